/** Coefficients of Lanczos' approximation with g = 7 and nine terms (Lanczos, SIAM J. Numer. Anal. B 1, 86, 1964), MEMORY; checked against SciPy. */
const LANCZOS = [
  0.99999999999980993, 676.5203681218851, -1259.1392167224028, 771.32342877765313, -176.61502916214059,
  12.507343278686905, -0.13857109526572012, 9.9843695780195716e-6, 1.5056327351493116e-7,
] as const;

/** Natural logarithm of the gamma function for x > 0. */
export function logGamma(x: number): number {
  if (x < 0.5) return Math.log(Math.PI / Math.sin(Math.PI * x)) - logGamma(1 - x);
  const z = x - 1;
  let sum: number = LANCZOS[0];
  for (let i = 1; i < LANCZOS.length; i++) sum += LANCZOS[i] / (z + i);
  const t = z + 7.5;
  return 0.5 * Math.log(2 * Math.PI) + (z + 0.5) * Math.log(t) - t + Math.log(sum);
}

/**
 * Regularised lower incomplete gamma function P(a, x): the probability that a gamma variable of shape `a` and scale 1 is
 * below `x`. Series below a + 1, continued fraction (modified Lentz) above; Abramowitz & Stegun 6.5.29 and 6.5.31 (MEMORY).
 */
export function gammaBelow(a: number, x: number): number {
  if (!(a > 0)) throw new RangeError(`the shape must be positive, not ${a}`);
  if (x <= 0) return 0;
  const front = Math.exp(-x + a * Math.log(x) - logGamma(a));
  if (x < a + 1) {
    let term = 1 / a;
    let sum = term;
    for (let n = 1; n < 100_000 && term > sum * 1e-17; n++) {
      term *= x / (a + n);
      sum += term;
    }
    return sum * front;
  }
  const tiny = 1e-300;
  let b = x + 1 - a;
  let c = 1 / tiny;
  let d = 1 / b;
  let h = d;
  for (let n = 1; n < 100_000; n++) {
    const an = -n * (n - a);
    b += 2;
    d = an * d + b;
    if (Math.abs(d) < tiny) d = tiny;
    c = b + an / c;
    if (Math.abs(c) < tiny) c = tiny;
    d = 1 / d;
    h *= d * c;
    if (Math.abs(d * c - 1) < 1e-16) break;
  }
  return 1 - front * h;
}

/**
 * Value below which a chi-square variable with `freedom` degrees of freedom (any positive number) lies with probability
 * `p`, by bisection of the logarithm to float64 precision.
 */
export function chiSquareQuantile(p: number, freedom: number): number {
  if (!(p > 0 && p < 1)) throw new RangeError(`the probability must be between 0 and 1, not ${p}`);
  const a = freedom / 2;
  let low = Math.log(1e-300);
  let high = Math.log(a + 40 * Math.sqrt(a) + 40);
  for (let i = 0; i < 200 && high - low > 1e-15 * Math.max(1, Math.abs(low)); i++) {
    const middle = (low + high) / 2;
    if (gammaBelow(a, Math.exp(middle)) < p) low = middle;
    else high = middle;
  }
  return 2 * Math.exp((low + high) / 2);
}
