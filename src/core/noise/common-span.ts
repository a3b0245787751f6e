import { UserError } from '../data/errors';
import { addSamples, formatGps, secondsBetween, type GpsTime } from '../data/gps-time';
import type { Series } from '../data/kinds';
import { cropSpans, intersectSpans, type Span } from '../data/spans';
import { numberText } from '../figures/number-text';

/** Two series over the time they have in common. */
export interface CommonSpan {
  /** Sample of each series that is sample 0 of the common span. */
  readonly offsets: readonly [number, number];
  readonly length: number;
  readonly start: GpsTime;
  readonly rate: number;
  /** Samples valid in both, counted from the start of the common span. */
  readonly valid: readonly Span[];
  /** How much later than the nearest sample of the first the samples of the second were taken, in samples. */
  readonly fraction: number;
}

/**
 * Aligns two series by GPS time to the nearest sample.
 *
 * @throws UserError when their rates differ or they have no time in common
 */
export function commonSpan(first: Series, second: Series): CommonSpan {
  if (Math.abs(first.rate / second.rate - 1) > 1e-9) {
    const lower = Math.min(first.rate, second.rate);
    const fast = first.rate > second.rate ? first : second;
    throw new UserError(
      'rates-differ',
      `${first.label} is sampled at ${numberText(first.rate, 9)} Hz and ${second.label} at ${numberText(second.rate, 9)} Hz; put a resample step to ${numberText(lower, 9)} Hz after ${fast.label}`,
    );
  }
  const { rate } = first;
  const lag = secondsBetween(second.start, first.start) * rate;
  const whole = Math.round(lag);
  const offsets: [number, number] = [Math.max(0, whole), Math.max(0, -whole)];
  const length = Math.min(first.length - offsets[0], second.length - offsets[1]);
  if (length <= 0)
    throw new UserError(
      'no-common-span',
      `${spanText(first)} and ${spanText(second)} have no time in common; choose inputs that cover the same time`,
    );
  const valid = intersectSpans(
    cropSpans(first.valid, offsets[0], offsets[0] + length),
    cropSpans(second.valid, offsets[1], offsets[1] + length),
  );
  return {
    offsets,
    length,
    start: addSamples(first.start, offsets[0], rate),
    rate,
    valid,
    fraction: lag - whole,
  };
}

function spanText({ label, start, length, rate }: Series): string {
  return `${label} (GPS ${formatGps(start)} to ${formatGps(addSamples(start, length, rate))})`;
}
