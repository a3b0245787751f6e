import { normalTail } from '../kernels/special-erf';
import { kolmogorovSmirnov } from '../kernels/special-kolmogorov';

/** Samples the distribution test is made with, at most. */
const MOST = 65_536;

export interface WhiteStatistics {
  readonly count: number;
  readonly mean: number;
  /** About the mean, divided by the count. */
  readonly variance: number;
  /** Fourth moment over squared variance, less 3. */
  readonly kurtosis: number;
  /**
   * Kolmogorov–Smirnov distance and probability of the samples, over their own root mean square, against the unit normal. The
   * probability is slightly too large because the scale is that of the same samples.
   */
  readonly distance: number;
  readonly pValue: number;
  /** Samples it was made with, and how many lie between one and the next. */
  readonly tested: number;
  readonly stride: number;
}

export interface StatisticsTaker {
  take(samples: Float64Array): void;
  result(): WhiteStatistics;
}

/**
 * Moments of all samples, and a Kolmogorov–Smirnov test of every n-th of them.
 *
 * @param total samples that will come
 * @param apart samples between two that may count as independent
 */
export function whiteStatistics(total: number, apart: number): StatisticsTaker {
  const stride = Math.max(1, Math.ceil(apart - 1e-9), Math.ceil(total / MOST));
  const picked = new Float64Array(Math.ceil(total / stride));
  let filled = 0;
  let count = 0;
  const sums = [0, 0, 0, 0];
  return {
    take(samples) {
      let [a, b, c, d] = [0, 0, 0, 0];
      for (const v of samples) {
        const square = v * v;
        a += v;
        b += square;
        c += square * v;
        d += square * square;
      }
      [a, b, c, d].forEach((v, i) => (sums[i] += v));
      for (let i = (stride - (count % stride)) % stride; i < samples.length; i += stride)
        picked[filled++] = samples[i];
      count += samples.length;
    },
    result() {
      const [m, s2, s3, s4] = sums.map((s) => s / count);
      const variance = s2 - m * m;
      const fourth = s4 - 4 * m * s3 + 6 * m * m * s2 - 3 * m ** 4;
      const rms = Math.sqrt(s2);
      const values = picked.subarray(0, filled).sort();
      let distance = 0;
      values.forEach((v, i) => {
        const p = normalTail(v / rms, 'lower');
        distance = Math.max(distance, p - i / filled, (i + 1) / filled - p);
      });
      return {
        count,
        mean: m,
        variance,
        kurtosis: fourth / (variance * variance) - 3,
        distance,
        pValue: kolmogorovSmirnov(distance, filled),
        tested: filled,
        stride,
      };
    },
  };
}
