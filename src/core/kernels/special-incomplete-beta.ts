import { normalQuantile, type Tail } from './special-erf';
import { binomialTerm } from './special-gamma';
import type { Tails } from './special-incomplete-gamma';
import { solve } from './special-solve';

/**
 * Regularised incomplete beta function I_x(a, b) (lower) and 1 − I_x (upper), a, b > 0, 0 ≤ x ≤ 1. Relative error of the
 * smaller one below 1e-13.
 *
 * @param y 1 − x, where it is known more exactly than that difference.
 *
 * Continued fraction, common factor by Loader's saddle point. Source: NIST Digital Library of Mathematical Functions
 * 8.17.22 (MEMORY).
 *
 * @throws RangeError outside these limits.
 * @example incompleteBeta(0.5, 2, 3).lower // 0.6875 = 11/16
 */
export function incompleteBeta(x: number, a: number, b: number, y: number = 1 - x): Tails {
  if (!(a > 0 && b > 0 && a + b < Infinity && x >= 0 && y >= 0))
    throw new RangeError(`incomplete beta function of x = ${x}, a = ${a}, b = ${b}`);
  if (x === 0) return { lower: 0, upper: 1 };
  if (y === 0) return { lower: 1, upper: 0 };
  const n = a + b;
  // x^a y^b/B(a, b)
  const factor = ((a * b) / n) * binomialTerm(a, b, x, y);
  if (x * (n + 2) < a + 1) {
    const lower = (factor / a) * fraction(x, a, b);
    return { lower, upper: 1 - lower };
  }
  const upper = (factor / b) * fraction(y, b, a);
  return { lower: 1 - upper, upper };
}

/** Continued fraction of I_x by the modified Lentz method. */
function fraction(x: number, a: number, b: number): number {
  let c = 1;
  let d = 1 / (1 - ((a + b) * x) / (a + 1));
  let f = d;
  for (let m = 1; m < 1e7; m++) {
    const even = (m * (b - m) * x) / ((a + 2 * m - 1) * (a + 2 * m));
    d = 1 / (1 + even * d);
    c = 1 + even / c;
    f *= c * d;
    const odd = (-(a + m) * (a + b + m) * x) / ((a + 2 * m) * (a + 2 * m + 1));
    d = 1 / (1 + odd * d);
    c = 1 + odd / c;
    f *= c * d;
    if (Math.abs(c * d - 1) < 1e-16) break;
  }
  return f;
}

/**
 * x at which I_x(a, b) has the given lower or upper tail p. Small tails keep their digits only if given as such.
 *
 * @throws RangeError if p is not between 0 and 1.
 * @example incompleteBetaInverse(0.6875, 2, 3, 'lower') // 0.5
 */
export function incompleteBetaInverse(p: number, a: number, b: number, tail: Tail): number {
  if (!(p >= 0 && p <= 1)) throw new RangeError(`probability ${p}: it must lie between 0 and 1`);
  const side: Tail = p > 0.5 ? (tail === 'lower' ? 'upper' : 'lower') : tail;
  const wanted = Math.min(p, 1 - p);
  if (wanted === 0) return side === 'lower' ? 0 : 1;
  // In u = ln(x/(1 − x)) both ends keep their digits and the distribution is near normal.
  const start = Math.log(a / b) + normalQuantile(wanted, side) * Math.sqrt(1 / a + 1 / b);
  const u = solve(
    (at) => {
      const x = 1 / (1 + Math.exp(-at));
      const y = 1 / (1 + Math.exp(at));
      const found = incompleteBeta(x, a, b, y)[side];
      const slope = (((a * b) / (a + b)) * binomialTerm(a, b, x, y)) / found;
      return { value: Math.log(found / wanted), slope: side === 'lower' ? slope : -slope };
    },
    side === 'lower',
    start,
  );
  return 1 / (1 + Math.exp(-u));
}
