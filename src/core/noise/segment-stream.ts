import type { Series } from '../data/kinds';
import type { Span } from '../data/spans';

/** Samples read at a time, at least; a block holds several segments. */
const BLOCK = 1 << 18;

/** A series whose sample `offset` is sample 0 of the spans that are streamed. */
export interface StreamedSeries {
  readonly series: Series;
  readonly offset: number;
}

/**
 * Reads every segment of the spans once, in order, from one or several series at the same time, in blocks.
 *
 * @param spans disjoint and rising; segments of `size` samples lie `step` apart in each, beginning at its start
 * @param block called once per block with the fraction done
 * @param visit gets one buffer per series, the position of the segment in it, its first sample in the spans' count, and
 *   its number. The buffers must not be kept.
 */
export async function streamSegments(
  sources: readonly StreamedSeries[],
  spans: readonly Span[],
  size: number,
  step: number,
  block: (fraction: number) => Promise<void>,
  visit: (buffers: readonly Float64Array[], at: number, start: number, segment: number) => void,
): Promise<void> {
  const length = Math.max(BLOCK, 4 * size);
  const buffers = sources.map(() => new Float64Array(length));
  const total = spans.reduce((n, s) => n + s.to - s.from, 0);
  let before = 0;
  let segment = 0;
  for (const span of spans) {
    // The buffers hold samples [at, filled); what a later segment needs of them is moved to the front.
    let at = span.from;
    let filled = span.from;
    let next = span.from;
    while (next + size <= span.to) {
      const kept = Math.max(0, filled - next);
      if (next > at) for (const b of buffers) b.copyWithin(0, next - at, next - at + kept);
      at = next;
      filled = at + kept;
      const to = Math.min(span.to, at + length);
      await block((before + filled - span.from) / total);
      sources.forEach(({ series, offset }, i) =>
        series.read(offset + filled, offset + to, buffers[i].subarray(filled - at, to - at)),
      );
      filled = to;
      for (; next + size <= filled; next += step) visit(buffers, next - at, next, segment++);
    }
    before += span.to - span.from;
  }
}
