import type { Waveform } from '../data/kinds';
import type { Split } from '../kernels/complex-arrays';

/** What the matched filter needs to know of a waveform. */
export interface Template {
  readonly label: string;
  /** What happens at t = 0: "coalescence". */
  readonly origin: string;
  /** Mpc; absent when the waveform has an amplitude of its own. */
  readonly distance?: number;
  /** Where h̃ is not zero, in Hz. */
  readonly low: number;
  readonly high: number;
  /**
   * h̃(f) in strain/Hz, kernel e^(−2πift), on bins k · rate / size, k = 0 … size / 2, with t = 0 at the first sample.
   */
  bins(size: number, rate: number): Split;
}

/** A waveform as template: h₊ as a detector straight below a source seen face on records it. */
export function templateOf(waveform: Waveform): Template {
  return {
    label: waveform.label,
    origin: waveform.origin,
    ...(waveform.distance === undefined ? {} : { distance: waveform.distance }),
    low: waveform.low,
    high: waveform.high,
    bins: (size, rate) =>
      waveform.at(Float64Array.from({ length: size / 2 + 1 }, (_, k) => (k * rate) / size)),
  };
}
