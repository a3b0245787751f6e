/**
 * Magnitude-squared coherence of two channels without anything in common exceeds this with probability `p` in one bin:
 * 1 − p^{1/(n−1)} for n independent segments; its mean is then 1/n. Carter, Knapp, Nuttall, IEEE Trans. Audio Electroacoust.
 * AU-21, 337 (1973) (MEMORY). With overlapping segments n is the number of effective averages, 1/n =
 * (1/K)[1 + 2 Σ (1 − j/K) ρ_j], which keeps the mean exact to first order (checked by simulation).
 */
export function coherenceLevel(p: number, averages: number): number {
  return -Math.expm1(Math.log(p) / (averages - 1));
}

/**
 * Central interval of the true coherence for an estimate `value`: atanh √C is nearly normal with variance 1/(2n).
 * Enochson & Goodman, report AFFDL-TR-65-57 (1965) (MEMORY).
 *
 * @param z half width in standard deviations
 */
export function coherenceInterval(value: number, averages: number, z: number): [number, number] {
  const at = Math.atanh(Math.sqrt(Math.min(value, 1 - 1e-15)));
  const step = z / Math.sqrt(2 * averages);
  return [Math.tanh(Math.max(0, at - step)) ** 2, Math.tanh(at + step) ** 2];
}
