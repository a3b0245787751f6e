import { binCovariance, sumVariance } from './bin-covariance';
import { median } from './spectrum-facts';
import type { StridePlan } from './stride-plan';

/** A sum over bins followed from stride to stride. */
export interface BandTrend {
  readonly label: string;
  /** Hz */
  readonly band: readonly [low: number, high: number];
  /** Value of each stride over the median of all; NaN where a stride has none. */
  readonly values: Float64Array;
  /** The median itself, in the unit of the sum. */
  readonly median: number;
  /** Standard deviation of a value that the estimate alone explains. */
  readonly expected: number;
}

/** Bins of a band and what each counts for, given its density; the value is a power of the sum. */
export interface BandSum {
  readonly label: string;
  readonly band: readonly [low: number, high: number];
  readonly from: number;
  readonly to: number;
  readonly weigh: (power: number, bin: number) => number;
  /** 1 for the sum itself, ½ for its root. */
  readonly exponent: number;
  /** Set when the weights go with 1/power: an inverse of a mean of a independent powers scatters by 1/(a − 2), not 1/a. */
  readonly inverse?: true;
}

/** Collects band sums stride by stride, then says how they moved and how far chance moves them. */
export class BandTrends {
  readonly #plan: StridePlan;
  readonly #sums: readonly BandSum[];
  readonly #values: readonly Float64Array[];
  /** Mean over strides of what each bin adds, for the variance. */
  readonly #parts: readonly Float64Array[];
  #count = 0;

  constructor(plan: StridePlan, sums: readonly BandSum[]) {
    this.#plan = plan;
    this.#sums = sums;
    this.#values = sums.map(() => new Float64Array(plan.strides).fill(NaN));
    this.#parts = sums.map((s) => new Float64Array(s.to - s.from));
  }

  take(stride: number, power: Float64Array): void {
    this.#count++;
    this.#sums.forEach(({ from, to, weigh, exponent }, i) => {
      let sum = 0;
      for (let k = from; k < to; k++) {
        const part = weigh(power[k], k);
        sum += part;
        this.#parts[i][k - from] += part;
      }
      this.#values[i][stride] = sum ** exponent;
    });
  }

  result(window: Float64Array): BandTrend[] {
    const covariance = binCovariance(window, this.#plan.step);
    // Strides with fewer segments scatter more; the typical number stands for all.
    const segments = Math.round(median(Float64Array.from(this.#plan.segments.filter((n) => n > 0))));
    const own = covariance(segments);
    const averages = 1 / own[0];
    return this.#sums.map(({ label, band, exponent, inverse }, i) => {
      const wider = inverse === true && averages > 3 ? averages / (averages - 2) : 1;
      const typical = median(this.#values[i].filter(Number.isFinite));
      const parts = this.#parts[i].map((p) => p / this.#count);
      return {
        label,
        band,
        values: this.#values[i].map((v) => v / typical),
        median: typical,
        expected: exponent * Math.sqrt(wider * sumVariance(parts, own)),
      };
    });
  }
}
