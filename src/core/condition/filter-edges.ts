import { UserError } from '../data/errors';
import type { Series } from '../data/kinds';
import { numberText } from '../figures/number-text';
import type { SectionRows } from '../kernels/kernels';
import { designIir, type IirFamily } from '../kernels/iir-design';
import type { Direction } from './filter-series';

export interface ShapeParams {
  readonly family: IirFamily;
  readonly order: number;
  readonly ripple: number;
  readonly attenuation: number;
  readonly direction: Direction;
  readonly crop: number | null;
}

/** Sections of a pass filter; edges at or above half the rate are refused with what can be set instead. */
export function passSections(
  series: Pick<Series, 'rate' | 'label'>,
  band: 'highpass' | 'bandpass',
  edges: readonly number[],
  { family, order, ripple, attenuation }: ShapeParams,
): SectionRows {
  const nyquist = series.rate / 2;
  const top = edges[edges.length - 1];
  if (top >= nyquist)
    throw new UserError(
      'filter-edges',
      `an edge at ${numberText(top, 9)} Hz is not below ${numberText(nyquist, 9)} Hz, half the sample rate of ${series.label}: lower it to at most ${numberText(0.9 * nyquist, 3)} Hz`,
    );
  return designIir({ family, band, order, edges, rate: series.rate, ripple, attenuation });
}

/** "Butterworth of order 4", with what the family makes of ripple and attenuation. */
export function shapeText({ family, order, ripple, attenuation }: ShapeParams): string {
  const name = {
    butterworth: 'Butterworth',
    'chebyshev-1': `Chebyshev-1 (${numberText(ripple)} dB ripple)`,
    'chebyshev-2': `Chebyshev-2 (${numberText(attenuation)} dB attenuation)`,
    elliptic: `elliptic (${numberText(ripple)} dB ripple, ${numberText(attenuation)} dB attenuation)`,
  }[family];
  return `${name} of order ${order}`;
}

/** How often the filter runs, and what that does to its gain. */
export const passesText = (direction: Direction): string =>
  direction === 'zero-phase'
    ? 'forwards and backwards: no phase, twice the attenuation in dB'
    : 'once, causal';
