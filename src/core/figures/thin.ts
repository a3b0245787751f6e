/**
 * The pixel columns of a plotting area: `width` columns between `from` and `to` in axis units, equal in width on a linear
 * or on a logarithmic axis.
 */
export interface Columns {
  readonly from: number;
  readonly to: number;
  readonly width: number;
  readonly scale: 'linear' | 'log';
}

/** Points that are left after thinning. NaN in `y` breaks the line. */
export interface Thinned {
  readonly x: Float64Array;
  readonly y: Float64Array;
}

/** A filled band after thinning. */
export interface ThinnedRange {
  readonly x: Float64Array;
  readonly low: Float64Array;
  readonly high: Float64Array;
}

const along = (v: number, scale: 'linear' | 'log'): number => (scale === 'log' ? Math.log(v) : v);

/** Maps a position on the axis to its column; below 0 or from `width` on means outside. */
export function columnFinder(c: Columns): (x: number) => number {
  const a = along(c.from, c.scale);
  const perUnit = c.width / (along(c.to, c.scale) - a);
  if (!(perUnit > 0) || !Number.isFinite(perUnit))
    throw new RangeError(`cannot divide ${c.from} to ${c.to} into ${c.width} columns on a ${c.scale} axis`);
  return (x) => Math.floor((along(x, c.scale) - a) * perUnit);
}

/** Position of the middle of column `k` in axis units; halves give the edges. */
export function columnCentre(c: Columns, k: number): number {
  const a = along(c.from, c.scale);
  const at = a + ((k + 0.5) * (along(c.to, c.scale) - a)) / c.width;
  return c.scale === 'log' ? Math.exp(at) : at;
}

/** First index in rising `x` with `x[i] >= value`. */
export function lowerBound(x: ArrayLike<number>, value: number): number {
  let lo = 0;
  let hi = x.length;
  while (lo < hi) {
    const mid = (lo + hi) >> 1;
    if (x[mid] < value) lo = mid + 1;
    else hi = mid;
  }
  return lo;
}

/**
 * Indices `[from, to)` of rising `x` that a view shows, with one neighbour outside on each side so that a line runs to
 * the edge of the picture. On a logarithmic axis positions that are not positive do not exist.
 */
export function visible(x: ArrayLike<number>, c: Columns): { from: number; to: number } {
  const first = c.scale === 'log' ? lowerBound(x, Number.MIN_VALUE) : 0;
  const from = Math.max(first, lowerBound(x, c.from) - 1);
  let to = lowerBound(x, c.to);
  while (to < x.length && x[to] === c.to) to++;
  return { from, to: Math.max(from, Math.min(x.length, to + 1)) };
}

/**
 * Thins a line to at most two points per pixel column: the smallest and the largest sample of the column, at their own
 * positions and in their own order, so neither a narrow line nor a one-sample spike can vanish. A column without a finite
 * sample becomes one NaN, which breaks the line. A view with at most two samples per column is returned as it is.
 * A single sample between two breaks is widened to one column, since a line through one point draws nothing.
 *
 * @param x rising positions in axis units, evenly spaced or not
 * @param y values; NaN means no value
 */
export function thinLine(x: ArrayLike<number>, y: ArrayLike<number>, c: Columns): Thinned {
  const { from, to } = visible(x, c);
  const outX: number[] = [];
  const outY: number[] = [];
  const push = (px: number, py: number): void => {
    outX.push(px);
    outY.push(py);
  };
  if (to - from <= 2 * c.width) {
    for (let i = from; i < to; i++) push(x[i], y[i]);
  } else {
    const find = columnFinder(c);
    let i = from;
    while (i < to) {
      const column = Math.max(-1, Math.min(c.width, find(x[i])));
      let low = -1;
      let high = -1;
      const first = i;
      for (; i < to && Math.max(-1, Math.min(c.width, find(x[i]))) === column; i++) {
        const v = y[i];
        if (Number.isNaN(v)) continue;
        if (low < 0 || v < y[low]) low = i;
        if (high < 0 || v > y[high]) high = i;
      }
      if (low < 0) push(x[first], NaN);
      else if (low === high) push(x[low], y[low]);
      else {
        const a = Math.min(low, high);
        const b = Math.max(low, high);
        push(x[a], y[a]);
        push(x[b], y[b]);
      }
    }
  }
  return widenSingles(outX, outY, c);
}

function widenSingles(x: readonly number[], y: readonly number[], c: Columns): Thinned {
  const outX: number[] = [];
  const outY: number[] = [];
  const half = Math.abs(along(c.to, c.scale) - along(c.from, c.scale)) / (2 * c.width);
  for (let i = 0; i < x.length; i++) {
    const alone = !Number.isNaN(y[i]) && !(y[i - 1] <= Infinity) && !(y[i + 1] <= Infinity);
    if (!alone) {
      outX.push(x[i]);
      outY.push(y[i]);
      continue;
    }
    const at = along(x[i], c.scale);
    const shifted = [at - half, at + half].map((v) => (c.scale === 'log' ? Math.exp(v) : v));
    outX.push(...shifted);
    outY.push(y[i], y[i]);
  }
  return { x: Float64Array.from(outX), y: Float64Array.from(outY) };
}

/**
 * Thins a band to one entry per pixel column, from the smallest `low` to the largest `high` of the column, at the column's
 * middle. Columns without a finite entry become NaN. A view with at most one entry per column is returned as it is.
 */
export function thinRange(
  x: ArrayLike<number>,
  low: ArrayLike<number>,
  high: ArrayLike<number>,
  c: Columns,
): ThinnedRange {
  const { from, to } = visible(x, c);
  const out: { x: number[]; low: number[]; high: number[] } = { x: [], low: [], high: [] };
  const push = (px: number, a: number, b: number): void => {
    out.x.push(px);
    out.low.push(a);
    out.high.push(b);
  };
  if (to - from <= c.width) for (let i = from; i < to; i++) push(x[i], low[i], high[i]);
  else {
    const find = columnFinder(c);
    let i = from;
    while (i < to) {
      const column = Math.max(-1, Math.min(c.width, find(x[i])));
      let a = Infinity;
      let b = -Infinity;
      for (; i < to && Math.max(-1, Math.min(c.width, find(x[i]))) === column; i++) {
        if (low[i] < a) a = low[i]!;
        if (high[i] > b) b = high[i]!;
      }
      push(columnCentre(c, column), a > b ? NaN : a, a > b ? NaN : b);
    }
  }
  return {
    x: Float64Array.from(out.x),
    low: Float64Array.from(out.low),
    high: Float64Array.from(out.high),
  };
}
