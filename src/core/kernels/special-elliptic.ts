/**
 * Arithmetic–geometric mean of 1 and b, 0 ≤ b ≤ 1; 0 for b = 0. Converges quadratically, to full precision.
 *
 * @example arithmeticGeometricMean(Math.SQRT1_2) // 0.8472130847939792
 */
function arithmeticGeometricMean(b: number): number {
  if (b === 0) return 0;
  let a = 1;
  while (Math.abs(a - b) > 1e-15 * a) [a, b] = [(a + b) / 2, Math.sqrt(a * b)];
  return (a + b) / 2;
}

/**
 * Complete elliptic integral of the first kind, K(m) = ∫₀^{π/2} dθ / √(1 − m sin²θ).
 *
 * @param m Parameter m = k², 0 ≤ m ≤ 1.
 * @param complement 1 − m, where it is known more exactly than that difference.
 * @returns K, relative error below 1e-15 × a few; Infinity at m = 1.
 *
 * Source: Abramowitz & Stegun 17.6 (MEMORY).
 *
 * @example ellipticK(0.5) // 1.8540746773013719
 */
export function ellipticK(m: number, complement: number = 1 - m): number {
  return Math.PI / 2 / arithmeticGeometricMean(Math.sqrt(complement));
}

/**
 * Incomplete elliptic integral of the first kind F(φ | m) for 0 ≤ φ ≤ π/2, given sin φ, cos φ and 1 − m; so it keeps its
 * digits where φ is near π/2 and m near 1.
 *
 * F = s R_F(c², 1 − m s², 1), and R_F by duplication: Carlson, Numer. Math. 33, 1 (1979) (MEMORY).
 *
 * @example ellipticF(Math.sin(1), Math.cos(1), 0.5) // 1.0832167728451690
 */
export function ellipticF(sine: number, cosine: number, complement: number): number {
  let x = cosine * cosine;
  let y = x + complement * sine * sine;
  let z = 1;
  for (;;) {
    const mean = (x + y + z) / 3;
    const [dx, dy, dz] = [1 - x / mean, 1 - y / mean, 1 - z / mean];
    // Next neglected term of the series below is of sixth order.
    if (Math.max(Math.abs(dx), Math.abs(dy), Math.abs(dz)) < 0.002) {
      const e2 = dx * dy - dz * dz;
      const e3 = dx * dy * dz;
      return (sine * (1 - e2 / 10 + e3 / 14 + (e2 * e2) / 24 - (3 * e2 * e3) / 44)) / Math.sqrt(mean);
    }
    const [a, b, c] = [Math.sqrt(x), Math.sqrt(y), Math.sqrt(z)];
    const step = a * b + b * c + c * a;
    x = (x + step) / 4;
    y = (y + step) / 4;
    z = (z + step) / 4;
  }
}

/** Jacobi elliptic functions of one argument. */
export interface Jacobi {
  readonly sn: number;
  readonly cn: number;
  readonly dn: number;
}

/**
 * Jacobi elliptic functions sn(u | m), cn(u | m), dn(u | m), 0 ≤ m ≤ 1, any real u; absolute error about 1e-15 for u
 * within one period.
 *
 * Descending Landen transformation, Abramowitz & Stegun 16.4 (MEMORY).
 *
 * @param complement 1 − m, where it is known more exactly than that difference.
 * @example jacobi(0.5, 0.5).sn // 0.47075047365565735
 */
export function jacobi(u: number, m: number, complement: number = 1 - m): Jacobi {
  if (complement === 0) {
    const cn = 1 / Math.cosh(u);
    return { sn: Math.tanh(u), cn, dn: cn };
  }
  let a = 1;
  let b = Math.sqrt(complement);
  let c = Math.sqrt(m);
  const ratios: number[] = [];
  while (c > 1e-16 * a) {
    [a, b, c] = [(a + b) / 2, Math.sqrt(a * b), (a - b) / 2];
    ratios.push(c / a);
  }
  let phi = 2 ** ratios.length * a * u;
  for (const ratio of ratios.reverse()) phi = (phi + Math.asin(ratio * Math.sin(phi))) / 2;
  const sn = Math.sin(phi);
  const cn = Math.cos(phi);
  return { sn, cn, dn: Math.sqrt(complement + m * cn * cn) };
}
