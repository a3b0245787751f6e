import type { Backend } from './kernels-backend';

/** Second-order sections as rows b0 b1 b2 a0 a1 a2, applied first to last. */
export type SectionRows = readonly ArrayLike<number>[];

/** Samples worked on at a time: they and the states stay in the second-level cache. */
const BLOCK = 16384;

/** Coefficients b0 b1 b2 a1 a2 per section, divided by a0; one section that does nothing makes the number even. */
export function packSections(rows: SectionRows): Float64Array {
  if (rows.length === 0) throw new RangeError('a filter needs at least one second-order section');
  const packed = new Float64Array((rows.length + (rows.length & 1)) * 5);
  rows.forEach((row, i) => {
    const [b0, b1, b2, a0, a1, a2] = Array.from(row);
    if (row.length !== 6 || !Array.from(row).every(Number.isFinite) || a0 === 0) {
      throw new RangeError(`section ${i + 1} must be six finite numbers b0 b1 b2 a0 a1 a2 with a0 not zero`);
    }
    packed.set([b0 / a0, b1 / a0, b2 / a0, a1 / a0, a2 / a0], 5 * i);
  });
  if (rows.length & 1) packed[5 * rows.length] = 1;
  return packed;
}

/** A cascade of second-order sections whose states are carried from call to call. */
export interface SectionsFilter {
  readonly sections: number;
  /** z0, z1 per section (transposed direct form II). */
  readonly state: Float64Array;
  /** Sets the states, zero when left out. */
  reset(state?: ArrayLike<number>): void;
  /** Filters x into `out` (default: in place), from the last sample to the first if `backwards`. */
  process(x: Float64Array, out?: Float64Array, backwards?: boolean): void;
  free(): void;
}

/**
 * Streaming filter; call `process` with consecutive blocks of any length.
 * Results are the same to the last bit however the samples are cut into blocks.
 */
export function createSectionsFilter(backend: Backend, rows: SectionRows): SectionsFilter {
  const packed = packSections(rows);
  const coefficients = backend.array(packed.length, 'f64');
  const states = backend.array((packed.length / 5) * 2, 'f64');
  const block = backend.array(BLOCK, 'f64');
  coefficients.set(packed);
  const run = (x: Float64Array, out: Float64Array, from: number, backwards: boolean): void => {
    const to = Math.min(from + BLOCK, x.length);
    block.set(x.subarray(from, to));
    backend.cascade(block, to - from, backwards, coefficients, states);
    out.set(block.view().subarray(0, to - from), from);
  };
  return {
    sections: rows.length,
    get state() {
      return states.slice(0, 2 * rows.length);
    },
    reset: (state) => {
      if (state && state.length !== 2 * rows.length) {
        throw new RangeError(`${rows.length} sections have ${2 * rows.length} states, not ${state.length}`);
      }
      states.fill(0);
      if (state) states.set(state);
    },
    process: (x, out = x, backwards = false) => {
      if (out.length !== x.length) throw new RangeError(`output of ${out.length} samples for ${x.length}`);
      if (!backwards) for (let from = 0; from < x.length; from += BLOCK) run(x, out, from, false);
      else {
        const last = Math.floor((x.length - 1) / BLOCK) * BLOCK;
        for (let from = last; from >= 0; from -= BLOCK) run(x, out, from, true);
      }
    },
    free: () => {
      coefficients.free();
      states.free();
      block.free();
    },
  };
}
