import {
  add,
  complex,
  divide,
  product,
  scale,
  squareRoot,
  subtract,
  type Complex,
} from './iir-design-complex';
import { modulus, multiply } from './iir-design-complex';
import type { ZerosPoles } from './iir-prototype';

// Frequency transformations of an analog lowpass with edge 1 rad/s; `w` in rad/s. Source: Constantinides, Proc. IEE 117,
// 1585 (1970) (MEMORY).

const excessPoles = ({ zeros, poles }: ZerosPoles): number => poles.length - zeros.length;
const copies = (value: Complex, n: number): Complex[] => Array.from({ length: n }, () => value);
const negated = (values: readonly Complex[]): Complex[] => values.map((v) => scale(v, -1));

/** Lowpass with edge w. */
export function toLowpass(h: ZerosPoles, w: number): ZerosPoles {
  const move = (s: Complex): Complex => scale(s, w);
  return { zeros: h.zeros.map(move), poles: h.poles.map(move), gain: h.gain * w ** excessPoles(h) };
}

/** Highpass with edge w. */
export function toHighpass(h: ZerosPoles, w: number): ZerosPoles {
  const move = (s: Complex): Complex => divide(complex(w), s);
  return {
    zeros: [...h.zeros.map(move), ...copies(complex(0), excessPoles(h))],
    poles: h.poles.map(move),
    gain: h.gain * divide(product(negated(h.zeros)), product(negated(h.poles))).re,
  };
}

/** Both roots of s² − 2 half s + centre² = 0; the smaller from the product, so that wide bands lose no digits. */
function roots(half: Complex, centre: number): readonly [Complex, Complex] {
  const c = complex(centre);
  const root = squareRoot(multiply(subtract(half, c), add(half, c)));
  const plus = add(half, root);
  const minus = subtract(half, root);
  const square = complex(centre * centre);
  return modulus(plus) >= modulus(minus) ? [plus, divide(square, plus)] : [divide(square, minus), minus];
}

/** Bandpass from low to high; twice the order. */
export function toBandpass(h: ZerosPoles, low: number, high: number): ZerosPoles {
  const centre = Math.sqrt(low * high);
  const move = (s: Complex): readonly Complex[] => roots(scale(s, (high - low) / 2), centre);
  return {
    zeros: [...h.zeros.flatMap(move), ...copies(complex(0), excessPoles(h))],
    poles: h.poles.flatMap(move),
    gain: h.gain * (high - low) ** excessPoles(h),
  };
}

/** Bandstop from low to high; twice the order. */
export function toBandstop(h: ZerosPoles, low: number, high: number): ZerosPoles {
  const centre = Math.sqrt(low * high);
  const inverted = toHighpass(h, (high - low) / 2);
  const move = (s: Complex): readonly Complex[] => roots(s, centre);
  const finite = inverted.zeros.slice(0, h.zeros.length);
  return {
    zeros: [
      ...finite.flatMap(move),
      ...copies(complex(0, centre), excessPoles(h)),
      ...copies(complex(0, -centre), excessPoles(h)),
    ],
    poles: inverted.poles.flatMap(move),
    gain: inverted.gain,
  };
}

/** Analog to digital by z = (1 + s)/(1 − s): frequency f maps from ω = tan(π f/rate). */
export function bilinear(h: ZerosPoles): ZerosPoles {
  const one = complex(1);
  const move = (s: Complex): Complex => divide(add(one, s), subtract(one, s));
  const away = (list: readonly Complex[]): Complex => product(list.map((s) => subtract(one, s)));
  return {
    zeros: [...h.zeros.map(move), ...copies(complex(-1), excessPoles(h))],
    poles: h.poles.map(move),
    gain: h.gain * divide(away(h.zeros), away(h.poles)).re,
  };
}
