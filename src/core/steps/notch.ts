import { passesText } from '../condition/filter-edges';
import { CROP_PARAM, DIRECTION_PARAM } from '../condition/filter-params';
import { responseFigure } from '../condition/filter-response';
import { runFilter } from '../condition/filter-run';
import { planNotches, type NotchPlan } from '../condition/notch-list';
import type { LineList, Series } from '../data/kinds';
import type { Warning } from '../data/quantity';
import type { Table } from '../data/table';
import { counted, numberText, withUnit } from '../figures/number-text';
import { seriesFigure } from '../figures/series';
import { notchRinging } from '../kernels/notch';
import { defineStep } from './define';

/** Part of the band below half the rate that the notches take, from which on it is worth a word. */
const MUCH = 0.05;

interface NotchParams {
  readonly frequencies: readonly number[];
  readonly harmonics: number;
  readonly q: number;
  readonly height: number;
}

const planFor = (series: Series, params: NotchParams, lines: LineList | undefined): NotchPlan =>
  planNotches({ ...params, lines, rate: series.rate, label: series.label });

export default defineStep({
  id: 'notch',
  title: 'Notch',
  version: 1,
  group: 'condition',
  summary: 'Takes narrow lines out: listed ones, their harmonics, or those that the step lines found.',
  takes: [
    { kind: 'series', count: 'one', help: 'the data to be filtered' },
    { kind: 'lines', count: 'optional', help: 'lines to take out, besides those listed' },
  ],
  gives: 'series',
  params: {
    frequencies: {
      kind: 'list',
      label: 'Frequencies',
      unit: 'Hz',
      each: 1,
      default: [],
      min: 0,
      ask: true,
      help: 'Centres of the notches.',
    },
    harmonics: {
      kind: 'number',
      label: 'Harmonics',
      unit: '',
      default: 1,
      min: 1,
      max: 200,
      integer: true,
      help: 'Notch each listed frequency at its multiples up to this one; 1 is the frequency alone.',
    },
    q: {
      kind: 'number',
      label: 'Q',
      unit: '',
      default: 30,
      min: 0.5,
      max: 100_000,
      exclusiveMin: true,
      slider: 'log',
      ask: true,
      help: 'Frequency over full width at half power of one pass. A higher Q takes less of the band and rings longer, 4.6 Q/(π f) seconds to 1 %; a line that drifts by more than half its width needs a lower one.',
    },
    height: {
      kind: 'number',
      label: 'Height',
      unit: '',
      default: 10,
      min: 1,
      slider: 'log',
      help: 'Of found lines, those whose density stands this many times above the floor.',
    },
    direction: DIRECTION_PARAM,
    crop: CROP_PARAM,
  },
  sources: [
    {
      text: 'Second-order notch: Orfanidis, Introduction to Signal Processing (Prentice-Hall, 1996), 11.3',
      flag: 'memory',
    },
    { text: 'Ringing 4.6 Q/(π f) s to 1 %: the decay of the pole pair', flag: 'computed' },
  ],
  async run(inputs, params, context) {
    const series = inputs.one('series');
    const lines = inputs.optional('lines');
    const plan = planFor(series, params, lines);
    const { places, rows } = plan;
    const lowest = places[0].frequency;
    const width = places.reduce((sum, p) => sum + p.frequency / p.q, 0);
    const request = { rows, direction: params.direction, crop: params.crop, word: 'notched', lowest };
    const { data, numbers, warnings, ending } = await runFilter(series, request, context);
    const named = places.slice(0, 6).map((p) => numberText(p.frequency, 6));
    return {
      data,
      sentence: `${series.label} notched at ${named.join(', ')}${places.length > 6 ? ` and ${places.length - 6} more` : ''} Hz, Q ${numberText(params.q)}, ${passesText(params.direction)}; ${ending}`,
      numbers: [
        { id: 'notches', label: 'Notches', value: places.length, unit: '' },
        {
          id: 'width',
          label: 'Band taken',
          value: width,
          unit: 'Hz',
          convention: 'widths at half power of one pass, summed',
        },
        ...numbers,
      ],
      warnings: [...overlapping(plan), ...outside(plan, series), ...much(width, series.rate), ...warnings],
      tables: [table(plan)],
    };
  },
  figures: (data, params, inputs, viewport) => {
    const { rows, places } = planFor(data, params, inputs.optional('lines'));
    const marks = places.map((p) => ({ at: p.frequency, label: 'notch' }));
    return [
      seriesFigure(data, viewport, { title: 'Notched' }),
      responseFigure({ rows, direction: params.direction, rate: data.rate, marks }, viewport),
    ];
  },
});

function table({ places }: NotchPlan): Table {
  return {
    kind: 'table',
    id: 'notches',
    title: 'Notches',
    columns: [
      { id: 'frequency', label: 'Frequency', unit: 'Hz' },
      { id: 'width', label: 'Width at half power', unit: 'Hz' },
      { id: 'ringing', label: 'Ringing to 1 %', unit: 's' },
      { id: 'from', label: 'From', unit: '' },
    ],
    rows: places.map((p) => [p.frequency, p.frequency / p.q, notchRinging(p.frequency, p.q), p.from]),
  };
}

function overlapping({ places }: NotchPlan): Warning[] {
  const close = places.filter((p, i) => {
    const next = places.at(i + 1);
    return (
      next !== undefined && next.frequency - p.frequency < (p.frequency / p.q + next.frequency / next.q) / 2
    );
  });
  if (close.length === 0) return [];
  return [
    {
      code: 'notches-overlap',
      severity: 'caution',
      found: `${counted(close.length, 'pair')} of notches overlap, the first at ${withUnit(close[0].frequency, 'Hz', 6)}`,
      value: close.length,
      consequence: 'What lies between them is taken out too, and both ring together.',
      remedy: 'Raise "q", or take one wider notch for both.',
    },
  ];
}

function outside({ above }: NotchPlan, series: Series): Warning[] {
  if (above === 0) return [];
  return [
    {
      code: 'lines-above-band',
      severity: 'note',
      found: `${counted(above, 'frequency', 'frequencies')} at or above ${withUnit(series.rate / 2, 'Hz')}, half the sample rate`,
      value: above,
      consequence: 'They are not in the data and were left out.',
      remedy: 'Nothing to do.',
    },
  ];
}

function much(width: number, rate: number): Warning[] {
  const share = width / (rate / 2);
  if (!(share > MUCH)) return [];
  return [
    {
      code: 'much-notched',
      severity: 'caution',
      found: `the notches take ${withUnit(width, 'Hz')}, ${numberText(100 * share, 3)} % of the band`,
      value: share,
      consequence: 'Broadband signals lose power and change shape.',
      remedy: 'Raise "q", "height", or take fewer harmonics; whitening copes with lines that stay.',
    },
  ];
}
