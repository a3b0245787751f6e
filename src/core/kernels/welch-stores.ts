import type { ComplexArray } from './complex-arrays';
import type { Backend } from './kernels-backend';

/**
 * How the powers of the segments are averaged.
 * - 'mean': arithmetic mean (Welch 1967).
 * - 'median': median divided by its bias for exponentially distributed powers (Allen et al. 2012, App. B, as SciPy).
 * - 'median-mean': segments number 0, 2, 4, … and 1, 3, 5, … form two halves; the median of each is divided by the bias
 *   of its own count and the two are averaged, each with weight one half. For segments overlapping by half this makes
 *   the segments of one half disjoint. (Allen et al. 2012, App. B; the equal weights are from MEMORY.) One segment
 *   alone gives its power.
 */
export type WelchAverage = 'mean' | 'median' | 'median-mean';

/** Median of n exponentially distributed numbers over their mean: Σ_{k=1}^{n'} (−1)^(k+1)/k, n' = n or n − 1, odd. */
export function medianBias(n: number): number {
  let bias = 1;
  for (let i = 2; i < n; i += 2) bias += 1 / (i + 1) - 1 / i;
  return bias;
}

/** Where powers go, one pass after the other. */
export interface PowerStore {
  readonly passes: number;
  add(spectrum: ComplexArray<'f64'>, index: number): void;
  endPass(count: number): void;
  power(): Float64Array;
  free(): void;
}

/** Running sum. */
export function meanStore(backend: Backend, bins: number): PowerStore {
  const sum = backend.array(bins, 'f64');
  let mean = new Float64Array(0);
  return {
    passes: 1,
    add: (spectrum) => backend.addPower(spectrum, sum),
    endPass: (count) => {
      mean = sum.slice().map((v) => v / count);
    },
    power: () => mean,
    free: () => sum.free(),
  };
}

/** Keeps every power of one band of bins per pass. */
export function medianStore(
  backend: Backend,
  bins: number,
  segments: number,
  average: 'median' | 'median-mean',
  memoryLimit: number,
): PowerStore {
  // Rows of whole cache lines; at least one line even when the limit is too small for it.
  const affordable = Math.max(8, Math.floor(memoryLimit / (8 * segments) / 8) * 8);
  const width = Math.min(Math.ceil(bins / 8) * 8, affordable);
  const passes = Math.ceil(bins / width);
  const rows = backend.array(width * segments, 'f64', false);
  const result = new Float64Array(bins);
  // Median-mean: the even-numbered segments take the first rows, the odd-numbered the others.
  const firstOdd = Math.ceil(segments / 2);
  const rowOf = (i: number): number => (average === 'median' ? i : (i & 1) * firstOdd + (i >> 1));
  let pass = 0;
  const band = (): [number, number] => [pass * width, Math.min(bins, (pass + 1) * width)];

  const median = (firstRow: number, count: number, weight: number): void => {
    const [from, to] = band();
    const out = backend.array(to - from, 'f64');
    try {
      backend.medians(rows.sub(firstRow * width, (firstRow + count) * width), width, count, out);
      const factor = weight / medianBias(count);
      out.view().forEach((v, k) => {
        result[from + k] += v * factor;
      });
    } finally {
      out.free();
    }
  };
  return {
    passes,
    add: (spectrum, index) => {
      const [from, to] = band();
      const at = rowOf(index) * width;
      backend.power(spectrum.sub(from, to), rows.sub(at, at + to - from));
    },
    endPass: (count) => {
      if (average === 'median' || count === 1) median(0, count, 1);
      else {
        median(0, Math.ceil(count / 2), 0.5);
        median(firstOdd, Math.floor(count / 2), 0.5);
      }
      pass++;
    },
    power: () => result,
    free: () => rows.free(),
  };
}
