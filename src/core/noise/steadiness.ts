import { median } from './spectrum-facts';

const OCTAVES = 7;
/** Fewest and most bins of an octave that are watched. */
const FEWEST = 16;
const MOST = 128;
/** Fewest segments whose mean and median are compared. */
const SEGMENTS = 8;
/** Difference that is always tolerated, and the number of standard deviations of chance added to it. */
const TOLERATED = 0.1;
const SIGMAS = 5;

/** The watched octave in which mean and median of the segments' power differ most. */
export interface Loudest {
  /** Hz */
  readonly band: readonly [number, number];
  readonly meanOverMedian: number;
  /** What chance and a tolerated difference of 10 % explain. */
  readonly limit: number;
  /** Number of the loudest segment and its power over the median. */
  readonly segment: number;
  readonly overMedian: number;
}

/** Bins watched for one octave. */
export interface WatchedOctave {
  /** Bins, spread evenly and at least `binWidth` apart, so that chance hits each on its own. */
  readonly bins: readonly number[];
}

/**
 * Octaves downward from the Nyquist frequency, at most seven, none with fewer than 16 bins to watch.
 *
 * @param binWidth noise bandwidth of the window in bins
 */
export function watchedOctaves(bins: number, binWidth: number): WatchedOctave[] {
  const out: WatchedOctave[] = [];
  for (let to = bins - 1, k = 0; k < OCTAVES; k++, to = Math.floor(to / 2)) {
    const from = Math.ceil(to / 2);
    const count = Math.min(MOST, Math.floor((to - from) / Math.ceil(binWidth)));
    if (count < FEWEST) break;
    out.push({
      bins: Array.from({ length: count }, (_, i) => from + Math.floor(((i + 0.5) * (to - from)) / count)),
    });
  }
  return out;
}

/**
 * Geometric mean of a segment's power over watched bins, in arbitrary unit. Unlike the sum, it gives a strong line,
 * whose power scatters from segment to segment by itself, no more weight than any other bin.
 */
export function octaveLevel(re: Float64Array, im: Float64Array, { bins }: WatchedOctave): number {
  let sum = 0;
  for (const k of bins) sum += Math.log(re[k] * re[k] + im[k] * im[k] + Number.MIN_VALUE);
  return Math.exp(sum / bins.length);
}

/**
 * Compares mean and median of the segments' levels in each octave. In steady Gaussian noise the logarithm of one bin's
 * power has variance π²/6, so that of the level σ² = π²/(6 M) for M bins; mean and median of the levels then differ by
 * about σ²/2, and that difference scatters by σ √((π/2 − 1)/K) over K segments.
 */
export function loudestOctave(
  octaves: readonly WatchedOctave[],
  watched: readonly Float64Array[],
  df: number,
): Loudest | undefined {
  const found = octaves.flatMap(({ bins }, b): Loudest[] => {
    const powers = watched[b];
    const typical = median(powers);
    if (powers.length < SEGMENTS || !(typical > 0)) return [];
    const variance = Math.PI ** 2 / (6 * bins.length);
    const meanOverMedian = powers.reduce((s, p) => s + p, 0) / powers.length / typical;
    const chance = Math.sqrt(((Math.PI / 2 - 1) * variance) / powers.length);
    const segment = powers.reduce((best, p, k) => (p > powers[best] ? k : best), 0);
    return [
      {
        band: [bins[0] * df, bins.at(-1)! * df],
        meanOverMedian,
        limit: 1 + TOLERATED + variance / 2 + SIGMAS * chance,
        segment,
        overMedian: powers[segment] / typical,
      },
    ];
  });
  const over = (l: Loudest): number => l.meanOverMedian - l.limit;
  return found.reduce<Loudest | undefined>(
    (best, l) => (best && over(best) >= over(l) ? best : l),
    undefined,
  );
}
