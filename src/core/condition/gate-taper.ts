import { UserError } from '../data/errors';
import { gpsTime, secondsBetween } from '../data/gps-time';
import type { Series } from '../data/kinds';
import { intersectSpans, type Span } from '../data/spans';

/** A stretch brought to zero; the tapers lie outside of it. */
export interface Gate extends Span {
  /** Asked for by the recipe, found by the search, or both. */
  readonly given: boolean;
  /** Samples found in it, and the largest in robust widths; 0 when none were. */
  readonly over: number;
  readonly loudest: number;
}

/** A time that differs from a sample's by less than this many samples is that sample's: GPS seconds in float64 are no better. */
const SLACK = 0.01;

/**
 * Gates given as pairs of seconds after the start and of GPS seconds.
 *
 * @throws UserError when a pair is not in order
 */
export function givenGates(
  series: Series,
  spans: readonly number[],
  gps: readonly number[],
): { readonly inside: Gate[]; readonly outside: number } {
  const { rate, start, length } = series;
  const seconds = [...spans, ...gps.map((t) => secondsBetween(gpsTime(t), start))];
  const asked = [...spans, ...gps];
  const inside: Gate[] = [];
  let outside = 0;
  for (let i = 0; i + 1 < seconds.length; i += 2) {
    if (!(seconds[i + 1] > seconds[i]))
      throw new UserError(
        'gate-order',
        `"${i < spans.length ? 'spans' : 'gps-spans'}" has the pair ${asked[i]}, ${asked[i + 1]}: the second must be later than the first`,
      );
    const from = Math.max(0, Math.floor(seconds[i] * rate + SLACK));
    const to = Math.min(length, Math.ceil(seconds[i + 1] * rate - SLACK));
    if (to > from) inside.push({ from, to, given: true, over: 0, loudest: 0 });
    else outside++;
  }
  return { inside, outside };
}

/** Gates in order; those whose tapers would meet become one, so that a weight never is the product of two. */
export function joinGates(gates: readonly Gate[], taper: number): Gate[] {
  const out: Gate[] = [];
  for (const g of [...gates].sort((a, b) => a.from - b.from)) {
    const last = out.at(-1);
    if (last && g.from - last.to < 2 * taper)
      out[out.length - 1] = {
        from: last.from,
        to: Math.max(last.to, g.to),
        given: last.given || g.given,
        over: last.over + g.over,
        loudest: Math.max(last.loudest, g.loudest),
      };
    else out.push(g);
  }
  return out;
}

/** Weight of the sample at a distance of d samples outside a gate (1 is the first): half a cosine, 1 beyond the taper. */
export const taperWeight = (d: number, taper: number): number =>
  d > taper ? 1 : 0.5 - 0.5 * Math.cos((Math.PI * d) / (taper + 1));

/** Multiplies samples, the first of which has index `at`, with the weights of gates in order. */
export function applyGates(samples: Float64Array, at: number, gates: readonly Gate[], taper: number): void {
  const end = at + samples.length;
  // The first gate that reaches into the samples.
  let [low, high] = [0, gates.length];
  while (low < high) {
    const middle = (low + high) >> 1;
    if (gates[middle].to + taper <= at) low = middle + 1;
    else high = middle;
  }
  for (; low < gates.length && gates[low].from - taper < end; low++) {
    const { from, to } = gates[low];
    for (let i = Math.max(at, from - taper); i < Math.min(end, to + taper); i++) {
      const d = i < from ? from - i : i - to + 1;
      // A sample that is missing stays so.
      samples[i - at] *= i < from || i >= to ? taperWeight(d, taper) : 0;
    }
  }
}

/** Samples with a weight below 1, of those valid. */
export const touchedSpans = (gates: readonly Gate[], taper: number, valid: readonly Span[]): Span[] =>
  intersectSpans(
    gates.map(({ from, to }) => ({ from: from - taper, to: to + taper })),
    valid,
  );

/** Sum of 1 − w² over valid samples: the power that white noise loses, in samples. */
export function lostPower(gates: readonly Gate[], taper: number, valid: readonly Span[]): number {
  let sum = 0;
  for (const span of touchedSpans(gates, taper, valid)) {
    const w = new Float64Array(span.to - span.from).fill(1);
    applyGates(w, span.from, gates, taper);
    for (const v of w) sum += 1 - v * v;
  }
  return sum;
}
