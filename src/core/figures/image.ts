import type { ThemeKind } from './colours';
import { mapColours, SHADES } from './colour-map';
import type { Trace } from './figure';
import { pngOf, pngUrl } from './png';

export type ImageTrace = Extract<Trace, { type: 'image' }>;

/** An image trace as a picture file: one pixel a cell, cells without a value see-through. */
export function imageUrl(trace: ImageTrace, kind: ThemeKind): string {
  const { columns, rows, values } = trace;
  const colours = mapColours(kind);
  const rgba = new Uint8Array(4 * columns * rows);
  for (let y = 0; y < rows; y++) {
    for (let x = 0; x < columns; x++) {
      const v = values[y * columns + x];
      if (!Number.isFinite(v)) continue;
      const shade = 3 * shadeOf(v, trace);
      // Row 0 is the lowest; a picture begins at the top.
      const at = 4 * ((rows - 1 - y) * columns + x);
      rgba[at] = colours[shade];
      rgba[at + 1] = colours[shade + 1];
      rgba[at + 2] = colours[shade + 2];
      rgba[at + 3] = 255;
    }
  }
  return pngUrl(pngOf(rgba, columns, rows));
}

/** The map itself as a strip from quiet to loud, for legends. */
export function mapStrip(kind: ThemeKind): string {
  const colours = mapColours(kind);
  const rgba = new Uint8Array(4 * SHADES).fill(255);
  for (let i = 0; i < SHADES; i++) rgba.set(colours.subarray(3 * i, 3 * i + 3), 4 * i);
  return pngUrl(pngOf(rgba, SHADES, 1));
}

function shadeOf(v: number, { low, high, scale }: ImageTrace): number {
  const t =
    scale === 'log' ? Math.log(Math.max(v, low) / low) / Math.log(high / low) : (v - low) / (high - low);
  return Math.max(0, Math.min(SHADES - 1, Math.round(t * (SHADES - 1))));
}

/** Largest value of a column and its row; undefined where the column has none. */
export function loudestInColumn(
  { columns, rows, values }: ImageTrace,
  column: number,
): { readonly row: number; readonly value: number } | undefined {
  let best: { row: number; value: number } | undefined;
  if (column < 0 || column >= columns) return undefined;
  for (let row = 0; row < rows; row++) {
    const value = values[row * columns + column];
    if (Number.isFinite(value) && (best === undefined || value > best.value)) best = { row, value };
  }
  return best;
}

/** Middle of a row in axis units. */
export function rowCentre(
  { y: [low, high], rows }: ImageTrace,
  row: number,
  scale: 'linear' | 'log',
): number {
  const t = (row + 0.5) / rows;
  return scale === 'log' ? low * (high / low) ** t : low + t * (high - low);
}
