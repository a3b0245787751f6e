import type { Span } from './spans';

/** Equal consecutive samples that count as flat. */
export const FLAT_SAMPLES = 8;
/** Seconds of exact zeros that count as digital zero. */
const ZERO_SECONDS = 0.05;
/** Used for zeros when no rate is known. */
const ZERO_SAMPLES_UNKNOWN = 256;
/** Spans kept in each list; what comes after is only counted. */
const MOST_SPANS = 10_000;

/** Spans and how many samples all of them hold, also those beyond the limit of the list. */
export interface FlatSpans {
  readonly spans: readonly Span[];
  readonly samples: number;
}

class SpanList {
  spans: Span[] = [];
  samples = 0;
  add(from: number, to: number): void {
    this.samples += to - from;
    if (this.spans.length < MOST_SPANS) this.spans.push({ from, to });
  }
  clear(): void {
    this.spans = [];
    this.samples = 0;
  }
}

function zeroSamples(rate: number | undefined): number {
  return rate === undefined ? ZERO_SAMPLES_UNKNOWN : Math.max(FLAT_SAMPLES, Math.ceil(ZERO_SECONDS * rate));
}

/**
 * Finds clipping and digital zero while samples go by.
 *
 * Saturated: a run of at least 8 equal samples at the smallest or the largest value of the whole span. A converter
 * that clips repeats its end value. Noise rarely visits the very end of its range and does not stay there, while equal
 * readings inside the range are common in coarsely digitised data and say nothing. A channel that sits more than half
 * its time in such runs, or never moves, is a state or a mask and not clipped.
 *
 * Digital zero: exactly 0 for at least 0.05 s (256 samples where no rate is known): a dropped-out source, not noise.
 * Such a run is not counted as saturated even where 0 is the smallest value.
 *
 * The extremes are known only at the end, so runs are kept while their value is the extreme so far and dropped when a
 * more extreme sample comes.
 */
export class FlatRuns {
  readonly #low = new SpanList();
  readonly #high = new SpanList();
  readonly #zero = new SpanList();
  #min = Infinity;
  #max = -Infinity;
  readonly #zeroSamples: number;

  constructor(rate: number | undefined) {
    this.#zeroSamples = zeroSamples(rate);
  }

  /** A finished run of equal samples of at least FLAT_SAMPLES; `min` and `max` are the extremes so far. */
  run(value: number, from: number, to: number, min: number, max: number): void {
    this.#extremes(min, max);
    if (value === 0 && to - from >= this.#zeroSamples) {
      this.#zero.add(from, to);
      return;
    }
    if (value === min) this.#low.add(from, to);
    if (value === max) this.#high.add(from, to);
  }

  finish(min: number, max: number, count: number): { saturated: FlatSpans; zeros: FlatSpans } {
    this.#extremes(min, max);
    const samples = this.#low.samples + this.#high.samples;
    const state = min === max || samples > count / 2;
    const spans = [...this.#low.spans, ...this.#high.spans].sort((a, b) => a.from - b.from);
    return { saturated: state ? { spans: [], samples: 0 } : { spans, samples }, zeros: this.#zero };
  }

  #extremes(min: number, max: number): void {
    if (min < this.#min) {
      this.#low.clear();
      this.#min = min;
    }
    if (max > this.#max) {
      this.#high.clear();
      this.#max = max;
    }
  }
}
