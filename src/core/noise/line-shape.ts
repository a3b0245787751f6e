import type { Peak } from './line-peaks';

export interface LineShape {
  /** Hz */
  readonly frequency: number;
  readonly frequencyError: number;
  readonly width: number;
  readonly unresolved: boolean;
  readonly height: number;
  readonly power: number;
}

export interface ShapeInput {
  readonly density: Float64Array;
  readonly floor: Float64Array;
  /** Hz */
  readonly df: number;
  /** Standard deviation of one bin over its mean. */
  readonly relativeError: number;
  /** Full width of the window's main lobe at half power, in bins. */
  readonly lobe: number;
  /** 1 + 2 Σ of the correlations of neighbouring bins. */
  readonly neighbours: number;
}

/** A line whose own width is below this part of the window's is not resolved. */
const RESOLVED = 0.5;
/** Widths on each side over which the power is summed. */
const SUMMED = 3;

/**
 * Frequency, width, height and power of a feature.
 *
 * Width: full width of the excess over the floor at half its height, crossings interpolated in the logarithm, freed of the
 * window's by Olivero & Longbothum, JQSRT 17, 233 (1977) (MEMORY), which takes the window as Gaussian and the line as
 * Lorentzian. Below half of the window's width only that half is stated, as an upper limit.
 *
 * Frequency, unresolved: vertex of the parabola through the logarithms of the three highest bins. Resolved: centroid of
 * the excess within one width of itself. Errors follow from those of the bins; that of a steady line of density P over a
 * floor S is √(2 S/P) of the floor's (the cross term of line and noise).
 */
export function lineShape(s: ShapeInput, { at }: Peak, low: number, high: number): LineShape {
  const { density, floor, df, lobe } = s;
  const base = floor[at];
  const excess = (k: number): number => density[k] - base;
  const top = excess(at);
  const seen = edge(excess, at, top / 2, 1, high) + edge(excess, at, top / 2, -1, low);
  const own = lorentzian(seen, lobe);
  const unresolved = own < RESOLVED * lobe;
  const width = unresolved ? RESOLVED * lobe : own;
  const [bin, error] = unresolved ? vertex(s, at) : centroid(s, at, Math.max(2, seen), low, high);
  const reach = Math.max(4, Math.ceil(SUMMED * seen));
  let power = 0;
  for (let k = Math.max(low, at - reach); k < Math.min(high, at + reach + 1); k++)
    power += (density[k] - (Number.isNaN(floor[k]) ? base : floor[k])) * df;
  return {
    frequency: bin * df,
    frequencyError: error * df,
    width: width * df,
    unresolved,
    height: density[at] / base,
    power: Math.max(0, power),
  };
}

/** Bins from the peak to where the excess has fallen to `half`. */
function edge(excess: (k: number) => number, at: number, half: number, side: 1 | -1, end: number): number {
  for (let d = 1; ; d++) {
    const k = at + side * d;
    if (side > 0 ? k >= end : k < end) return d;
    const [a, b] = [excess(k - side), excess(k)];
    if (b > half) continue;
    const floor = half * 1e-3;
    return d - 1 + Math.log(a / half) / Math.log(a / Math.max(b, floor));
  }
}

/** Width of the Lorentzian that, seen through a Gaussian of width `g`, has the width `seen`; same unit. 0 when narrower. */
export function lorentzian(seen: number, g: number): number {
  if (seen <= g) return 0;
  const [a, b] = [0.5346, 0.2166];
  const c = a * a - b;
  return (a * seen - Math.sqrt(a * a * seen * seen - c * (seen * seen - g * g))) / c;
}

function vertex({ density, floor, relativeError }: ShapeInput, at: number): [number, number] {
  const y = [at - 1, at, at + 1].map((k) => Math.log(Math.max(density[k], Number.MIN_VALUE)));
  const bend = 2 * y[1] - y[0] - y[2];
  if (!(bend > 0)) return [at, 0.5];
  const offset = (y[2] - y[0]) / (2 * bend);
  // ∂offset/∂y for each of the three, bins taken as independent.
  const slopes = [(-0.5 + offset) / bend, (-2 * offset) / bend, (0.5 + offset) / bend];
  let variance = 0;
  [at - 1, at, at + 1].forEach((k, i) => {
    const e = relativeError * Math.min(1, Math.sqrt((2 * floor[at]) / density[k]));
    variance += (slopes[i] * e) ** 2;
  });
  return [at + Math.max(-0.5, Math.min(0.5, offset)), Math.min(0.5, Math.sqrt(variance))];
}

function centroid(s: ShapeInput, at: number, half: number, low: number, high: number): [number, number] {
  let centre = at;
  let error = 0.5;
  for (let round = 0; round < 6; round++) {
    const from = Math.max(low, Math.ceil(centre - half));
    const to = Math.min(high, Math.floor(centre + half) + 1);
    let [sum, first, square] = [0, 0, 0];
    for (let k = from; k < to; k++) {
      const e = s.density[k] - s.floor[at];
      sum += e;
      first += e * (k - at);
    }
    const next = at + first / sum;
    for (let k = from; k < to; k++) square += ((k - next) * s.density[k]) ** 2;
    error = (s.relativeError * Math.sqrt(square * s.neighbours)) / sum;
    if (!(Math.abs(next - at) <= half)) return [at, half];
    centre = next;
  }
  return [centre, error];
}
