import type { Backend } from './kernels-backend';
import { createSectionsFilter, type SectionRows } from './sections-filter';

/**
 * States of the sections in the steady state for a constant input of 1: z0, z1 per section.
 * Equals scipy.signal.sosfilt_zi. Throws when a section has a pole at zero frequency.
 */
export function steadyState(rows: SectionRows): Float64Array {
  const state = new Float64Array(2 * rows.length);
  let level = 1;
  rows.forEach((row, i) => {
    const [b0, b1, b2, a0, a1, a2] = Array.from(row) as [number, number, number, number, number, number];
    const denominator = a0 + a1 + a2;
    if (denominator === 0)
      throw new RangeError(`section ${i + 1} has a pole at zero frequency: no steady state`);
    const gain = (b0 + b1 + b2) / denominator;
    const z1 = (b2 - a2 * gain) / a0;
    state[2 * i] = level * ((b1 - a1 * gain) / a0 + z1);
    state[2 * i + 1] = level * z1;
    level *= gain;
  });
  return state;
}

/** Samples added at each end by `zeroPhase`: three times the number of taps, as scipy.signal.sosfiltfilt does. */
export function zeroPhasePadding(rows: SectionRows): number {
  const zeros = rows.filter((r) => r[2] === 0).length;
  const poles = rows.filter((r) => r[5] === 0).length;
  return 3 * (2 * rows.length + 1 - Math.min(zeros, poles));
}

export interface FilterOptions {
  /** States to start from (z0, z1 per section); zero when left out. */
  zi?: ArrayLike<number>;
  /** 'backward' filters from the last sample to the first. */
  direction?: 'forward' | 'backward';
  /** Where to put the result, for example the input itself; a new array when left out. */
  out?: Float64Array;
}

/** Causal filtering; y as scipy.signal.sosfilt, with the states zf after the last sample. */
export function filterSections(
  backend: Backend,
  rows: SectionRows,
  x: Float64Array,
  options: FilterOptions = {},
): { y: Float64Array; zf: Float64Array } {
  const y = options.out ?? new Float64Array(x.length);
  const filter = createSectionsFilter(backend, rows);
  try {
    filter.reset(options.zi);
    filter.process(x, y, options.direction === 'backward');
    return { y, zf: filter.state };
  } finally {
    filter.free();
  }
}

/**
 * Forward and backward filtering: no phase shift, the response squared. Equals scipy.signal.sosfiltfilt with its default
 * odd padding. `out` may be x itself. Throws when x is not longer than the padding, see {@link zeroPhasePadding}.
 */
export function zeroPhase(
  backend: Backend,
  rows: SectionRows,
  x: Float64Array,
  out?: Float64Array,
): Float64Array {
  const pad = zeroPhasePadding(rows);
  const n = x.length;
  if (n <= pad) {
    throw new RangeError(
      `filtering forwards and backwards with ${rows.length} sections needs more than ${pad} samples, not ${n}`,
    );
  }
  const y = out ?? new Float64Array(n);
  const head = Float64Array.from({ length: pad }, (_, i) => 2 * x[0] - x[pad - i]);
  const tail = Float64Array.from({ length: pad }, (_, i) => 2 * x[n - 1] - x[n - 2 - i]);
  const zi = steadyState(rows);
  const filter = createSectionsFilter(backend, rows);
  try {
    filter.reset(zi.map((z) => z * head[0]));
    filter.process(head);
    filter.process(x, y);
    filter.process(tail);
    const end = tail[pad - 1];
    filter.reset(zi.map((z) => z * end));
    filter.process(tail, tail, true);
    filter.process(y, y, true);
    return y;
  } finally {
    filter.free();
  }
}
