import type { WaveformFact } from '../data/kinds';
import type { Quantity, Warning } from '../data/quantity';

export interface ComplexValues {
  readonly re: Float64Array;
  readonly im: Float64Array;
}

/** One signal of one model: everything a `Waveform` needs but the grid. */
export interface SignalModel {
  readonly id: string;
  readonly label: string;
  readonly facts: readonly WaveformFact[];
  readonly distance?: number;
  readonly reference: string;
  readonly polarisation: 'circular' | 'linear' | 'both';
  readonly quadrupole: boolean;
  /** Hz; h̃ is zero outside. */
  readonly low: number;
  readonly high: number;
  /** Up to where a grid should reach by itself, in Hz. */
  readonly top: number;
  readonly before: number;
  readonly after: number;
  readonly origin: string;
  readonly notes?: readonly string[];
  readonly numbers: readonly Quantity[];
  readonly warnings: readonly Warning[];
  /** h̃₊ or h̃× in strain/Hz, kernel e^(−2πift), at frequencies ≥ 0. */
  at(frequency: Float64Array, which?: 'plus' | 'cross'): ComplexValues;
}

/** h̃× of a circular wave from its h̃₊: −i h̃₊. */
export const quarterTurn = ({ re, im }: ComplexValues): ComplexValues => ({
  re: im.slice(),
  im: re.map((v) => -v),
});

/** A transform given as amplitude and phase: A e^{iφ}, both functions of one frequency. `at` is called inside the band only. */
export function fromAmplitudeAndPhase(
  frequency: Float64Array,
  amplitude: (f: number) => number,
  phase: (f: number) => number,
): ComplexValues {
  const re = new Float64Array(frequency.length);
  const im = new Float64Array(frequency.length);
  frequency.forEach((f, k) => {
    const a = amplitude(f);
    if (a === 0) return;
    const p = phase(f);
    re[k] = a * Math.cos(p);
    im[k] = a * Math.sin(p);
  });
  return { re, im };
}

/** What a source's orientation is when its wave is strongest. */
export const OPTIMAL = 'face on, straight above (optimal)';
