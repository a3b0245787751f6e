import type { Split } from '../kernels/complex-arrays';
import type { Kernels } from '../kernels/kernels';
import { incompleteGamma } from '../kernels/special-incomplete-gamma';

/** Most lags compared; more are thinned out evenly. */
const LAGS = 401;

/**
 * R(j) = Σ w e^(2πi k j/size)/Σ w for j = 0 … count: how |SNR| falls off beside a signal of exactly the template's shape.
 * R(−j) is its conjugate.
 *
 * @param weights |h̃|²/S on bins 0 … size / 2
 */
export function autocorrelation(kernels: Kernels, weights: Float64Array, size: number, count: number): Split {
  const work = kernels.complex(size, 'f64');
  try {
    let sum = 0;
    for (const w of weights) sum += w;
    work.re.set(weights.map((w) => w / sum));
    kernels.fftPlan(size, 'f64').backward(work, work);
    return { re: work.re.slice(0, count + 1), im: work.im.slice(0, count + 1) };
  } finally {
    work.free();
  }
}

/** Lags in samples from −before to after, evenly thinned to at most {@link LAGS}; zero is among them. */
export function chooseLags(before: number, after: number): Int32Array {
  const step = Math.max(1, Math.ceil((before + after) / (LAGS - 1)));
  const first = -Math.floor(before / step);
  return Int32Array.from({ length: Math.floor(after / step) - first + 1 }, (_, i) => (first + i) * step);
}

export interface ShapeCheck {
  /** Σ|ρ(t+τ) − ρ(t)R(τ)|² over its mean in Gaussian noise: 1 expected. */
  readonly ratio: number;
  readonly pValue: number;
}

/**
 * Compares the SNR around a peak with what the template alone gives. In Gaussian noise x(τ) = ρ(t+τ) − ρ(t)R(τ) has mean
 * zero and covariance 2[R(τ−τ') − R(τ)R*(τ')], whatever signal of the template's shape is there. The sum of |x|² has mean and
 * variance by that covariance; the probability is that of a gamma distribution with both (Satterthwaite, Biometrics Bull. 2,
 * 110, 1946, MEMORY), good to some ten per cent.
 *
 * @param x residual at the lags
 * @param r R for lags from 0 to the largest distance between two of them
 */
export function shapeCheck(x: Split, lags: Int32Array, r: Split): ShapeCheck {
  const n = lags.length;
  const imOf = (j: number): number => (j < 0 ? -r.im[-j] : r.im[j]);
  let sum = 0;
  let mean = 0;
  let variance = 0;
  for (let a = 0; a < n; a++) {
    sum += x.re[a] ** 2 + x.im[a] ** 2;
    const [ar, ai] = [r.re[Math.abs(lags[a])], imOf(lags[a])];
    mean += 2 * (1 - ar * ar - ai * ai);
    for (let b = 0; b < n; b++) {
      const [br, bi] = [r.re[Math.abs(lags[b])], imOf(lags[b])];
      const d = lags[a] - lags[b];
      const cr = r.re[Math.abs(d)] - (ar * br + ai * bi);
      const ci = imOf(d) - (ai * br - ar * bi);
      variance += 4 * (cr * cr + ci * ci);
    }
  }
  if (!(mean > 0)) return { ratio: NaN, pValue: NaN };
  return {
    ratio: sum / mean,
    pValue: incompleteGamma((mean * mean) / variance, (sum * mean) / variance).upper,
  };
}
