import type { Series } from '../data/kinds';
import { formatGps, utcText } from '../data/gps-time';
import { complementSpans, type Span } from '../data/spans';
import { columnsOf, extentOf, timeAxis } from './axis';
import { envelopeOf } from './envelope';
import type { Axis, Figure, Mark, TraceRole, Viewport } from './figure';
import { counted, numberText, repeated, withUnit } from './number-text';
import { thinLine, type Columns, type Thinned } from './thin';

export interface SeriesFigureOptions {
  readonly id?: string;
  readonly title?: string;
  readonly role?: TraceRole;
  /** Marks besides the gaps. */
  readonly marks?: readonly Mark[];
  /** A sentence put after the caption. */
  readonly note?: string;
}

/**
 * A series against time, thinned to the pixel columns by smallest and largest sample. A zoomed view reads the samples it
 * shows, so far enough in every point is a sample of the data.
 */
export function seriesFigure(series: Series, viewport: Viewport, options: SeriesFigureOptions = {}): Figure {
  const seconds = series.length / series.rate;
  const gps = timeAxis(series.start, seconds, viewport);
  const x = series.startUnknown === true ? { ...gps, label: 'Time after the first sample' } : gps;
  const columns = columnsOf(x, viewport);
  const trace = thinSeries(series, columns);
  const spoilt = series.spoilt ?? [];
  const gaps = complementSpans([...series.valid, ...spoilt], series.length);
  return {
    id: options.id ?? 'series',
    title: options.title ?? series.label,
    caption: caption(series, x, trace, gaps, spoilt, options.note),
    x,
    y: valueAxis(series, trace),
    traces: [{ type: 'line', name: series.label, role: options.role ?? 'data', x: trace.x, y: trace.y }],
    marks: [
      ...spanMarks(gaps, series, columns, 'gap', 'gap'),
      ...spanMarks(spoilt, series, columns, 'cropped', 'filter edge'),
      ...spanMarks(series.gates ?? [], series, columns, 'event', 'gate'),
      ...(options.marks ?? []),
    ],
  };
}

/** Samples of a series in a view, x in seconds after its start; at most two points per pixel column. */
function thinSeries(series: Series, columns: Columns): Thinned {
  const from = Math.max(0, Math.floor(columns.from * series.rate) - 1);
  const to = Math.min(series.length, Math.ceil(columns.to * series.rate) + 2);
  if (to - from > 2 * columns.width) {
    const { cell, low, high } = series.scan?.envelope ?? envelopeOf(series);
    const first = Math.floor(from / cell);
    const last = Math.ceil(to / cell);
    if (cell > 1 && last - first >= columns.width) {
      const x = new Float64Array(2 * (last - first));
      const y = new Float64Array(x.length);
      for (let k = first; k < last; k++) {
        const end = Math.min(series.length, (k + 1) * cell);
        const at = 2 * (k - first);
        x[at] = x[at + 1] = (k * cell + end - 1) / 2 / series.rate;
        y[at] = low[k]!;
        y[at + 1] = high[k]!;
      }
      return thinLine(x, y, columns);
    }
  }
  const y = series.read(from, to);
  const x = y.map((_, i) => (from + i) / series.rate);
  return thinLine(x, y, columns);
}

function valueAxis(series: Series, trace: Thinned): Axis {
  const isStrain = series.unit === 'strain';
  return {
    label: isStrain ? 'Strain' : 'Sample value',
    unit: isStrain ? '' : series.unit,
    scale: 'linear',
    extent: extentOf([trace.y], 'linear'),
  };
}

/** Runs of samples as marks in seconds; runs closer together than a pixel column share one mark, runs out of view are left out. */
export function spanMarks(
  spans: readonly Span[],
  series: Series,
  columns: Columns,
  role: Mark['role'],
  word: string,
): Mark[] {
  const pixel = (columns.to - columns.from) / columns.width;
  const groups: { from: number; to: number; seconds: number; count: number }[] = [];
  for (const span of spans) {
    const from = span.from / series.rate;
    const to = span.to / series.rate;
    if (to < columns.from || from > columns.to) continue;
    const last = groups.at(-1);
    if (last && from - last.to < pixel) {
      last.to = to;
      last.seconds += to - from;
      last.count++;
    } else groups.push({ from, to, seconds: to - from, count: 1 });
  }
  return groups.map(({ from, to, seconds, count }) => ({
    role,
    from,
    to,
    label: `${count === 1 ? word : counted(count, word)}, ${numberText(seconds)} s`,
  }));
}

function caption(
  series: Series,
  x: Axis,
  trace: Thinned,
  gaps: readonly Span[],
  spoilt: readonly Span[],
  note: string | undefined,
): string {
  const [from, to] = x.range ?? x.extent;
  const [low, high] = extentOf([trace.y], 'linear');
  const parts = [
    `${series.label} against time from GPS ${formatGps(series.start)} (${utcText(series.start)}): ` +
      `${numberText(from, 9)} to ${numberText(to, 9)} s after it, sampled at ${withUnit(series.rate, 'Hz', 9)}.`,
    trace.y.some(Number.isFinite)
      ? `Values from ${numberText(low)} to ${withUnit(high, series.unit)}; smallest and largest sample of each pixel column.`
      : 'No valid sample in view.',
  ];
  if (gaps.length > 0) parts.push(`${counted(gaps.length, 'gap')} marked.`);
  if (spoilt.length > 0) parts.push(`${counted(spoilt.length, 'filter edge')} marked: not to be used.`);
  if (series.gates?.length) parts.push(`${counted(series.gates.length, 'gate')} marked.`);
  if (note !== undefined) parts.push(note);
  return parts.join(' ') + repeated(series.notes);
}
