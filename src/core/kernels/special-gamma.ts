/** Coefficients B_{2k}/(2k(2k − 1)) of Stirling's series: NIST Digital Library of Mathematical Functions 5.11.1 (MEMORY). */
const STIRLING = [
  1 / 12,
  -1 / 360,
  1 / 1260,
  -1 / 1680,
  1 / 1188,
  -691 / 360360,
  1 / 156,
  -3617 / 122400,
  43867 / 244188,
];

/**
 * Error of Stirling's formula, δ(x) = ln Γ(x + 1) − [(x + ½) ln x − x + ½ ln 2π], x > 0; near 1/(12x). Absolute error
 * below 1e-15 × a few, which makes it the way to the relative accuracy of large factorials.
 *
 * @example stirlingError(1) // 0.08106146679532726
 */
export function stirlingError(x: number): number {
  let shift = 0;
  for (; x < 12; x++) shift += (x + 0.5) * Math.log1p(1 / x) - 1;
  const square = 1 / (x * x);
  return shift + STIRLING.reduceRight((sum, c) => sum * square + c, 0) / x;
}

/**
 * Natural logarithm of Γ(x), x > 0. Absolute error below 1e-15 × max(1, |ln Γ|) × a few.
 *
 * @throws RangeError for x ≤ 0 or NaN.
 * @example lnGamma(0.5) // 0.5723649429247001 = ln √π
 */
export function lnGamma(x: number): number {
  if (!(x > 0)) throw new RangeError(`ln Γ of ${x}: the argument must be above 0`);
  if (x >= 12) return (x - 0.5) * Math.log(x) - x + 0.5 * Math.log(2 * Math.PI) + stirlingError(x);
  return Math.log(gamma(x));
}

/**
 * Γ(x) for real x; relative error below 1e-15 × max(10, |x|). Infinite above 171.6, NaN at 0, −1, −2, …
 *
 * @example gamma(0.5) // 1.772453850905516 = √π
 */
export function gamma(x: number): number {
  if (x <= 0) {
    if (Number.isInteger(x)) return NaN;
    // Reflection; the sine of the distance to the nearest whole number keeps its digits.
    const nearest = Math.round(x);
    const sine = Math.sin(Math.PI * (x - nearest)) * (nearest % 2 === 0 ? 1 : -1);
    return Math.PI / (sine * gamma(1 - x));
  }
  if (Number.isInteger(x) && x <= 171) {
    let product = 1;
    for (let k = 2; k < x; k++) product *= k;
    return product;
  }
  let divisor = 1;
  for (; x < 12; x++) divisor *= x;
  // The power in two halves: x^(x − ½) alone overflows before Γ does.
  const half = x ** (x / 2 - 0.25);
  return (Math.sqrt(2 * Math.PI) * half * Math.exp(-x) * half * Math.exp(stirlingError(x))) / divisor;
}

/**
 * a ln(a/x) + x − a for a, x > 0: how unlikely x is where a is expected. Keeps its digits where x ≈ a.
 *
 * Source: Loader, Fast and accurate computation of binomial probabilities (2000) (MEMORY).
 */
function deviance(a: number, x: number): number {
  const v = (a - x) / (a + x);
  if (Math.abs(v) > 0.1) return a * Math.log(a / x) + x - a;
  // ln(a/x) = 2 artanh v, minus its first term, which x − a cancels.
  let sum = (a - x) * v;
  let power = 2 * a * v;
  for (let k = 3; ; k += 2) {
    power *= v * v;
    const next = sum + power / k;
    if (next === sum) return sum;
    sum = next;
  }
}

/** x^a e^(−x)/Γ(a + 1), a ≥ 0: the Poisson probability of a at mean x, continued to real a. */
export function poissonTerm(a: number, x: number): number {
  if (x === 0) return a === 0 ? 1 : 0;
  if (a === 0) return Math.exp(-x);
  return Math.exp(-stirlingError(a) - deviance(a, x)) / Math.sqrt(2 * Math.PI * a);
}

/** Γ(a+b+1)/(Γ(a+1)Γ(b+1)) x^a y^b, y = 1 − x: the binomial probability of a in a + b, continued to real numbers. */
export function binomialTerm(a: number, b: number, x: number, y: number): number {
  const n = a + b;
  if (a === 0) return Math.exp(n * (x < 0.5 ? Math.log1p(-x) : Math.log(y)));
  if (b === 0) return Math.exp(n * (y < 0.5 ? Math.log1p(-y) : Math.log(x)));
  if (x === 0 || y === 0) return 0;
  const exponent =
    stirlingError(n) - stirlingError(a) - stirlingError(b) - deviance(a, n * x) - deviance(b, n * y);
  return Math.exp(exponent) * Math.sqrt(n / (2 * Math.PI * a) / b);
}
