import type { ChirpMetric } from './bank-metric';

export interface ChirpBox {
  readonly tau0: readonly [from: number, to: number];
  readonly tau3: readonly [from: number, to: number];
}

/**
 * Hexagonal lattice (A₂*, the thinnest covering of the plane; Conway & Sloane, Sphere Packings, Lattices and Groups, MEMORY)
 * whose discs of mismatch 1 − `minimalMatch` cover a box of chirp times, edges included. Points may lie outside the box.
 *
 * @param metric positive definite, 1/s²
 * @returns [τ₀, τ₃] in s
 */
export function coveringLattice(
  metric: ChirpMetric,
  minimalMatch: number,
  box: ChirpBox,
): [tau0: number, tau3: number][] {
  const [a, b, c] = metric;
  const radius = Math.sqrt(1 - minimalMatch);
  // u = √a (τ₀ + (b/a) τ₃), v = √(c − b²/a) τ₃: mismatch is the squared distance.
  const scaleU = Math.sqrt(a);
  const scaleV = Math.sqrt(c - (b * b) / a);
  if (!(radius > 0) || !(scaleU > 0) || !(scaleV > 0))
    throw new RangeError('the metric must be positive definite and the minimal match below 1');
  const side = Math.sqrt(3) * radius;
  const rise = 1.5 * radius;
  const out: [number, number][] = [];
  const [first, last] = box.tau3.map((t) => t * scaleV);
  for (let row = Math.floor((first - radius) / rise); row * rise <= last + radius; row++) {
    const v = row * rise;
    // Rows are cut where the box, slanted in u, comes within reach of them.
    const near = [Math.max(first, v - radius), Math.min(last, v + radius)];
    if (near[0] > near[1]) continue;
    const shifts = near.map((y) => (b / a) * (y / scaleV) * scaleU);
    const from = box.tau0[0] * scaleU + Math.min(...shifts) - radius;
    const to = box.tau0[1] * scaleU + Math.max(...shifts) + radius;
    const offset = row % 2 === 0 ? 0 : side / 2;
    for (let k = Math.ceil((from - offset) / side); k * side + offset <= to; k++) {
      const tau3 = v / scaleV;
      out.push([(k * side + offset) / scaleU - (b / a) * tau3, tau3]);
    }
  }
  return out;
}

/** Templates an area of chirp times needs, edges left out: area √det g / [(3√3/2)(1 − minimal match)]. */
export const metricCount = ([a, b, c]: ChirpMetric, minimalMatch: number, area: number): number =>
  (area * Math.sqrt(a * c - b * b)) / (1.5 * Math.sqrt(3) * (1 - minimalMatch));
