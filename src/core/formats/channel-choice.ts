import type { ChannelFacts, SampleType } from './format';
import { meaningOf, wordsOf } from './meaning';

/** Fewer samples than this are a list of numbers, not a series. */
const SHORTEST = 16;
/** A shape with more rows beside the long axis is a table or a picture. */
const MOST_ROWS = 64;

export interface ChannelAxes {
  /** Axis along which samples follow one another. */
  readonly axis: number;
  readonly length: number;
  /** One index per channel, with 0 at `axis`. */
  readonly indices: readonly (readonly number[])[];
}

/**
 * How a shape is taken for channels: the longest axis is time (the last of equals), every combination of the others is
 * a channel. Undefined when it has fewer than 16 samples or more than 64 channels.
 */
export function channelAxes(shape: readonly number[]): ChannelAxes | undefined {
  if (shape.length === 0) return undefined;
  const length = Math.max(...shape);
  const axis = shape.lastIndexOf(length);
  const rows = shape.reduce((n, size, i) => (i === axis ? n : n * size), 1);
  if (length < SHORTEST || rows < 1 || rows > MOST_ROWS || (shape.length > 1 && rows >= length))
    return undefined;
  const indices: number[][] = [];
  for (let k = 0; k < rows; k++) {
    const at = new Array<number>(shape.length).fill(0);
    for (let a = shape.length - 1, rest = k; a >= 0; a--) {
      if (a === axis) continue;
      at[a] = rest % shape[a];
      rest = Math.floor(rest / shape[a]);
    }
    indices.push(at);
  }
  return { axis, length, indices };
}

/** "" for one axis, "[2]" for a row, "[:,2]" for a column. */
export function channelIndexName(at: readonly number[], axis: number): string {
  if (at.length === 1) return '';
  const parts = at.map((i, a) => (a === axis ? ':' : String(i)));
  if (axis === at.length - 1) parts.pop();
  return `[${parts.join(',')}]`;
}

/** Notes that a sample type calls for. */
export function typeNotes(type: SampleType): string[] {
  if (type === 'int64' || type === 'uint64')
    return ['64-bit integers: values beyond 2^53 are rounded to float64; no scale is applied.'];
  if (type.includes('int')) return [`Integers (${type}) are read as stored; no scale is applied.`];
  if (type === 'float16') return ['float16 keeps about three digits.'];
  return [];
}

/**
 * Likeliest strain first: not a short list beside a long one, not a time axis, floating point, a name that says strain,
 * a known rate, then the longest. Stable, so equals keep the file's order.
 */
export function rankChannels<T extends { readonly facts: ChannelFacts }>(channels: readonly T[]): T[] {
  const longest = Math.max(0, ...channels.map((c) => c.facts.length));
  const weight = ({ facts }: T): number => {
    const name = facts.name.slice(facts.name.lastIndexOf('/') + 1).replace(/\[.*\]$/, '');
    const time = meaningOf(name)?.meaning === 'time-axis' && !/^[xt]$/i.test(name);
    const strain = facts.unit?.value === 'strain' || wordsOf(name).some((w) => w === 'strain' || w === 'h');
    const long = facts.length * 64 >= longest;
    return (
      (long ? 16 : 0) +
      (time ? 0 : 8) +
      (facts.type.startsWith('float') ? 4 : 0) +
      (strain ? 2 : 0) +
      (facts.rate ? 1 : 0)
    );
  };
  return channels
    .map((c) => ({ c, w: weight(c) }))
    .sort((a, b) => b.w - a.w || b.c.facts.length - a.c.facts.length)
    .map(({ c }) => c);
}
