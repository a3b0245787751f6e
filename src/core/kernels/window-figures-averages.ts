import { UserError } from '../data/errors';
import { overlapCorrelation } from './window-figures';

function checkAverages(averages: number): void {
  if (!Number.isSafeInteger(averages) || averages < 1)
    throw new UserError('averages', `${averages} averages: it must be a whole number, at least 1`);
}

/** 1 + 2 Σ_j (1 − j/K) f(ρ_j), ρ_j the power correlation of segments j steps apart. */
function overlapSum(w: Float64Array, step: number, averages: number, f: (rho: number) => number): number {
  checkAverages(averages);
  if (!Number.isSafeInteger(step) || step < 1)
    throw new UserError(
      'window-step',
      `step ${step} between segments: it must be a whole number of samples, at least 1`,
    );
  let sum = 1;
  for (let j = 1; j < averages && j * step < w.length; j++)
    sum += 2 * (1 - j / averages) * f(overlapCorrelation(w, j * step) ** 2);
  return sum;
}

/**
 * Variance of the mean of `averages` overlapping periodograms divided by the square of the true density: the relative
 * standard error of a bin is its square root. For Gaussian noise whose spectrum is flat over the window's bandwidth, and
 * not for the first and last bins (DC, Nyquist: twice this).
 *
 * @param w Window of one segment.
 * @param step Samples from one segment to the next.
 *
 * (1/K) [1 + 2 Σ_j (1 − j/K) ρ_j], Welch, IEEE Trans. AU-15, 70 (1967).
 *
 * @example welchVarianceFactor(makeWindow('hann', 4096), 2048, 10) // 0.105 = (1 + 2·0.9/36)/10
 */
export function welchVarianceFactor(w: Float64Array, step: number, averages: number): number {
  return overlapSum(w, step, averages, (rho) => rho) / averages;
}

/**
 * Expected median of n independent periodograms divided by their mean; divide a median spectrum by it. 1 for n = 1,
 * 5/6 for n = 3, to ln 2. For even n the median is the mean of the two middle values and n − 1 gives the exact answer.
 *
 * Allen, Anderson, Brady, Brown, Creighton, Phys. Rev. D 85, 122006 (2012), App. B, as cited in SciPy (READ).
 *
 * @example medianBias(3) // 0.8333333333333334
 */
export function medianBias(n: number): number {
  checkAverages(n);
  let sum = 1;
  for (let k = 2; k < n; k += 2) sum -= 1 / k - 1 / (k + 1);
  return sum;
}

/**
 * Variance of the bias-corrected median of `averages` periodograms divided by the square of the true density.
 *
 * Exact without overlap: the r-th smallest of n exponentials is Σ_{k=n−r+1}^{n} E_k/k with independent E_k (Rényi,
 * Acta Math. Acad. Sci. Hung. 4, 191, 1953, MEMORY), so its variance is Σ 1/k². For many averages it tends to
 * 1/(ln 2)² = 2.081 times the variance of the mean. With overlap it is multiplied by 1 + 2 Σ_j (1 − j/K) φ(ρ_j): the
 * powers of two overlapping segments follow the bivariate exponential law with Laguerre expansion
 * e^(−x−y) Σ ρ^k L_k(x) L_k(y), in which the sides of the median on which two of them fall have correlation
 * φ(ρ) = Σ_{k≥1} [L_{k−1}(ln 2) − L_k(ln 2)]² ρ^k. That is exact for many averages and comes out low for few: with a
 * Hann window at 50 % overlap by at most 3 %, at 75 % by 15 % for 8 averages, 8 % for 16, 4 % for 33 (measured by
 * simulation). At 75 % the bias of the median is also not quite `medianBias`: the result is 5.6 % high for 8 averages,
 * 3 % for 16, 1.7 % for 33, and 0.4 % for 8 at 50 %.
 *
 * @example medianVarianceFactor(makeWindow('boxcar', 8), 8, 3) // 0.52 = (1/4 + 1/9)/(5/6)²
 */
export function medianVarianceFactor(w: Float64Array, step: number, averages: number): number {
  const overlap = overlapSum(w, step, averages, signCorrelation);
  const n = averages;
  let variance = n % 2 === 0 ? 1 / n ** 2 : 0;
  for (let k = Math.floor(n / 2) + 1; k <= n; k++) variance += 1 / k ** 2;
  return (variance / medianBias(n) ** 2) * overlap;
}

/** φ(ρ), by the three-term recurrence of the Laguerre polynomials; φ(0) = 0, φ(1) = 1. */
function signCorrelation(rho: number): number {
  const x = Math.LN2;
  let before = 1;
  let now = 1 - x;
  let power = rho;
  let sum = 0;
  for (let k = 1; k < 4000 && power > 1e-12; k++) {
    sum += (before - now) ** 2 * power;
    const next = ((2 * k + 1 - x) * now - k * before) / (k + 1);
    before = now;
    now = next;
    power *= rho;
  }
  return sum;
}
