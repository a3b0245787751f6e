import type { Precision, Split } from './complex-arrays';
import type { Backend } from './kernels-backend';

/** Samples of either element type; results have the type of the input. */
export type Real = Float64Array | Float32Array;

const precisionOf = (x: Real): Precision => (x instanceof Float64Array ? 'f64' : 'f32');

function checkPair(re: Real, im: Real): void {
  if (re.length !== im.length || precisionOf(re) !== precisionOf(im)) {
    throw new RangeError('real and imaginary part must have the same length and element type');
  }
}

function scale(x: Real, factor: number): void {
  for (let k = 0; k < x.length; k++) x[k] *= factor;
}

function complexTransform<A extends Real>(backend: Backend, re: A, im: A, inverse: boolean): Split<A> {
  checkPair(re, im);
  const n = re.length;
  const plan = backend.fftPlan(n, precisionOf(re));
  const work = backend.complex(n, plan.precision);
  try {
    work.re.set(re);
    work.im.set(im);
    if (inverse) plan.backward(work, work);
    else plan.forward(work, work);
    const out = { re: work.re.slice() as A, im: work.im.slice() as A };
    if (inverse) {
      scale(out.re, 1 / n);
      scale(out.im, 1 / n);
    }
    return out;
  } finally {
    work.free();
  }
}

/** Forward transform, y[k] = Σ x[j] e^(−2πi jk/n), into new arrays. */
export const fft = <A extends Real>(backend: Backend, re: A, im: A): Split<A> =>
  complexTransform(backend, re, im, false);

/** Inverse transform, y[j] = (1/n) Σ x[k] e^(+2πi jk/n), into new arrays. */
export const ifft = <A extends Real>(backend: Backend, re: A, im: A): Split<A> =>
  complexTransform(backend, re, im, true);

/** One-sided spectrum of real samples, floor(n/2) + 1 bins, into new arrays. */
export function rfft<A extends Real>(backend: Backend, x: A): Split<A> {
  const plan = backend.rfftPlan(x.length, precisionOf(x));
  const samples = backend.array(x.length, plan.precision);
  const spectrum = backend.complex(plan.bins, plan.precision);
  try {
    samples.set(x);
    plan.forward(samples, spectrum);
    return { re: spectrum.re.slice() as A, im: spectrum.im.slice() as A };
  } finally {
    samples.free();
    spectrum.free();
  }
}

/** n real samples of a one-sided spectrum of floor(n/2) + 1 bins, divided by n, into a new array. */
export function irfft<A extends Real>(backend: Backend, re: A, im: A, n: number): A {
  checkPair(re, im);
  const plan = backend.rfftPlan(n, precisionOf(re));
  if (re.length !== plan.bins) {
    throw new RangeError(`${n} samples have a spectrum of ${plan.bins} bins, not ${re.length}`);
  }
  const samples = backend.array(n, plan.precision);
  const spectrum = backend.complex(plan.bins, plan.precision);
  try {
    spectrum.re.set(re);
    spectrum.im.set(im);
    plan.backward(spectrum, samples);
    const out = samples.slice() as A;
    scale(out, 1 / n);
    return out;
  } finally {
    samples.free();
    spectrum.free();
  }
}
