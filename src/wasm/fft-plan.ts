// The header of a plan and what the kinds of transforms share.
//
//   word 0 length, 1 kind, 2 number of passes, 3 padded length (chirp), 4 tables, 5 chirp spectrum, 6 inner plan;
//   from byte 32: per pass its radix and the address of its twiddles.
import { bytes, lanes } from './lanes';

export const HEADER: usize = 320;
export const KIND_ONE = 0; // length 1
export const KIND_VECTOR = 1; // 2^a 3^b 5^c with enough factors of two for vectors
export const KIND_SCALAR = 2; // 2^a 3^b 5^c otherwise
export const KIND_CHIRP = 3; // any other length, as a convolution

// @ts-ignore: decorator
@inline
export function aligned(at: usize): usize {
  return (at + 63) & ~63;
}

/**
 * Bytes from the real parts of n numbers to their imaginary parts in scratch and tables. Rows of a page or more are
 * half a page apart modulo the page: streams at the same offset in a page would fight for the same cache sets.
 */
export function rowBytes<T>(n: i32): usize {
  const all = aligned(bytes<T>(n)) + 64;
  return all < 4096 ? all : ((all + 4095) & ~4095) + 2048 + 64;
}

export function smooth(n: i32): bool {
  while (n % 2 == 0) n /= 2;
  while (n % 3 == 0) n /= 3;
  while (n % 5 == 0) n /= 5;
  return n == 1;
}

export function kindOf<T>(n: i32): i32 {
  if (n == 1) return KIND_ONE;
  if (!smooth(n)) return KIND_CHIRP;
  return n % (4 * lanes<T>()) == 0 ? KIND_VECTOR : KIND_SCALAR;
}
