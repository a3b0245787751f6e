import { median } from './spectrum-facts';

/** A run of bins `[from, to)` that stand above the threshold, and the highest of them. */
export interface Peak {
  readonly from: number;
  readonly to: number;
  readonly at: number;
}

export interface PeakSearch {
  readonly density: Float64Array;
  readonly floor: Float64Array;
  /** Factor on the floor that a bin must exceed. */
  readonly threshold: number;
  /** Bins `[from, to)` that are searched. */
  readonly from: number;
  readonly to: number;
  /** Bins at most this far apart belong to one feature: the window's main lobe. */
  readonly reach: number;
  /** Bins on each side over which the floor is taken. */
  readonly half: number;
}

/**
 * Features above the threshold, by frequency. Runs are joined across gaps of the window's reach; a run is cut at a valley
 * from which both peaks rise by the threshold squared, which noise on a single broad peak does not reach. Near a stronger
 * feature, whose flank lifts the floor of one side, a feature must also stand above the bins right around it.
 */
export function findPeaks(s: PeakSearch): Peak[] {
  const { density, floor, threshold, reach } = s;
  const runs: [number, number][] = [];
  for (let k = s.from; k < s.to; k++) {
    if (!(density[k] > threshold * floor[k])) continue;
    const last = runs.at(-1);
    if (last && k - last[1] < reach) last[1] = k + 1;
    else runs.push([k, k + 1]);
  }
  const peaks = runs.flatMap(([from, to]) => split(density, from, to, threshold ** 2, reach));
  const loudest = [...peaks].sort((a, b) => density[b.at] - density[a.at]);
  const kept: Peak[] = [];
  for (const p of loudest) {
    const near = kept.some((q) => Math.abs(q.at - p.at) < 2 * s.half && density[q.at] > 4 * density[p.at]);
    if (!near || density[p.at] > threshold * around(density, p.at, reach)) kept.push(p);
  }
  return kept.sort((a, b) => a.at - b.at);
}

function split(density: Float64Array, from: number, to: number, rise: number, reach: number): Peak[] {
  let at = from;
  for (let k = from; k < to; k++) if (density[k] > density[at]) at = k;
  for (const side of [-1, 1]) {
    // Walk off the peak: the lowest bin so far is the valley; a later bin that rises from it is a peak of its own.
    let valley = at;
    for (let k = at; k >= from && k < to; k += side) {
      if (density[k] < density[valley]) valley = k;
      if (Math.abs(k - at) <= 2 * reach || density[k] < rise * density[valley]) continue;
      const cut = side > 0 ? valley : valley + 1;
      return [...split(density, from, cut, rise, reach), ...split(density, cut, to, rise, reach)];
    }
  }
  return [{ from, to, at }];
}

/** Median of the 12 bins on each side, without those of the feature itself. */
function around(density: Float64Array, at: number, reach: number): number {
  const [near, far] = [reach + 1, reach + 13];
  const left = density.slice(Math.max(0, at - far), Math.max(0, at - near));
  const right = density.slice(at + near, at + far);
  return Math.max(median(left), median(right)) || 0;
}
