import { UserError } from '../data/errors';
import type { Spectrum, Waveform } from '../data/kinds';
import { numberText } from '../figures/number-text';
import { coveredBand, densityAt } from '../noise/inverse-spectrum';

/** Points of a logarithmic grid where the spectrum has no even bins of its own. */
const POINTS = 20_000;

/** Squared SNR by frequency: what each bin of a grid adds. */
export interface SnrByFrequency {
  /** Hz, rising; middle of each bin. */
  readonly frequency: Float64Array;
  /** Hz; width of each bin inside the band. */
  readonly width: Float64Array;
  /** 4 |h̃|²/S times the width. */
  readonly parts: Float64Array;
  readonly band: readonly [low: number, high: number];
  readonly snr: number;
}

/**
 * Optimal SNR of a waveform in noise, ρ² = 4 ∫ |h̃|²/S df with one-sided S over the band that both cover, bin by bin of the
 * spectrum (edges in part), or on a logarithmic grid for a curve without even bins.
 *
 * @throws UserError when the two have no band in common
 */
export function optimalSnr(
  waveform: Waveform,
  spectrum: Spectrum,
  low: number,
  high: number,
): SnrByFrequency {
  const asked = [Math.max(low, waveform.low), Math.min(high, waveform.high)] as const;
  if (!(asked[1] > asked[0]))
    throw new UserError(
      'band-empty',
      `${waveform.label} lies between ${numberText(waveform.low)} and ${numberText(waveform.high)} Hz, which leaves nothing between ${numberText(low)} and ${numberText(high)} Hz`,
    );
  const band = coveredBand(spectrum, asked);
  const edges = edgesOf(spectrum, band);
  const n = edges.length - 1;
  const frequency = Float64Array.from({ length: n }, (_, k) => (edges[k] + edges[k + 1]) / 2);
  const width = Float64Array.from({ length: n }, (_, k) => edges[k + 1] - edges[k]);
  const { re, im } = waveform.at(frequency);
  const parts = frequency.map((f, k) => {
    const s = densityAt(spectrum, f);
    return s > 0 ? (4 * (re[k] * re[k] + im[k] * im[k]) * width[k]) / s : 0;
  });
  return { frequency, width, parts, band, snr: Math.sqrt(parts.reduce((a, b) => a + b, 0)) };
}

/** Edges of bins centred on those of the spectrum, the outer ones cut at the band; or of even steps in the logarithm. */
function edgesOf({ df }: Spectrum, [low, high]: readonly [number, number]): Float64Array {
  if (!(df > 0))
    return Float64Array.from({ length: POINTS + 1 }, (_, k) => low * (high / low) ** (k / POINTS));
  const first = Math.floor(low / df + 0.5) + 0.5;
  const inner: number[] = [];
  for (let e = first; e * df < high; e++) if (e * df > low) inner.push(e * df);
  return Float64Array.from([low, ...inner, high]);
}

/** Frequency in Hz below which a part of the squared SNR lies. */
export function shareFrequency({ frequency, parts, snr }: SnrByFrequency, share: number): number {
  let sum = 0;
  for (let k = 0; k < parts.length; k++) {
    sum += parts[k];
    if (sum >= share * snr * snr) return frequency[k];
  }
  return frequency[frequency.length - 1];
}
