import type { Trend, TrendCurve } from '../data/kinds';
import { columnsOf, extentOf, timeAxis } from './axis';
import type { Figure, Viewport } from './figure';
import { numberText } from './number-text';
import { thinLine } from './thin';

/** One curve of a trend with twice its expected scatter shaded; `seconds` is the length of the data. */
export function trendFigure(trend: Trend, curve: TrendCurve, seconds: number, viewport: Viewport): Figure {
  const x = timeAxis(trend.start, seconds, viewport);
  const used = curve.values.filter(Number.isFinite);
  const mean = used.reduce((s, v) => s + v, 0) / used.length;
  const flat = (v: number): Float64Array => new Float64Array(2).fill(v);
  const ends = Float64Array.of(0, seconds);
  const [low, high] = [mean - 2 * curve.expected, mean + 2 * curve.expected];
  return {
    id: `trend-${curve.id}`,
    title: curve.label,
    caption: `${trend.label}: ${curve.label} of each stride over its median against time; shaded ±2σ of what the estimate alone explains (σ ${numberText(curve.expected, 3)}).`,
    x,
    y: {
      label: 'Over the median',
      unit: curve.unit,
      scale: 'linear',
      extent: extentOf([curve.values, Float64Array.of(low, high)], 'linear'),
    },
    traces: [
      { type: 'range', name: '±2σ by chance', role: 'interval', x: ends, low: flat(low), high: flat(high) },
      {
        type: 'line',
        name: curve.label,
        role: 'data',
        ...thinLine(trend.time, curve.values, columnsOf(x, viewport)),
      },
    ],
    marks: [],
  };
}
