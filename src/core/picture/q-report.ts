import { addSeconds, formatGps } from '../data/gps-time';
import type { LoudTile, TimeFrequencyMap } from '../data/kinds';
import type { Quantity, Warning } from '../data/quantity';
import type { Table } from '../data/table';
import { numberText, withUnit } from '../figures/number-text';
import { chanceOf, tileSnr } from './loud-tiles';
import type { MapSpan } from './map-span';

export interface QFacts {
  readonly map: TimeFrequencyMap;
  readonly span: MapSpan;
  readonly loud: readonly LoudTile[];
  readonly trials: number;
  readonly planes: number;
  readonly mean: number;
  readonly cells: number;
  /** Part of the cells that touch an edge or a gap. */
  readonly empty: number;
  /** Averages of the data's own spectrum; absent when the noise was given. */
  readonly ownSegments?: number;
  readonly white: boolean;
}

/** Mean energy further from 1 than this means that the data are not white where it matters. */
const NOT_WHITE = 0.1;
const FEW = 8;
const MUCH_EMPTY = 0.3;

export function qNumbers({ map, loud, trials, planes, mean }: QFacts): Quantity[] {
  const first = loud.at(0);
  const tile: Quantity[] = first
    ? [
        {
          id: 'time',
          label: 'Loudest tile',
          value: first.time,
          unit: 's',
          convention: `after GPS ${formatGps(map.start)}, middle of the tile`,
        },
        {
          id: 'frequency',
          label: 'Its frequency',
          value: first.frequency,
          unit: 'Hz',
          convention: 'centre of the tile',
        },
        {
          id: 'q',
          label: 'Its Q',
          value: first.q,
          unit: '',
          convention: 'frequency over standard deviation of the squared window',
        },
        {
          id: 'energy',
          label: 'Its energy',
          value: first.energy,
          unit: '',
          convention: 'mean 1 in Gaussian noise',
        },
        {
          id: 'snr',
          label: 'Its SNR',
          value: tileSnr(first.energy),
          unit: '',
          convention: '√(2(E − 1)), of a burst of the shape of the tile',
          explain: {
            formula: 'noise alone has ⟨E⟩ = 1 and p(E) = e^(−E); a burst of optimal SNR ρ adds ρ²/2',
            source: 'Chatterji et al., Class. Quantum Grav. 21, S1809 (2004)',
          },
        },
        {
          id: 'chance',
          label: 'Chance in Gaussian noise',
          value: chanceOf(first.energy, trials),
          unit: '',
          convention: `of a tile as loud among ${trials} tiles; real noise is not Gaussian`,
        },
      ]
    : [];
  return [
    ...tile,
    {
      id: 'tiles',
      label: 'Tiles',
      value: trials,
      unit: '',
      convention: 'that the mismatch asks for, without those at edges and gaps',
    },
    { id: 'planes', label: 'Planes of Q', value: planes, unit: '' },
    {
      id: 'mean-energy',
      label: 'Mean energy',
      value: mean,
      unit: '',
      convention: '1 in Gaussian noise of the assumed spectrum',
    },
  ];
}

export function qTable({ map, loud, trials }: QFacts): Table {
  return {
    kind: 'table',
    id: 'loud-tiles',
    title: 'Loudest tiles',
    columns: [
      { id: 'gps', label: 'GPS time', unit: 's' },
      { id: 'time', label: 'After the start', unit: 's' },
      { id: 'frequency', label: 'Frequency', unit: 'Hz' },
      { id: 'q', label: 'Q', unit: '' },
      { id: 'energy', label: 'Energy', unit: '' },
      { id: 'snr', label: 'SNR', unit: '' },
      { id: 'chance', label: 'Chance in Gaussian noise', unit: '' },
    ],
    rows: loud.map((t) => [
      formatGps(addSeconds(map.start, t.time)),
      t.time,
      t.frequency,
      t.q,
      t.energy,
      tileSnr(t.energy),
      chanceOf(t.energy, trials),
    ]),
  };
}

export function qWarnings(facts: QFacts): Warning[] {
  return [...shortened(facts), ...notWhite(facts), ...fewAverages(facts), ...mostlyEdges(facts)];
}

function shortened({ span }: QFacts): Warning[] {
  if (span.cutFrom === undefined) return [];
  return [
    {
      code: 'map-shortened',
      severity: 'caution',
      found: `the map holds the first ${withUnit(span.seconds, 's')} of ${withUnit(span.cutFrom, 's', 7)}`,
      value: span.seconds,
      consequence: 'What comes later was not looked at.',
      remedy: 'Set "start" and "duration", raise "mismatch" or "low", or resample to a lower rate.',
    },
  ];
}

function notWhite({ mean, white }: QFacts): Warning[] {
  if (!(Math.abs(mean - 1) > NOT_WHITE)) return [];
  return [
    {
      code: 'not-white',
      severity: mean > 2 || mean < 0.5 ? 'problem' : 'caution',
      found: `the mean energy of all tiles is ${numberText(mean, 3)}, not 1`,
      value: mean,
      consequence:
        'The noise was not of the assumed spectrum, or loud disturbances fill the map: energies, SNR and chances are off by about this factor.',
      remedy: white
        ? 'Let the step whiten ("whitening": "divide"), or whiten the data to variance 1 first.'
        : 'Take the noise from a quiet span close by, and look for lines and drifts with lines and stationarity.',
    },
  ];
}

function fewAverages({ ownSegments }: QFacts): Warning[] {
  if (ownSegments === undefined || ownSegments >= FEW) return [];
  return [
    {
      code: 'few-averages',
      severity: 'caution',
      found: `the noise was taken from ${ownSegments} segments of the same data`,
      value: ownSegments,
      consequence: 'A loud burst is part of its own noise and looks quieter than it is.',
      remedy: 'Give a longer span, a shorter "segment", or a noise spectrum of other data in "of".',
    },
  ];
}

function mostlyEdges({ empty, span }: QFacts): Warning[] {
  if (!(empty > MUCH_EMPTY)) return [];
  return [
    {
      code: 'mostly-edges',
      severity: 'caution',
      found: `${numberText(100 * empty, 3)} % of the cells touch an edge or a gap of the ${withUnit(span.seconds, 's')}`,
      value: empty,
      consequence: 'Low frequencies and high Q need time around them and have no values there.',
      remedy: 'Take a longer span, raise "low" or lower "q-high".',
    },
  ];
}
