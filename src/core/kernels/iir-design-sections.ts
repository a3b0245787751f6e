import { modulus, subtract, type Complex } from './iir-design-complex';
import { complex } from './iir-design-complex';
import type { ZerosPoles } from './iir-prototype';

/**
 * One second-order section (b0 + b1 z⁻¹ + b2 z⁻²)/(1 + a1 z⁻¹ + a2 z⁻²) as a row b0, b1, b2, 1, a1, a2, the order SciPy
 * uses. A filter is a list of rows, applied first to last.
 */
export type Section = readonly [b0: number, b1: number, b2: number, a0: number, a1: number, a2: number];

/** Real roots and one of each conjugate pair, by real part; parts below rounding count as real. */
function halves(roots: readonly Complex[]): Complex[] {
  const isReal = (r: Complex): boolean => Math.abs(r.im) <= 100 * Number.EPSILON * modulus(r);
  const byPart = (a: Complex, b: Complex): number => a.re - b.re || a.im - b.im;
  const pairs = roots.filter((r) => !isReal(r) && r.im > 0).sort(byPart);
  const reals = roots.filter(isReal).sort(byPart);
  return [...pairs, ...reals.map((r) => complex(r.re))];
}

/** Removes and returns the element with the smallest cost among those allowed. */
function take(
  from: Complex[],
  cost: (r: Complex) => number,
  allowed: (r: Complex) => boolean = () => true,
): Complex {
  let best = -1;
  from.forEach((r, i) => {
    if (allowed(r) && (best < 0 || cost(r) < cost(from[best]))) best = i;
  });
  return from.splice(best, 1)[0];
}

/** Coefficients of z² + c1 z + c2 with a conjugate pair or two real roots. */
const quadratic = (r: Complex, other: Complex | undefined): readonly [number, number] =>
  other === undefined ? [-2 * r.re, r.re * r.re + r.im * r.im] : [-(r.re + other.re), r.re * other.re];

const real = (r: Complex): boolean => r.im === 0;

/**
 * Second-order sections of a digital filter with as many zeros as poles. The pole nearest the unit circle is taken
 * first, with the zero nearest to it, and goes last; so no section has a high gain, and no earlier one overflows what a
 * later one cuts. The overall gain is in the first row. Same pairing as scipy.signal.zpk2sos with 'nearest'.
 */
export function toSections(h: ZerosPoles): Section[] {
  const odd = h.poles.length % 2 === 1 ? [complex(0)] : [];
  const poles = halves([...h.poles, ...odd]);
  const zeros = halves([...h.zeros, ...odd]);
  const fromCircle = (r: Complex): number => Math.abs(1 - modulus(r));
  const rows: Section[] = [];
  while (poles.length > 0) {
    const pole = take(poles, fromCircle);
    const partner = real(pole) ? take(poles, fromCircle, real) : undefined;
    const near = (r: Complex): number => modulus(subtract(r, pole));
    const zero = take(zeros, near);
    const second = real(zero) ? take(zeros, near, real) : undefined;
    const [b1, b2] = quadratic(zero, second);
    const [a1, a2] = quadratic(pole, partner);
    const g = poles.length === 0 ? h.gain : 1;
    rows.unshift([g, g * b1, g * b2, 1, a1, a2]);
  }
  return rows;
}
