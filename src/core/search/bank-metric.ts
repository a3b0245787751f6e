import { UserError } from '../data/errors';
import type { Spectrum } from '../data/kinds';
import { numberText } from '../figures/number-text';
import { SUN_SECONDS } from '../waveforms/constants';

const { PI } = Math;
/** Coefficients of the 2PN phase in chirp times; Owen & Sathyaprakash, PRD 60, 022002 (1999), COMPUTED against the series in v. */
const A01 = 3 / 5;
const A21 = (11 * PI) / 12;
const A22 = (743 / 2016) * Math.cbrt(25 / (2 * PI ** 2));
const A31 = -3 / 2;
const A41 = (617 * PI ** 2) / 384;
const A42 = (5429 / 5376) * Math.cbrt((25 * PI) / 2);
const A43 = (15293365 / 10838016) * Math.cbrt(5 / (4 * PI ** 4));

/** g₀₀, g₀₃, g₃₃ in 1/s²: mismatch = g_ij Δτ^i Δτ^j, maximised over time and phase. */
export type ChirpMetric = readonly [g00: number, g03: number, g33: number];

/** 2PN phase in radians at `f` Hz of chirp times in s at `f0` Hz, coalescence at t = 0. */
export function chirpTimePhase(f: number, tau0: number, tau3: number, f0: number): number {
  const [a, b] = [2 * PI * f0 * tau0, 2 * PI * f0 * tau3];
  const r = Math.cbrt(f / f0);
  return (
    A01 * a * r ** -5 +
    ((A21 * a) / b + A22 * Math.cbrt(a * b * b)) / r ** 3 +
    (A31 * b) / r ** 2 +
    ((A41 * a) / (b * b) + A42 * Math.cbrt(a / b) + A43 * Math.cbrt(b ** 4 / a)) / r
  );
}

/** Derivatives of {@link chirpTimePhase} with respect to τ₀ and τ₃, in rad/s. */
export function phaseSlopes(f: number, tau0: number, tau3: number, f0: number): [number, number] {
  const k = 2 * PI * f0;
  const [a, b] = [k * tau0, k * tau3];
  const r = Math.cbrt(f / f0);
  const one = A22 * Math.cbrt(a * b * b);
  const two = A42 * Math.cbrt(a / b);
  const three = A43 * Math.cbrt(b ** 4 / a);
  const byA =
    A01 / r ** 5 + (A21 / b + one / (3 * a)) / r ** 3 + (A41 / (b * b) + (two - three) / (3 * a)) / r;
  const byB =
    ((-A21 * a) / (b * b) + (2 * one) / (3 * b)) / r ** 3 +
    A31 / r ** 2 +
    ((-2 * A41 * a) / b ** 3 - two / (3 * b) + (4 * three) / (3 * b)) / r;
  return [k * byA, k * byB];
}

/**
 * Metric of inspirals without spin about one point, from the moments of f^{−7/3}/S over the band.
 * Owen, PRD 53, 6749 (1996); Owen & Sathyaprakash, PRD 60, 022002 (1999).
 *
 * @param band Hz
 * @throws UserError when fewer than ten bins of the spectrum lie in the band
 */
export function chirpMetric(
  spectrum: Spectrum,
  band: readonly [low: number, high: number],
  tau: readonly [tau0: number, tau3: number],
  f0: number,
): ChirpMetric {
  const mean = [0, 0, 0];
  const square = [0, 0, 0, 0, 0, 0];
  let total = 0;
  let bins = 0;
  const { frequency, density } = spectrum;
  for (let k = 0; k < frequency.length; k++) {
    const f = frequency[k];
    if (f < band[0] || f > band[1] || !(f > 0) || !(density[k] > 0)) continue;
    const width = (frequency[Math.min(k + 1, frequency.length - 1)] - frequency[Math.max(k - 1, 0)]) / 2;
    const w = (width * f ** (-7 / 3)) / (density[k] / density[density.length >> 1]);
    const [p, q] = phaseSlopes(f, tau[0], tau[1], f0);
    const t = f / f0;
    const products = [t * t, t * p, t * q, p * p, p * q, q * q];
    for (const [i, v] of [t, p, q].entries()) mean[i] += w * v;
    for (const [i, v] of products.entries()) square[i] += w * v;
    total += w;
    bins++;
  }
  if (bins < 10)
    throw new UserError(
      'band-empty',
      `${spectrum.label} has ${bins} usable bins from ${numberText(band[0])} to ${numberText(band[1])} Hz: widen the band, or use a spectrum that covers it`,
    );
  const [t, p, q] = mean.map((m) => m / total);
  const pairs = [t * t, t * p, t * q, p * p, p * q, q * q];
  const [tt, tp, tq, pp, pq, qq] = square.map((s, i) => (s / total - pairs[i]) / 2);
  return [pp - (tp * tp) / tt, pq - (tp * tq) / tt, qq - (tq * tq) / tt];
}

/** Detector-frame masses in M☉ with these chirp times, or undefined where η would exceed 1/4 (no such binary). */
export function massesOf(
  tau0: number,
  tau3: number,
  f0: number,
): { mass1: number; mass2: number } | undefined {
  const seconds = (5 * tau3) / (32 * PI ** 2 * f0 * tau0);
  const eta = (PI * seconds * f0) ** (-2 / 3) / (8 * f0 * tau3);
  if (!(eta <= 0.25 * (1 + 1e-12))) return undefined;
  const half = seconds / SUN_SECONDS / 2;
  const root = Math.sqrt(Math.max(0, 1 - 4 * eta));
  return { mass1: half * (1 + root), mass2: half * (1 - root) };
}
