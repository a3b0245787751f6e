import { findPeaks, type Peak } from './line-peaks';
import { localFloor } from './line-floor';

/** Rounds of finding lines and taking the floor without them. */
const ROUNDS = 3;

export interface LineSearch {
  readonly peaks: readonly Peak[];
  readonly floor: Float64Array;
  /** Part of the searched bins that lines take. */
  readonly taken: number;
}

/**
 * Finds lines, takes the floor without them, and finds again.
 *
 * @param usable bins `[from, to)` that detrending and the Nyquist frequency do not change
 * @param searched bins `[from, to)` in which lines are looked for
 */
export function searchLines(
  density: Float64Array,
  usable: readonly [number, number],
  searched: readonly [number, number],
  half: number,
  lawMedian: number,
  threshold: number,
  reach: number,
): LineSearch {
  const masked = new Uint8Array(density.length);
  let floor = localFloor(density, ...usable, half, lawMedian, masked);
  let peaks: Peak[] = [];
  for (let round = 0; ; round++) {
    peaks = findPeaks({ density, floor, threshold, from: searched[0], to: searched[1], reach, half });
    if (round === ROUNDS - 1 || peaks.length === 0) break;
    masked.fill(0);
    for (const p of peaks) masked.fill(1, Math.max(0, p.from - reach), p.to + reach);
    floor = localFloor(density, ...usable, half, lawMedian, masked);
  }
  let taken = 0;
  for (const p of peaks) taken += p.to - p.from;
  return { peaks, floor, taken: taken / Math.max(1, searched[1] - searched[0]) };
}
