import { median } from './spectrum-facts';

/** Fewest bins on each side of one whose floor is taken. */
export const LEAST_SIDE = 12;

/**
 * Local floor: running median of the density over `half` bins on each side, divided by the median of the law of one bin.
 * Towards the ends the window shrinks and stays symmetric, so that a density that only rises or falls has no bias; bins with
 * fewer than 12 on a side have no floor (NaN). Bins in `masked` (lines found before) do not enter.
 *
 * @param from, to usable bins `[from, to)`
 */
export function localFloor(
  density: Float64Array,
  from: number,
  to: number,
  half: number,
  lawMedian: number,
  masked: Uint8Array,
): Float64Array {
  const floor = new Float64Array(density.length).fill(NaN);
  const clean = density.map((v, k) => (masked[k] === 1 ? NaN : v));
  for (let k = from + LEAST_SIDE; k < to - LEAST_SIDE; k++) {
    const side = Math.min(half, k - from, to - 1 - k);
    const inside = clean.subarray(k - side, k + side + 1);
    let free = 0;
    for (const v of inside) if (!Number.isNaN(v)) free++;
    // Where lines fill more than half of the window, they are part of the floor.
    const whole = 2 * free < inside.length ? density.subarray(k - side, k + side + 1) : inside;
    floor[k] = median(whole) / lawMedian;
  }
  return floor;
}
