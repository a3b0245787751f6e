import type { SectionRows } from './sections-filter';

/** a + b1 + c without losing the digits that remain when b1 ≈ −2a: halves of b1 are exact. */
const atZero = (a: number, b: number, c: number): number => a + b / 2 + (c + b / 2);

/** e^{iω}(c0 + c1 e^{−iω} + c2 e^{−2iω}) from sin and cos: the common phase of numerator and denominator cancels. */
function polynomial(
  c0: number,
  c1: number,
  c2: number,
  sine: number,
  sineOfHalf: number,
): readonly [re: number, im: number] {
  return [atZero(c0, c1, c2) - 2 * (c0 + c2) * sineOfHalf * sineOfHalf, (c0 - c2) * sine];
}

/**
 * Complex response of a cascade of second-order sections: the gain and phase of a causal pass.
 *
 * @param rows Rows b0, b1, b2, a0, a1, a2.
 * @param frequency In Hz, of any length, from 0 to half the rate.
 * @param rate Samples per second.
 * @returns Real and imaginary part at each frequency, no unit.
 *
 * Evaluated about zero frequency, so a low edge at a high rate keeps the digits its coefficients have. Source: the
 * definition of the transfer function, H = Π B(e^{iω})/A(e^{iω}).
 *
 * @example sectionsResponse([notch(60, 30, 4096)], Float64Array.of(60), 4096) // both parts 0 within 1e-13
 */
export function sectionsResponse(
  rows: SectionRows,
  frequency: Float64Array,
  rate: number,
): { re: Float64Array; im: Float64Array } {
  const re = new Float64Array(frequency.length);
  const im = new Float64Array(frequency.length);
  frequency.forEach((f, i) => {
    const sine = Math.sin((2 * Math.PI * f) / rate);
    const sineOfHalf = Math.sin((Math.PI * f) / rate);
    let x = 1;
    let y = 0;
    for (const row of rows) {
      const [bRe, bIm] = polynomial(row[0], row[1], row[2], sine, sineOfHalf);
      const [aRe, aIm] = polynomial(row[3], row[4], row[5], sine, sineOfHalf);
      const square = aRe * aRe + aIm * aIm;
      const hRe = (bRe * aRe + bIm * aIm) / square;
      const hIm = (bIm * aRe - bRe * aIm) / square;
      [x, y] = [x * hRe - y * hIm, x * hIm + y * hRe];
    }
    re[i] = x;
    im[i] = y;
  });
  return { re, im };
}

/** |H| of a causal pass at each frequency in Hz. */
export function sectionsGain(rows: SectionRows, frequency: Float64Array, rate: number): Float64Array {
  const { re, im } = sectionsResponse(rows, frequency, rate);
  return re.map((v, i) => Math.hypot(v, im[i]));
}

/**
 * Effective gain of filtering forwards and backwards, |H|², without phase: the order is doubled, and a Butterworth edge
 * lies at −6.02 dB (0.5) instead of −3.01 dB (0.71).
 */
export function zeroPhaseGain(rows: SectionRows, frequency: Float64Array, rate: number): Float64Array {
  const { re, im } = sectionsResponse(rows, frequency, rate);
  return re.map((v, i) => v * v + im[i] * im[i]);
}

/**
 * Group delay −dφ/dω of a causal pass in seconds at each frequency in Hz. A zero exactly on the frequency, where phase
 * jumps, counts as no delay.
 *
 * @example groupDelay([[0, 1, 0, 1, 0, 0]], Float64Array.of(10), 100) // 0.01: one sample
 */
export function groupDelay(rows: SectionRows, frequency: Float64Array, rate: number): Float64Array {
  return frequency.map((f) => {
    const sine = Math.sin((2 * Math.PI * f) / rate);
    const cosine = Math.cos((2 * Math.PI * f) / rate);
    const sineOfHalf = Math.sin((Math.PI * f) / rate);
    // Im(P'/P) for P as in `polynomial`, P' = dP/dω.
    const turn = (c0: number, c1: number, c2: number): number => {
      const [re, im] = polynomial(c0, c1, c2, sine, sineOfHalf);
      const square = re * re + im * im;
      return square === 0 ? 0 : (re * (c0 - c2) * cosine + im * (c0 + c2) * sine) / square;
    };
    let samples = 0;
    for (const row of rows) samples += turn(row[3], row[4], row[5]) - turn(row[0], row[1], row[2]);
    return samples / rate;
  });
}
