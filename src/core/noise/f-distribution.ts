import { incompleteBetaInverse } from '../kernels/special-incomplete-beta';
import { chiSquareQuantile } from '../kernels/special-intervals';
import type { Tail } from '../kernels/special-erf';

/**
 * Value that the ratio of two independent variances, each chi-square distributed over its degrees of freedom, exceeds
 * ('upper') or stays below ('lower') with probability `p`. Infinite degrees of freedom stand for a variance known exactly.
 * F = (d2/d1) B/(1 − B) with B of the beta distribution (d1/2, d2/2); Abramowitz & Stegun 26.6.2 (MEMORY).
 */
export function fQuantile(p: number, d1: number, d2: number, tail: Tail): number {
  const other: Tail = tail === 'lower' ? 'upper' : 'lower';
  if (d1 === Infinity && d2 === Infinity) return 1;
  if (d2 === Infinity) return chiSquareQuantile(p, d1, tail) / d1;
  if (d1 === Infinity) return d2 / chiSquareQuantile(p, d2, other);
  // 1 − B is the beta variable with the arguments exchanged; both keep their digits in the tails.
  const b = incompleteBetaInverse(p, d1 / 2, d2 / 2, tail);
  const rest = incompleteBetaInverse(p, d2 / 2, d1 / 2, other);
  return (d2 / d1) * (b / rest);
}
