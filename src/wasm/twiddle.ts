// exp(-2 pi i k / n), accurate to about one unit in the last place: the angle is first folded into [0, pi/4], where
// its rounding error is smallest, and the quarter turns are exact.

export let turnRe: f64 = 1;
export let turnIm: f64 = 0;

/** Sets turnRe, turnIm to exp(-2 pi i k / n); any k >= 0, n >= 1. */
export function turn(k: u64, n: u64): void {
  k %= n;
  // Octant and position in it, in integers: 8 k = octant n + rest.
  const octant = <i32>((8 * k) / n);
  const odd = octant & 1;
  // Distance from the nearest multiple of a quarter turn, in units of 1 / (4 n) of a turn.
  const quarter = (octant + 1) >> 1;
  const d = odd ? <u64>quarter * n - 4 * k : 4 * k - <u64>quarter * n;
  const a = (0.5 * Math.PI * <f64>d) / <f64>n;
  const c = Math.cos(a);
  let s = Math.sin(a);
  if (odd) s = -s; // angle = quarter turn - a
  if ((quarter & 3) == 0) {
    turnRe = c;
    turnIm = -s;
  } else if ((quarter & 3) == 1) {
    turnRe = -s;
    turnIm = -c;
  } else if ((quarter & 3) == 2) {
    turnRe = -c;
    turnIm = s;
  } else {
    turnRe = s;
    turnIm = c;
  }
}

/** Stores exp(-2 pi i k / n) as (re, im). */
export function putTurn<T>(at: usize, k: u64, n: u64): void {
  turn(k, n);
  store<T>(at, <T>turnRe);
  store<T>(at + sizeof<T>(), <T>turnIm);
}

/** Table of one pass: per p, for k = 1 .. radix - 1, exp(-2 pi i p k / n). */
export function fillPass<T>(at: usize, n: i32, radix: i32): void {
  for (let p = 0; p < n / radix; p++) {
    for (let k = 1; k < radix; k++) {
      putTurn<T>(at, <u64>k * <u64>p, n);
      at += 2 * sizeof<T>();
    }
  }
}
