import type { Series } from '../data/kinds';
import type { Kernels } from '../kernels/kernels';
import type { CommonSpan } from './common-span';
import type { SegmentPlan } from './segments';
import { streamSegments } from './segment-stream';

export interface CoherenceEstimate {
  /** |mean X₁X₂*|² / (mean |X₁|² mean |X₂|²) per bin, 0 to 1; NaN where one of the channels has no power at all. */
  readonly coherence: Float64Array;
  /** Phase of mean X₁X₂* in degrees, (−180, 180]; positive where the second channel lags. */
  readonly phase: Float64Array;
}

/** Welch's magnitude-squared coherence of two series over segments valid in both; equals scipy.signal.coherence. */
export async function coherenceEstimate(
  series: readonly [Series, Series],
  common: CommonSpan,
  plan: SegmentPlan,
  kernels: Kernels,
  window: Float64Array,
  detrend: 'constant' | 'none',
  block: (fraction: number) => Promise<void>,
): Promise<CoherenceEstimate> {
  const cross = kernels.createCrossSpectrum({ segment: plan.size, window, detrend });
  try {
    await streamSegments(
      series.map((s, i) => ({ series: s, offset: common.offsets[i] })),
      plan.used,
      plan.size,
      plan.step,
      block,
      ([a, b], at) => cross.add(a, b, at),
    );
    const { power1, power2, re, im } = cross.result();
    const coherence = re.map((r, k) => {
      // Strain squared twice falls below the smallest float64; the ratio of roots does not.
      const size = Math.hypot(r, im[k]) / Math.sqrt(power1[k]) / Math.sqrt(power2[k]);
      return Number.isFinite(size) ? Math.min(1, size * size) : NaN;
    });
    return { coherence, phase: re.map((r, k) => (Math.atan2(im[k], r) * 180) / Math.PI) };
  } finally {
    cross.free();
  }
}
