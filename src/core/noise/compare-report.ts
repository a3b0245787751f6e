import type { Spectrum } from '../data/kinds';
import type { Quantity, Warning } from '../data/quantity';
import { secondsBetween } from '../data/gps-time';
import type { Table } from '../data/table';
import { numberText } from '../figures/number-text';
import { bandId, bandText, type Band } from './bands';
import type { CommonGrid } from './common-grid';
import type { FrequencyRange } from './frequency-ranges';

/** Relative error of one bin above which the comparison says little. */
const COARSE = 0.35;

export interface BandRatio {
  readonly band: Band;
  readonly bins: number;
  readonly ratio: number;
  /** 90 % for the true ratio. */
  readonly low: number;
  readonly high: number;
}

export interface CompareFacts {
  readonly spectra: readonly [Spectrum, Spectrum];
  readonly names: readonly [string, string];
  readonly grid: CommonGrid;
  readonly ratio: Float64Array;
  /** Bins that are judged, with a value. */
  readonly judged: number;
  readonly outside: number;
  readonly probability: number;
  readonly falseBins: number;
  readonly low: number;
  readonly high: number;
  /** Limits that account for the number of bins. */
  readonly rareLow: number;
  readonly rareHigh: number;
  readonly neighbours: number;
  readonly bands: readonly BandRatio[];
  readonly ranges: readonly FrequencyRange[];
  /** Whether any of the two has an error. */
  readonly hasError: boolean;
}

export function compareNumbers(f: CompareFacts): Quantity[] {
  const chance = 1 - f.probability;
  const slack = 2 * Math.sqrt((chance * (1 - chance) * f.neighbours) / Math.max(1, f.judged));
  const law = {
    formula: '√F of the central probability, ν = 2/(relative error)² degrees of freedom each',
    source:
      'ratio of two chi-square estimates; Welch, IEEE Trans. Audio Electroacoust. AU-15, 70 (1967), for ν',
  };
  return [
    ...f.bands.map((b): Quantity => ({
      id: bandId('ratio', b.band),
      label: `Ratio, ${bandText(b.band)}`,
      value: b.ratio,
      unit: '',
      convention: `amplitude densities, first over second, median of ${b.bins} bins`,
      ...(f.hasError
        ? {
            low: b.low,
            high: b.high,
            intervalMeaning: '90 % confidence for the true ratio, were it the same in the whole band',
          }
        : {}),
    })),
    ...(f.hasError
      ? [
          {
            id: 'bin-interval',
            label: 'Interval of one bin',
            value: 1,
            unit: '',
            convention: 'ratio of amplitude densities when the true ones are equal',
            low: f.low,
            high: f.high,
            intervalMeaning: `central ${numberText(100 * f.probability, 4)} %`,
            explain: law,
          },
          {
            id: 'outside',
            label: 'Bins outside',
            value: f.outside / f.judged,
            unit: '',
            convention: `share of ${f.judged} bins; ${numberText(chance)} expected by chance`,
            low: Math.max(0, chance - slack),
            high: Math.min(1, chance + slack),
            intervalMeaning: 'about 95 % of pairs with equal true densities',
          },
          {
            id: 'ranges',
            label: 'Ranges that differ',
            value: f.ranges.length,
            unit: '',
            convention: `below ${numberText(f.rareLow)} or above ${numberText(f.rareHigh)}; ${numberText(f.falseBins)} or fewer expected by chance in the whole spectrum`,
          },
        ]
      : []),
    { id: 'bins', label: 'Bins compared', value: f.judged, unit: '' },
  ];
}

export function compareTables(f: CompareFacts): Table[] {
  return [
    {
      kind: 'table',
      id: 'ranges',
      title: `Where ${f.names[0]} and ${f.names[1]} differ`,
      columns: [
        { id: 'from', label: 'From', unit: 'Hz' },
        { id: 'to', label: 'To', unit: 'Hz' },
        { id: 'louder', label: 'Louder', unit: '' },
        { id: 'at', label: 'Furthest out at', unit: 'Hz' },
        { id: 'ratio', label: 'Ratio of amplitude densities, first over second', unit: '' },
      ],
      rows: f.ranges.map((r) => [r.from, r.to, f.names[r.side === 'high' ? 0 : 1], r.at, r.value]),
    },
    {
      kind: 'table',
      id: 'bands',
      title: 'Median ratio in bands',
      columns: [
        { id: 'from', label: 'From', unit: 'Hz' },
        { id: 'to', label: 'To', unit: 'Hz' },
        { id: 'bins', label: 'Bins', unit: '' },
        { id: 'ratio', label: 'Ratio of amplitude densities, first over second', unit: '' },
        { id: 'low', label: '90 % from', unit: '' },
        { id: 'high', label: '90 % to', unit: '' },
      ],
      rows: f.bands.map((b) => [
        b.band[0],
        b.band[1],
        b.bins,
        b.ratio,
        f.hasError ? b.low : null,
        f.hasError ? b.high : null,
      ]),
    },
  ];
}

export function compareWarnings(f: CompareFacts): Warning[] {
  const [a, b] = f.spectra;
  const out: Warning[] = [];
  if (!f.hasError)
    out.push({
      code: 'no-error',
      severity: 'note',
      found: 'neither of the two is an estimate',
      consequence: 'There is no error band: any difference is one.',
      remedy: 'Compare with a noise-spectrum step to have an error.',
    });
  const worst = Math.max(...f.spectra.map((s) => s.estimate?.relativeError ?? 0));
  if (worst > COARSE)
    out.push({
      code: 'few-averages',
      severity: 'caution',
      found: `one bin of the poorer estimate is known to ${numberText(100 * worst, 2)} %`,
      value: worst,
      consequence: `Equal noise gives ratios from ${numberText(f.low, 3)} to ${numberText(f.high, 3)}; only large differences show.`,
      remedy: 'Use shorter segments or longer spans for the noise spectra.',
    });
  if (f.grid.interpolated !== undefined) {
    const [made, kept] = f.grid.interpolated === 'first' ? [a, b] : [b, a];
    const curve = made.estimate === undefined;
    out.push({
      code: 'grids-differ',
      severity: curve ? 'note' : 'caution',
      found: `the frequencies differ: ${made.label} is interpolated at those of ${kept.label}, straight in log density against log frequency`,
      ...(made.df > 0 && kept.df > 0 ? { value: made.df / kept.df } : {}),
      consequence: curve
        ? 'Lines narrower than the points of the curve are lost.'
        : `Two resolutions are compared (bins every ${numberText(made.df)} and ${numberText(kept.df)} Hz): at lines and steep slopes the ratio says nothing about the instruments.`,
      remedy: curve ? 'Give the curve more points.' : 'Use the same "segment" in both noise spectra.',
    });
  } else if (a.estimate && b.estimate && a.estimate.window !== b.estimate.window)
    out.push({
      code: 'windows-differ',
      severity: 'note',
      found: `one spectrum has the ${a.estimate.window} window, the other ${b.estimate.window}`,
      consequence: 'Lines come out with different height and width.',
      remedy: 'Use the same "window" in both noise spectra.',
    });
  const shared = sharedSeconds(a, b);
  if (a.label === b.label && shared > 0)
    out.push({
      code: 'not-independent',
      severity: 'caution',
      found: `both spectra are of ${a.label.replace(/^noise of /, '')} over ${numberText(shared)} s in common`,
      value: shared,
      consequence: 'Their errors are shared, so that the ratio scatters less than the band says.',
      remedy: 'Compare spans that do not overlap.',
    });
  return out;
}

function sharedSeconds({ estimate: a }: Spectrum, { estimate: b }: Spectrum): number {
  if (!a || !b) return 0;
  const lag = secondsBetween(b.start, a.start);
  return Math.min(a.duration, lag + b.duration) - Math.max(0, lag);
}
