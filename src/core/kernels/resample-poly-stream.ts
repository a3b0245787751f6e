import { resampledLength, resampleInto, type ResamplePlan } from './resample-poly';

/** Resampling of a record that arrives in blocks. */
export interface Resampler {
  /** Takes the next block and returns the outputs that are now complete, in order; they may be none. */
  push(block: Float64Array): Float64Array;
  /** The rest of the outputs, with zeros after the last sample. Call once. */
  finish(): Float64Array;
}

/**
 * The same numbers as `resample` gives for the blocks put together, keeping only as much input as the filter is long.
 *
 * @example
 * const r = createResampler(planResample(1, 4));
 * const y = [r.push(first), r.push(second), r.finish()];
 */
export function createResampler(plan: ResamplePlan): Resampler {
  let kept = new Float64Array(0);
  let keptFrom = 0;
  let made = 0;
  const make = (until: number): Float64Array => {
    const out = new Float64Array(Math.max(0, until - made));
    resampleInto(plan, kept, keptFrom, made, out);
    made += out.length;
    return out;
  };
  return {
    push: (block) => {
      const joined = new Float64Array(kept.length + block.length);
      joined.set(kept);
      joined.set(block, kept.length);
      kept = joined;
      const total = keptFrom + kept.length;
      // Output m is complete when input ⌊(m · down + half)/up⌋ has come.
      const out = make(Math.ceil((total * plan.up - plan.half) / plan.down));
      const oldest = Math.floor((made * plan.down + plan.half) / plan.up) - plan.taps + 1;
      const drop = Math.min(Math.max(0, oldest - keptFrom), kept.length);
      kept = kept.slice(drop);
      keptFrom += drop;
      return out;
    },
    finish: () => make(resampledLength(plan, keptFrom + kept.length)),
  };
}
