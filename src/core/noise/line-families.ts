import { incompleteGamma } from '../kernels/special-incomplete-gamma';

export interface FamilyMember {
  readonly line: number;
  readonly harmonic: number;
}

export interface Family {
  /** Hz */
  readonly fundamental: number;
  readonly members: readonly FamilyMember[];
  /** Probability that unrelated lines make one such family or a better one, all fundamentals tried. */
  readonly chance: number;
}

interface Placed {
  readonly frequency: number;
  readonly frequencyError: number;
}

/** Families less surprising than this are not reported. */
const CHANCE = 0.01;
/** Relative uncertainty of a mains frequency: grids are kept within about 0.1 % (common practice, no source). */
const MAINS_TOLERANCE = 0.001;
/** Farther harmonics than this match by chance alone. */
const MOST = 60;

/**
 * Groups lines whose frequencies are multiples of a common fundamental: a mains frequency, or one of the lines. A line
 * counts as the k-th multiple when it is within three standard errors (at least half a bin); an unrelated line falls there
 * with probability 2 · tolerance/fundamental. With λ the sum of these over the other lines, n matches or more come by chance
 * with probability P(n, λ) (Poisson), times the number of fundamentals tried. The least likely family is taken first and its
 * lines no longer enter. Only lines up to the highest multiple that is taken count, and each match is tried as the highest, which
 * enters the number of trials. At least two lines of mains, three of anything else.
 */
export function findFamilies(lines: readonly Placed[], mains: readonly number[], df: number): Family[] {
  const left = new Set(lines.keys());
  const out: Family[] = [];
  const tried = lines.length + mains.length;
  for (;;) {
    let best: Family | undefined;
    for (const f0 of mains) best = better(best, family(lines, left, f0, MAINS_TOLERANCE * f0, df, -1, tried));
    for (const i of left) {
      const { frequency, frequencyError } = lines[i];
      best = better(best, family(lines, left, frequency, 3 * frequencyError, df, i, tried));
    }
    if (!best || best.chance > CHANCE) return out.sort((a, b) => a.fundamental - b.fundamental);
    for (const m of best.members) left.delete(m.line);
    out.push(best);
  }
}

const better = (a: Family | undefined, b: Family | undefined): Family | undefined =>
  a === undefined || (b !== undefined && b.chance < a.chance) ? b : a;

function family(
  lines: readonly Placed[],
  left: ReadonlySet<number>,
  f0: number,
  error: number,
  df: number,
  self: number,
  tried: number,
): Family | undefined {
  const chances: {
    readonly harmonic: number;
    readonly chance: number;
    readonly line: number;
    readonly match: boolean;
  }[] = [];
  for (const i of left) {
    const { frequency, frequencyError } = lines[i];
    const k = Math.round(frequency / f0);
    if (i === self || k < (self < 0 ? 1 : 2) || k > MOST) continue;
    const tolerance = Math.max(df / 2, 3 * frequencyError) + k * error;
    const match = Math.abs(frequency - k * f0) <= tolerance;
    chances.push({ harmonic: k, chance: Math.min(1, (2 * tolerance) / f0), line: i, match });
  }
  const matched = chances.filter((c) => c.match).sort((a, b) => a.harmonic - b.harmonic);
  let [chance, count] = [1, 0];
  for (let n = 2; n <= matched.length; n++) {
    const highest = matched[n - 1].harmonic;
    const expected = chances.reduce((s, c) => s + (c.harmonic <= highest ? c.chance : 0), 0);
    const p = tried * (matched.length - 1) * incompleteGamma(n, expected).lower;
    if (p <= chance) [chance, count] = [p, n];
  }
  if (count === 0) return undefined;
  const members: FamilyMember[] = [
    ...(self < 0 ? [] : [{ line: self, harmonic: 1 }]),
    ...matched.slice(0, count),
  ].map(({ line, harmonic }) => ({ line, harmonic }));
  // Weighted least squares of frequency = k · fundamental.
  let [top, bottom] = [0, 0];
  for (const { line, harmonic } of members) {
    const w = 1 / Math.max(lines[line].frequencyError, df / 100) ** 2;
    top += w * harmonic * lines[line].frequency;
    bottom += w * harmonic * harmonic;
  }
  return { fundamental: top / bottom, members, chance };
}
