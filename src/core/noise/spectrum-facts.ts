import type { Spectrum } from '../data/kinds';
import { lowerBound } from '../figures/thin';

/** What is read off an estimated spectrum. */
export interface SpectrumFacts {
  /** Band of the floor in Hz and as bins `[from, to)`. */
  readonly band: readonly [number, number];
  readonly bins: readonly [number, number];
  /** Median amplitude density in the band. */
  readonly floor: number;
  /** Lowest bin of the band: amplitude density and frequency. */
  readonly lowest: number;
  readonly lowestAt: number;
  /** √ of the sum of all bins times their spacing. */
  readonly parseval: number;
  /** Decades between the largest and the smallest positive density, without the detrended bins and the Nyquist bin. */
  readonly decades: number;
  readonly zeroBins: number;
}

/**
 * The band in which the floor is taken: as asked, or 100 to 200 Hz, or the upper quarter to half of the range when the
 * rate is too low for that.
 */
export function floorBand(rate: number, low: number | null, high: number | null): [number, number] {
  const nyquist = rate / 2;
  const [a, b] = nyquist > 250 ? [100, 200] : [nyquist / 4, nyquist / 2];
  return [low ?? Math.min(a, (high ?? Infinity) / 2), high ?? Math.max(b, Math.min(nyquist, 2 * (low ?? 0)))];
}

/** Bins of a band, `[from, to)`. */
export function bandBins(frequency: Float64Array, band: readonly [number, number]): [number, number] {
  const from = lowerBound(frequency, band[0] * (1 - 1e-12));
  return [from, Math.max(from, lowerBound(frequency, band[1] * (1 + 1e-12)))];
}

/** @param detrended lowest bins that detrending has changed, left out of the range of densities */
export function spectrumFacts(
  { frequency, density, df }: Spectrum,
  band: readonly [number, number],
  detrended: number,
): SpectrumFacts {
  const bins = bandBins(frequency, band);
  const inside = density.slice(bins[0], bins[1]).map(Math.sqrt);
  let at = bins[0];
  for (let k = bins[0]; k < bins[1]; k++) if (density[k] < density[at]) at = k;
  let low = Infinity;
  let high = 0;
  let zeroBins = 0;
  let sum = 0;
  density.forEach((s, k) => {
    sum += s;
    if (k < detrended) return;
    if (s === 0) zeroBins++;
    if (s === 0 || k === density.length - 1) return;
    if (s < low) low = s;
    if (s > high) high = s;
  });
  return {
    band,
    bins,
    floor: median(inside),
    lowest: Math.sqrt(density[at]),
    lowestAt: frequency[at],
    parseval: Math.sqrt(sum * df),
    decades: high > low ? Math.log10(high / low) : 0,
    zeroBins,
  };
}

/** Median of an array, which is left as it is; NaN entries are left out; NaN when nothing is left. */
export function median(values: Float64Array): number {
  const sorted = values.filter((v) => !Number.isNaN(v)).sort();
  if (sorted.length === 0) return NaN;
  const half = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[half] : (sorted[half - 1] + sorted[half]) / 2;
}
