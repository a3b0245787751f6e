import { binomialTerm } from './special-gamma';
import { kolmogorovExact } from './special-kolmogorov-exact';

/** Above this many samples the exact distribution is replaced by its expansion. */
const EXACT_BELOW = 1000;

/**
 * P(√n D_n > x) for n → ∞, D_n the largest distance between an empirical and a continuous distribution function.
 *
 * Kolmogorov, Giorn. Ist. Ital. Attuari 4, 83 (1933) (MEMORY). Relative error below 1e-14.
 *
 * @example kolmogorovTail(1.3581) // 0.05 within 2e-5
 */
export function kolmogorovTail(x: number): number {
  if (x <= 0) return 1;
  if (x < 1) return 1 - limit(x);
  let sum = 0;
  for (let k = 1; k < 20; k++) sum += (k % 2 === 1 ? 2 : -2) * Math.exp(-2 * k * k * x * x);
  return sum;
}

/** Σ over half-integers h = ½, 3/2, … of g(h²π²) exp(−h²π²/(2x²)); few terms matter for x below about 2. */
function theta(x: number, g: (square: number) => number, first: number): number {
  let sum = 0;
  for (let k = 0; k < 40; k++) {
    const square = (Math.PI * (k + first)) ** 2;
    sum += g(square) * Math.exp(-square / (2 * x * x));
  }
  return sum;
}

const limit = (x: number): number => (Math.sqrt(2 * Math.PI) / x) * theta(x, () => 1, 0.5);

/** Distribution function of √n D_n to order 1/n: Pelz & Good, J. R. Stat. Soc. B 38, 152 (1976) (MEMORY). */
function expansion(x: number, n: number): number {
  const x2 = x * x;
  const x4 = x2 * x2;
  const root = Math.sqrt(Math.PI / 2);
  // Sums over all half-integers or integers are twice those over the positive ones.
  const first = (root / (6 * x4)) * 2 * theta(x, (s) => s - x2, 0.5);
  const second =
    (root / (72 * x4 * x2 * x)) *
      2 *
      theta(x, (s) => 6 * x4 * x2 + 2 * x4 + (2 * x4 - 5 * x2) * s + (1 - 2 * x2) * s * s, 0.5) -
    (root / (36 * x2 * x)) * 2 * theta(x, (s) => s, 1);
  return limit(x) + first / Math.sqrt(n) + second / n;
}

/**
 * P(D⁺_n ≥ d): the empirical distribution function of n samples exceeds the true one by d somewhere.
 *
 * Exact sum of Birnbaum & Tingey, Ann. Math. Stat. 22, 592 (1951) (MEMORY): all its terms are positive.
 */
export function smirnovTail(d: number, n: number): number {
  if (d <= 0) return 1;
  let sum = 0;
  for (let j = 0; j <= n * (1 - d) && d + j / n < 1; j++) {
    const p = d + j / n;
    sum += (d / p) * binomialTerm(j, n - j, p, 1 - p);
  }
  return d >= 1 ? 0 : sum;
}

/**
 * p-value of a Kolmogorov–Smirnov test of n independent samples against a known continuous distribution: P(D_n ≥ d).
 *
 * @param d Largest distance found, 0 to 1.
 * @param n Samples, a whole number ≥ 1.
 * @throws RangeError outside these limits.
 *
 * For n d² > 4 twice the one-sided tail, whose relative error is below e^(−6nd²) < 4e-11; else exact up to 1000 samples
 * (relative error 1e-11) and by expansion above (absolute error below 3e-6, falling as n^(−3/2)). Division of cases as
 * in Simard & L'Ecuyer, J. Stat. Softw. 39, 11 (2011) (MEMORY). Not valid if parameters of the distribution were fitted
 * to the same samples.
 *
 * @example kolmogorovSmirnov(0.409, 10) // 0.05022: the table's 5 % point
 */
export function kolmogorovSmirnov(d: number, n: number): number {
  if (!(d >= 0 && d <= 1 && Number.isSafeInteger(n) && n >= 1))
    throw new RangeError(`Kolmogorov–Smirnov test with distance ${d} and ${n} samples`);
  if (2 * n * d <= 1) return 1;
  if (d >= 0.5 || n * d * d > 4) return Math.min(1, 2 * smirnovTail(d, n));
  const cdf = n <= EXACT_BELOW ? kolmogorovExact(d, n) : expansion(Math.sqrt(n) * d, n);
  return Math.min(1, Math.max(0, 1 - cdf));
}
