/**
 * Coefficients c_k of windows w(x) = Σ c_k cos(2πkx), x from 0 to 1. The signs alternate, so w is small at both ends.
 *
 * Sources (MEMORY, except where said): hamming, blackman, blackman-harris: Harris, Proc. IEEE 66, 51 (1978); nuttall:
 * Nuttall, IEEE Trans. ASSP 29, 84 (1981), minimum four-term; flat-top: D'Antona & Ferrero, Digital Signal Processing
 * for Measurement Systems (Springer, 2006), as SciPy has it. HFT…: Heinzel, Rüdiger, Schilling, Spectrum and spectral
 * density estimation by the DFT, report of 15 February 2002; the number is the sidelobe in dB, D marks those whose
 * sidelobes fall. They are scaled to a mean of 1, as in the report, so their peak is above 4. Noise bandwidth and
 * sidelobes computed from these digits agree with the report's.
 */
export const COSINE_SUMS = {
  hann: [0.5, -0.5],
  hamming: [0.54, -0.46],
  blackman: [0.42, -0.5, 0.08],
  nuttall: [0.3635819, -0.4891775, 0.1365995, -0.0106411],
  'blackman-harris': [0.35875, -0.48829, 0.14128, -0.01168],
  'flat-top': [0.21557895, -0.41663158, 0.277263158, -0.083578947, 0.006947368],
  HFT70: [1, -1.90796, 1.07349, -0.18199],
  HFT90D: [1, -1.942604, 1.340318, -0.440811, 0.043097],
  HFT95: [1, -1.9383379, 1.3045202, -0.402827, 0.0350665],
  HFT116D: [1, -1.9575375, 1.4780705, -0.6367431, 0.1228389, -0.0066288],
  HFT144D: [1, -1.96760033, 1.57983607, -0.81123644, 0.22583558, -0.02773848, 0.0009036],
  HFT196D: [
    1, -1.97928042, 1.710288951, -1.081629853, 0.448734314, -0.112376628, 0.015122992, -0.000871252,
    0.000011896,
  ],
  HFT223D: [
    1, -1.98298997309, 1.75556083063, -1.19037717712, 0.56155440797, -0.17296769663, 0.03233247087,
    -0.00324954578, 0.0001380104, -0.00000132725,
  ],
  HFT248D: [
    1, -1.985844164102, 1.791176438506, -1.282075284005, 0.667777530266, -0.240160796576, 0.056656381764,
    -0.008134974479, 0.00062454465, -1.9808998e-5, 1.32974e-7,
  ],
} as const satisfies Record<string, readonly number[]>;

/** Σ c_k cos(2πk i/last) at i = 0 … count − 1; angles are reduced in integers first, so long windows stay exact. */
export function cosineSum(coefficients: readonly number[], count: number, last: number): Float64Array {
  const out = new Float64Array(count);
  for (let i = 0; i < count; i++) {
    let sum = 0;
    for (let k = coefficients.length - 1; k >= 0; k--)
      sum += coefficients[k] * Math.cos((2 * Math.PI * ((k * i) % last)) / last);
    out[i] = sum;
  }
  return out;
}
