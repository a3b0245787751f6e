import { inherited } from '../condition/block-series';
import { filteredSeries, filteredSpans } from '../condition/symmetric-filter';
import { designWhitening, type WhitenDesign } from '../condition/whiten-design';
import type { Series, Spectrum } from '../data/kinds';
import type { Kernels } from '../kernels/kernels';
import { densityAt } from '../noise/inverse-spectrum';

export interface Whitened {
  readonly series: Series;
  /** Power of the noise in the result relative to white noise of density 2/rate, at a frequency in Hz. */
  readonly power: (frequency: number) => number;
}

/** Points of the response per reach of the filter. */
const FINE = 8;

/** A series whitened for a map, computed as it is read, and what its noise then is at each frequency. */
export function whitenedFor(
  kernels: Kernels,
  series: Series,
  spectrum: Spectrum,
  band: readonly [low: number, high: number],
  reach: number,
  keep: number,
): Whitened {
  const design = designWhitening(kernels, spectrum, series.rate, band[0], band[1], reach);
  const facts = {
    ...inherited(series),
    label: `whitened ${series.label}`,
    unit: '',
    rate: series.rate,
    length: series.length,
    ...filteredSpans(series, design.taps.length - 1),
  };
  return {
    series: filteredSeries(kernels, series, design.taps, facts, keep),
    power: noisePower(kernels, design, spectrum),
  };
}

function noisePower(
  kernels: Kernels,
  { taps, rate }: WhitenDesign,
  spectrum: Spectrum,
): (f: number) => number {
  const size = 2 ** Math.ceil(Math.log2(FINE * taps.length));
  const circle = new Float64Array(size);
  taps.forEach((h, k) => {
    circle[k] = h;
    if (k > 0) circle[size - k] = h;
  });
  const response = kernels.rfft(circle).re;
  const power = response.map((r, k) => {
    const s = densityAt(spectrum, (k * rate) / size);
    return Number.isFinite(s) ? (r * r * s * rate) / 2 : 0;
  });
  return (f) => {
    const at = (f * size) / rate;
    const k = Math.min(power.length - 2, Math.floor(at));
    return power[k] + (at - k) * (power[k + 1] - power[k]);
  };
}
