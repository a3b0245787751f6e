import { UserError } from '../data/errors';
import type { Spectrum } from '../data/kinds';
import { numberText } from '../figures/number-text';
import { lowerBound } from '../figures/thin';
import type { Kernels } from '../kernels/kernels';
import { blackmanHarris, MAIN_LOBE, WIDTH } from './truncation-window';
import { coveredBand, densityAt, truncateInTime } from '../noise/inverse-spectrum';

/** Lowest bins of a spectrum that detrending may have emptied, whatever its window. */
const DETRENDED = 4;
/** Samples of the grid the filter is designed on, at most, unless its reach needs more. */
const GRID = 2 ** 21;

/** A whitening filter, symmetric in time. */
export interface WhitenDesign {
  /** Weights h₀, h₁, … h_m: sample n of the output is Σ h_|k| x(n + k), |k| ≤ m. */
  readonly taps: Float64Array;
  readonly rate: number;
  /** Hz: where the response has come down to nothing, unless the band is kept to zero or to half the rate. */
  readonly band: readonly [low: number, high: number];
  /** Whether the response goes down at each end of the band. */
  readonly ends: readonly [low: boolean, high: boolean];
  /** Hz over which it goes from nothing to 1, and full width at half height of its resolution. */
  readonly slope: number;
  readonly resolution: number;
  /** Variance of the output for noise of exactly this spectrum, and for the response before it was truncated in time. */
  readonly variance: number;
  readonly ideal: number;
}

/**
 * Response √(2 / (rate S(f))) in the band and 0 outside, drawn in by the half width of the window's main lobe, truncated to less
 * than `reach` seconds on either side. The output then has the one-sided density 2/rate in the band: variance 1 if the band
 * is all of 0 to rate/2.
 *
 * A Blackman–Harris window rather than Hann, so that a wall of noise below the band does not come in by its side lobes.
 *
 * @param low Hz; 0 keeps all, with the density below the fourth bin taken as that of the fourth
 * @param high Hz; rate/2 or more keeps all, with the density at rate/2 taken as that of the bin before
 * @throws UserError when the spectrum does not cover the band or the band is too narrow
 */
export function designWhitening(
  kernels: Kernels,
  spectrum: Spectrum,
  rate: number,
  low: number,
  high: number,
  reach: number,
): WhitenDesign {
  const nyquist = rate / 2;
  const { frequency, df } = spectrum;
  const ends = [
    low > 0 || !(df > 0) || frequency[0] > 2 * df,
    high < nyquist || frequency.at(-1)! < nyquist - 1.01 * df,
  ] as const;
  const covered = coveredBand(spectrum, [low, Math.min(high, nyquist)]);
  const band = [ends[0] ? covered[0] : 0, ends[1] ? covered[1] : nyquist] as const;
  const half = Math.round(reach * rate);
  const wanted = Math.max(8 * half, df > 0 ? Math.min(GRID, (2 * rate) / df) : 0);
  const size = 2 ** Math.ceil(Math.log2(wanted));
  const bin = rate / size;
  const drawn = (MAIN_LOBE / 2) * (rate / half);
  const from = ends[0] ? Math.max(1, Math.ceil((band[0] + drawn) / bin)) : 0;
  const to = ends[1] ? Math.floor((band[1] - drawn) / bin) : size / 2;
  if (half < 2 || to <= from)
    throw new UserError(
      'band-narrow',
      `the band from ${numberText(band[0])} to ${numberText(band[1])} Hz is too narrow for a filter that reaches ${numberText(reach)} s to either side: it needs more than ${numberText(2 * drawn)} Hz; widen "low" and "high" or raise "reach"`,
    );
  const density = densities(trimmed(spectrum, nyquist, !ends[0]), size, bin);
  const root = density.map((s, k) => (k < from || k > to ? 0 : Math.sqrt(2 / (rate * s))));
  const { response, impulse } = truncateInTime(kernels, root, size, half, blackmanHarris);
  return {
    taps: impulse.slice(0, half),
    rate,
    band,
    ends,
    slope: 2 * drawn,
    resolution: (WIDTH / 2) * (rate / half),
    variance: integral(response, density, bin),
    ideal: integral(root, density, bin),
  };
}

/** The spectrum without the bins that are not what their neighbours are: the last at rate/2, and the lowest when they are used. */
function trimmed(spectrum: Spectrum, nyquist: number, fromZero: boolean): Spectrum {
  const { frequency, density } = spectrum;
  const n = frequency.length;
  const end =
    frequency[n - 1] >= nyquist * (1 - 1e-12) ? Math.max(1, lowerBound(frequency, nyquist * (1 - 1e-12))) : n;
  const start = fromZero ? Math.min(DETRENDED, end - 1) : 0;
  return { ...spectrum, frequency: frequency.slice(start, end), density: density.slice(start, end) };
}

/** Density at each bin; beyond the ends of the spectrum that of its first or last bin. */
function densities(spectrum: Spectrum, size: number, bin: number): Float64Array {
  const { frequency } = spectrum;
  const [first, last] = [frequency[0], frequency.at(-1)!];
  return Float64Array.from({ length: size / 2 + 1 }, (_, k) =>
    densityAt(spectrum, Math.min(last, Math.max(first, k * bin))),
  );
}

/** ∫ |W|² S df by trapezoids over all bins with a density. */
function integral(response: Float64Array, density: Float64Array, bin: number): number {
  let sum = 0;
  const last = response.length - 1;
  response.forEach((w, k) => {
    if (w !== 0 && Number.isFinite(density[k])) sum += w * w * density[k] * (k === 0 || k === last ? 0.5 : 1);
  });
  return sum * bin;
}
