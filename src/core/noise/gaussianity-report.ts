import type { Quantity, Warning } from '../data/quantity';
import type { Table } from '../data/table';
import { counted, numberText } from '../figures/number-text';
import type { FrequencyRange } from './frequency-ranges';
import { GAUSSIAN_RATIO, type RatioLaw } from './magnitude-ratio';

/** Fewer segments than this make the band so wide that only gross departures show. */
const FEW = 30;

/** What a range on either side means. */
export const RANGE_WORDS = { low: 'steady line', high: 'bursts or drift' } as const;

export interface GaussianityFacts {
  readonly segments: number;
  readonly law: RatioLaw;
  readonly probability: number;
  readonly falseRanges: number;
  readonly low: number;
  readonly high: number;
  readonly values: Float64Array;
  readonly ranges: readonly FrequencyRange[];
  /** Factor by which correlation between neighbouring bins widens the scatter of a count. */
  readonly neighbours: number;
}

interface Counts {
  readonly bins: number;
  readonly below: number;
  readonly above: number;
  readonly median: number;
  /** Two standard deviations of the share outside. */
  readonly slack: number;
}

function counts({ values, low, high, probability, neighbours }: GaussianityFacts): Counts {
  const good = values.filter((v) => !Number.isNaN(v)).sort();
  const bins = good.length;
  const middle = bins >> 1;
  return {
    bins,
    below: good.filter((v) => v < low).length,
    above: good.filter((v) => v > high).length,
    median: bins === 0 ? NaN : bins % 2 === 1 ? good[middle] : (good[middle - 1] + good[middle]) / 2,
    slack: 2 * Math.sqrt((probability * (1 - probability) * neighbours) / Math.max(1, bins)),
  };
}

export function gaussianityNumbers(f: GaussianityFacts): Quantity[] {
  const { bins, below, above, median, slack } = counts(f);
  const chance = 1 - f.probability;
  if (bins === 0) return [{ id: 'segments', label: 'Segments', value: f.segments, unit: '' }];
  return [
    {
      id: 'median',
      label: 'Median of the bins',
      value: median,
      unit: '',
      convention: 'standard deviation over mean of the magnitude',
    },
    {
      id: 'expected',
      label: 'Expected of Gaussian noise',
      value: f.law.mean,
      unit: '',
      convention: `of ${counted(f.segments, 'segment')}; ${numberText(GAUSSIAN_RATIO, 5)} for very many`,
      low: f.low,
      high: f.high,
      intervalMeaning: `central ${numberText(100 * f.probability, 4)} % of one bin`,
      explain: {
        formula: '√((4 − π)/π) (1 − 0.672/n), standard deviation √(0.1379/n)',
        source: 'Rayleigh’s distribution; delta method, COMPUTED',
      },
    },
    { id: 'segments', label: 'Segments', value: f.segments, unit: '' },
    {
      id: 'effective-segments',
      label: 'Effective segments',
      value: f.law.segments,
      unit: '',
      convention: 'independent segments with the same scatter of this ratio',
    },
    {
      id: 'outside',
      label: 'Bins outside',
      value: (below + above) / bins,
      unit: '',
      convention: `share of ${bins} bins; ${numberText(chance)} expected`,
      low: Math.max(0, chance - slack),
      high: Math.min(1, chance + slack),
      intervalMeaning: 'about 95 % of Gaussian noise',
    },
    { id: 'below', label: 'Bins below', value: below / bins, unit: '', convention: `share of ${bins} bins` },
    { id: 'above', label: 'Bins above', value: above / bins, unit: '', convention: `share of ${bins} bins` },
    ...(['low', 'high'] as const).map((side): Quantity => ({
      id: `ranges-${side}`,
      label: `Ranges too ${side}`,
      value: f.ranges.filter((r) => r.side === side).length,
      unit: '',
      convention: `${numberText(f.falseRanges / 2)} or fewer expected by chance in the whole spectrum`,
    })),
  ];
}

export function gaussianityTable({ ranges, law }: GaussianityFacts): Table {
  return {
    kind: 'table',
    id: 'ranges',
    title: 'Frequencies at which the noise is not Gaussian',
    columns: [
      { id: 'from', label: 'From', unit: 'Hz' },
      { id: 'to', label: 'To', unit: 'Hz' },
      { id: 'side', label: 'Looks like', unit: '' },
      { id: 'at', label: 'Furthest out at', unit: 'Hz' },
      { id: 'value', label: 'Standard deviation over mean', unit: '' },
      { id: 'sigmas', label: 'Standard deviations from expected', unit: '' },
    ],
    rows: ranges.map((r) => [
      r.from,
      r.to,
      RANGE_WORDS[r.side],
      r.at,
      r.value,
      (r.value - law.mean) / law.deviation,
    ]),
  };
}

export function gaussianityWarnings(f: GaussianityFacts): Warning[] {
  const { bins, below, above, slack } = counts(f);
  const out: Warning[] = [];
  const outside = (below + above) / Math.max(1, bins);
  const chance = 1 - f.probability;
  if (f.segments < FEW)
    out.push({
      code: 'few-averages',
      severity: 'caution',
      found: `only ${counted(f.segments, 'segment')}`,
      value: f.segments,
      consequence: `Gaussian noise scatters from ${numberText(f.low, 3)} to ${numberText(f.high, 3)}; only gross departures show.`,
      remedy: 'Use shorter segments or a longer span.',
    });
  if (bins < f.values.length)
    out.push({
      code: 'zero-bins',
      severity: 'caution',
      found: `${counted(f.values.length - bins, 'bin')} of ${f.values.length} without any power`,
      value: f.values.length - bins,
      consequence: 'They have no ratio and are neither drawn nor counted.',
      remedy: 'Check the channel: it may be constant, or filtered to nothing there.',
    });
  if (outside > chance + 2 * slack) {
    const high = above > below;
    out.push({
      code: 'not-gaussian',
      severity: 'caution',
      found: `${numberText(100 * outside, 3)} % of the bins lie outside the band that ${numberText(100 * chance, 3)} % leave by chance, ${high ? 'most above: bursts, or noise that changes' : 'most below: steady lines'}`,
      value: outside,
      consequence: high
        ? 'Significances worked out for Gaussian noise are too good: loud events come more often than that.'
        : 'There are lines whose amplitude does not fluctuate; the spectrum alone does not describe them.',
      remedy: high
        ? 'Look at the stationarity step for when it happens; leave loud times out with "exclude", or gate them.'
        : 'Find the lines with the lines step and take them out with notches.',
    });
  }
  return out;
}
