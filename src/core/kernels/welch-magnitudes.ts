import type { Backend } from './kernels-backend';
import { createSegmentTransform, type SegmentOptions, type SegmentTransform } from './welch-segments';

export interface MagnitudesOptions extends SegmentOptions {
  /** Transform to use instead of an own one (not freed). */
  transform?: SegmentTransform;
}

/** Mean and variance over segments of the magnitude |X| per bin. */
export interface Magnitudes {
  readonly bins: number;
  add(samples: Float64Array, at?: number): void;
  /** Adds the segment last loaded into the shared transform. */
  addLoaded(): void;
  /** `variance` is divided by the number of segments (not by one less). */
  result(): { mean: Float64Array; variance: Float64Array; segments: number };
  free(): void;
}

/**
 * Streaming mean and variance of spectral magnitudes. For Gaussian noise the magnitudes follow Rayleigh's distribution,
 * whose standard deviation over mean is √(4/π − 1) = 0.5227; larger means bursts, smaller a steady line.
 */
export function createMagnitudes(backend: Backend, options: MagnitudesOptions): Magnitudes {
  const transform = options.transform ?? createSegmentTransform(backend, options);
  const { bins, spectrum } = transform;
  const mean = backend.array(bins, 'f64');
  const spread = backend.array(bins, 'f64');
  let count = 0;
  const addLoaded = (): void => {
    count++;
    backend.addMagnitude(spectrum, count, mean, spread);
  };
  return {
    bins,
    addLoaded,
    add: (samples, at = 0) => {
      transform.load(samples, at);
      addLoaded();
    },
    result: () => {
      if (count === 0) throw new RangeError('a mean needs at least one segment');
      return { mean: mean.slice(), variance: spread.slice().map((v) => v / count), segments: count };
    },
    free: () => {
      mean.free();
      spread.free();
      if (!options.transform) transform.free();
    },
  };
}
