import { readExactly } from './bytes';
import { channelAxes, channelIndexName, typeNotes } from './channel-choice';
import { factsFrom, type Clue } from './facts';
import type { ByteSource, ChannelFacts } from './format';
import type { ReadableChannel } from './open-channels';
import { decodeSamples, SAMPLE_BYTES, type NumberType } from './samples';
import { readOnGrid, type TimeFit } from './time-axis';

/** An array of numbers lying in a source. */
export interface StoredArray {
  /** Name of the channel before any index: "strain". */
  readonly name: string;
  readonly source: ByteSource;
  readonly offset: number;
  readonly type: NumberType;
  readonly littleEndian: boolean;
  readonly shape: readonly number[];
  readonly fortran: boolean;
  readonly notes?: readonly string[];
}

/** Bytes fetched at once; a strided channel of a wide array is read in pieces of this size. */
const PIECE = 1 << 22;

/** Reads samples of one channel of an array, `at` fixed on the other axes. */
export function arrayReader(
  a: StoredArray,
  at: readonly number[],
  axis: number,
): (from: number, to: number, into: Float64Array) => void {
  const size = SAMPLE_BYTES[a.type];
  const steps = strides(a.shape, a.fortran);
  const first = at.reduce((sum, i, k) => sum + i * steps[k], 0);
  const layout = { type: a.type, littleEndian: a.littleEndian, stride: steps[axis] * size };
  const most = Math.max(1, Math.floor(PIECE / layout.stride));
  return (from, to, into) => {
    for (let n = from; n < to; n += most) {
      const count = Math.min(most, to - n);
      const offset = a.offset + (first + n * steps[axis]) * size;
      const bytes = readExactly(
        a.source,
        offset,
        (count - 1) * layout.stride + size,
        `sample ${n + count - 1} of ${a.name}`,
      );
      decodeSamples(bytes, count, layout, into, n - from);
    }
  };
}

/** Elements from one index to the next along each axis. */
function strides(shape: readonly number[], fortran: boolean): number[] {
  const out = new Array<number>(shape.length).fill(1);
  if (fortran) for (let i = 1; i < shape.length; i++) out[i] = out[i - 1] * shape[i - 1];
  else for (let i = shape.length - 2; i >= 0; i--) out[i] = out[i + 1] * shape[i + 1];
  return out;
}

/** Channels of an array, see channel-choice.ts; none when it is too short or too wide. */
export function arrayChannels(a: StoredArray, clues: readonly Clue[], fit?: TimeFit): ReadableChannel[] {
  const axes = channelAxes(a.shape);
  if (!axes) return [];
  const found = factsFrom(clues, { name: a.name, length: axes.length, axis: axes.axis }, fit);
  return axes.indices.map((at) => {
    const facts: ChannelFacts = {
      name: a.name + channelIndexName(at, axes.axis),
      type: a.type,
      shape: a.shape,
      length: fit?.grid?.length ?? axes.length,
      ...(found.rate ? { rate: found.rate } : {}),
      ...(found.start ? { start: found.start } : {}),
      ...(found.unit ? { unit: found.unit } : {}),
      ...(fit?.grid ? { runs: fit.grid.runs } : {}),
      notes: [...found.notes, ...(fit?.notes ?? []), ...typeNotes(a.type), ...(a.notes ?? [])],
    };
    const rows = arrayReader(a, at, axes.axis);
    return { facts, read: fit?.grid ? readOnGrid(fit.grid, rows) : rows };
  });
}
