/** Longer windows are thinned: the sums below are smooth. */
const LONG = 16384;

/**
 * Correlation of the powers of two bins `bins` apart, of segments `shift` samples apart, for Gaussian noise that is flat
 * over the window's bandwidth: |Σ w(n) w(n + shift) e^(−2πi n bins/N)|² / (Σ w²)². 1 for the same bin of the same segment.
 * For `bins` 0 it is ρ_j of Welch, IEEE Trans. AU-15, 70 (1967); the rest follows from Isserlis' theorem.
 *
 * @example powerCorrelation(makeWindow('hann', 4096), 0, 1) // 0.444 = (2/3)²
 */
export function powerCorrelation(w: Float64Array, shift: number, bins: number): number {
  const n = w.length;
  const stride = Math.max(1, Math.floor(n / LONG));
  let [re, im, squares] = [0, 0, 0];
  for (let i = 0; i < n; i += stride) {
    squares += w[i] * w[i];
    if (i + shift >= n) continue;
    const v = w[i] * w[i + shift];
    const a = (2 * Math.PI * bins * i) / n;
    re += v * Math.cos(a);
    im -= v * Math.sin(a);
  }
  return (re * re + im * im) / (squares * squares);
}

/** 1 + 2 Σ_d of the correlation of a bin with its d-th neighbours: the factor by which it widens the scatter of a count or a sum over bins. */
export function neighbourFactor(w: Float64Array): number {
  let sum = 1;
  for (let d = 1; d <= 12 && d < w.length / 2; d++) {
    const r = powerCorrelation(w, 0, d);
    sum += 2 * r;
    if (r < 1e-6) break;
  }
  return sum;
}
