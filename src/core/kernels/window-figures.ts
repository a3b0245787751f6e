import { UserError } from '../data/errors';

export interface WindowFigures {
  /** Mean of the weights: the height of a line is divided by it. */
  readonly coherentGain: number;
  /** Equivalent noise bandwidth in bins, n Σw² / (Σw)². Times rate/n it is in Hz. */
  readonly enbw: number;
  /** Loss of a line half-way between two bins, dB, ≥ 0 but for ripple of flat-tops. */
  readonly scallopLoss: number;
  /** Scallop loss plus 10 log₁₀ enbw: smallest signal-to-noise loss of a line against the boxcar on a bin, dB. */
  readonly worstProcessingLoss: number;
  /** Full width of the main lobe at −3.0103 dB (half power), bins; NaN if the window is too short to have one. */
  readonly bandwidth3: number;
  /** Full width at −6.0206 dB (half amplitude), bins. */
  readonly bandwidth6: number;
  /** Highest sidelobe, dB relative to the main lobe; approximate, see below; NaN if there is none. */
  readonly peakSidelobe: number;
}

/** Sidelobes are searched out to this many bins; every window here has its highest one well inside. */
const SEARCH = 40;
const PER_BIN = 16;
/** Longer windows are thinned for the shape of the main lobe and sidelobes (never for sums). */
const LONG = 16384;

/**
 * Figures of merit of a window as used in spectra (periodic form).
 *
 * @param w Weights, any scale; their sum must not be 0.
 * @throws UserError if the window is empty, sums to zero or is not finite.
 *
 * Sums are exact. The main lobe and sidelobes come from |Σ w e^(−2πifn/N)| at fractional bins f: widths to 1e-6 bins,
 * sidelobes to 0.01 dB and within 40 bins of the main lobe; above 16384 samples every d-th sample is taken for these
 * (difference below 0.01 dB for the windows here). Source: Harris, Proc. IEEE 66, 51 (1978), section IV (MEMORY);
 * noise bandwidth also Heinzel, Rüdiger, Schilling, report of 15 February 2002.
 *
 * @example windowFigures(makeWindow('hann', 4096)).enbw // 1.5
 */
export function windowFigures(w: Float64Array): WindowFigures {
  const n = w.length;
  let sum = 0;
  let squares = 0;
  for (const v of w) {
    sum += v;
    squares += v * v;
  }
  if (!(Math.abs(sum) > 0 && Number.isFinite(squares)))
    throw new UserError('window-sum', `window of ${n} samples sums to ${sum}: it has no main lobe at zero`);
  const enbw = (n * squares) / (sum * sum);
  const gain = kernel(w);
  const scallopLoss = -decibel(gain(0.5));
  return {
    coherentGain: sum / n,
    enbw,
    scallopLoss,
    worstProcessingLoss: scallopLoss + 10 * Math.log10(enbw),
    bandwidth3: 2 * crossing(gain, Math.SQRT1_2, n / 2),
    bandwidth6: 2 * crossing(gain, 0.5, n / 2),
    peakSidelobe: decibel(highestSidelobe(gain, n / 2)),
  };
}

/**
 * Correlation of the same window at a distance of `step` samples, Σ w[i] w[i+step] / Σ w²; 0 if they do not overlap.
 * Its square is the correlation of the powers of two overlapping segments of white noise.
 *
 * @example overlapCorrelation(makeWindow('hann', 4096), 2048) // 0.16666666666666666
 */
export function overlapCorrelation(w: Float64Array, step: number): number {
  let cross = 0;
  let squares = 0;
  for (let i = 0; i < w.length; i++) {
    squares += w[i] * w[i];
    if (i + step < w.length) cross += w[i] * w[i + step];
  }
  return cross / squares;
}

const decibel = (amplitude: number): number => 20 * Math.log10(amplitude);

/** |W(f)/W(0)| at f bins, by a direct sum with a rotating phasor. */
function kernel(w: Float64Array): (f: number) => number {
  const stride = Math.max(1, Math.floor(w.length / LONG));
  const n = w.length;
  const at = (f: number): number => {
    const angle = (-2 * Math.PI * f * stride) / n;
    const c = Math.cos(angle);
    const s = Math.sin(angle);
    let re = 1;
    let im = 0;
    let sumRe = 0;
    let sumIm = 0;
    for (let i = 0, j = 0; i < n; i += stride, j++) {
      // Restarting the phasor bounds the rounding of the recurrence.
      if ((j & 255) === 0) {
        re = Math.cos(angle * j);
        im = Math.sin(angle * j);
      }
      sumRe += w[i] * re;
      sumIm += w[i] * im;
      const next = re * c - im * s;
      im = re * s + im * c;
      re = next;
    }
    return Math.hypot(sumRe, sumIm);
  };
  const top = at(0);
  return (f) => at(f) / top;
}

/** First f at which the main lobe falls through `level`. */
function crossing(gain: (f: number) => number, level: number, limit: number): number {
  let high = 0;
  do high += 0.25;
  while (high <= limit && gain(high) > level);
  if (high > limit) return NaN;
  let low = high - 0.25;
  while (high - low > 1e-8) {
    const middle = (low + high) / 2;
    if (gain(middle) > level) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}

/** Largest gain beyond the first minimum below half height. */
function highestSidelobe(gain: (f: number) => number, limit: number): number {
  const end = Math.min(limit, SEARCH);
  let f = 1 / PER_BIN;
  let value = gain(f);
  const next = (): number => gain(f + 1 / PER_BIN);
  for (let after = next(); f < end && (value > 0.5 || after < value); after = next()) {
    f += 1 / PER_BIN;
    value = after;
  }
  const grid: number[] = [value];
  for (let g = f + 1 / PER_BIN; g <= end + 1 / PER_BIN; g += 1 / PER_BIN) grid.push(gain(g));
  const top = Math.max(...grid.slice(1));
  // Lobes of equal height are told apart only after refining: one grid cell may hide 0.05 dB.
  let best = NaN;
  grid.forEach((v, i) => {
    if (i === 0 || v < 0.98 * top || v < grid[i - 1] || v < (grid[i + 1] ?? Infinity)) return;
    const peak = maximum(gain, f + (i - 1) / PER_BIN, f + (i + 1) / PER_BIN);
    if (!(peak <= best)) best = peak;
  });
  return best;
}

/** Largest value on an interval with one maximum, by golden section. */
function maximum(gain: (f: number) => number, from: number, to: number): number {
  const part = (Math.sqrt(5) - 1) / 2;
  let [low, high] = [from, to];
  let [a, b] = [high - part * (high - low), low + part * (high - low)];
  let [ga, gb] = [gain(a), gain(b)];
  while (high - low > 1e-4) {
    if (ga > gb) {
      [high, b, gb] = [b, a, ga];
      a = high - part * (high - low);
      ga = gain(a);
    } else {
      [low, a, ga] = [a, b, gb];
      b = low + part * (high - low);
      gb = gain(b);
    }
  }
  return Math.max(ga, gb);
}
