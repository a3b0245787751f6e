import { UserError } from '../data/errors';
import type { Spectrum } from '../data/kinds';
import { numberText } from '../figures/number-text';
import { lowerBound } from '../figures/thin';
import type { Kernels } from '../kernels/kernels';

/**
 * One-sided density at evenly spaced frequencies, straight between the spectrum's own bins; NaN outside of them.
 */
export function densityAt(spectrum: Spectrum, frequency: number): number {
  const { frequency: f, density } = spectrum;
  const k = lowerBound(f, frequency);
  if (k < f.length && f[k] === frequency) return density[k];
  if (k === 0 || k === f.length) return NaN;
  const part = (frequency - f[k - 1]) / (f[k] - f[k - 1]);
  return density[k - 1] + part * (density[k] - density[k - 1]);
}

/**
 * The part of a band in which a spectrum has a positive density. A bin of an estimate at zero frequency or at the Nyquist
 * frequency does not count.
 *
 * @throws UserError when nothing is left, or when a hole lies inside
 */
export function coveredBand(spectrum: Spectrum, band: readonly [number, number]): [number, number] {
  const { frequency: f, density } = spectrum;
  const usable = (k: number): boolean => density[k] > 0 && density[k] < Infinity && f[k] > 0;
  let a = lowerBound(f, band[0]);
  if (a > 0 && (a === f.length || f[a] > band[0])) a--;
  let b = Math.min(f.length - 1, lowerBound(f, band[1]));
  while (a < b && !usable(a)) a++;
  while (b > a && !usable(b)) b--;
  if (a >= b)
    throw new UserError(
      'band-empty',
      `${spectrum.label} has no positive density between ${numberText(band[0])} and ${numberText(band[1])} Hz: choose another band with "low" and "high", or another spectrum`,
    );
  for (let k = a; k <= b; k++)
    if (!usable(k))
      throw new UserError(
        'spectrum-hole',
        `${spectrum.label} has density ${numberText(density[k])} at ${numberText(f[k])} Hz, inside the band filtered: a filter cannot divide by it; choose another band or spectrum`,
      );
  return [Math.max(band[0], f[a]), Math.min(band[1], f[b])];
}

/**
 * 1/S on the bins of a block, made to reach at most `seconds` to either side in time, so that a line one bin wide does not
 * make the filter longer than the data.
 *
 * 1/√S is set to zero outside the band (drawn in by 2/`seconds` at each end, so that the smoothed edge has come down to zero
 * at the band's own edge), taken to time, multiplied by a Hann window over ± `seconds`/2, taken back and squared: never
 * negative. Frequency resolution (full width at half height) 2/`seconds` Hz.
 *
 * @param size even number of samples of a block
 * @param band Hz, inside what the spectrum covers
 * @returns size / 2 + 1 values in Hz per squared unit of the samples, zero outside the band
 */
export function inverseSpectrum(
  kernels: Kernels,
  spectrum: Spectrum,
  size: number,
  rate: number,
  band: readonly [number, number],
  seconds: number,
): Float64Array {
  const df = rate / size;
  const half = Math.min(size / 2, Math.round((seconds / 2) * rate));
  const edge = 2 / seconds;
  const from = Math.max(1, Math.ceil((band[0] + edge) / df));
  const to = Math.min(size / 2 - 1, Math.floor((band[1] - edge) / df));
  if (to <= from)
    throw new UserError(
      'band-narrow',
      `the band from ${numberText(band[0])} to ${numberText(band[1])} Hz is too narrow for an inverse spectrum that reaches ${numberText(seconds)} s: it needs more than ${numberText(2 * edge)} Hz; widen "low" and "high" or raise "reach"`,
    );
  // Scaled by the largest, so that densities near 1e-46 do not lose digits to the smallest float64 in the square.
  const root = new Float64Array(size / 2 + 1);
  let top = 0;
  for (let k = from; k <= to; k++) {
    root[k] = 1 / Math.sqrt(densityAt(spectrum, k * df));
    top = Math.max(top, root[k]);
  }
  for (let k = from; k <= to; k++) root[k] /= top;
  const time = kernels.irfft(root, new Float64Array(root.length), size);
  for (let i = 0; i <= size / 2; i++) {
    const w = i < half ? 0.5 + 0.5 * Math.cos((Math.PI * i) / half) : 0;
    time[i] *= w;
    if (i > 0 && i < size / 2) time[size - i] *= w;
  }
  const { re } = kernels.rfft(time);
  const first = Math.ceil(band[0] / df - 1e-9);
  const last = Math.floor(band[1] / df + 1e-9);
  return re.map((a, k) => (k < first || k > last ? 0 : (a * top) ** 2));
}
