import { UserError } from '../data/errors';
import type { Series } from '../data/kinds';
import { spanLength } from '../data/spans';
import { withUnit } from '../figures/number-text';
import { normalTail } from '../kernels/special-erf';
import type { Kernels } from '../kernels/kernels';
import { robustWidth } from '../look/robust-width';
import { inherited } from './block-series';
import type { Gate } from './gate-taper';
import { filteredSeries, filteredSpans } from './symmetric-filter';
import { sweep } from './sweep';
import { blackmanHarris } from './truncation-window';

export interface GateSearch {
  readonly gates: Gate[];
  /** Robust centre and width of what was tested. */
  readonly median: number;
  readonly width: number;
  /** Samples over the threshold, and the largest distance from the median in widths. */
  readonly over: number;
  readonly loudest: number;
  /** Samples tested, and how many of them Gaussian noise alone puts over the threshold. */
  readonly tested: number;
  readonly chance: number;
}

/**
 * Impulse response of a band, symmetric in time: the ideal one under a Blackman–Harris window that reaches four periods of the
 * lowest edge, so that half the amplitude is left at each edge and nothing outside of half the lowest edge from it.
 *
 * @param low Hz, null for everything down to 0
 * @param high Hz, null for everything up to rate/2
 */
export function bandTaps(rate: number, low: number | null, high: number | null): Float64Array {
  const half = Math.round((4 * rate) / (low ?? high ?? rate));
  const [a, b] = [(low ?? 0) / rate, (high ?? rate / 2) / rate];
  return Float64Array.from({ length: half }, (_, k) => {
    const ideal =
      k === 0 ? 2 * (b - a) : (Math.sin(2 * Math.PI * b * k) - Math.sin(2 * Math.PI * a * k)) / (Math.PI * k);
    return ideal * blackmanHarris(k / half);
  });
}

/** What the search tests: the series itself, or a copy with a band of it. */
export function searchedSeries(
  kernels: Kernels,
  series: Series,
  low: number | null,
  high: number | null,
  keep: number,
): Series {
  if (low === null && high === null) return series;
  const nyquist = series.rate / 2;
  if (!((low ?? 0) < (high ?? nyquist) && (high ?? 0) <= nyquist && (low ?? 0) < nyquist))
    throw new UserError(
      'band-empty',
      `the band to look in, ${withUnit(low ?? 0, 'Hz')} to ${withUnit(high ?? nyquist, 'Hz')}: "low" must be below "high", and both below ${withUnit(nyquist, 'Hz')}, half the sample rate`,
    );
  const taps = bandTaps(series.rate, low, high);
  const spans = filteredSpans(series, taps.length - 1);
  if (spans.valid.length === 0)
    throw new UserError(
      'filter-long',
      `no valid span of ${series.label} is longer than the ${withUnit((2 * taps.length) / series.rate, 's')} the band filter reaches over: raise "low"`,
    );
  const { label, unit, rate, length } = series;
  return filteredSeries(
    kernels,
    series,
    taps,
    { ...inherited(series), label, unit, rate, length, ...spans },
    keep,
  );
}

/**
 * Gates around every sample whose distance from the median is more than `threshold` robust widths.
 *
 * @param margin samples brought to zero on either side
 * @param taper samples of the taper: gates closer than two of them are joined
 */
export async function searchGates(
  searched: Series,
  threshold: number,
  margin: number,
  taper: number,
  report: (fraction: number) => Promise<void>,
): Promise<GateSearch> {
  const { median, width } = robustWidth(searched);
  const limit = threshold * width;
  const gates: Gate[] = [];
  let [over, loudest] = [0, 0];
  await sweep(searched, report, (x, at) => {
    for (let i = 0; i < x.length; i++) {
      const distance = Math.abs(x[i] - median);
      if (distance > loudest) loudest = distance;
      if (!(distance > limit)) continue;
      over++;
      const from = Math.max(0, at + i - margin);
      const to = Math.min(searched.length, at + i + 1 + margin);
      const last = gates.at(-1);
      const multiple = width > 0 ? distance / width : Infinity;
      if (last && from - last.to < 2 * taper)
        gates[gates.length - 1] = {
          ...last,
          to,
          over: last.over + 1,
          loudest: Math.max(last.loudest, multiple),
        };
      else gates.push({ from, to, given: false, over: 1, loudest: multiple });
    }
  });
  const tested = spanLength(searched.valid);
  return {
    gates,
    median,
    width,
    over,
    loudest: width > 0 ? loudest / width : loudest > 0 ? Infinity : 0,
    tested,
    chance: 2 * normalTail(threshold) * tested,
  };
}
