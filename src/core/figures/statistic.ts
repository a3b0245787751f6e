import type { FrequencyStatistic } from '../data/kinds';
import type { FrequencyRange } from '../noise/frequency-ranges';
import { columnsOf, extentOf, frequencyAxis } from './axis';
import type { Figure, Mark, Trace, Viewport } from './figure';
import { counted, numberText } from './number-text';
import { lowerBound, thinLine } from './thin';

/** What the steps add to the data kind for their pictures. */
export interface StatisticDetail extends FrequencyStatistic {
  /** Ranges that stand out once the number of bins is accounted for. */
  readonly ranges: readonly FrequencyRange[];
}

export interface StatisticFigureOptions {
  readonly title: string;
  /** Scale of the value axis. */
  readonly scale: 'linear' | 'log';
  /** Smallest stretch of the value axis that is shown, so that a quiet result does not look wild. */
  readonly atLeast?: readonly [number, number];
  /** Name of the line at the expected value. */
  readonly expectedName: string;
  /** What a marked range is, by side. */
  readonly words: Readonly<Record<'low' | 'high', string>>;
  /** A sentence put after the caption. */
  readonly note?: string;
}

const hasRanges = (data: FrequencyStatistic): data is StatisticDetail => 'ranges' in data;

/** A statistic against frequency with the band expected by chance; thinned so that a single bin that stands out stays. */
export function statisticFigure(
  data: FrequencyStatistic,
  viewport: Viewport,
  options: StatisticFigureOptions,
): Figure {
  const { frequency, values, expected, low, high } = data;
  const first = Math.min(lowerBound(frequency, Number.MIN_VALUE), frequency.length - 1);
  const from = Math.max(frequency[first], Number.MIN_VALUE);
  const to = frequency.at(-1)!;
  const x = frequencyAxis(to > from ? [from, to] : [from / 2, from * 2], viewport);
  const drawn = options.scale === 'log' ? values.map((v) => (v > 0 ? v : NaN)) : values;
  const ranges = hasRanges(data) ? data.ranges : [];
  const flat = (v: number): Float64Array => new Float64Array(2).fill(v);
  const ends = Float64Array.from(x.extent);
  const percent = numberText(100 * data.probability, 4);
  const traces: Trace[] = [
    {
      type: 'range',
      name: `${percent} % by chance`,
      role: 'interval',
      x: ends,
      low: flat(low),
      high: flat(high),
    },
    { type: 'line', name: options.expectedName, role: 'reference', x: ends, y: flat(expected) },
    {
      type: 'line',
      name: data.quantity,
      role: 'data',
      ...thinLine(frequency, drawn, columnsOf(x, viewport)),
    },
  ];
  const extent = extentOf([drawn, Float64Array.of(low, high, ...(options.atLeast ?? []))], options.scale);
  return {
    id: 'statistic',
    title: options.title,
    caption:
      `${data.label}: ${data.quantity} against frequency. ${options.expectedName} ${numberText(expected)}; ` +
      `shaded ${numberText(low)} to ${numberText(high)}, where ${percent} % of the bins lie by chance. ` +
      (ranges.length === 0
        ? 'No range stands out.'
        : `${counted(ranges.length, 'range')} marked that ${ranges.length === 1 ? 'stands' : 'stand'} out.`) +
      (options.note === undefined ? '' : ` ${options.note}`),
    x,
    y: { label: data.quantity, unit: '', scale: options.scale, extent },
    traces,
    marks: ranges.map((r): Mark => ({
      role: 'event',
      from: Math.max(r.from, x.extent[0]),
      to: Math.min(r.to, x.extent[1]),
      label: `${options.words[r.side]}, ${numberText(r.value)} at ${numberText(r.at, 6)} Hz`,
    })),
  };
}
