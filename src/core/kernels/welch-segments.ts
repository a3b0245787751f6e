import type { ComplexArray } from './complex-arrays';
import type { Backend } from './kernels-backend';

export interface SegmentOptions {
  /** Samples per segment. */
  segment: number;
  /** Weights, one per sample of the segment. */
  window: Float64Array;
  /** 'constant' takes the mean of each segment off before the window. */
  detrend: 'constant' | 'none';
}

/** Windowed spectra of segments, one at a time; several accumulators can share one. */
export interface SegmentTransform {
  readonly segment: number;
  /** floor(segment/2) + 1 */
  readonly bins: number;
  /** Spectrum of the segment last loaded: Σ w (x − mean) e^(−2πi jk/n), one-sided, unscaled. */
  readonly spectrum: ComplexArray<'f64'>;
  /** Transforms samples at..at+segment. Throws when a sample is NaN or infinite or the segment does not fit. */
  load(samples: Float64Array, at?: number): void;
  free(): void;
}

/** Allocates the buffers of one segment; see {@link SegmentTransform}. */
export function createSegmentTransform(backend: Backend, options: SegmentOptions): SegmentTransform {
  const { segment, window, detrend } = options;
  if (!Number.isInteger(segment) || segment < 1)
    throw new RangeError(`a segment of ${segment} samples is not possible`);
  if (window.length !== segment) {
    throw new RangeError(`the window has ${window.length} weights, the segment ${segment} samples`);
  }
  const plan = backend.rfftPlan(segment, 'f64');
  const samples = backend.array(segment, 'f64');
  const weights = backend.array(segment, 'f64');
  const tapered = backend.array(segment, 'f64');
  const spectrum = backend.complex(plan.bins, 'f64');
  weights.set(window);
  return {
    segment,
    bins: plan.bins,
    spectrum,
    load: (x, at = 0) => {
      if (at < 0 || at + segment > x.length) {
        throw new RangeError(`a segment of ${segment} samples at ${at} is not inside ${x.length} samples`);
      }
      samples.set(x.subarray(at, at + segment));
      const sum = backend.taper(samples, weights, detrend === 'constant', tapered);
      if (!Number.isFinite(sum)) {
        throw new RangeError(`the segment at sample ${at} holds NaN or infinite values: leave it out`);
      }
      plan.forward(tapered, spectrum);
    },
    free: () => {
      samples.free();
      weights.free();
      tapered.free();
      spectrum.free();
    },
  };
}
