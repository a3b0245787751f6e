import type { Span } from '../data/spans';

/** Equal samples in a row from which on a run at the largest or smallest value can mean an instrument at its limit. */
const LIMIT_RUN = 4;
/** Runs kept; more than this are counted in no picture anyway. */
const MOST = 100_000;

interface Run extends Span {
  /** Larger of the steps into and out of the run. */
  readonly step: number;
}

export interface FlatRuns {
  /** Runs at the smallest or largest value of all that look cut off. */
  readonly saturated: readonly Span[];
  /** Runs of equal values at least as long as asked, at any value. */
  readonly flat: readonly Span[];
}

/**
 * Finds runs of equal samples while a series streams by. A run at an extreme counts as saturated when it is entered or
 * left by more than one and a half of the smallest step there is in the data: the top of a slow, finely digitised wave
 * is left by one step, a clipped one by many.
 */
export class FlatRunFinder {
  readonly #flatFrom: number;
  readonly #flat: Span[] = [];
  #atMax: Run[] = [];
  #atMin: Run[] = [];
  #max = -Infinity;
  #min = Infinity;
  #smallestStep = Infinity;
  #value = NaN;
  #start = 0;
  #stepIn = 0;

  /** @param flatFrom samples from which on a run is reported as flat */
  constructor(flatFrom: number) {
    this.#flatFrom = flatFrom;
  }

  /** Takes up samples `block[0, count)`, which start at sample `from` of the series and follow what was taken before. */
  take(block: Float64Array, count: number, from: number): void {
    let value = this.#value;
    let smallest = this.#smallestStep;
    for (let i = 0; i < count; i++) {
      const v = block[i];
      if (v === value) continue;
      const step = Math.abs(v - value);
      if (step > 0 && step < smallest) smallest = step;
      this.#end(value, from + i, step);
      value = v;
      this.#start = from + i;
      this.#stepIn = step;
    }
    this.#value = value;
    this.#smallestStep = smallest;
  }

  /** The runs found, `end` being the number of samples of the series. */
  finish(end: number): FlatRuns {
    this.#end(this.#value, end, NaN);
    this.#value = NaN;
    if (this.#max === this.#min) return { saturated: [], flat: this.#flat };
    const cut = (r: Run): boolean => r.step > 1.5 * this.#smallestStep;
    const saturated = [...this.#atMin, ...this.#atMax].filter(cut).sort((a, b) => a.from - b.from);
    return { saturated: saturated.map(({ from, to }) => ({ from, to })), flat: this.#flat };
  }

  #end(value: number, to: number, stepOut: number): void {
    if (!(Math.abs(value) < Infinity)) return;
    if (value > this.#max) {
      this.#max = value;
      this.#atMax = [];
    }
    if (value < this.#min) {
      this.#min = value;
      this.#atMin = [];
    }
    const size = to - this.#start;
    if (size < LIMIT_RUN) return;
    const step = Math.max(this.#stepIn || 0, stepOut || 0);
    const run = { from: this.#start, to, step };
    if (value === this.#max && this.#atMax.length < MOST) this.#atMax.push(run);
    if (value === this.#min && this.#atMin.length < MOST) this.#atMin.push(run);
    if (size >= this.#flatFrom && this.#flat.length < MOST) this.#flat.push({ from: run.from, to });
  }
}
