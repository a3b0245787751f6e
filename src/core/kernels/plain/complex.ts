import type { ComplexArray, KernelArray } from '../complex-arrays';

/** out = a b, or a conj(b). */
export function multiply(a: ComplexArray, b: ComplexArray, out: ComplexArray, conjugate: boolean): void {
  const [ar, ai, br, bi] = [a.re.view(), a.im.view(), b.re.view(), b.im.view()];
  const [or, oi] = [out.re.view(), out.im.view()];
  const sign = conjugate ? -1 : 1;
  for (let k = 0; k < a.length; k++) {
    const p = ar[k];
    const q = ai[k];
    const r = br[k];
    const s = sign * bi[k];
    or[k] = p * r - q * s;
    oi[k] = p * s + q * r;
  }
}

export function windowed(
  x: ComplexArray,
  weights: KernelArray | undefined,
  factor: number,
  out: ComplexArray,
): void {
  const [xr, xi, or, oi] = [x.re.view(), x.im.view(), out.re.view(), out.im.view()];
  const w = weights?.view();
  for (let k = 0; k < x.length; k++) {
    const c = w ? factor * w[k] : factor;
    or[k] = xr[k] * c;
    oi[k] = xi[k] * c;
  }
  or.fill(0, x.length);
  oi.fill(0, x.length);
}

export function energy(x: ComplexArray, out: KernelArray | undefined): { sum: number; max: number } {
  const [r, i] = [x.re.view(), x.im.view()];
  const o = out?.view();
  let sum = 0;
  let max = 0;
  for (let k = 0; k < x.length; k++) {
    const v = r[k] * r[k] + i[k] * i[k];
    if (o) o[k] = v;
    sum += v;
    if (v > max) max = v;
  }
  return { sum, max };
}

export function peak(x: ComplexArray): { index: number; value: number } {
  const [r, i] = [x.re.view(), x.im.view()];
  let index = -1;
  let value = -1;
  for (let k = 0; k < x.length; k++) {
    const v = r[k] * r[k] + i[k] * i[k];
    if (v > value) {
      value = v;
      index = k;
    }
  }
  return { index, value };
}
