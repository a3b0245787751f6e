import { normalTail } from '../kernels/special-erf';
import { incompleteGamma } from '../kernels/special-incomplete-gamma';
import type { BandTrend } from './stationarity-bands';

/** How far a trend moved, against what chance explains. */
export interface Steadiness {
  readonly trend: BandTrend;
  /** Strides with a value. */
  readonly strides: number;
  /** Σ ((v − mean)/σ)² with one degree of freedom less than strides, and the probability of at least as much. */
  readonly chiSquared: number;
  readonly pValue: number;
  /** Scatter found over scatter expected. */
  readonly excess: number;
  /** Stride that lies furthest from the mean, in expected standard deviations, and its probability among all of them. */
  readonly furthest: number;
  readonly sigmas: number;
  readonly furthestPValue: number;
}

/** Tests each trend for more scatter than its estimate has; trials over all strides of all trends are counted. */
export function steadinessOf(trends: readonly BandTrend[]): Steadiness[] {
  const all = trends.reduce((n, t) => n + t.values.filter(Number.isFinite).length, 0);
  return trends.map((trend) => {
    const { values, expected } = trend;
    const used = values.filter(Number.isFinite);
    const n = used.length;
    const mean = used.reduce((s, v) => s + v, 0) / n;
    let chiSquared = 0;
    let furthest = 0;
    let most = 0;
    values.forEach((v, i) => {
      if (!Number.isFinite(v)) return;
      const z = (v - mean) / expected;
      chiSquared += z * z;
      if (Math.abs(z) > Math.abs(most)) [most, furthest] = [z, i];
    });
    const single = 2 * normalTail(Math.abs(most));
    return {
      trend,
      strides: n,
      chiSquared,
      pValue: incompleteGamma((n - 1) / 2, chiSquared / 2).upper,
      excess: Math.sqrt(chiSquared / (n - 1)),
      furthest,
      sigmas: most,
      furthestPValue: -Math.expm1(all * Math.log1p(-single)),
    };
  });
}
