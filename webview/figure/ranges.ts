import type { Axis, Figure } from '../../src/core/figures/figure';

export type Range = readonly [from: number, to: number];

/** Part of a figure on show; what is absent is shown whole. In axis units, also on logarithmic axes. */
export interface View {
  readonly x?: Range;
  readonly y?: Range;
}

const along = (v: number, scale: Axis['scale']): number => (scale === 'log' ? Math.log10(v) : v);
const back = (v: number, scale: Axis['scale']): number => (scale === 'log' ? 10 ** v : v);

/** Range moved by a part of its width, kept inside the axis's extent without changing its width. */
export function panned(range: Range, by: number, axis: Axis): Range {
  const [a, b] = inPlace(range, axis);
  const [min, max] = inPlace(axis.extent, axis);
  const shift = Math.max(Math.min(by * (b - a), Math.max(0, max - b)), Math.min(0, min - a));
  return outOf([a + shift, b + shift], axis);
}

/** Range made `factor` times as wide around `centre` (default its middle), not beyond the extent. */
export function zoomed(range: Range, factor: number, axis: Axis, centre?: number): Range {
  const [a, b] = inPlace(range, axis);
  const [min, max] = inPlace(axis.extent, axis);
  const c = centre === undefined ? (a + b) / 2 : along(centre, axis.scale);
  const from = Math.max(min, c + (a - c) * factor);
  const to = Math.min(max, c + (b - c) * factor);
  return to > from ? outOf([from, to], axis) : range;
}

/** True when a range shows the whole extent, to a thousandth of it. */
export function isWhole(range: Range, axis: Axis): boolean {
  const [a, b] = inPlace(range, axis);
  const [min, max] = inPlace(axis.extent, axis);
  const slack = 1e-3 * (max - min);
  return a <= min + slack && b >= max - slack;
}

/** Range of the values a view shows, with a little room; the extent for figures of bars and where nothing is shown. */
export function valueRange(figure: Figure, x: Range): Range {
  const { y } = figure;
  if (y.range) return y.range;
  if (figure.traces.some((t) => t.type === 'bars' || t.type === 'image')) return y.extent;
  let low = Infinity;
  let high = -Infinity;
  const take = (v: number): void => {
    if (!Number.isFinite(v) || (y.scale === 'log' && v <= 0)) return;
    if (v < low) low = v;
    if (v > high) high = v;
  };
  for (const t of figure.traces) {
    if (t.type === 'bars' || t.type === 'image') continue;
    for (let i = 0; i < t.x.length; i++) {
      const at = t.x[i];
      if (at < x[0] || at > x[1]) continue;
      if (t.type === 'line' || t.type === 'points') take(t.y[i]);
      else {
        take(t.low[i]);
        take(t.high[i]);
      }
    }
  }
  if (low > high) return y.extent;
  const [a, b] = inPlace([low, high], y);
  const room = b > a ? 0.05 * (b - a) : y.scale === 'log' ? 0.3 : Math.abs(a) * 0.1 || 1;
  return outOf([a - room, b + room], y);
}

/** Range in the units the figure library counts in: powers of ten on a logarithmic axis. */
export function inPlace([a, b]: Range, axis: Pick<Axis, 'scale'>): Range {
  return [along(a, axis.scale), along(b, axis.scale)];
}

export function outOf([a, b]: Range, axis: Pick<Axis, 'scale'>): Range {
  return [back(a, axis.scale), back(b, axis.scale)];
}
