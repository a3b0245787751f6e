import { UserError } from '../data/errors';
import type { Spectrum } from '../data/kinds';
import { numberText } from '../figures/number-text';
import type { Kernels } from '../kernels/kernels';
import { densityAt, truncateInTime } from '../noise/inverse-spectrum';

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
  const hann = (u: number): number => 0.5 + 0.5 * Math.cos(Math.PI * u);
  const { response } = truncateInTime(kernels, root, size, half, hann);
  const first = Math.ceil(band[0] / df - 1e-9);
  const last = Math.floor(band[1] / df + 1e-9);
  return response.map((a, k) => (k < first || k > last ? 0 : (a * top) ** 2));
}
