import { fillGaussian } from './counter-noise';
import { noiseDensity, type NoiseCurve } from './noise-curve';
import { realFromHalf } from './transform';

/**
 * `length` samples (a power of two) at `rate` Hz of Gaussian noise with the one-sided density of `curve`: every bin of a spectrum
 * twice as long is drawn with variance S f_s N/2 (real and imaginary part half each), transformed, and the middle half kept,
 * so that end and beginning do not join as those of a single transform would. Bin 0 and the highest are 0.
 */
export function colouredNoise(
  curve: NoiseCurve,
  rate: number,
  length: number,
  seed: number,
  stream: number,
): Float64Array {
  const n = 2 * length;
  const re = new Float64Array(length + 1);
  const im = new Float64Array(length + 1);
  const draws = fillGaussian(seed, stream, new Float64Array(2 * length));
  for (let k = 1; k < length; k++) {
    const spread = Math.sqrt(noiseDensity(curve, (k * rate) / n) * rate * n) / 2;
    re[k] = spread * draws[2 * k];
    im[k] = spread * draws[2 * k + 1];
  }
  return realFromHalf(re, im).slice(length / 2, length / 2 + length);
}
