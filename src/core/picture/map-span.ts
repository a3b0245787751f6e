import { UserError } from '../data/errors';
import { addSamples, formatGps, secondsBetween, type GpsTime } from '../data/gps-time';
import type { Series } from '../data/kinds';
import { complementSpans, intersectSpans, spanLength, type Span } from '../data/spans';
import { numberText } from '../figures/number-text';

export interface MapSpan {
  /** Samples of the series. */
  readonly from: number;
  readonly to: number;
  readonly start: GpsTime;
  readonly seconds: number;
  /** Stretches inside without valid samples, counted from `from`. */
  readonly holes: readonly Span[];
  /** Set when the whole was too long: seconds of the whole. */
  readonly cutFrom?: number;
}

/**
 * The part of a series that a map is made of: from `start` (else the first valid sample) for `duration` seconds (else to the
 * last valid sample, but not more than `most`).
 *
 * @throws UserError when the span lies outside of the data or holds no valid sample
 */
export function mapSpan(
  series: Series,
  start: GpsTime | null,
  duration: number | null,
  most: number,
): MapSpan {
  const { rate, valid, length, label } = series;
  if (valid.length === 0)
    throw new UserError('no-data', `${label} has no valid sample: choose another span of the file`);
  const begin = Math.min(...valid.map((s) => s.from));
  const end = Math.max(...valid.map((s) => s.to));
  const from = start === null ? begin : Math.round(secondsBetween(start, series.start) * rate);
  if (from < 0 || from >= length)
    throw new UserError(
      'no-data',
      `"start" GPS ${formatGps(start!)} is not in ${label}, which runs from GPS ${formatGps(series.start)} for ${numberText(length / rate, 9)} s`,
    );
  const whole = duration === null ? end - from : Math.round(duration * rate);
  const limit = Math.floor(most * rate);
  if (duration !== null && whole > limit)
    throw new UserError(
      'map-long',
      `a map of ${numberText(duration)} s would not fit into memory; at most ${numberText(most, 3)} s do at this rate, band and mismatch`,
    );
  const to = Math.min(length, from + Math.min(whole, limit));
  const inside = intersectSpans(valid, [{ from, to }]);
  if (spanLength(inside) === 0)
    throw new UserError(
      'no-data',
      `the span of the map holds no valid sample of ${label}: choose another "start" or "duration"`,
    );
  const holes = intersectSpans(complementSpans(valid, length), [{ from, to }]).map((s) => ({
    from: s.from - from,
    to: s.to - from,
  }));
  return {
    from,
    to,
    start: addSamples(series.start, from, rate),
    seconds: (to - from) / rate,
    holes,
    ...(whole > limit ? { cutFrom: whole / rate } : {}),
  };
}
