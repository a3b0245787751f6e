import { UserError } from '../data/errors';
import type { Series } from '../data/kinds';
import { complementSpans, intersectSpans, segmentStarts, spanLength, type Span } from '../data/spans';
import { numberText } from '../figures/number-text';

/** Which segments of a series an averaged spectrum is made of. */
export interface SegmentPlan {
  /** Samples per segment, and from one segment to the next inside a span. */
  readonly size: number;
  readonly step: number;
  readonly starts: readonly number[];
  /** Spans between first and last segment of each usable span: the samples that enter. */
  readonly used: readonly Span[];
  /** Spans asked to be left out, in samples. */
  readonly excluded: readonly Span[];
  /** Samples that are valid and not excluded but in no segment, because the span they are in is too short or has a rest. */
  readonly left: number;
}

/** Shortest segment that makes a spectrum worth the name. */
const SHORTEST = 16;

/**
 * Lays segments into the valid spans of a series, each span on its own grid, leaving out what `exclude` names.
 *
 * @param seconds length of a segment
 * @param overlap fraction of a segment shared with the next, 0 to below 1
 * @param exclude pairs of seconds after the start of the series
 * @throws UserError when a pair is not a span, the segment is too short, or no span is long enough for one segment
 */
export function planSegments(
  series: Series,
  seconds: number,
  overlap: number,
  exclude: readonly number[],
): SegmentPlan {
  const { rate } = series;
  const size = Math.round(seconds * rate);
  if (size < SHORTEST)
    throw new UserError(
      'segment-short',
      `a segment of ${numberText(seconds)} s has only ${size} samples at ${numberText(rate)} Hz; set "segment" to at least ${numberText(SHORTEST / rate)} s`,
    );
  const step = Math.max(1, size - Math.floor(size * overlap + 1e-9));
  const excluded = excludedSpans(series, exclude);
  const usable = intersectSpans(series.valid, complementSpans(excluded, series.length));
  const starts = segmentStarts(usable, size, step);
  if (starts.length === 0) throw tooLong(series, usable, size, excluded.length > 0);
  const used = usable
    .filter((s) => s.to - s.from >= size)
    .map(({ from, to }) => ({ from, to: from + Math.floor((to - from - size) / step) * step + size }));
  return { size, step, starts, used, excluded, left: spanLength(usable) - spanLength(used) };
}

function excludedSpans(series: Series, exclude: readonly number[]): Span[] {
  const out: Span[] = [];
  for (let i = 0; i + 1 < exclude.length; i += 2) {
    const [from, to] = [exclude[i], exclude[i + 1]];
    if (!(to > from))
      throw new UserError(
        'exclude-order',
        `"exclude" has the pair ${from}, ${to}: the second must be later than the first (seconds after the start of the series)`,
      );
    const a = Math.max(0, Math.floor(from * series.rate));
    const b = Math.min(series.length, Math.ceil(to * series.rate));
    if (b > a) out.push({ from: a, to: b });
  }
  return out;
}

function tooLong(series: Series, usable: readonly Span[], size: number, excluding: boolean): UserError {
  const longest = usable.reduce((n, s) => Math.max(n, s.to - s.from), 0);
  const what = excluding ? 'valid span outside the excluded ones' : 'valid span';
  if (longest < SHORTEST)
    return new UserError(
      'no-data',
      longest === 0
        ? `there is no ${what} in ${series.label}: choose another span of the file`
        : `the longest ${what} in ${series.label} has ${longest} samples, too few for a spectrum: choose another span of the file`,
    );
  const fits = longest / series.rate;
  return new UserError(
    'segment-long',
    `no segment of ${numberText(size / series.rate)} s fits: the longest ${what} in ${series.label} is ${numberText(fits)} s; set "segment" to ${suggestion(fits)} s or less`,
  );
}

/** A round number of seconds that still gives several segments in `longest` seconds. */
function suggestion(longest: number): string {
  return numberText(2 ** Math.floor(Math.log2(longest / 4)));
}
