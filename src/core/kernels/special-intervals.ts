import { normalQuantile, type Tail } from './special-erf';
import { incompleteBetaInverse } from './special-incomplete-beta';
import { incompleteGamma, incompleteGammaInverse } from './special-incomplete-gamma';

export interface Interval {
  readonly low: number;
  readonly high: number;
}

/** Probability that χ² with `dof` degrees of freedom lies above x. @example chiSquareTail(3.841, 1) // 0.05001 */
export function chiSquareTail(x: number, dof: number): number {
  return incompleteGamma(dof / 2, Math.max(0, x) / 2).upper;
}

/**
 * x at which χ² with `dof` > 0 degrees of freedom has probability p below ('lower') or above it.
 *
 * @example chiSquareQuantile(0.05, 1, 'upper') // 3.841458820694124
 */
export function chiSquareQuantile(p: number, dof: number, tail: Tail = 'lower'): number {
  return 2 * incompleteGammaInverse(dof / 2, p, tail);
}

function checkCounts(k: number, n: number, level: number): void {
  if (!Number.isSafeInteger(k) || k < 0 || !(n >= 1 && k <= n))
    throw new RangeError(`${k} of ${n}: counts must be whole numbers, the first not above the second`);
  if (!(level > 0 && level < 1))
    throw new RangeError(`confidence level ${level}: it must lie between 0 and 1`);
}

/**
 * Central interval of a fraction from k successes in n trials that covers the truth with at least the given
 * probability, whatever the truth: too wide rather than too narrow.
 *
 * Clopper & Pearson, Biometrika 26, 404 (1934) (MEMORY).
 *
 * @example clopperPearson(0, 10, 0.95) // { low: 0, high: 0.3085 } = 1 − 0.025^(1/10)
 */
export function clopperPearson(k: number, n: number, level: number): Interval {
  checkCounts(k, n, level);
  const side = (1 - level) / 2;
  return {
    low: k === 0 ? 0 : incompleteBetaInverse(side, k, n - k + 1, 'lower'),
    high: k === n ? 1 : incompleteBetaInverse(side, k + 1, n - k, 'upper'),
  };
}

/**
 * Interval of a fraction from k successes in n trials that covers the truth with about the given probability on
 * average: shorter than Clopper–Pearson's, and may cover too little for some fractions.
 *
 * Wilson, J. Am. Stat. Assoc. 22, 209 (1927) (MEMORY).
 *
 * @example wilsonInterval(0, 10, 0.95).high // 0.2775
 */
export function wilsonInterval(k: number, n: number, level: number): Interval {
  checkCounts(k, n, level);
  const z2 = normalQuantile((1 - level) / 2, 'upper') ** 2;
  const f = k / n;
  const middle = f + z2 / (2 * n);
  const half = Math.sqrt(z2 * ((f * (1 - f)) / n + z2 / (4 * n * n)));
  const scale = 1 + z2 / n;
  // Exactly 0 and 1 at the ends, where rounding would leave a trace of the other sign.
  return {
    low: k === 0 ? 0 : (middle - half) / scale,
    high: k === n ? 1 : (middle + half) / scale,
  };
}

/**
 * Upper limit on the mean of a Poisson process that gave k counts, at one-sided confidence `level`. Divide by the
 * observing time for a rate.
 *
 * @example poissonUpperLimit(0, 0.9) // 2.302585092994046 = ln 10
 */
export function poissonUpperLimit(k: number, level: number): number {
  checkCounts(k, Infinity, level);
  // P(at most k | μ) = Q(k + 1, μ).
  return incompleteGammaInverse(k + 1, 1 - level, 'upper');
}

/**
 * Central interval of the mean of a Poisson process that gave k counts, covering it with at least probability `level`.
 *
 * Garwood, Biometrika 28, 437 (1936) (MEMORY).
 *
 * @example poissonInterval(0, 0.9) // { low: 0, high: 2.9957 } = −ln 0.05
 */
export function poissonInterval(k: number, level: number): Interval {
  checkCounts(k, Infinity, level);
  const side = (1 - level) / 2;
  return {
    low: k === 0 ? 0 : incompleteGammaInverse(k, side, 'lower'),
    high: incompleteGammaInverse(k + 1, side, 'upper'),
  };
}
