import { incompleteBetaInverse } from '../kernels/special-incomplete-beta';
import { incompleteGammaInverse } from '../kernels/special-incomplete-gamma';
import type { AverageKind } from '../data/kinds';
import { digamma, trigamma } from './polygamma';

/** Law of one bin of an averaged spectrum over its mean, Gaussian noise alone. */
export interface BinLaw {
  readonly median: number;
  /** Value that is exceeded with probability `p`. */
  above(p: number): number;
}

/**
 * Law of a bin whose relative variance is `variance`. A mean is gamma distributed (Welch 1967). A median of exponential
 * variables is −ln(1 − B) with B of the beta distribution (m, m), m = (n + 1)/2 for n independent segments (order statistics;
 * David & Nagaraja, Order Statistics, 2003, 2.1, MEMORY), over its mean ψ(2m) − ψ(m); m is taken from the variance, so that
 * overlap is accounted for. A mean of two medians is taken as gamma distributed.
 */
export function binLaw(average: AverageKind, variance: number): BinLaw {
  if (average !== 'median') {
    const a = 1 / variance;
    return {
      median: incompleteGammaInverse(a, 0.5, 'lower') / a,
      above: (p) => incompleteGammaInverse(a, p, 'upper') / a,
    };
  }
  const m = betaShape(variance);
  const mean = digamma(2 * m) - digamma(m);
  // 1 − B is the beta variable with the same arguments: small values keep their digits.
  const value = (p: number): number => -Math.log(incompleteBetaInverse(p, m, m, 'lower')) / mean;
  return { median: Math.LN2 / mean, above: value };
}

/** m at which the median has the given relative variance, [ψ′(m) − ψ′(2m)]/[ψ(2m) − ψ(m)]², which falls with m. */
function betaShape(variance: number): number {
  let [low, high] = [Math.log(0.51), Math.log(1e7)];
  for (let i = 0; i < 80; i++) {
    const u = (low + high) / 2;
    const m = Math.exp(u);
    if ((trigamma(m) - trigamma(2 * m)) / (digamma(2 * m) - digamma(m)) ** 2 > variance) low = u;
    else high = u;
  }
  return Math.exp((low + high) / 2);
}
