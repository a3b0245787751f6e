import type { Series } from '../../src/core/data/kinds';

/** A sine of amplitude 1 and phase 0.3 at sample 0. */
export const sine = (n: number, rate: number, f: number): Float64Array =>
  Float64Array.from({ length: n }, (_, i) => Math.sin((2 * Math.PI * f * i) / rate + 0.3));

/** Root mean square of the valid samples times √2: the amplitude of a sine. */
export function amplitude(data: Series): number {
  let sum = 0;
  let n = 0;
  for (const { from, to } of data.valid) {
    for (const v of data.read(from, to)) sum += v * v;
    n += to - from;
  }
  return Math.sqrt((2 * sum) / n);
}

/** Largest difference of samples `keep` that are valid in a series from expected ones, over the largest expected. */
export function worst(data: Series, keep: readonly number[], expected: readonly number[]): number {
  const scale = Math.max(...expected.map(Math.abs));
  const x = data.read(0, data.length);
  let most = 0;
  let compared = 0;
  keep.forEach((i, k) => {
    if (!data.valid.some((s) => i >= s.from && i < s.to)) return;
    most = Math.max(most, Math.abs(x[i] - expected[k]) / scale);
    compared++;
  });
  if (compared < keep.length / 4) throw new Error(`only ${compared} of ${keep.length} samples are valid`);
  return most;
}
