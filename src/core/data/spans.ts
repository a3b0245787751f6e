/** Half-open run of sample indices `[from, to)`. */
export interface Span {
  readonly from: number;
  readonly to: number;
}

/** Spans sorted, overlapping or touching ones joined, empty ones dropped. */
export function normaliseSpans(spans: readonly Span[]): Span[] {
  const sorted = spans.filter((s) => s.to > s.from).sort((a, b) => a.from - b.from);
  const out: Span[] = [];
  for (const s of sorted) {
    const last = out.at(-1);
    if (last && s.from <= last.to) out[out.length - 1] = { from: last.from, to: Math.max(last.to, s.to) };
    else out.push(s);
  }
  return out;
}

/** What of `[0, length)` is not in `spans`. */
export function complementSpans(spans: readonly Span[], length: number): Span[] {
  const out: Span[] = [];
  let at = 0;
  for (const s of normaliseSpans(spans)) {
    if (s.from > at) out.push({ from: at, to: s.from });
    at = Math.max(at, s.to);
  }
  if (at < length) out.push({ from: at, to: length });
  return out;
}

/** Common part of two lists of spans. */
export function intersectSpans(a: readonly Span[], b: readonly Span[]): Span[] {
  const p = normaliseSpans(a);
  const q = normaliseSpans(b);
  const out: Span[] = [];
  for (let i = 0, j = 0; i < p.length && j < q.length;) {
    const from = Math.max(p[i].from, q[j].from);
    const to = Math.min(p[i].to, q[j].to);
    if (to > from) out.push({ from, to });
    if (p[i].to < q[j].to) i++;
    else j++;
  }
  return out;
}

/** The part of `spans` inside `[from, to)`, re-based so that `from` becomes 0. */
export function cropSpans(spans: readonly Span[], from: number, to: number): Span[] {
  return intersectSpans(spans, [{ from, to }]).map((s) => ({ from: s.from - from, to: s.to - from }));
}

export function spanLength(spans: readonly Span[]): number {
  return spans.reduce((n, s) => n + (s.to - s.from), 0);
}

/** Starts of all segments of `size` samples, `step` apart, that lie wholly inside one span (each span on its own grid). */
export function segmentStarts(spans: readonly Span[], size: number, step: number): number[] {
  const starts: number[] = [];
  for (const s of spans) for (let at = s.from; at + size <= s.to; at += step) starts.push(at);
  return starts;
}
