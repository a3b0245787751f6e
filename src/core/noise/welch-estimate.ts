import type { AverageKind, Series } from '../data/kinds';
import { spanLength } from '../data/spans';
import type { Kernels } from '../kernels/kernels';
import { RunningMoments } from '../look/running-moments';
import type { SegmentPlan } from './segments';
import { octaveLevel, type WatchedOctave } from './steadiness';

/** Samples read at a time, at least; a block holds several segments. */
const BLOCK = 1 << 18;

export interface WelchRequest {
  readonly average: AverageKind;
  readonly window: Float64Array;
  readonly detrend: 'constant' | 'none';
  /** Octaves whose level is kept for every segment. */
  readonly watch: readonly WatchedOctave[];
  /** Bytes for work arrays. */
  readonly memoryLimit: number;
  /** Called once per block with the fraction done. */
  readonly block: (fraction: number, note?: string) => Promise<void>;
}

export interface WelchEstimate {
  /** One-sided density in squared sample unit per Hz; floor(size / 2) + 1 bins. */
  readonly density: Float64Array;
  /** Level of each segment in each watched octave, in arbitrary unit. */
  readonly watched: readonly Float64Array[];
  readonly passes: number;
  /** Moments of the samples that entered, each counted once. */
  readonly moments: RunningMoments;
  /** Whether every sample that entered is a float32 value. */
  readonly float32: boolean;
}

/**
 * Averaged one-sided power spectral density of the segments of a plan, streaming: the series is read in blocks, and
 * read again when the powers a median needs exceed the memory limit.
 *
 * Scaling: P(f) = 2 / (rate Σ w²) |Σ w x e^(−2πi f n / rate)|², without the 2 at zero frequency and at the Nyquist
 * frequency, so that Σ P Δf of the mean average is the mean square of the windowed samples (Welch 1967).
 */
export async function welchEstimate(
  series: Series,
  plan: SegmentPlan,
  kernels: Kernels,
  request: WelchRequest,
): Promise<WelchEstimate> {
  const { window, detrend, average, watch } = request;
  const { size, step } = plan;
  const segments = plan.starts.length;
  const transform = kernels.createSegmentTransform({ segment: size, window, detrend });
  const welch = kernels.createWelch({
    segment: size,
    window,
    detrend,
    segments,
    step,
    transform,
    average,
    memoryLimit: request.memoryLimit,
  });
  const watched = watch.map(() => new Float64Array(segments));
  const moments = new RunningMoments();
  let float32 = true;
  const { passes } = welch;
  const total = passes * spanLength(plan.used);
  const buffer = new Float64Array(Math.max(BLOCK, 4 * size));
  let done = 0;
  try {
    for (let pass = 0; pass < passes; pass++) {
      let segment = 0;
      for (const span of plan.used) {
        // The buffer holds samples [at, filled); what a later segment needs of them is moved to its front.
        let at = span.from;
        let filled = span.from;
        let next = span.from;
        while (next + size <= span.to) {
          if (next > at) buffer.copyWithin(0, next - at, filled - at);
          at = next;
          const to = Math.min(span.to, at + buffer.length);
          const fresh = buffer.subarray(filled - at, to - at);
          await request.block(done / total, passes > 1 ? `pass ${pass + 1} of ${passes}` : undefined);
          series.read(filled, to, fresh);
          done += to - filled;
          filled = to;
          if (pass === 0) {
            moments.take(fresh, 0, fresh.length);
            float32 &&= fresh.every((v) => Math.fround(v) === v);
          }
          for (; next + size <= filled; next += step) {
            transform.load(buffer, next - at);
            welch.addLoaded();
            if (pass === 0) {
              const re = transform.spectrum.re.view();
              const im = transform.spectrum.im.view();
              watched.forEach((w, b) => (w[segment] = octaveLevel(re, im, watch[b])));
            }
            segment++;
          }
        }
      }
      welch.endPass();
    }
    const density = welch.result().power.map(densityScale(window, series.rate, size));
    return { density, watched, passes, moments, float32 };
  } finally {
    welch.free();
    transform.free();
  }
}

function densityScale(
  window: Float64Array,
  rate: number,
  size: number,
): (power: number, k: number) => number {
  let squares = 0;
  for (const w of window) squares += w * w;
  const twoSided = 1 / (rate * squares);
  const nyquist = size % 2 === 0 ? size / 2 : -1;
  return (power, k) => power * (k === 0 || k === nyquist ? twoSided : 2 * twoSided);
}
