import { cosTurns, log, sinTurns } from './elementary';

/**
 * Random numbers by counting: number `index` of stream `stream` under `seed` is a pure function of the three, so any
 * stretch can be drawn alone, in any order, and is the same to the bit on every platform.
 * Generator: Philox4x32-10. Salmon, Moraes, Dror, Shaw, "Parallel random numbers: as easy as 1, 2, 3", SC11 (2011),
 * doi 10.1145/2063384.2063405 (constants MEMORY, confirmed by the known-answer vectors in the tests).
 */

/** High 32 bits of the product of two 32-bit numbers, in 16-bit halves because float64 holds only 53. */
function mulHigh(a: number, b: number): number {
  const al = a & 0xffff;
  const ah = a >>> 16;
  const bl = b & 0xffff;
  const bh = b >>> 16;
  const u = ah * bl + ((al * bl) >>> 16);
  const v = al * bh + (u & 0xffff);
  return (ah * bh + (u >>> 16) + (v >>> 16)) >>> 0;
}

/** One block of Philox4x32-10: four 32-bit words of `counter` under two of `key`, written to `out`. Returns `out`. */
export function philox(
  out: Uint32Array,
  c0: number,
  c1: number,
  c2: number,
  c3: number,
  k0: number,
  k1: number,
): Uint32Array {
  for (let round = 0; round < 10; round++) {
    const high0 = mulHigh(0xd2511f53, c0);
    const low0 = Math.imul(0xd2511f53, c0) >>> 0;
    const high1 = mulHigh(0xcd9e8d57, c2);
    const low1 = Math.imul(0xcd9e8d57, c2) >>> 0;
    c0 = (high1 ^ c1 ^ k0) >>> 0;
    c1 = low1;
    c2 = (high0 ^ c3 ^ k1) >>> 0;
    c3 = low0;
    k0 = (k0 + 0x9e3779b9) >>> 0;
    k1 = (k1 + 0xbb67ae85) >>> 0;
  }
  out[0] = c0;
  out[1] = c1;
  out[2] = c2;
  out[3] = c3;
  return out;
}

const words = new Uint32Array(4);

/** Block `index` of a stream: two numbers of 52 bits each, in the open interval (0, 1). */
function block(seed: number, stream: number, index: number): void {
  philox(words, index >>> 0, Math.floor(index / 4294967296) >>> 0, 0, 0, seed >>> 0, stream >>> 0);
}
const first = (): number => ((words[0] >>> 6) * 67108864 + (words[1] >>> 6) + 0.5) / 4503599627370496;
const second = (): number => ((words[2] >>> 6) * 67108864 + (words[3] >>> 6) + 0.5) / 4503599627370496;

/**
 * Number `index` (0 … 2⁵³) of a uniform stream, in the open interval (0, 1) with 52 random bits: never 0 or 1.
 * `seed` and `stream` are taken modulo 2³².
 */
export function uniform(seed: number, stream: number, index: number): number {
  block(seed, stream, Math.floor(index / 2));
  return index % 2 === 0 ? first() : second();
}

/**
 * Fills `out` with numbers `from` … of the Gaussian stream (mean 0, variance 1). `from` and the length must be even:
 * numbers 2j and 2j+1 are the pair of Box and Muller, Ann. Math. Statist. 29, 610 (1958), from block j.
 * Values beyond 8.6 cannot occur (52-bit uniforms).
 */
export function fillGaussian(seed: number, stream: number, out: Float64Array, from = 0): Float64Array {
  if (from % 2 !== 0 || out.length % 2 !== 0) throw new RangeError('Gaussian numbers are drawn in pairs');
  for (let i = 0; i < out.length; i += 2) {
    block(seed, stream, (from + i) / 2);
    const radius = Math.sqrt(-2 * log(first()));
    const turns = second();
    out[i] = radius * cosTurns(turns);
    out[i + 1] = radius * sinTurns(turns);
  }
  return out;
}
