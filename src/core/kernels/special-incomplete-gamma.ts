import { normalQuantile, type Tail } from './special-erf';
import { lnGamma, poissonTerm } from './special-gamma';
import { solve } from './special-solve';

/** A probability and its complement, both with all their digits. */
export interface Tails {
  readonly lower: number;
  readonly upper: number;
}

/**
 * Regularised incomplete gamma functions P(a, x) = ∫₀ˣ t^(a−1) e^(−t) dt/Γ(a) (lower) and Q = 1 − P (upper), a > 0,
 * x ≥ 0. Relative error of the smaller one below 1e-13.
 *
 * Series below the mean, continued fraction above, common factor by Loader's saddle point. Source: NIST Digital Library
 * of Mathematical Functions 8.11.4, 8.9.2 (MEMORY).
 *
 * @throws RangeError outside these limits.
 * @example incompleteGamma(2, 3).upper // 0.19914827347145578 = 4 e^(−3)
 */
export function incompleteGamma(a: number, x: number): Tails {
  if (!(a > 0 && x >= 0 && a < Infinity))
    throw new RangeError(`incomplete gamma function of a = ${a}, x = ${x}`);
  if (x === 0) return { lower: 0, upper: 1 };
  if (x === Infinity) return { lower: 1, upper: 0 };
  const factor = poissonTerm(a, x);
  if (x < (a < 1 ? 0.6 : a + 1)) {
    let term = 1;
    let sum = 1;
    for (let k = 1; term > sum * 1e-17; k++) {
      term *= x / (a + k);
      sum += term;
    }
    const lower = factor * sum;
    return { lower, upper: 1 - lower };
  }
  const upper = a * factor * upperFraction(a, x);
  return { lower: 1 - upper, upper };
}

/** Q(a, x) Γ(a) e^x x^(−a) by the modified Lentz method. */
function upperFraction(a: number, x: number): number {
  let b = x + 1 - a;
  let c = 1e300;
  let d = 1 / b;
  let f = d;
  for (let k = 1; k < 1e7; k++) {
    const n = -k * (k - a);
    b += 2;
    d = 1 / (n * d + b);
    c = b + n / c;
    f *= c * d;
    if (Math.abs(c * d - 1) < 1e-16) break;
  }
  return f;
}

/**
 * x at which the incomplete gamma function has the given lower or upper tail p. Small tails keep their digits only if
 * given as such. 0 and Infinity at the ends.
 *
 * @throws RangeError if p is not between 0 and 1.
 * @example incompleteGammaInverse(2, 0.19914827347145578, 'upper') // 3
 */
export function incompleteGammaInverse(a: number, p: number, tail: Tail): number {
  if (!(p >= 0 && p <= 1)) throw new RangeError(`probability ${p}: it must lie between 0 and 1`);
  const side: Tail = p > 0.5 ? (tail === 'lower' ? 'upper' : 'lower') : tail;
  const wanted = Math.min(p, 1 - p);
  if (wanted === 0) return side === 'lower' ? 0 : Infinity;
  const small = (Math.log(wanted) + lnGamma(a + 1)) / a;
  // So near zero that the first term of the series is all; x itself may be below the smallest number.
  if (side === 'lower' && small < -50) return Math.exp(small);
  // Start: Wilson & Hilferty, Proc. Nat. Acad. Sci. 17, 684 (1931).
  const cube = 1 - 1 / (9 * a) + normalQuantile(wanted, side) / (3 * Math.sqrt(a));
  const start = cube > 0.2 ? Math.log(a) + 3 * Math.log(cube) : side === 'lower' ? small : Math.log(a) - 1;
  return Math.exp(
    solve(
      (u) => {
        const x = Math.exp(u);
        const found = incompleteGamma(a, x)[side];
        const slope = (a * poissonTerm(a, x)) / found;
        return { value: Math.log(found / wanted), slope: side === 'lower' ? slope : -slope };
      },
      side === 'lower',
      start,
    ),
  );
}
