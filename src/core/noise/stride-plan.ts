import { UserError } from '../data/errors';
import type { Series } from '../data/kinds';
import { complementSpans, intersectSpans, type Span } from '../data/spans';
import { counted, numberText } from '../figures/number-text';

/** Fewest segments in a whole stride, and fewest strides. */
const SEGMENTS = 4;
const STRIDES = 3;

/** Equal stretches of a series, each with segments of its own. */
export interface StridePlan {
  /** Samples per stride, per segment, and from one segment to the next. */
  readonly stride: number;
  readonly size: number;
  readonly step: number;
  readonly strides: number;
  /** Segments in each stride; 0 where too little is valid for a value. */
  readonly segments: readonly number[];
  /** Spans whose segments enter; none reaches from one stride into the next. */
  readonly spans: readonly Span[];
}

/**
 * Divides a series into strides from its start and lays segments into the valid part of each. A stride that holds less
 * than half of the segments of a whole one gets no value. What is left at the end is not used.
 *
 * @throws UserError when a segment is too short, a stride too short for its segments, or there are too few strides
 */
export function planStrides(
  series: Series,
  strideSeconds: number,
  segmentSeconds: number,
  overlap: number,
  excluded: readonly Span[],
): StridePlan {
  const { rate, length } = series;
  const size = Math.round(segmentSeconds * rate);
  const stride = Math.round(strideSeconds * rate);
  if (size < 16)
    throw new UserError(
      'segment-short',
      `a segment of ${numberText(segmentSeconds)} s has only ${size} samples at ${numberText(rate)} Hz; set "segment" to at least ${numberText(16 / rate)} s`,
    );
  const step = Math.max(1, size - Math.floor(size * overlap + 1e-9));
  const whole = stride < size ? 0 : Math.floor((stride - size) / step) + 1;
  if (whole < SEGMENTS || stride < 2 * size)
    throw new UserError(
      'stride-short',
      `a stride of ${numberText(strideSeconds)} s holds ${counted(whole, 'segment')} of ${numberText(segmentSeconds)} s, and at least ${SEGMENTS} over twice the length of one are needed; set "stride" to ${numberText(8 * segmentSeconds)} s or "segment" to ${numberText(strideSeconds / 8)} s`,
    );
  const strides = Math.floor(length / stride);
  if (strides < STRIDES)
    throw new UserError(
      'few-strides',
      `${numberText(length / rate, 9)} s hold ${counted(strides, 'stride')} of ${numberText(strideSeconds)} s, and at least ${STRIDES} are needed to see a change; set "stride" to ${numberText(length / rate / 8, 2)} s or less, or take a longer span`,
    );
  const usable = intersectSpans(series.valid, complementSpans(excluded, length));
  const segments: number[] = [];
  const spans: Span[] = [];
  for (let s = 0; s < strides; s++) {
    const parts = within(usable, s * stride, (s + 1) * stride).filter((p) => p.to - p.from >= size);
    const count = parts.reduce((n, p) => n + Math.floor((p.to - p.from - size) / step) + 1, 0);
    const enough = 2 * count >= whole;
    segments.push(enough ? count : 0);
    if (enough) spans.push(...parts);
  }
  if (segments.filter((n) => n > 0).length < STRIDES)
    throw new UserError(
      'few-strides',
      `of ${counted(strides, 'stride')} of ${numberText(strideSeconds)} s in ${series.label} only ${segments.filter((n) => n > 0).length} hold enough valid data, and at least ${STRIDES} are needed; choose another span of the file or a shorter "stride"`,
    );
  return { stride, size, step, strides, segments, spans };
}

/** Parts of rising disjoint spans inside `[from, to)`. */
function within(spans: readonly Span[], from: number, to: number): Span[] {
  return spans
    .filter((s) => s.to > from && s.from < to)
    .map((s) => ({ from: Math.max(s.from, from), to: Math.min(s.to, to) }));
}
