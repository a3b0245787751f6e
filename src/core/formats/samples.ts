import type { SampleType } from './format';

export type NumberType = Exclude<SampleType, 'text'>;

export const SAMPLE_BYTES: Readonly<Record<NumberType, number>> = {
  float64: 8,
  float32: 4,
  float16: 2,
  int8: 1,
  int16: 2,
  int24: 3,
  int32: 4,
  int64: 8,
  uint8: 1,
  uint16: 2,
  uint32: 4,
  uint64: 8,
};

/** How samples of one channel lie in bytes. */
export interface SampleLayout {
  readonly type: NumberType;
  readonly littleEndian: boolean;
  /** Bytes from one sample to the next; at least the size of the type. */
  readonly stride: number;
}

/**
 * Decodes `count` samples that begin at `bytes[0]` into `into[at…]` as float64, unscaled.
 * 64-bit integers beyond ±2^53 are rounded to the nearest float64. Never writes to `bytes`.
 */
export function decodeSamples(
  bytes: Uint8Array,
  count: number,
  layout: SampleLayout,
  into: Float64Array,
  at: number,
): void {
  const size = SAMPLE_BYTES[layout.type];
  const swap = !layout.littleEndian && size > 1;
  // A view needs aligned bytes, and swapping must not touch the caller's: otherwise they are used where they lie.
  const inPlace = layout.stride === size && !swap && bytes.byteOffset % size === 0;
  const packed = inPlace ? bytes : compact(bytes, count, size, layout.stride);
  if (swap) swapBytes(packed, size);
  const buffer = packed.buffer;
  const start = packed.byteOffset;
  switch (layout.type) {
    case 'float64':
      into.set(new Float64Array(buffer, start, count), at);
      return;
    case 'float32':
      into.set(new Float32Array(buffer, start, count), at);
      return;
    case 'float16':
      halves(new Uint16Array(buffer, start, count), into, at);
      return;
    case 'int8':
      into.set(new Int8Array(buffer, start, count), at);
      return;
    case 'int16':
      into.set(new Int16Array(buffer, start, count), at);
      return;
    case 'int24':
      for (let i = 0, j = 0; i < count; i++, j += 3)
        into[at + i] = ((packed[j] << 8) | (packed[j + 1] << 16) | (packed[j + 2] << 24)) >> 8;
      return;
    case 'int32':
      into.set(new Int32Array(buffer, start, count), at);
      return;
    case 'int64':
      wide(new Int32Array(buffer, start, 2 * count), packed, count, into, at);
      return;
    case 'uint8':
      into.set(packed.subarray(0, count), at);
      return;
    case 'uint16':
      into.set(new Uint16Array(buffer, start, count), at);
      return;
    case 'uint32':
      into.set(new Uint32Array(buffer, start, count), at);
      return;
    case 'uint64':
      wide(new Uint32Array(buffer, start, 2 * count), packed, count, into, at);
      return;
  }
}

/** Copy of the samples without what lies between them, aligned for a typed-array view. */
function compact(bytes: Uint8Array, count: number, size: number, stride: number): Uint8Array {
  if (stride === size) return bytes.slice(0, count * size);
  const out = new Uint8Array(count * size);
  for (let i = 0, from = 0, to = 0; i < count; i++, from += stride, to += size)
    for (let k = 0; k < size; k++) out[to + k] = bytes[from + k]!;
  return out;
}

function swapBytes(bytes: Uint8Array, size: number): void {
  for (let at = 0; at + size <= bytes.length; at += size)
    for (let a = at, b = at + size - 1; a < b; a++, b--) {
      const keep = bytes[a];
      bytes[a] = bytes[b]!;
      bytes[b] = keep;
    }
}

function wide(
  words: Int32Array | Uint32Array,
  bytes: Uint8Array,
  count: number,
  into: Float64Array,
  at: number,
) {
  const low = new Uint32Array(bytes.buffer, bytes.byteOffset, 2 * count);
  for (let i = 0; i < count; i++) into[at + i] = words[2 * i + 1] * 2 ** 32 + low[2 * i];
}

/** IEEE 754 binary16: sign, 5 exponent bits (bias 15), 10 fraction bits. */
function halves(bits: Uint16Array, into: Float64Array, at: number): void {
  for (let i = 0; i < bits.length; i++) {
    const b = bits[i];
    const sign = b & 0x8000 ? -1 : 1;
    const exponent = (b >> 10) & 31;
    const fraction = b & 1023;
    into[at + i] =
      exponent === 31
        ? fraction
          ? NaN
          : sign * Infinity
        : sign * (exponent === 0 ? fraction * 2 ** -24 : (1024 + fraction) * 2 ** (exponent - 25));
  }
}
