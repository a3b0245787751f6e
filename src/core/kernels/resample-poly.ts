import { UserError } from '../data/errors';
import { reduced, type Ratio } from './resample-poly-ratio';
import { makeWindow } from './windows';

/** An anti-alias filter split into the parts ("phases") that meet one output sample each. */
export interface ResamplePlan extends Ratio {
  /** Half the length of the filter, in samples of the rate · up grid. */
  readonly half: number;
  /** Taps per phase. */
  readonly taps: number;
  /** Taps of phase p at p · taps, in the order of the input samples they multiply. */
  readonly phases: Float64Array;
}

export interface Resampled {
  readonly y: Float64Array;
  /** Output samples at each end whose filter reaches outside the input, where zeros are assumed: not to be used. */
  readonly edges: { readonly start: number; readonly end: number };
}

/**
 * Part of the new Nyquist frequency (of the lower rate) up to which the gain is within 1 % of 1. Above 2 − 0.84 = 1.16
 * times it, and so for what folds to below 0.84, the filter is below −53 dB; at the new Nyquist itself it is −6 dB.
 * With the default β.
 */
export const CLEAN_FRACTION = 0.84;

/**
 * Filter for resampling by up/down: a sinc of ten zero crossings on each side under a Kaiser window, cut at the lower of
 * both Nyquist frequencies, gain 1 at zero frequency. As scipy.signal.resample_poly designs it.
 *
 * @param beta Kaiser's β. 5 suppresses aliases by 53 dB; 9 by 90 dB, with a pass band clean to 0.71 instead of 0.84.
 * @throws UserError for factors that are not whole numbers from 1 to 65536 in lowest terms.
 */
export function planResample(up: number, down: number, beta = 5): ResamplePlan {
  const ratio = reduced(up, down);
  const widest = Math.max(ratio.up, ratio.down);
  const half = widest === 1 ? 0 : 10 * widest;
  const h = makeWindow('kaiser', 2 * half + 1, { beta, periodic: false }).map((w, i) => {
    const x = (Math.PI * (i - half)) / widest;
    return x === 0 ? w : (w * Math.sin(x)) / x;
  });
  const level = ratio.up / h.reduce((sum, v) => sum + v, 0);
  const taps = Math.ceil(h.length / ratio.up);
  const phases = new Float64Array(taps * ratio.up);
  h.forEach((v, i) => {
    phases[(i % ratio.up) * taps + taps - 1 - Math.floor(i / ratio.up)] = v * level;
  });
  return { ...ratio, half, taps, phases };
}

/** Samples that come out of n samples: ⌈n · up/down⌉; output m lies at the time of input m · down/up. */
export const resampledLength = ({ up, down }: Ratio, n: number): number => Math.ceil((n * up) / down);

/** Number of outputs at each end, among `resampledLength` of them, that the ends of n input samples have touched. */
export function resampleEdges(plan: ResamplePlan, n: number): Resampled['edges'] {
  const outputs = resampledLength(plan, n);
  const start = Math.min(outputs, Math.ceil(plan.half / plan.down));
  const firstBad = Math.max(0, Math.floor(((n - 1) * plan.up - plan.half) / plan.down) + 1);
  return { start, end: outputs - Math.min(outputs, firstBad) };
}

/**
 * Computes outputs `from` … `from + out.length − 1` from the stretch of input `x` whose first sample has index `offset`.
 * Input outside the stretch counts as zero. Only kept outputs are computed, each by the same sum in the same order
 * whatever the stretch.
 */
export function resampleInto(
  plan: ResamplePlan,
  x: Float64Array,
  offset: number,
  from: number,
  out: Float64Array,
): void {
  const { up, down, half, taps, phases } = plan;
  const n = x.length;
  for (let tile = 0; tile < out.length; tile += 4 * up) {
    const end = Math.min(tile + 4 * up, out.length);
    for (let r = tile; r < Math.min(tile + up, end); r++) {
      // Outputs r, r + up, r + 2 up, r + 3 up meet the same taps, on inputs `down` apart. `reach` is the index on the fine
      // grid of the newest tap; input i meets tap (reach − i · up).
      const reach = (from + r) * down + half;
      const newest = Math.floor(reach / up);
      const tap = (reach - newest * up) * taps;
      const first = newest - taps + 1 - offset;
      if (first >= 0 && r + 3 * up < end && first + 3 * down + taps <= n) {
        four(phases, tap, taps, x, first, down, out, r, up);
        continue;
      }
      for (let m = r, i = first; m < end; m += up, i += down) {
        const skip = Math.max(0, -i);
        out[m] = dot(phases, tap + skip, x, i + skip, Math.min(taps, n - i) - skip);
      }
    }
  }
}

// Indices below are made 32-bit integers: as doubles they cost five times the arithmetic.

/** Σ h[t + k] x[i + k], k < count. */
function dot(h: Float64Array, tap: number, x: Float64Array, first: number, count: number): number {
  let i = first | 0;
  const end = (i + count) | 0;
  const shift = (tap - first) | 0;
  let sum = 0;
  for (; i < end; i = (i + 1) | 0) sum += h[(i + shift) | 0] * x[i];
  return sum;
}

/** Four such sums at once, so that their additions do not wait for each other and each tap is fetched once. */
function four(
  h: Float64Array,
  tap: number,
  count: number,
  x: Float64Array,
  first: number,
  step: number,
  out: Float64Array,
  at: number,
  apart: number,
): void {
  const [i0, i1, i2, i3] = [first | 0, (first + step) | 0, (first + 2 * step) | 0, (first + 3 * step) | 0];
  const [t, n] = [tap | 0, count | 0];
  let a = 0;
  let b = 0;
  let c = 0;
  let d = 0;
  for (let k = 0; k < n; k = (k + 1) | 0) {
    const v = h[(t + k) | 0];
    a += v * x[(i0 + k) | 0];
    b += v * x[(i1 + k) | 0];
    c += v * x[(i2 + k) | 0];
    d += v * x[(i3 + k) | 0];
  }
  out[at] = a;
  out[at + apart] = b;
  out[at + 2 * apart] = c;
  out[at + 3 * apart] = d;
}

/**
 * Resamples a whole record by the ratio up/down, without delay: output 0 lies at the time of input 0.
 *
 * @param x Samples, any unit; NaN spreads over the length of the filter, so split at gaps first.
 * @param up New samples per `down` old ones; both are divided by their common factor.
 * @param beta See `planResample`.
 * @returns ⌈n · up/down⌉ samples and the number at each end that zeros outside the record have touched: ten samples of
 * the lower rate.
 * @throws UserError for an empty record or an absurd ratio.
 *
 * Equal to scipy.signal.resample_poly. Frequencies above the new Nyquist are filtered out before samples are dropped;
 * what lies within 16 % of it is attenuated or folded, see CLEAN_FRACTION. Source: Crochiere & Rabiner, Multirate Digital
 * Signal Processing (Prentice-Hall, 1983) (MEMORY).
 *
 * @example resample(new Float64Array(100).fill(1), 1, 4).edges // { start: 10, end: 10 }
 */
export function resample(x: Float64Array, up: number, down: number, beta = 5): Resampled {
  if (x.length === 0)
    throw new UserError('resample-empty', 'resampling an empty record: there are no samples');
  const plan = planResample(up, down, beta);
  const y = new Float64Array(resampledLength(plan, x.length));
  resampleInto(plan, x, 0, 0, y);
  return { y, edges: resampleEdges(plan, x.length) };
}
