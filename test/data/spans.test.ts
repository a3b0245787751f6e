import { describe, expect, it } from 'vitest';
import {
  complementSpans,
  cropSpans,
  intersectSpans,
  normaliseSpans,
  segmentStarts,
  spanLength,
  type Span,
} from '../../src/core/data/spans';

const s = (from: number, to: number): Span => ({ from, to });

/** Membership of every index, the slow and obvious way. */
function mask(spans: readonly Span[], length: number): boolean[] {
  return Array.from({ length }, (_, i) => spans.some((p) => i >= p.from && i < p.to));
}

/** Small lists of spans in every arrangement (a fixed congruential sequence, Park and Miller 1988). */
function* lists(count: number): Generator<Span[]> {
  let x = 7;
  const next = (n: number): number => (x = (x * 48271) % 2147483647) % n;
  for (let k = 0; k < count; k++)
    yield Array.from({ length: next(5) }, () => {
      const from = next(28);
      return s(from, from + next(8));
    });
}

describe('spans agree with membership index by index', () => {
  it('normalise, complement, intersect, crop', () => {
    const all = [...lists(400)];
    for (let k = 0; k + 1 < all.length; k++) {
      const [a, b] = [all[k], all[k + 1]];
      const n = normaliseSpans(a);
      expect(mask(n, 40)).toEqual(mask(a, 40));
      expect(n.every((p, i) => p.to > p.from && (i === 0 || p.from > n[i - 1].to))).toBe(true);
      expect(mask(complementSpans(a, 40), 40)).toEqual(mask(a, 40).map((m) => !m));
      const both = mask(a, 40).map((m, i) => m && mask(b, 40)[i]);
      expect(mask(intersectSpans(a, b), 40)).toEqual(both);
      expect(mask(cropSpans(a, 5, 25), 20)).toEqual(mask(a, 40).slice(5, 25));
      expect(spanLength(n)).toBe(mask(a, 40).filter(Boolean).length);
    }
  });
});

describe('spans by example', () => {
  it('joins touching and drops empty ones', () => {
    expect(normaliseSpans([s(5, 9), s(0, 3), s(3, 5), s(20, 20)])).toEqual([s(0, 9)]);
  });

  it('has nothing left of a full length', () => {
    expect(complementSpans([s(0, 10)], 10)).toEqual([]);
    expect(complementSpans([], 10)).toEqual([s(0, 10)]);
    expect(complementSpans([], 0)).toEqual([]);
  });

  it('places segments on the grid of each span', () => {
    expect(segmentStarts([s(0, 10), s(13, 18)], 4, 2)).toEqual([0, 2, 4, 6, 13]);
    expect(segmentStarts([s(0, 3)], 4, 2)).toEqual([]);
    expect(segmentStarts([s(2, 6)], 4, 4)).toEqual([2]);
  });
});
