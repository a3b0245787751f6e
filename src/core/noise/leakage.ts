import type { Kernels } from '../kernels/kernels';

/** Power from further than this many bins away counts as leakage; no main lobe of the windows offered is wider. */
const NEAR = 8;
/** Bins at which leakage is worked out. */
const PROBES = 33;

/**
 * Share of the density in a band that a window's sidelobes carry there from more than 8 bins away, if the estimate were
 * the true density: the median over bins of the band of Σ_j S_j K(k − j) / S_k, with K the window's power response
 * averaged over a bin. Near 1 when the estimate in the band is leakage and nothing else. Method: our own, from the
 * convolution of spectrum and spectral window (Welch 1967).
 *
 * @param band bins `[from, to)`
 */
export function leakedShare(
  kernels: Kernels,
  window: Float64Array,
  density: Float64Array,
  band: readonly [number, number],
): number {
  const response = binResponse(kernels, window);
  const last = density.length - 1;
  const shares: number[] = [];
  const count = Math.min(PROBES, band[1] - band[0]);
  for (let p = 0; p < count; p++) {
    const k = band[0] + Math.floor(((p + 0.5) * (band[1] - band[0])) / count);
    if (!(density[k] > 0)) continue;
    let sum = 0;
    for (let j = 0; j <= last; j++) {
      const d = Math.abs(k - j);
      const image = k + j <= last ? k + j : 2 * last - k - j;
      if (d > NEAR) sum += density[j] * response[d];
      if (image > NEAR && j > 0) sum += density[j] * response[image];
    }
    shares.push(sum / density[k]);
  }
  shares.sort((a, b) => a - b);
  return shares[shares.length >> 1] ?? 0;
}

/** Power response of a window to a line d bins away, averaged over one bin and normalised to a sum of 1 over all bins. */
function binResponse(kernels: Kernels, window: Float64Array): Float64Array {
  const n = window.length;
  const padded = new Float64Array(2 * n);
  padded.set(window);
  const { re, im } = kernels.rfft(padded);
  const power = re.map((r, i) => r * r + im[i] * im[i]);
  const squares = window.reduce((s, w) => s + w * w, 0);
  const at = (half: number): number => power[Math.min(power.length - 1, Math.abs(half))];
  return Float64Array.from(
    { length: Math.floor(n / 2) + 1 },
    (_, d) => (at(2 * d - 1) / 4 + at(2 * d) / 2 + at(2 * d + 1) / 4) / (n * squares),
  );
}
