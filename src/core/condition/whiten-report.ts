import type { Series, Spectrum } from '../data/kinds';
import type { Quantity } from '../data/quantity';
import { spanLength } from '../data/spans';
import type { WhitenDesign } from './whiten-design';
import type { WhiteStatistics } from './whiten-statistics';

export interface WhitenFacts {
  readonly from: Series;
  readonly to: Series;
  readonly spectrum: Spectrum;
  /** Whether the spectrum was made of these data by the step itself. */
  readonly own: boolean;
  readonly design: WhitenDesign;
  readonly statistics: WhiteStatistics;
  /** As asked for, Hz. */
  readonly asked: readonly [low: number, high: number | null];
  readonly reach: number;
}

/** Samples that carry information of their own: two per second and Hz of the band. */
export const independent = ({ design, statistics }: WhitenFacts): number =>
  (statistics.count * (design.band[1] - design.band[0])) / (design.rate / 2);

const SOURCE = { formula: '', source: 'common practice, no source' } as const;

export function whitenNumbers(f: WhitenFacts): Quantity[] {
  const { design, statistics: s, to } = f;
  const error = 1.645 * Math.sqrt(2 / independent(f));
  return [
    {
      id: 'variance',
      label: 'Variance',
      value: s.variance,
      unit: '',
      convention: 'of the valid samples, about their mean',
      low: s.variance * (1 - error),
      high: s.variance * (1 + error),
      intervalMeaning: '90 %, were the noise Gaussian',
    },
    {
      id: 'expected',
      label: 'Variance expected',
      value: design.variance,
      unit: '',
      convention: 'from the spectrum; an upper limit where it has lines narrower than its own bins',
      explain: {
        ...SOURCE,
        formula: '∫ |W(f)|² S(f) df, W the filter, S the spectrum; density 2/rate in the band',
      },
    },
    {
      id: 'share',
      label: 'Share of the band',
      value: design.ideal,
      unit: '',
      convention: 'variance of noise that is perfectly white in the band',
    },
    { id: 'kurtosis', label: 'Excess kurtosis', value: s.kurtosis, unit: '', convention: '0 for a Gaussian' },
    {
      id: 'p-value',
      label: 'Kolmogorov–Smirnov p',
      value: s.pValue,
      unit: '',
      convention: 'samples over their own RMS against the unit normal; slightly too large for that',
    },
    { id: 'distance', label: 'Kolmogorov–Smirnov distance', value: s.distance, unit: '' },
    {
      id: 'tested',
      label: 'Samples tested',
      value: s.tested,
      unit: '',
      convention: s.stride === 1 ? 'every valid sample' : `one of every ${s.stride} valid samples`,
    },
    { id: 'low', label: 'Band from', value: design.band[0], unit: 'Hz' },
    { id: 'high', label: 'Band to', value: design.band[1], unit: 'Hz' },
    {
      id: 'resolution',
      label: 'Resolution',
      value: design.resolution,
      unit: 'Hz',
      convention: 'full width at half height of the filter’s smoothing',
    },
    {
      id: 'edge',
      label: 'Dropped',
      value: (design.taps.length - 1) / design.rate,
      unit: 's',
      convention: 'at each end of a valid span',
    },
    {
      id: 'kept',
      label: 'Valid',
      value: spanLength(to.valid) / to.rate,
      unit: 's',
      convention: 'samples over rate',
    },
  ];
}
