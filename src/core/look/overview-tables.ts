import { addSamples, formatGps, isPastLeapTable, utcText } from '../data/gps-time';
import type { Series } from '../data/kinds';
import { spanLength } from '../data/spans';
import type { Cell, Table } from '../data/table';
import { gapsOf } from './sample-scan';
import { LEAP_SECONDS } from '../data/leap-seconds';

/** Rows a table of spans has at most; the rest is summed up in its last row. */
const MOST = 500;

/** Name, rate, times and size of a series. */
export function factsTable(series: Series): Table {
  const end = addSamples(series.start, series.length, series.rate);
  const late = isPastLeapTable(end)
    ? ` (after ${LEAP_SECONDS.version} expires: a later leap second may be missing)`
    : '';
  const rows: Cell[][] = [
    ['Channel', series.label, ''],
    ['Sample rate', series.rate, 'Hz'],
    ['Start', formatGps(series.start), 's GPS'],
    ['Start', utcText(series.start) + late, 'UTC'],
    ['End (first instant after)', formatGps(end), 's GPS'],
    ['End (first instant after)', utcText(end) + late, 'UTC'],
    ['Duration', series.length / series.rate, 's'],
    ['Samples', series.length, ''],
    ['Usable samples', spanLength(series.valid), ''],
    ['Unit of the samples', series.unit === '' ? 'none given' : series.unit, ''],
  ];
  return {
    kind: 'table',
    id: 'facts',
    title: 'Facts',
    columns: [
      { id: 'what', label: 'What', unit: '' },
      { id: 'value', label: 'Value', unit: '' },
      { id: 'unit', label: 'Unit or scale', unit: '' },
    ],
    rows,
  };
}

/** Usable spans and gaps in the order of time. */
export function spansTable(series: Series): Table {
  const all = [
    ...series.valid.map((s) => ({ ...s, what: 'data' })),
    ...(series.spoilt ?? []).map((s) => ({ ...s, what: 'filter edge' })),
    ...gapsOf(series).map((s) => ({ ...s, what: 'gap' })),
  ].sort((a, b) => a.from - b.from);
  const rows: Cell[][] = all.slice(0, MOST).map(({ from, to, what }) => {
    const start = addSamples(series.start, from, series.rate);
    return [what, from / series.rate, (to - from) / series.rate, to - from, formatGps(start), utcText(start)];
  });
  const left = all.slice(MOST);
  if (left.length > 0) {
    const n = spanLength(left);
    rows.push([`${left.length} more spans`, null, n / series.rate, n, null, null]);
  }
  return {
    kind: 'table',
    id: 'spans',
    title: 'Spans of data and gaps',
    columns: [
      { id: 'what', label: 'Span', unit: '' },
      { id: 'from', label: 'From, after the start', unit: 's' },
      { id: 'duration', label: 'Duration', unit: 's' },
      { id: 'samples', label: 'Samples', unit: '' },
      { id: 'gps', label: 'Start', unit: 's GPS' },
      { id: 'utc', label: 'Start', unit: 'UTC' },
    ],
    rows,
  };
}
