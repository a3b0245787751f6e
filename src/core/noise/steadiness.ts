import { median } from './spectrum-facts';

const OCTAVES = 7;
/** Fewest bins of an octave that is watched. */
const FEWEST = 16;
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

/** Octaves downward from the Nyquist frequency as bins `[from, to)`, at most seven, none with fewer than 16 bins. */
export function watchedOctaves(bins: number): [number, number][] {
  const out: [number, number][] = [];
  for (let to = bins - 1, k = 0; k < OCTAVES && to / 2 >= FEWEST; k++, to = Math.floor(to / 2))
    out.push([Math.ceil(to / 2), to]);
  return out;
}

/**
 * Compares mean and median of the segments' power in each octave. In steady Gaussian noise the two agree: the power of
 * M bins is a gamma variable whose median is below its mean by about 1/(3M), and the difference of sample mean and sample
 * median of K of them scatters by √((π/2 − 1)/(K M)).
 *
 * @param binWidth noise bandwidth of the window in bins, which makes neighbouring bins depend on each other
 */
export function loudestOctave(
  octaves: readonly (readonly [number, number])[],
  watched: readonly Float64Array[],
  df: number,
  binWidth: number,
): Loudest | undefined {
  const found = octaves.flatMap(([from, to], b): Loudest[] => {
    const powers = watched[b];
    const typical = median(powers);
    if (powers.length < SEGMENTS || !(typical > 0)) return [];
    const free = (to - from) / binWidth;
    const meanOverMedian = powers.reduce((s, p) => s + p, 0) / powers.length / typical;
    const chance = Math.sqrt((Math.PI / 2 - 1) / (powers.length * free));
    const segment = powers.reduce((best, p, k) => (p > powers[best] ? k : best), 0);
    return [
      {
        band: [from * df, to * df],
        meanOverMedian,
        limit: 1 + TOLERATED + 1 / (3 * free) + SIGMAS * chance,
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
