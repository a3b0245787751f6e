import type { Envelope, SampleStats, Series } from '../data/kinds';
import { spanLength, type Span } from '../data/spans';
import { emptyEnvelope, foldEnvelope } from '../figures/envelope';
import { FlatRunFinder } from './flat-runs';
import { RunningMoments } from './running-moments';
import { robustWidth, type RobustWidth } from './robust-width';

const BLOCK = 1 << 18;
const BINS = 120;
const REACH = 6;

/** Everything the first inspection of a series finds out about its samples. */
export interface SampleScan {
  readonly stats: SampleStats;
  /** Standard deviation about the mean. */
  readonly deviation: number;
  readonly robust: RobustWidth;
  readonly envelope: Envelope;
  /** The end bins also hold everything beyond them. */
  readonly histogram: { readonly edges: Float64Array; readonly counts: Float64Array };
  readonly saturated: readonly Span[];
  /** Runs of one and the same value for at least 50 ms and 256 samples. */
  readonly flat: readonly Span[];
  /** Whether every valid sample is a whole number. */
  readonly whole: boolean;
}

/**
 * Reads a series once in blocks (and a few blocks before that for the histogram's edges) and gathers statistics,
 * envelope, histogram and runs of equal samples.
 *
 * @param block called once per block with the fraction done
 */
export async function scanSamples(
  series: Series,
  block: (fraction: number) => Promise<void>,
): Promise<SampleScan> {
  const robust = robustWidth(series);
  const edges = histogramEdges(robust);
  const counts = new Float64Array(edges.length - 1);
  const envelope = emptyEnvelope(series.length);
  const runs = new FlatRunFinder(Math.max(256, Math.ceil(0.05 * series.rate)));
  const sums = new Sums();
  const buffer = new Float64Array(Math.min(BLOCK, series.length));
  for (let from = 0; from < series.length; from += BLOCK) {
    await block(from / series.length);
    const to = Math.min(series.length, from + BLOCK);
    const samples = series.read(from, to, buffer.subarray(0, to - from));
    foldEnvelope(envelope, samples, to - from, from);
    runs.take(samples, to - from, from);
    sums.take(samples);
    count(samples, to - from, edges, counts);
  }
  const { saturated, flat } = runs.finish(series.length);
  return {
    stats: { ...sums.stats(), saturated: spanLength(saturated) },
    deviation: sums.moments.deviation,
    robust,
    envelope,
    histogram: { edges, counts },
    saturated,
    flat,
    whole: sums.whole,
  };
}

/** 120 bins over ±6 robust widths about the median; for whole numbers every bin holds equally many of them. */
function histogramEdges({ median, width, whole }: RobustWidth): Float64Array {
  const centre = Number.isFinite(median) ? median : 0;
  let bin = (2 * REACH * width) / BINS;
  if (!(bin > Math.abs(centre) * 1e-14)) bin = (2 * (Math.abs(centre) || 1)) / BINS;
  if (whole) bin = Math.max(1, Math.round(bin));
  const first = whole ? Math.round(centre) - 0.5 - (BINS / 2) * bin : centre - (BINS / 2) * bin;
  return Float64Array.from({ length: BINS + 1 }, (_, k) => first + k * bin);
}

function count(samples: Float64Array, n: number, edges: Float64Array, counts: Float64Array): void {
  const first = edges[0];
  const perBin = counts.length / (edges.at(-1)! - first);
  const last = counts.length - 1;
  for (let i = 0; i < n; i++) {
    const v = samples[i];
    if (!(Math.abs(v) < Infinity)) continue;
    const k = Math.floor((v - first) * perBin);
    counts[k < 0 ? 0 : k > last ? last : k]++;
  }
}

/** Count, extremes and moments of the finite samples. */
class Sums {
  readonly moments = new RunningMoments();
  whole = true;
  #bad = 0;
  #min = Infinity;
  #max = -Infinity;

  take(samples: Float64Array): void {
    let { whole } = this;
    let min = this.#min;
    let max = this.#max;
    let from = 0;
    for (let i = 0; i < samples.length; i++) {
      const v = samples[i];
      if (!(Math.abs(v) < Infinity)) {
        this.moments.take(samples, from, i);
        this.#bad++;
        from = i + 1;
        continue;
      }
      if (v < min) min = v;
      if (v > max) max = v;
      if (whole && !Number.isInteger(v)) whole = false;
    }
    this.moments.take(samples, from, samples.length);
    this.whole = whole;
    this.#min = min;
    this.#max = max;
  }

  stats(): Omit<SampleStats, 'saturated'> {
    const { count, mean, rms } = this.moments;
    const none = count === 0;
    return {
      count,
      notFinite: this.#bad,
      min: none ? NaN : this.#min,
      max: none ? NaN : this.#max,
      mean: none ? NaN : mean,
      rms,
    };
  }
}
