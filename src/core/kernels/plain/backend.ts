import { checkLengths, type Backend } from '../kernels-backend';
import { energy, multiply, peak, windowed } from './complex';
import { plainFftPlan, plainRfftPlan, PlainTransforms } from './fft';
import { plainArray, plainComplex } from './plain-array';
import { cascade } from './sections';
import { addCross, addMagnitude, medians, power, taper } from './welch-ops';

/** The operations in plain TypeScript: fallback without WebAssembly, and the kernels' independent twin in tests. */
export function plainBackend(): Backend {
  const transforms = new PlainTransforms();
  return {
    kind: 'plain',
    array: plainArray,
    complex: plainComplex,
    memory: () => ({ reserved: 0, used: 0 }),
    trim: () => transforms.clear(),
    fftPlan: (length, precision) => plainFftPlan(transforms, length, precision),
    rfftPlan: (length, precision) => plainRfftPlan(transforms, length, precision),
    multiply: (a, b, out) => {
      checkLengths('multiply', a.length, b, out);
      multiply(a, b, out, false);
    },
    multiplyConj: (a, b, out) => {
      checkLengths('multiplyConj', a.length, b, out);
      multiply(a, b, out, true);
    },
    windowed: (x, weights, factor, out) => {
      checkLengths('windowed', x.length, out, ...(weights ? [weights] : []));
      windowed(x, weights, factor, out);
    },
    energy: (x, out) => {
      if (out) checkLengths('energy', x.length, out);
      return energy(x, out);
    },
    peak,
    taper: (x, weights, centred, out) => {
      checkLengths('taper', x.length, weights, out);
      return taper(x, weights, centred, out);
    },
    power: (x, out) => {
      checkLengths('power', x.length, out);
      power(x, out, false);
    },
    addPower: (x, out) => {
      checkLengths('addPower', x.length, out);
      power(x, out, true);
    },
    addCross: (a, b, out) => {
      checkLengths('addCross', a.length, b, out);
      addCross(a, b, out);
    },
    addMagnitude: (x, count, mean, spread) => {
      checkLengths('addMagnitude', x.length, mean, spread);
      addMagnitude(x, count, mean, spread);
    },
    medians: (rows, stride, count, out) => {
      checkLengths('medians', out.length + stride * (count - 1), rows);
      medians(rows, stride, count, out);
    },
    cascade: (x, count, backwards, coefficients, states) => {
      checkLengths('cascade', count, x);
      checkLengths('states of the cascade', 2 * Math.floor(coefficients.length / 5), states);
      cascade(x, count, backwards, coefficients, states);
    },
  };
}
