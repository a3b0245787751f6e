import { UserError } from '../data/errors';

/** Rows `[row, row + count)` whose stamps rise in even steps; times in seconds since the first stamp of all. */
export interface TimeStretch {
  readonly row: number;
  count: number;
  readonly first: number;
  last: number;
}

/** More breaks than this mean that the stamps are not those of an evenly sampled series. */
const MOST_STRETCHES = 10_000;
const PROBE = 1000;

/**
 * Follows a time column row by row and cuts it where it jumps. A step is a jump when it differs from the usual step
 * (median of the first thousand) by more than half of it and by more than the stamps' resolution explains.
 */
export class TimeTrack {
  readonly stretches: TimeStretch[] = [];
  #crowded = false;
  count = 0;
  step = NaN;
  #waiting: number[] = [];
  readonly #resolution: number;
  readonly #rowName: (row: number) => string;

  /** `resolution` in seconds; `rowName` names a row in messages: "line 12 of run.csv". */
  constructor(resolution: number, rowName: (row: number) => string) {
    this.#resolution = resolution;
    this.#rowName = rowName;
  }

  /** `t` in seconds since the first stamp. Throws a UserError where time is not a number or goes back. */
  push(t: number): void {
    if (!Number.isFinite(t))
      throw new UserError('time-not-a-number', `${this.#rowName(this.count)} has no time. Remove the row.`);
    if (Number.isNaN(this.step)) {
      this.#waiting.push(t);
      this.count++;
      if (this.#waiting.length > PROBE) this.#settle();
      return;
    }
    this.#place(t, this.count++);
  }

  /** True when the steps are too uneven for a sampled series: every tenth row begins a new stretch. */
  get uneven(): boolean {
    return this.#crowded || this.stretches.length > Math.max(3, this.count / 10);
  }

  finish(): void {
    if (Number.isNaN(this.step)) this.#settle();
  }

  #settle(): void {
    const held = this.#waiting;
    this.#waiting = [];
    const steps = Float64Array.from(
      { length: Math.max(0, held.length - 1) },
      (_, i) => held[i + 1] - held[i],
    );
    const median = steps.sort()[steps.length >> 1] ?? 0;
    this.step = median > 0 ? median : (held.at(-1)! - held[0]) / Math.max(1, held.length - 1);
    held.forEach((t, row) => {
      this.#place(t, row);
    });
  }

  #place(t: number, row: number): void {
    const now = this.stretches.at(-1);
    const d = now ? t - now.last : 0;
    const slack = Math.max(0.5 * Math.abs(this.step), 1.5 * this.#resolution);
    if (now && Math.abs(d - this.step) <= slack) {
      now.count++;
      now.last = t;
      return;
    }
    if (now && d <= 0)
      throw new UserError(
        'time-goes-back',
        `${this.#rowName(row)}: time ${d < 0 ? 'goes back' : 'stands still'} (step ${d} s where ${this.step} s is usual). Sort the rows or remove the overlap.`,
      );
    if (this.stretches.length >= MOST_STRETCHES) {
      this.#crowded = true;
      now!.count++;
      now!.last = t;
      return;
    }
    this.stretches.push({ row, count: 1, first: t, last: t });
  }
}
