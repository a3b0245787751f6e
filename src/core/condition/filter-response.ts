import { columnsOf, frequencyAxis } from '../figures/axis';
import type { Figure, Mark, Viewport } from '../figures/figure';
import { numberText } from '../figures/number-text';
import { thinLine } from '../figures/thin';
import type { SectionRows } from '../kernels/kernels';
import { sectionsGain, zeroPhaseGain } from '../kernels/sections-response';
import type { Direction } from './filter-series';

/** Half power, as a gain. */
const HALF_POWER = Math.SQRT1_2;
/** What is lower is drawn here. */
const FLOOR_DB = -140;
const POINTS = 4000;

/** Gain of all passes together at frequencies in Hz. */
export function effectiveGain(
  rows: SectionRows,
  direction: Direction,
  frequency: Float64Array,
  rate: number,
): Float64Array {
  return direction === 'zero-phase'
    ? zeroPhaseGain(rows, frequency, rate)
    : sectionsGain(rows, frequency, rate);
}

/**
 * Frequency between `from` (gain below half power) and `to` (above) at which the effective gain is half power (−3.01 dB),
 * by bisection to 1e-9 of it; NaN when the two do not enclose one.
 */
export function halfPowerBetween(
  rows: SectionRows,
  direction: Direction,
  rate: number,
  from: number,
  to: number,
): number {
  const above = (f: number): boolean =>
    effectiveGain(rows, direction, Float64Array.of(f), rate)[0] > HALF_POWER;
  if (above(from) || !above(to)) return NaN;
  let [low, high] = [from, to];
  for (let i = 0; i < 200 && Math.abs(high - low) > 1e-12 * Math.abs(high + low); i++) {
    const middle = (low + high) / 2;
    if (above(middle)) high = middle;
    else low = middle;
  }
  return (low + high) / 2;
}

export interface ResponseFigureOptions {
  readonly rows: SectionRows;
  readonly direction: Direction;
  readonly rate: number;
  /** Frequencies in Hz that deserve a mark, with what they are. */
  readonly marks: readonly { readonly at: number; readonly label: string }[];
}

/** The response that the data have met, in dB against frequency. */
export function responseFigure(options: ResponseFigureOptions, viewport: Viewport): Figure {
  const { rows, direction, rate, marks } = options;
  const nyquist = rate / 2;
  const lowest = Math.min(nyquist / 1000, ...marks.map((m) => m.at / 10));
  const x = frequencyAxis([lowest, nyquist], viewport);
  const [from, to] = x.range ?? x.extent;
  const frequency = new Set(
    Array.from({ length: POINTS }, (_, i) => from * (to / from) ** (i / (POINTS - 1))),
  );
  // A notch is narrower than the grid: its own frequencies are drawn too.
  for (const { at } of marks)
    for (const d of [0, 1e-4, 1e-3, 3e-3, 1e-2, 3e-2])
      for (const f of [at * (1 - d), at * (1 + d)]) if (f >= from && f <= to) frequency.add(f);
  const f = Float64Array.from(frequency).sort();
  const gain = effectiveGain(rows, direction, f, rate).map((g) => Math.max(FLOOR_DB, 20 * Math.log10(g)));
  const passes = direction === 'zero-phase' ? 'forwards and backwards' : 'one causal pass';
  return {
    id: 'response',
    title: 'Effective response',
    caption: `Gain of the filter (${passes}) in dB against frequency, not below ${FLOOR_DB} dB; ${marks
      .map((m) => `${m.label} ${numberText(m.at, 6)} Hz`)
      .slice(0, 8)
      .join(', ')}.`,
    x,
    y: {
      label: 'Gain',
      unit: 'dB',
      scale: 'linear',
      extent: [FLOOR_DB, Math.max(5, ...gain)],
      range: [Math.max(FLOOR_DB, Math.min(-20, Math.min(...gain) - 5)), Math.max(5, ...gain)],
    },
    traces: [{ type: 'line', name: 'Gain', role: 'data', ...thinLine(f, gain, columnsOf(x, viewport)) }],
    marks: marks
      .filter((m) => m.at >= x.extent[0] && m.at <= nyquist)
      .map((m): Mark => ({ role: 'event', from: m.at, to: m.at, label: m.label })),
  };
}
