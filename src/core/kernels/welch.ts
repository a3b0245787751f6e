import type { Backend } from './kernels-backend';
import { createSegmentTransform, type SegmentOptions, type SegmentTransform } from './welch-segments';
import { medianStore, meanStore, type PowerStore, type WelchAverage } from './welch-stores';

export interface WelchOptions extends SegmentOptions {
  average: WelchAverage;
  /** Segments that will be added (in each pass). Needed to lay out the store of a median. */
  segments: number;
  /** Distance of segments in `addRun`, samples. Default: half a segment. */
  step?: number;
  /** Bytes the powers kept for a median may take; more makes several passes. Default 512 MiB. */
  memoryLimit?: number;
  /** Use this transform instead of an own one (it is not freed). Its options then decide. */
  transform?: SegmentTransform;
}

export interface WelchResult {
  /** Averaged |X|² per bin, floor(segment/2) + 1 of them, squared unit of the samples times window²; not scaled. */
  power: Float64Array;
  /** Segments averaged. */
  segments: number;
}

/**
 * Averaged periodogram, fed segment by segment. The one-sided density is `power[k] · 2 / (rate · Σ window²)`, without
 * the 2 at zero frequency and (even segment) at the Nyquist frequency.
 *
 * Every segment is added once per pass, in the same order, and each pass is ended with `endPass`:
 * @example
 * const w = kernels.createWelch({ segment, window, detrend: 'constant', average: 'median', segments: starts.length });
 * do for (const at of starts) w.add(samples, at);
 * while (w.endPass());
 * const { power } = w.result();
 * w.free();
 */
export interface Welch {
  /** Passes over all segments this estimate needs; 1 unless the powers exceed the memory limit. */
  readonly passes: number;
  readonly bins: number;
  /** Adds samples at..at+segment. Throws on NaN, infinite values, or more segments than announced. */
  add(samples: Float64Array, at?: number): void;
  /** Adds the segment last loaded into the shared transform. */
  addLoaded(): void;
  /** Adds every segment of a gapless run, `step` apart; returns how many. */
  addRun(samples: Float64Array): number;
  /** Ends a pass; true when all segments have to be added once more. */
  endPass(): boolean;
  result(): WelchResult;
  free(): void;
}

/**
 * Streaming Welch estimate: see {@link Welch} for the use and {@link WelchOptions} for the parameters.
 * Sources: Welch, IEEE Trans. Audio Electroacoust. AU-15, 70 (1967); median and its bias, Allen et al., PRD 85, 122006
 * (2012), App. B. Mean and median equal scipy.signal.welch to rounding.
 */
export function createWelch(backend: Backend, options: WelchOptions): Welch {
  const transform = options.transform ?? createSegmentTransform(backend, options);
  const { segment, bins, spectrum } = transform;
  const step = options.step ?? Math.max(1, Math.floor(segment / 2));
  const { segments, average, memoryLimit = 512 * 1048576 } = options;
  if (!Number.isInteger(step) || step < 1)
    throw new RangeError(`segments ${step} samples apart are not possible`);
  if (!Number.isInteger(segments) || segments < 1)
    throw new RangeError('an average needs at least one segment');
  const store: PowerStore =
    average === 'mean'
      ? meanStore(backend, bins)
      : medianStore(backend, bins, segments, average, memoryLimit);
  let added = 0;
  let perPass = 0;
  let pass = 0;

  const addLoaded = (): void => {
    if (pass >= store.passes) throw new Error('this estimate is complete: no more segments can be added');
    if (added >= segments) throw new RangeError(`only ${segments} segments were announced, this is one more`);
    store.add(spectrum, added);
    added++;
  };
  const add = (samples: Float64Array, at = 0): void => {
    transform.load(samples, at);
    addLoaded();
  };
  return {
    passes: store.passes,
    bins,
    add,
    addLoaded,
    addRun: (samples) => {
      let count = 0;
      for (let at = 0; at + segment <= samples.length; at += step) {
        add(samples, at);
        count++;
      }
      return count;
    },
    endPass: () => {
      if (added === 0) throw new RangeError('an average needs at least one segment');
      if (pass > 0 && added !== perPass) {
        throw new RangeError(
          `pass ${pass + 1} had ${added} segments, the first ${perPass}: they must be the same`,
        );
      }
      store.endPass(added);
      perPass = added;
      added = 0;
      pass++;
      return pass < store.passes;
    },
    result: () => {
      if (pass < store.passes)
        throw new Error(`${store.passes - pass} more passes are needed before the result`);
      return { power: store.power(), segments: perPass };
    },
    free: () => {
      store.free();
      if (!options.transform) transform.free();
    },
  };
}
