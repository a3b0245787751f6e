import { UserError } from '../data/errors';
import type { Section } from './iir-design-sections';

/**
 * Second-order notch: gain 0 at `frequency`, 1 at zero and half the rate, −3.01 dB at two frequencies
 * frequency/quality apart.
 *
 * @param frequency Centre in Hz, above 0 and below half the rate.
 * @param quality Q = frequency / full width at half power, no unit, above 1/2 (else the width exceeds the band).
 * @param rate Samples per second.
 * @returns Row b0, b1, b2, 1, a1, a2.
 * @throws UserError for values outside these limits.
 *
 * Equal to scipy.signal.iirnotch. Source: Orfanidis, Introduction to Signal Processing (Prentice-Hall, 1996), 11.3
 * (MEMORY). A high Q cuts little of the spectrum but rings long, see `notchRinging`.
 *
 * @example notch(60, 30, 4096)[0] // 0.9984683675055748
 */
export function notch(frequency: number, quality: number, rate: number): Section {
  if (!(rate > 0 && frequency > 0 && frequency < rate / 2))
    throw new UserError(
      'notch-frequency',
      `notch at ${frequency} Hz: it must lie above 0 and below ${rate / 2} Hz, half the sample rate`,
    );
  const width = frequency / quality;
  if (!(quality > 0 && Number.isFinite(quality) && width < rate / 2))
    throw new UserError(
      'notch-quality',
      `notch at ${frequency} Hz with Q ${quality} is ${width} Hz wide; Q must be a number that keeps the width below ${rate / 2} Hz, half the sample rate`,
    );
  const gain = 1 / (1 + Math.tan((Math.PI * width) / rate));
  const middle = -2 * gain * Math.cos((2 * Math.PI * frequency) / rate);
  return [gain, middle, gain, 1, middle, 2 * gain - 1];
}

/**
 * Seconds until the ringing of a notch, after a line starts or at the edge of a record, has died to a fraction of its
 * first amplitude: ln(1/fraction) Q/(π f). At the default 1 % that is 4.6 Q/(π f).
 *
 * Amplitude decays with the pole, whose half width is f/(2Q) in Hz; exact for f/Q far below the sample rate.
 *
 * @example notchRinging(60, 30) // 0.7329
 */
export function notchRinging(frequency: number, quality: number, fraction = 0.01): number {
  return (-Math.log(fraction) * quality) / (Math.PI * frequency);
}
