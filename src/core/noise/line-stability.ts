import type { NoiseLine } from '../data/kinds';
import { incompleteGamma } from '../kernels/special-incomplete-gamma';
import type { LineShape } from './line-shape';

/** Probability that any one steady line is called drifting. */
const CHANCE = 0.01;

export interface Stability {
  readonly stability: NoiseLine['stability'];
  /** Largest less smallest frequency of the parts, Hz, and largest over smallest height. */
  readonly wander: number;
  readonly heights: number;
}

/**
 * Whether the same line in parts of the time has the same frequency and peak density: χ² of either about the weighted mean
 * with one degree of freedom per part less one; drifting when either has a probability below 1 % over twice the number of
 * lines, and the frequency moves by more than a tenth of a bin or the density by more than a quarter.
 *
 * @param parts shape of the line in each part, `peak` its density there
 */
export function lineStability(
  parts: readonly { readonly shape: LineShape; readonly peak: number }[],
  relativeError: number,
  df: number,
  lines: number,
): Stability {
  if (parts.length < 2) return { stability: 'not tested', wander: NaN, heights: NaN };
  const limit = CHANCE / (2 * lines);
  const frequency = parts.map((p) => p.shape.frequency);
  const height = parts.map((p) => Math.log(p.peak));
  const wander = Math.max(...frequency) - Math.min(...frequency);
  const heights = Math.exp(Math.max(...height) - Math.min(...height));
  const moved = excess(
    frequency,
    parts.map((p) => Math.hypot(p.shape.frequencyError, 0.01 * df)),
  );
  const changed = excess(
    height,
    parts.map(({ shape }) =>
      shape.unresolved ? relativeError * Math.min(1, Math.sqrt(2 / shape.height)) : relativeError,
    ),
  );
  const drifting = (moved < limit && wander > 0.1 * df) || (changed < limit && heights > 1.25);
  return { stability: drifting ? 'drifting' : 'stable', wander, heights };
}

function excess(values: readonly number[], errors: readonly number[]): number {
  let [w, sum] = [0, 0];
  values.forEach((v, i) => {
    w += errors[i] ** -2;
    sum += v / errors[i] ** 2;
  });
  const chi2 = values.reduce((c, v, i) => c + ((v - sum / w) / errors[i]) ** 2, 0);
  // A part in which the line has no height to speak of says nothing about it.
  return Number.isFinite(chi2) ? incompleteGamma((values.length - 1) / 2, chi2 / 2).upper : 1;
}
