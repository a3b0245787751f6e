/** A complex number; filters have a few dozen of them, so clarity goes before speed. */
export interface Complex {
  readonly re: number;
  readonly im: number;
}

export const complex = (re: number, im = 0): Complex => ({ re, im });
export const add = (a: Complex, b: Complex): Complex => complex(a.re + b.re, a.im + b.im);
export const subtract = (a: Complex, b: Complex): Complex => complex(a.re - b.re, a.im - b.im);
export const scale = (a: Complex, factor: number): Complex => complex(a.re * factor, a.im * factor);
export const modulus = (a: Complex): number => Math.hypot(a.re, a.im);
export const multiply = (a: Complex, b: Complex): Complex =>
  complex(a.re * b.re - a.im * b.im, a.re * b.im + a.im * b.re);

export function divide(a: Complex, b: Complex): Complex {
  const square = b.re * b.re + b.im * b.im;
  return complex((a.re * b.re + a.im * b.im) / square, (a.im * b.re - a.re * b.im) / square);
}

/** Principal square root: real part ≥ 0; a negative real number gives a positive imaginary part. */
export function squareRoot(a: Complex): Complex {
  const r = modulus(a);
  if (r === 0) return a;
  // The larger part first; the other follows without cancellation.
  const large = Math.sqrt((r + Math.abs(a.re)) / 2);
  const small = Math.abs(a.im) / (2 * large);
  const sign = a.im < 0 ? -1 : 1;
  return a.re >= 0 ? complex(large, sign * small) : complex(small, sign * large);
}

export const product = (values: readonly Complex[]): Complex => values.reduce(multiply, complex(1));
