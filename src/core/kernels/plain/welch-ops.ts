import type { ComplexArray, KernelArray } from '../complex-arrays';

type Doubles = KernelArray<'f64'>;
type Complex = ComplexArray<'f64'>;

export function taper(x: Doubles, weights: Doubles, centred: boolean, out: Doubles): number {
  const [a, w, o] = [x.view(), weights.view(), out.view()];
  const n = x.length;
  let sum = 0;
  for (let k = 0; k < n; k++) sum += a[k];
  const mean = centred ? sum / n : 0;
  for (let k = 0; k < n; k++) o[k] = (a[k] - mean) * w[k];
  return sum;
}

/** out = |x|², or out += |x|². */
export function power(x: Complex, out: Doubles, add: boolean): void {
  const [r, i, o] = [x.re.view(), x.im.view(), out.view()];
  for (let k = 0; k < x.length; k++) {
    const v = r[k] * r[k] + i[k] * i[k];
    o[k] = add ? o[k] + v : v;
  }
}

export function addCross(a: Complex, b: Complex, out: Complex): void {
  const [ar, ai, br, bi] = [a.re.view(), a.im.view(), b.re.view(), b.im.view()];
  const [or, oi] = [out.re.view(), out.im.view()];
  for (let k = 0; k < a.length; k++) {
    or[k] += ar[k] * br[k] + ai[k] * bi[k];
    oi[k] += ai[k] * br[k] - ar[k] * bi[k];
  }
}

/** Running mean and sum of squared deviations (Welford, Technometrics 4, 419, 1962). */
export function addMagnitude(x: Complex, count: number, mean: Doubles, spread: Doubles): void {
  const [r, i, m, s] = [x.re.view(), x.im.view(), mean.view(), spread.view()];
  for (let k = 0; k < x.length; k++) {
    const v = Math.sqrt(r[k] * r[k] + i[k] * i[k]);
    const d = v - m[k];
    const after = m[k] + d / count;
    m[k] = after;
    s[k] += d * (v - after);
  }
}

export function medians(rows: Doubles, stride: number, count: number, out: Doubles): void {
  const [p, o] = [rows.view(), out.view()];
  const column = new Float64Array(count);
  const half = count >> 1;
  for (let k = 0; k < out.length; k++) {
    for (let s = 0; s < count; s++) column[s] = p[s * stride + k]!;
    column.sort(); // typed arrays sort by value, NaN last
    o[k] = count & 1 ? column[half] : 0.5 * (column[half - 1] + column[half]);
  }
}
