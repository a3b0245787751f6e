import type { AverageKind } from '../data/kinds';
import { medianVarianceFactor, welchVarianceFactor } from '../kernels/window-figures-averages';
import { chiSquareQuantile } from './chi-square';

/** How well one bin of an averaged spectrum is known. */
export interface BinError {
  /** Standard deviation of one bin divided by its mean. */
  readonly relative: number;
  /** Number of independent segments whose mean would be known as well. */
  readonly effectiveAverages: number;
  /** Factors on an estimate that give the central 90 % confidence interval of the true density. */
  readonly band: readonly [low: number, high: number];
}

/**
 * Error of one bin of noise that is flat over the window's bandwidth, from `segments` segments `step` samples apart.
 * Median-mean is the mean of two medians of half the segments each. The interval takes the estimate as chi-square
 * distributed with ν = 2 / relative² degrees of freedom (Welch, IEEE Trans. AU-15, 70, 1967).
 *
 * @param window weights of one segment
 */
export function binError(
  average: AverageKind,
  segments: number,
  window: Float64Array,
  step: number,
): BinError {
  const variance =
    average === 'mean'
      ? welchVarianceFactor(window, step, segments)
      : average === 'median' || segments < 2
        ? medianVarianceFactor(window, step, segments)
        : (medianVarianceFactor(window, step, segments) * halves(segments)) / independent(segments);
  const freedom = 2 / variance;
  return {
    relative: Math.sqrt(variance),
    effectiveAverages: 1 / variance,
    band: [freedom / chiSquareQuantile(0.95, freedom), freedom / chiSquareQuantile(0.05, freedom)],
  };
}

/** Variance factor of the median of `n` segments that do not overlap. */
const independent = (n: number): number => medianVarianceFactor(new Float64Array([1]), 1, n);

/** Variance factor of the mean of the medians of two halves that do not overlap. */
const halves = (n: number): number => (independent(Math.ceil(n / 2)) + independent(Math.floor(n / 2))) / 4;
