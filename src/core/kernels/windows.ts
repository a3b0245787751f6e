import { hint, nearestNames } from '../data/nearest';
import { UserError } from '../data/errors';
import { besselI0Scaled } from './special-bessel';
import { COSINE_SUMS, cosineSum } from './windows-cosine-sum';
import { WINDOW_NAMES, type WindowName, type WindowShape } from './windows-names';

export interface WindowOptions extends WindowShape {
  /**
   * true (default): one period of the window's Fourier series, w[i] at i/n, for spectra. false: both ends equal, w[i]
   * at i/(n − 1), for filters and for tapering a record.
   */
  readonly periodic?: boolean;
}

/**
 * Samples of a window.
 *
 * @param name One of WINDOW_NAMES.
 * @param n Length in samples, a whole number ≥ 1; length 1 gives [1].
 * @returns n weights, no unit. Peak 1 (at most), except the HFT windows: mean 1.
 * @throws UserError for an unknown name, a bad length or a bad shape parameter.
 *
 * Equal to `scipy.signal.get_window` within 1e-14 for the windows that has. For Welch's method take periodic windows;
 * the default Hann is wrong for a spectrum spanning more than about six decades (take 'blackman-harris' or 'nuttall')
 * and for reading off the height of a line between bins (take 'flat-top' or a HFT window).
 *
 * Sources: Harris, Proc. IEEE 66, 51 (1978) (MEMORY); cosine sums: see COSINE_SUMS; Kaiser: Kaiser & Schafer, IEEE
 * Trans. ASSP 28, 105 (1980) (MEMORY).
 *
 * @example makeWindow('hann', 4) // [0, 0.5, 1, 0.5]
 */
export function makeWindow(name: WindowName, n: number, options: WindowOptions = {}): Float64Array {
  if (!Number.isSafeInteger(n) || n < 1)
    throw new UserError(
      'window-length',
      `window length ${n}: it must be a whole number of samples, at least 1`,
    );
  if (!WINDOW_NAMES.includes(name))
    throw new UserError(
      'window-name',
      `there is no window "${name}".${hint(nearestNames(name, WINDOW_NAMES)) || ` Known: ${WINDOW_NAMES.join(', ')}.`}`,
    );
  const { periodic = true } = options;
  if (n === 1) return new Float64Array([1]);
  // Symmetric windows run from 0 to n − 1; a periodic one is the symmetric one of length n + 1 without its last sample.
  const last = periodic ? n : n - 1;
  switch (name) {
    case 'boxcar':
      return new Float64Array(n).fill(1);
    case 'bartlett':
      return sampled(n, last, (x) => 1 - Math.abs(2 * x - 1));
    case 'cosine':
      // Sampled at cell centres, so the ends are not zero.
      return new Float64Array(n).map((_, i) => Math.sin((Math.PI * (i + 0.5)) / (last + 1)));
    case 'tukey':
      return tukey(n, last, options.alpha ?? 0.25);
    case 'kaiser':
      return kaiser(n, last, options.beta ?? 3 * Math.PI);
    case 'gaussian':
      return gaussian(n, last, options.std ?? n / 6);
    default:
      return cosineSum(COSINE_SUMS[name], n, last);
  }
}

const sampled = (n: number, last: number, at: (x: number) => number): Float64Array =>
  new Float64Array(n).map((_, i) => at(i / last));

function shape(ok: boolean, window: string, name: string, value: number, rule: string): void {
  if (!ok) throw new UserError('window-shape', `${window} window: ${name} is ${value}; it must be ${rule}`);
}

function tukey(n: number, last: number, alpha: number): Float64Array {
  shape(alpha >= 0 && alpha <= 1, 'tukey', 'alpha', alpha, 'between 0 (no taper) and 1 (all taper)');
  // The whole-sample edge of the taper decides which samples are exactly 1.
  const edge = Math.floor((alpha * last) / 2);
  return new Float64Array(n).map((_, i) => {
    const fromEnd = Math.min(i, last - i);
    return alpha === 0 || fromEnd > edge
      ? 1
      : 0.5 * (1 + Math.cos(Math.PI * ((2 * fromEnd) / alpha / last - 1)));
  });
}

function kaiser(n: number, last: number, beta: number): Float64Array {
  shape(beta >= 0 && Number.isFinite(beta), 'kaiser', 'beta', beta, 'a number, 0 or more');
  const top = besselI0Scaled(beta);
  return sampled(n, last, (x) => {
    // 1 − (2x − 1)² as a product keeps the digits near both ends.
    const z = beta * 2 * Math.sqrt(Math.max(0, x * (1 - x)));
    return (Math.exp(z - beta) * besselI0Scaled(z)) / top;
  });
}

function gaussian(n: number, last: number, std: number): Float64Array {
  shape(std > 0 && Number.isFinite(std), 'gaussian', 'std', std, 'a number of samples above 0');
  return new Float64Array(n).map((_, i) => Math.exp(-0.5 * ((i - last / 2) / std) ** 2));
}
