import { cosTurns, sinTurns } from './elementary';

export interface Harmonic {
  /** Multiple of the fundamental. */
  readonly order: number;
  /** Mean amplitude of the sinusoid, strain. */
  readonly amplitude: number;
  /** Phase at the start of the data, turns. */
  readonly phase: number;
}

/** Pick-up of the electric grid. Both sites hang on one grid, so their lines are coherent with each other. */
export interface Mains {
  readonly harmonics: readonly Harmonic[];
  /** Slow change of the amplitude: relative depth, period in s, phase in turns. */
  readonly wander: { readonly depth: number; readonly period: number; readonly phase: number };
}

/** The grid: frequency in Hz and a slow swing of its phase by `swing` turns with `period` s. */
export interface Grid {
  readonly frequency: number;
  readonly swing: number;
  readonly period: number;
}

/** Adds the lines to `samples` in place. */
export function addMains(samples: Float64Array, rate: number, grid: Grid, mains: Mains): void {
  const { depth, period, phase } = mains.wander;
  for (let i = 0; i < samples.length; i++) {
    const t = i / rate;
    const turns = grid.frequency * t + grid.swing * sinTurns(t / grid.period);
    const gain = 1 + depth * sinTurns(t / period + phase);
    let sum = 0;
    for (const h of mains.harmonics) sum += h.amplitude * cosTurns(h.order * turns + h.phase);
    samples[i] = samples[i] + gain * sum;
  }
}
