import { UserError } from '../data/errors';
import type { Spectrum } from '../data/kinds';
import { counted, numberText } from '../figures/number-text';
import { statisticFigure, type StatisticDetail } from '../figures/statistic';
import { makeWindow } from '../kernels/windows';
import { windowFigures } from '../kernels/window-figures';
import { WINDOW_NAMES } from '../kernels/windows-names';
import { BANDS_PARAM, bandsWithin, bandText } from '../noise/bands';
import { commonGrid, type CommonGrid } from '../noise/common-grid';
import {
  compareNumbers,
  compareTables,
  compareWarnings,
  type BandRatio,
  type CompareFacts,
} from '../noise/compare-report';
import { detrendedBins } from '../noise/detrended-bins';
import { fQuantile } from '../noise/f-distribution';
import { frequencyRanges } from '../noise/frequency-ranges';
import { trigamma } from '../noise/polygamma';
import { neighbourFactor } from '../noise/power-correlation';
import { bandBins, median } from '../noise/spectrum-facts';
import { defineStep } from './define';

export default defineStep({
  id: 'compare-noise',
  title: 'Compare noise',
  version: 1,
  group: 'noise',
  summary: 'Ratio of two amplitude densities, with the band that the errors of both explain.',
  takes: [
    { kind: 'spectrum', count: 'one', help: 'the spectrum above the line of the fraction' },
    { kind: 'spectrum', count: 'one', help: 'the spectrum it is divided by' },
  ],
  gives: 'statistic',
  params: {
    bands: {
      ...BANDS_PARAM,
      help: 'Bands in which the median ratio is read off, as pairs of frequencies. What lies outside the common frequencies is cut off.',
    },
    probability: {
      kind: 'number',
      label: 'Central band',
      unit: '',
      default: 0.9,
      min: 0.5,
      max: 0.9999,
      help: 'Probability with which the ratio of one bin lies inside the shaded band when the true densities are equal.',
    },
    'false-bins': {
      kind: 'number',
      label: 'False bins',
      unit: '',
      default: 0.1,
      min: 0,
      exclusiveMin: true,
      max: 100,
      slider: 'log',
      help: 'Number of bins that equal noise may put outside the limits of the marked ranges by chance, on average in the whole spectrum. It accounts for the number of bins looked at.',
    },
    low: {
      kind: 'number',
      label: 'From',
      unit: 'Hz',
      default: null,
      min: 0,
      help: 'Lowest frequency that is judged. Left empty: the first bin that detrending does not change.',
    },
    high: {
      kind: 'number',
      label: 'To',
      unit: 'Hz',
      default: null,
      min: 0,
      exclusiveMin: true,
      help: 'Highest frequency that is judged. Left empty: the highest common one, without that at half the sample rate.',
    },
  },
  sources: [
    {
      text: 'Ratio of two estimates as F distributed: Abramowitz & Stegun, section 26.6 (1964)',
      flag: 'memory',
    },
    {
      text: 'Equivalent degrees of freedom: Welch, IEEE Trans. Audio Electroacoust. AU-15, 70 (1967)',
      flag: 'memory',
    },
  ],
  async run(inputs, params, context) {
    await context.block(0);
    const spectra = [inputs.one('spectrum', 0), inputs.one('spectrum', 1)] as const;
    const [first, second] = spectra;
    if (first.unit !== second.unit)
      throw new UserError(
        'units-differ',
        `${first.label} is in ${first.unit} and ${second.label} in ${second.unit}; give both inputs the same "unit" and "scale"`,
      );
    const grid = commonGrid(first, second);
    const { frequency } = grid;
    const judged = judgedBins(grid, spectra, params.low, params.high);
    const ratio = grid.first.map((s, k) => Math.sqrt(s / grid.second[k]));
    const inside = ratio.map((r, k) => (k >= judged[0] && k < judged[1] ? r : NaN));
    const count = inside.reduce((n, r) => (Number.isNaN(r) ? n : n + 1), 0);
    if (count === 0)
      throw new UserError(
        'no-common-band',
        `${first.label} and ${second.label} have no bin from ${numberText(frequency[judged[0]])} to ${numberText(frequency[judged[1] - 1])} Hz in which both are above zero`,
      );
    const freedom = spectra.map((s) => (s.estimate ? 2 / s.estimate.relativeError ** 2 : Infinity));
    const limit = (p: number, tail: 'lower' | 'upper'): number =>
      Math.sqrt(fQuantile(p, freedom[0], freedom[1], tail));
    const hasError = freedom.some(Number.isFinite);
    const side = (1 - params.probability) / 2;
    const rare = Math.min(side, params['false-bins'] / (2 * count));
    const [rareLow, rareHigh] = [limit(rare, 'lower'), limit(rare, 'upper')];
    const [low, high] = [limit(side, 'lower'), limit(side, 'upper')];
    const windows = spectra.flatMap((s) => knownWindow(s));
    const neighbours = Math.max(1, ...windows.map(neighbourFactor));
    const reach = Math.max(2, ...windows.map((w) => Math.ceil(2 * windowFigures(w).enbw)));
    const { bands, warnings } = bandsWithin(params.bands, frequency[judged[0]], frequency[judged[1] - 1], 0);
    const names: [string, string] =
      first.label === second.label ? [inputs.names[0], inputs.names[1]] : [first.label, second.label];
    const facts: CompareFacts = {
      spectra,
      names,
      grid,
      ratio,
      judged: count,
      outside: inside.filter((r) => r < low || r > high).length,
      probability: params.probability,
      falseBins: params['false-bins'],
      low,
      high,
      rareLow,
      rareHigh,
      neighbours,
      bands: bands.flatMap((band) =>
        bandRatio(band, frequency, inside, freedom, limit(0.5, 'lower'), neighbours),
      ),
      ranges: hasError ? frequencyRanges(frequency, inside, rareLow, rareHigh, reach) : [],
      hasError,
    };
    const data: StatisticDetail = {
      kind: 'statistic',
      label: `${names[0]} over ${names[1]}`,
      quantity: 'Ratio of amplitude densities',
      frequency,
      values: ratio,
      expected: 1,
      low,
      high,
      probability: params.probability,
      ranges: facts.ranges,
    };
    return {
      data,
      sentence:
        `Amplitude density of ${names[0]} over that of ${names[1]}, ${count} bins from ${bandText([frequency[judged[0]], frequency[judged[1] - 1]])}` +
        (grid.interpolated === undefined
          ? ''
          : ` (${names[grid.interpolated === 'first' ? 0 : 1]} interpolated)`) +
        `: ${facts.bands.map((b) => `${numberText(b.ratio, 3)} from ${bandText(b.band)}`).join(', ')} (medians)` +
        (hasError
          ? `; ${counted(facts.ranges.length, 'range')} outside what the errors explain.`
          : '; neither has an error.'),
      numbers: compareNumbers(facts),
      warnings: [...compareWarnings(facts), ...warnings],
      tables: compareTables(facts),
    };
  },
  figures: (data, _params, _inputs, viewport) => [
    statisticFigure(data, viewport, {
      title: 'Ratio of noise',
      scale: 'log',
      atLeast: [0.5, 2],
      expectedName: 'equal noise:',
      words: { low: 'quieter', high: 'louder' },
    }),
  ],
});

/** A short window of the shape an estimate was made with; none for models and curves. */
function knownWindow({ estimate }: Spectrum): Float64Array[] {
  const name = WINDOW_NAMES.find((n) => n === estimate?.window);
  return name === undefined ? [] : [makeWindow(name, 1024)];
}

/** Bins `[from, to)`: as asked, without the lowest that detrending changes and the one at half the sample rate. */
function judgedBins(
  { frequency }: CommonGrid,
  spectra: readonly Spectrum[],
  low: number | null,
  high: number | null,
): [number, number] {
  let lowest = frequency[0];
  let highest = frequency.at(-1)!;
  for (const { estimate, df } of spectra) {
    const name = WINDOW_NAMES.find((n) => n === estimate?.window);
    if (estimate === undefined || name === undefined) continue;
    lowest = Math.max(lowest, detrendedBins(name) * df);
    highest = Math.min(highest, estimate.rate / 2 - df / 2);
  }
  const [from, to] = bandBins(frequency, [low ?? lowest, high ?? highest]);
  if (to <= from)
    throw new UserError(
      'empty-band',
      `no common bin from ${numberText(low ?? lowest)} to ${numberText(high ?? highest)} Hz; the spectra have ${numberText(frequency[0])} to ${numberText(frequency.at(-1)!)} Hz in common`,
    );
  return [from, to];
}

/**
 * Median ratio in a band. The median of n independent values with standard deviation σ scatters by √(π/2) σ/√n; the
 * logarithm of a chi-square estimate with ν degrees of freedom has variance ψ′(ν/2).
 */
function bandRatio(
  band: readonly [number, number],
  frequency: Float64Array,
  ratio: Float64Array,
  freedom: readonly number[],
  middle: number,
  neighbours: number,
): BandRatio[] {
  const inside = ratio.slice(...bandBins(frequency, band)).filter((r) => !Number.isNaN(r));
  if (inside.length === 0) return [];
  const value = median(inside);
  const variance = freedom.reduce((sum, nu) => sum + (nu === Infinity ? 0 : trigamma(nu / 2)), 0) / 4;
  const step = 1.645 * Math.sqrt(((Math.PI / 2) * variance * neighbours) / inside.length);
  return [
    {
      band,
      bins: inside.length,
      ratio: value,
      low: (value / middle) * Math.exp(-step),
      high: (value / middle) * Math.exp(step),
    },
  ];
}
