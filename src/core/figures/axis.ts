import { formatGps, type GpsTime } from '../data/gps-time';
import type { Axis, Viewport } from './figure';
import type { Columns } from './thin';

/** A time axis: seconds after `epoch`, moved together with the other time axes of the panel. */
export function timeAxis(epoch: GpsTime, seconds: number, viewport: Viewport): Axis {
  const text = formatGps(epoch);
  return {
    label: `Time after GPS ${text}`,
    unit: 's',
    scale: 'linear',
    link: 'time',
    epoch: text,
    extent: [0, seconds],
    ...shown(viewport, [0, seconds]),
  };
}

/** A logarithmic frequency axis. `extent` must be positive. */
export function frequencyAxis(extent: readonly [number, number], viewport: Viewport): Axis {
  return {
    label: 'Frequency',
    unit: 'Hz',
    scale: 'log',
    link: 'frequency',
    extent,
    ...shown(viewport, extent),
  };
}

function shown(viewport: Viewport, extent: readonly [number, number]): { range?: readonly [number, number] } {
  const range = clip(viewport.x, extent);
  return range === undefined ? {} : { range };
}

/** The part of `asked` inside `extent`; undefined when nothing was asked or nothing of it is inside. */
function clip(
  asked: readonly [number, number] | undefined,
  extent: readonly [number, number],
): readonly [number, number] | undefined {
  if (asked === undefined) return undefined;
  const from = Math.max(extent[0], Math.min(asked[0], asked[1]));
  const to = Math.min(extent[1], Math.max(asked[0], asked[1]));
  return to > from ? [from, to] : undefined;
}

/** Pixel columns of an axis as it is shown. */
export function columnsOf(axis: Axis, viewport: Viewport): Columns {
  const [from, to] = axis.range ?? axis.extent;
  return { from, to, scale: axis.scale, width: Math.max(16, Math.round(viewport.width)) };
}

/** Smallest and largest finite value in several arrays; on a log axis only positive ones count. [0, 1] or [1, 10] when there is none. */
export function extentOf(arrays: readonly Float64Array[], scale: 'linear' | 'log'): [number, number] {
  let low = Infinity;
  let high = -Infinity;
  for (const array of arrays)
    for (const v of array) {
      if (!Number.isFinite(v) || (scale === 'log' && v <= 0)) continue;
      if (v < low) low = v;
      if (v > high) high = v;
    }
  if (low > high) return scale === 'log' ? [1, 10] : [0, 1];
  if (low < high) return [low, high];
  return scale === 'log'
    ? [low / 2, low * 2]
    : [low - (Math.abs(low) || 1) * 0.5, low + (Math.abs(low) || 1) * 0.5];
}
