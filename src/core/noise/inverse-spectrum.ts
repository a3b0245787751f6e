import { UserError } from '../data/errors';
import type { Spectrum } from '../data/kinds';
import { numberText } from '../figures/number-text';
import { lowerBound } from '../figures/thin';
import type { Kernels } from '../kernels/kernels';

/**
 * One-sided density at any frequency in Hz, straight between the spectrum's own bins; NaN outside of them.
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
 * A one-sided real response made to reach less than `half` samples to either side in time: taken to time, multiplied by a
 * window and taken back.
 *
 * @param response size / 2 + 1 real values
 * @param window weight at distance u from the middle, in units of `half`; 1 at 0, 0 at 1
 * @returns the response as it then is, and its impulse response on a circle of `size` samples, t = 0 at sample 0
 */
export function truncateInTime(
  kernels: Kernels,
  response: Float64Array,
  size: number,
  half: number,
  window: (u: number) => number,
): { readonly response: Float64Array; readonly impulse: Float64Array } {
  const impulse = kernels.irfft(response, new Float64Array(response.length), size);
  for (let i = 0; i <= size / 2; i++) {
    const w = i < half ? window(i / half) : 0;
    impulse[i] *= w;
    if (i > 0 && i < size / 2) impulse[size - i] *= w;
  }
  return { response: kernels.rfft(impulse).re, impulse };
}
