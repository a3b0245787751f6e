import { UserError } from '../data/errors';
import { incompleteGamma } from '../kernels/special-incomplete-gamma';

/** Bins of a template's band cut into pieces of equal expected loudness. */
export interface Bands {
  /** Bin boundaries, one more than bands: band l is bins `[bounds[l], bounds[l + 1])`. */
  readonly bounds: Int32Array;
  /** σ_l²/σ²: near 1/p, and exactly what the bins of the band hold. */
  readonly shares: Float64Array;
}

/**
 * Cuts bins into `count` bands of equal σ²/p as nearly as whole bins allow.
 *
 * @param weights |h̃|²/S per bin, not negative
 * @throws UserError when the template is too narrow for so many bands
 */
export function equalBands(weights: Float64Array, count: number): Bands {
  let total = 0;
  for (const w of weights) total += w;
  const bounds = new Int32Array(count + 1);
  const shares = new Float64Array(count);
  let sum = 0;
  let band = 0;
  let started = false;
  for (let k = 0; k < weights.length; k++) {
    if (weights[k] > 0 && !started) {
      started = true;
      bounds[0] = k;
    }
    // The bin goes to the band its middle falls in.
    const middle = Math.min(count - 1, Math.floor(((sum + weights[k] / 2) / total) * count));
    while (started && band < middle) bounds[++band] = k;
    shares[band] += weights[k] / total;
    sum += weights[k];
    if (weights[k] > 0) bounds[count] = k + 1;
  }
  while (band < count - 1) bounds[++band] = bounds[count];
  if (shares.some((s) => s < 0.5 / count || s > 1.5 / count))
    throw new UserError(
      'bands-many',
      `the template is too narrow for ${count} bands: single frequency bins hold more than half a band; set "bands" lower`,
    );
  return { bounds, shares };
}

/**
 * χ² = Σ_l |ρ_l − q_l ρ|² / q_l with the bands' shares q_l: for equal bands p Σ |ρ_l − ρ/p|². In Gaussian noise, with or
 * without a signal of the template's shape, it has 2p − 2 degrees of freedom. Allen, Phys. Rev. D 71, 062001 (2005), MEMORY.
 *
 * @param re, im ρ_l of the bands; their sum is ρ
 * @returns what each band adds
 */
export function chiSquaredParts(re: Float64Array, im: Float64Array, shares: Float64Array): Float64Array {
  const sum = (x: Float64Array): number => x.reduce((s, v) => s + v, 0);
  const [r, i] = [sum(re), sum(im)];
  return shares.map((q, l) => ((re[l] - q * r) ** 2 + (im[l] - q * i) ** 2) / q);
}

/** Probability that χ² with `freedom` degrees of freedom is at least as large. */
export const chiSquaredTail = (value: number, freedom: number): number =>
  incompleteGamma(freedom / 2, value / 2).upper;

/**
 * ρ / [(1 + (χ_r²)³)/2]^(1/6) where χ_r² = χ²/(degrees of freedom) exceeds 1, else ρ. Babak et al., Phys. Rev. D 87, 024033
 * (2013), MEMORY.
 *
 * @example reweighted(10, 2) // 7.782717162260106
 */
export const reweighted = (snr: number, reduced: number): number =>
  reduced > 1 ? snr / ((1 + reduced ** 3) / 2) ** (1 / 6) : snr;
