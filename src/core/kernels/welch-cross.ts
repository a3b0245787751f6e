import type { Backend } from './kernels-backend';
import { createSegmentTransform, type SegmentOptions, type SegmentTransform } from './welch-segments';

export interface CrossOptions extends SegmentOptions {
  /** Transforms of the two channels to use instead of own ones (not freed). */
  transforms?: [SegmentTransform, SegmentTransform];
}

export interface CrossResult {
  /** Mean |X1|² per bin, unscaled as in {@link WelchResult}. */
  power1: Float64Array;
  /** Mean |X2|². */
  power2: Float64Array;
  /** Mean X1 conj(X2). */
  re: Float64Array;
  im: Float64Array;
  segments: number;
}

/** Mean powers and cross-spectrum of two channels; coherence is (re² + im²) / (power1 · power2). */
export interface CrossSpectrum {
  readonly bins: number;
  /** Adds samples at..at+segment of both channels (`at2`: where in the second, if elsewhere). */
  add(first: Float64Array, second: Float64Array, at?: number, at2?: number): void;
  /** Adds the segments last loaded into the shared transforms. */
  addLoaded(): void;
  result(): CrossResult;
  free(): void;
}

/**
 * Streaming cross-spectrum with the Welch average (mean). scipy.signal.csd uses the conjugate of the first factor,
 * so it equals (re − i im); scipy.signal.coherence agrees as it is.
 */
export function createCrossSpectrum(backend: Backend, options: CrossOptions): CrossSpectrum {
  const own = options.transforms === undefined;
  const [a, b] = options.transforms ?? [
    createSegmentTransform(backend, options),
    createSegmentTransform(backend, options),
  ];
  if (a.segment !== b.segment) throw new RangeError('both channels need segments of the same length');
  const { bins } = a;
  const power1 = backend.array(bins, 'f64');
  const power2 = backend.array(bins, 'f64');
  const cross = backend.complex(bins, 'f64');
  let count = 0;
  const addLoaded = (): void => {
    backend.addPower(a.spectrum, power1);
    backend.addPower(b.spectrum, power2);
    backend.addCross(a.spectrum, b.spectrum, cross);
    count++;
  };
  return {
    bins,
    addLoaded,
    add: (first, second, at = 0, at2 = at) => {
      a.load(first, at);
      b.load(second, at2);
      addLoaded();
    },
    result: () => {
      if (count === 0) throw new RangeError('a cross-spectrum needs at least one pair of segments');
      const [p1, p2, re, im] = [power1, power2, cross.re, cross.im].map((x) =>
        x.slice().map((v) => v / count),
      );
      return { power1: p1, power2: p2, re: re, im: im, segments: count };
    },
    free: () => {
      power1.free();
      power2.free();
      cross.free();
      if (own) {
        a.free();
        b.free();
      }
    },
  };
}
