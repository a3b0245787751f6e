import type { Kernels } from '../kernels/kernels';
import type { ComplexValues } from './signal-model';

/** Points of the interpolating polynomial, and bins per inverse length of the samples. */
const POINTS = 12;
const FINE = 4;

/**
 * The transform Δt Σ x_j e^{−2πif t_j} of samples at t_j = (j − origin) Δt at any frequencies from 0 to half the rate, zero
 * above. It is computed once on bins four times finer than 1/length, with t counted from the middle of the samples, and
 * interpolated by a polynomial through twelve of them: within about 3e-6 of the largest value.
 *
 * @param origin index of t = 0, need not be whole
 * @param rate Hz
 */
export function sampledTransform(
  kernels: Kernels,
  samples: Float64Array,
  origin: number,
  rate: number,
): (frequency: Float64Array) => ComplexValues {
  const n = samples.length;
  const size = 2 ** Math.ceil(Math.log2(FINE * n));
  const middle = n >> 1;
  const turned = new Float64Array(size);
  for (let j = 0; j < n; j++) turned[(j - middle + size) % size] = samples[j] / rate;
  const { re, im } = kernels.rfft(turned);
  const last = re.length - 1;
  const weights = barycentric(POINTS);
  return (frequency) => {
    const out = { re: new Float64Array(frequency.length), im: new Float64Array(frequency.length) };
    frequency.forEach((f, i) => {
      const at = (f / rate) * size;
      if (f < 0 || at > last) return;
      const first = Math.floor(at) - POINTS / 2 + 1;
      let [sumRe, sumIm, sum] = [0, 0, 0];
      for (let p = 0; p < POINTS; p++) {
        const k = first + p;
        // Real samples: the transform at −f is the conjugate, and it repeats with the rate.
        const folded = k < 0 ? -k : k > last ? 2 * last - k : k;
        const sign = k < 0 || k > last ? -1 : 1;
        if (at === k) {
          [sumRe, sumIm, sum] = [re[folded], sign * im[folded], 1];
          break;
        }
        const w = weights[p] / (at - k);
        sumRe += w * re[folded];
        sumIm += w * sign * im[folded];
        sum += w;
      }
      // From the middle of the samples to the origin.
      const turn = (2 * Math.PI * f * (origin - middle)) / rate;
      const [c, s] = [Math.cos(turn), Math.sin(turn)];
      const [a, b] = [sumRe / sum, sumIm / sum];
      out.re[i] = a * c - b * s;
      out.im[i] = a * s + b * c;
    });
    return out;
  };
}

/** Weights of Lagrange's polynomial through `n` evenly spaced points in barycentric form. */
function barycentric(n: number): Float64Array {
  const w = new Float64Array(n);
  let binomial = 1;
  for (let k = 0; k < n; k++) {
    w[k] = k % 2 === 0 ? binomial : -binomial;
    binomial = (binomial * (n - 1 - k)) / (k + 1);
  }
  return w;
}
