import type { MapPlane, MapRow, TimeFrequencyMap } from '../data/kinds';
import { frequencyAxis, timeAxis } from './axis';
import type { Axis, Figure, Mark, Viewport } from './figure';
import type { ImageTrace } from './image';
import { counted, numberText, repeated } from './number-text';

export interface MapFigureOptions {
  readonly title: string;
  readonly plane: MapPlane;
  /** Values at the ends of the colours. */
  readonly range: readonly [number, number];
  readonly scale: 'linear' | 'log';
  /** Places to ring, with what they are. */
  readonly points?: readonly { readonly time: number; readonly frequency: number; readonly label: string }[];
  readonly pointsName?: string;
  readonly marks?: readonly Mark[];
  readonly note?: string;
  readonly notes?: readonly string[] | undefined;
}

/** Pixels a column of the picture is wide, and the most rows it has. */
const PIXELS = 2;
const ROWS = 160;

/**
 * One plane of a map, pooled to the pixels of the view by the largest value, so that a loud cell never vanishes however
 * narrow it is drawn. Zooming in pools fewer cells.
 */
export function mapFigure(map: TimeFrequencyMap, viewport: Viewport, options: MapFigureOptions): Figure {
  const { plane } = options;
  const x = timeAxis(map.start, map.duration, viewport);
  const low = Math.min(...plane.rows.map((r) => r.low));
  const high = Math.max(...plane.rows.map((r) => r.high));
  const y: Axis = frequencyAxis([low, high], { width: viewport.width });
  const [from, to] = x.range ?? x.extent;
  const image = pooled(plane.rows, [from, to], [low, high], viewport.width, { map, options });
  const points = (options.points ?? []).filter(
    (p) => p.time >= from && p.time <= to && p.frequency >= low && p.frequency <= high,
  );
  return {
    id: 'map',
    title: options.title,
    caption:
      `${map.label}: ${map.quantity} over time and frequency, ${numberText(from, 7)} to ${numberText(to, 7)} s after GPS ${x.epoch ?? ''}, ${numberText(low)} to ${numberText(high)} Hz; each pixel shows the largest value under it. ` +
      (points.length > 0
        ? `${counted(points.length, 'place')} ringed: ${points[0].label}${points.length > 1 ? ' and others' : ''}.`
        : 'Nothing is ringed in this view.') +
      (options.note === undefined ? '' : ` ${options.note}`) +
      repeated(options.notes),
    x,
    y: withoutLink(y),
    traces: [
      image,
      ...(options.points === undefined
        ? []
        : [
            {
              type: 'points' as const,
              name: options.pointsName ?? 'loudest',
              role: 'second' as const,
              x: Float64Array.from(points, (p) => p.time),
              y: Float64Array.from(points, (p) => p.frequency),
              labels: points.map((p) => p.label),
            },
          ]),
    ],
    marks: options.marks ?? [],
  };
}

/** Frequency runs upwards here, so it does not move with the frequency axes that run along. */
function withoutLink({ label, unit, scale, extent }: Axis): Axis {
  return { label, unit, scale, extent };
}

function pooled(
  rows: readonly MapRow[],
  [from, to]: readonly [number, number],
  [low, high]: readonly [number, number],
  width: number,
  { map, options }: { readonly map: TimeFrequencyMap; readonly options: MapFigureOptions },
): ImageTrace {
  const columns = Math.max(16, Math.round(width / PIXELS));
  const lines = Math.min(ROWS, Math.max(24, 2 * rows.length));
  const values = new Float32Array(columns * lines).fill(NaN);
  const place = (f: number): number => (Math.log(f / low) / Math.log(high / low)) * lines;
  for (const row of rows) {
    const first = Math.max(0, Math.min(lines - 1, Math.floor(place(row.low) + 1e-9)));
    const last = Math.max(first + 1, Math.min(lines, Math.ceil(place(row.high) - 1e-9)));
    for (let c = 0; c < columns; c++) {
      const a = from + (c * (to - from)) / columns;
      const b = from + ((c + 1) * (to - from)) / columns;
      const v = largest(row, a, b);
      if (Number.isNaN(v)) continue;
      for (let l = first; l < last; l++) {
        const at = l * columns + c;
        if (!(values[at] >= v)) values[at] = v;
      }
    }
  }
  return {
    type: 'image',
    name: map.quantity,
    role: 'data',
    x: [from, to],
    y: [low, high],
    columns,
    rows: lines,
    values,
    quantity: map.quantity,
    unit: map.unit,
    low: options.range[0],
    high: options.range[1],
    scale: options.scale,
  };
}

/** Largest value of the cells of a row that touch [a, b) seconds; NaN where none has a value. */
function largest({ offset, cell, values }: MapRow, a: number, b: number): number {
  const first = Math.max(0, Math.floor((a - offset) / cell));
  const last = Math.min(values.length - 1, Math.max(first, Math.ceil((b - offset) / cell) - 1));
  let most = NaN;
  for (let i = first; i <= last; i++) if (!(most >= values[i]) && !Number.isNaN(values[i])) most = values[i];
  return most;
}
