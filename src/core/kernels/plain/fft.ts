import FFT from 'fft.js';
import type { ComplexArray, KernelArray, Precision } from '../complex-arrays';
import { checkLengths, checkTransformLength, type FftPlan, type RfftPlan } from '../kernels-backend';

/** The part of fft.js used here; numbers interleaved as re, im. */
interface PowerOfTwo {
  transform(out: Float64Array, data: Float64Array): void;
  inverseTransform(out: Float64Array, data: Float64Array): void;
}
const PowerOfTwoFft = FFT as unknown as new (size: number) => PowerOfTwo;

/** Forward transform of n interleaved complex numbers, in double, from `x` to `y`. */
type Interleaved = (x: Float64Array, y: Float64Array) => void;

function powerOfTwo(n: number): Interleaved {
  if (n === 1) return (x, y) => y.set(x.subarray(0, 2));
  const fft = new PowerOfTwoFft(n);
  return (x, y) => fft.transform(y, x);
}

/** exp(−iπ k²/n), with k² reduced exactly (in BigInt where needed) before it becomes an angle. */
function chirpOf(n: number): Float64Array {
  const chirp = new Float64Array(2 * n);
  for (let k = 0; k < n; k++) {
    const square = k < 94_906_265 ? (k * k) % (2 * n) : Number((BigInt(k) * BigInt(k)) % BigInt(2 * n));
    chirp[2 * k] = Math.cos((Math.PI * square) / n);
    chirp[2 * k + 1] = -Math.sin((Math.PI * square) / n);
  }
  return chirp;
}

function product(n: number, a: Float64Array, b: Float64Array, out: Float64Array): void {
  for (let k = 0; k < 2 * n; k += 2) {
    const re = a[k] * b[k] - a[k + 1] * b[k + 1];
    out[k + 1] = a[k] * b[k + 1] + a[k + 1] * b[k];
    out[k] = re;
  }
}

/** Any length as a convolution with a chirp (Bluestein, IEEE Trans. AU-18, 451, 1970). */
function chirpTransform(n: number): Interleaved {
  let m = 2;
  while (m < 2 * n - 1) m *= 2;
  const inner = new PowerOfTwoFft(m);
  const chirp = chirpOf(n);
  const wrapped = new Float64Array(2 * m);
  for (let k = 0; k < n; k++) {
    for (const at of k === 0 ? [0] : [k, m - k]) {
      wrapped[2 * at] = chirp[2 * k]!;
      wrapped[2 * at + 1] = -chirp[2 * k + 1];
    }
  }
  const spectrum = new Float64Array(2 * m);
  inner.transform(spectrum, wrapped);
  const a = new Float64Array(2 * m);
  const b = new Float64Array(2 * m);
  return (x, y) => {
    a.fill(0, 2 * n);
    product(n, x, chirp, a);
    inner.transform(b, a);
    product(m, b, spectrum, b);
    inner.inverseTransform(a, b);
    product(n, a, chirp, y);
  };
}

interface Transform {
  run: Interleaved;
  x: Float64Array;
  y: Float64Array;
}

function makeTransform(n: number): Transform {
  const run = (n & (n - 1)) === 0 ? powerOfTwo(n) : chirpTransform(n);
  return { run, x: new Float64Array(2 * n), y: new Float64Array(2 * n) };
}

const KEPT = 8;

/** The last few transforms used, by length. */
export class PlainTransforms {
  private readonly kept = new Map<number, Transform>();

  get(n: number): Transform {
    let found = this.kept.get(n);
    if (found) this.kept.delete(n);
    else found = makeTransform(n);
    this.kept.set(n, found);
    for (const key of this.kept.keys()) {
      if (this.kept.size <= KEPT) break;
      this.kept.delete(key);
    }
    return found;
  }

  clear(): void {
    this.kept.clear();
  }
}

/** Complex plan: the twin of the wasm plan, in double for either element type. */
export function plainFftPlan<P extends Precision>(
  transforms: PlainTransforms,
  length: number,
  precision: P,
): FftPlan<P> {
  checkTransformLength(length);
  const run = (xr: KernelArray<P>, xi: KernelArray<P>, yr: KernelArray<P>, yi: KernelArray<P>): void => {
    checkLengths(`transform of length ${length}`, length, xr, yr);
    const t = transforms.get(length);
    const [a, b, c, d] = [xr.view(), xi.view(), yr.view(), yi.view()];
    for (let k = 0; k < length; k++) {
      t.x[2 * k] = a[k]!;
      t.x[2 * k + 1] = b[k]!;
    }
    t.run(t.x, t.y);
    for (let k = 0; k < length; k++) {
      c[k] = t.y[2 * k]!;
      d[k] = t.y[2 * k + 1]!;
    }
  };
  return {
    length,
    precision,
    forward: (x, y) => run(x.re, x.im, y.re, y.im),
    backward: (x, y) => run(x.im, x.re, y.im, y.re),
  };
}

/** Real plan: a complex transform with zero imaginary part. */
export function plainRfftPlan<P extends Precision>(
  transforms: PlainTransforms,
  length: number,
  precision: P,
): RfftPlan<P> {
  checkTransformLength(length);
  const bins = Math.floor(length / 2) + 1;
  const check = (samples: KernelArray, spectrum: ComplexArray): void => {
    checkLengths(`real transform of length ${length}`, length, samples);
    checkLengths(`spectrum of ${length} real samples`, bins, spectrum);
  };
  return {
    length,
    bins,
    precision,
    forward: (x, y) => {
      check(x, y);
      const t = transforms.get(length);
      const [a, c, d] = [x.view(), y.re.view(), y.im.view()];
      for (let k = 0; k < length; k++) {
        t.x[2 * k] = a[k]!;
        t.x[2 * k + 1] = 0;
      }
      t.run(t.x, t.y);
      for (let k = 0; k < bins; k++) {
        c[k] = t.y[2 * k]!;
        d[k] = t.y[2 * k + 1]!;
      }
    },
    backward: (x, y) => {
      check(y, x);
      const t = transforms.get(length);
      const [a, b, c] = [x.re.view(), x.im.view(), y.view()];
      // Real and imaginary part exchanged on the way in turn the forward transform into the inverse.
      t.x[0] = 0;
      t.x[1] = a[0]!;
      for (let k = 1; k < bins; k++) {
        const j = length - k;
        const im = j === k ? 0 : b[k];
        t.x[2 * k] = im;
        t.x[2 * k + 1] = a[k]!;
        t.x[2 * j] = -im;
        t.x[2 * j + 1] = a[k]!;
      }
      t.run(t.x, t.y);
      for (let k = 0; k < length; k++) c[k] = t.y[2 * k + 1]!;
    },
  };
}
