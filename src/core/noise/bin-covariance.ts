import { powerCorrelation } from './power-correlation';

/** Neighbours further away than this are not correlated for any window offered. */
const FAR = 8;

/**
 * Covariance of two bins d = 0, 1, 2, … apart of a Welch mean over `segments` segments `step` samples apart, relative to
 * the product of their densities: (1/K)[r_0(d) + 2 Σ_j (1 − j/K) r_j(d)], with r_j(d) the correlation of the powers of
 * segments j steps apart. Welch, IEEE Trans. AU-15, 70 (1967) for d = 0.
 */
export function binCovariance(window: Float64Array, step: number): (segments: number) => readonly number[] {
  const lags = Math.ceil(window.length / step);
  const r = Array.from({ length: lags }, (_, j) =>
    Array.from({ length: FAR + 1 }, (__, d) => powerCorrelation(window, j * step, d)),
  );
  return (segments) =>
    Array.from({ length: FAR + 1 }, (_, d) => {
      let sum = r[0][d];
      for (let j = 1; j < lags && j < segments; j++) sum += 2 * (1 - j / segments) * r[j][d];
      return sum / segments;
    });
}

/** Relative variance of Σ a_k P_k for bins with a_k S_k = `parts` and the covariance above. */
export function sumVariance(parts: Float64Array, covariance: readonly number[]): number {
  let [sum, square] = [0, 0];
  for (let k = 0; k < parts.length; k++) {
    sum += parts[k];
    square += covariance[0] * parts[k] * parts[k];
    for (let d = 1; d < covariance.length && k + d < parts.length; d++)
      square += 2 * covariance[d] * parts[k] * parts[k + d];
  }
  return square / (sum * sum);
}
