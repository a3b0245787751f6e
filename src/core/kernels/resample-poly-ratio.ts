import { UserError } from '../data/errors';

/** New rate = rate · up/down, in lowest terms. */
export interface Ratio {
  readonly up: number;
  readonly down: number;
}

/** Larger factors would need filters of millions of taps, and mean that the rates do not belong together. */
const LARGEST_FACTOR = 65_536;

const divisor = (a: number, b: number): number => (b === 0 ? a : divisor(b, a % b));

/** up/down in lowest terms, checked. @throws UserError for factors that are not whole, below 1 or above 65536. */
export function reduced(up: number, down: number): Ratio {
  if (!Number.isSafeInteger(up) || !Number.isSafeInteger(down) || up < 1 || down < 1)
    throw new UserError(
      'resample-ratio',
      `resampling by ${up}/${down}: both must be whole numbers, at least 1`,
    );
  const common = divisor(up, down);
  const ratio = { up: up / common, down: down / common };
  if (Math.max(ratio.up, ratio.down) > LARGEST_FACTOR)
    throw new UserError(
      'resample-ratio',
      `resampling by ${ratio.up}/${ratio.down} (in lowest terms) needs a filter of ${20 * Math.max(ratio.up, ratio.down) + 1} taps; factors up to ${LARGEST_FACTOR} are taken: choose a rate with a simpler ratio`,
    );
  return ratio;
}

/**
 * The ratio of two sample rates in Hz as a fraction, by continued fraction; the fraction must hold exactly, to rounding.
 *
 * @throws UserError if a rate is not a positive number or no fraction with factors up to 65536 gives the new rate.
 * @example ratioOfRates(16384, 44100) // { up: 11025, down: 4096 }
 */
export function ratioOfRates(from: number, to: number): Ratio {
  for (const rate of [from, to])
    if (!(rate > 0 && Number.isFinite(rate)))
      throw new UserError('resample-rate', `sample rate ${rate} Hz: it must be a number above 0`);
  const target = to / from;
  let rest = target;
  let [n0, d0] = [0, 1];
  let [n1, d1] = [1, 0];
  while (Math.max(n1, d1) <= LARGEST_FACTOR) {
    const whole = Math.floor(rest);
    [n0, d0, n1, d1] = [n1, d1, whole * n1 + n0, whole * d1 + d0];
    if (n1 > 0 && Math.abs(n1 / d1 / target - 1) < 1e-14) return reduced(n1, d1);
    rest = 1 / (rest - whole);
  }
  throw new UserError(
    'resample-ratio',
    `${from} Hz to ${to} Hz: no ratio of whole numbers up to ${LARGEST_FACTOR} gives this; choose a rate with a simpler ratio to ${from} Hz`,
  );
}
