import type { SnrPeak } from '../data/kinds';
import type { Span } from '../data/spans';

interface Complex {
  readonly re: Float64Array;
  readonly im: Float64Array;
}

/**
 * The loudest maxima of |SNR| no two of which are closer than `window` samples, loudest first. Each is refined
 * between the samples where its neighbours are valid.
 *
 * @param spans samples that may be used
 */
export function loudestPeaks(snr: Complex, spans: readonly Span[], window: number, count: number): SnrPeak[] {
  const taken: number[] = [];
  const gap = Math.max(1, Math.round(window));
  for (let found = 0; found < count; found++) {
    let at = -1;
    let best = 0;
    const blocked = [...taken].sort((a, b) => a - b);
    for (const { from, to } of spans) {
      let next = 0;
      for (let i = from; i < to; i++) {
        while (next < blocked.length && blocked[next] + gap <= i) next++;
        if (next < blocked.length && i > blocked[next] - gap) {
          i = blocked[next] + gap - 1;
          continue;
        }
        const v = snr.re[i] * snr.re[i] + snr.im[i] * snr.im[i];
        if (v > best) {
          best = v;
          at = i;
        }
      }
    }
    if (at < 0) break;
    taken.push(at);
  }
  return taken.map((i) => refine(snr, i, spans)).sort((a, b) => b.snr - a.snr);
}

/**
 * The maximum beside sample `i`: place and height by a parabola through |SNR|² of three samples. The phase is carried from
 * sample `i` to that place at the rate it turns there (the values turn at the template's mean frequency).
 */
function refine({ re, im }: Complex, i: number, spans: readonly Span[]): SnrPeak {
  const phase = Math.atan2(im[i], re[i]);
  const [a, b, c] = [-1, 0, 1].map((j) => re[i + j] ** 2 + im[i + j] ** 2);
  const curve = a - 2 * b + c;
  const inside = spans.some((s) => i - 1 >= s.from && i + 1 < s.to);
  if (!inside || !(curve < 0)) return { at: i, snr: Math.sqrt(b), phase };
  const d = Math.max(-0.5, Math.min(0.5, (0.5 * (a - c)) / curve));
  const turn = Math.atan2(
    im[i + 1] * re[i - 1] - re[i + 1] * im[i - 1],
    re[i + 1] * re[i - 1] + im[i + 1] * im[i - 1],
  );
  // Half of it is the turn per sample, up to half a turn; the steps from sample to sample say which.
  const step = Math.atan2(im[i + 1] * re[i] - re[i + 1] * im[i], re[i + 1] * re[i] + im[i + 1] * im[i]);
  const half = turn / 2;
  const perSample = Math.cos(step - half) >= 0 ? half : half + Math.PI;
  const at = phase + d * wrap(perSample);
  return { at: i + d, snr: Math.sqrt(b - 0.25 * (a - c) * d), phase: wrap(at) };
}

const wrap = (angle: number): number => angle - 2 * Math.PI * Math.ceil(angle / (2 * Math.PI) - 0.5);

/** What |SNR| looks like against a Rayleigh distribution. */
export interface RayleighFacts {
  readonly count: number;
  readonly median: number;
  readonly rms: number;
  /** Share of samples above √(2 ln 20), which Gaussian noise exceeds in 5 % of them. */
  readonly above: number;
}

/** √(2 ln 2): median of |SNR| in Gaussian noise. */
export const RAYLEIGH_MEDIAN = Math.sqrt(2 * Math.LN2);
export const RAYLEIGH_HIGH = Math.sqrt(2 * Math.log(20));

export function rayleighFacts({ re, im }: Complex, spans: readonly Span[]): RayleighFacts {
  let count = 0;
  for (const { from, to } of spans) count += to - from;
  const values = new Float64Array(count);
  let k = 0;
  let sum = 0;
  let above = 0;
  for (const { from, to } of spans)
    for (let i = from; i < to; i++) {
      const v = re[i] * re[i] + im[i] * im[i];
      values[k++] = v;
      sum += v;
      if (v > RAYLEIGH_HIGH ** 2) above++;
    }
  values.sort();
  const half = count >> 1;
  const middle = count % 2 === 1 ? values[half] : (values[half - 1] + values[half]) / 2;
  return { count, median: Math.sqrt(middle), rms: Math.sqrt(sum / count), above: above / count };
}

/** |SNR| that one of `independent` values of Gaussian noise is expected to exceed: N e^(−ρ²/2) = 1. */
export const loudestOf = (independent: number): number =>
  Math.sqrt(2 * Math.log(Math.max(Math.E, independent)));

/**
 * How often in `seconds` of Gaussian noise |SNR| rises through a level: √(2π) B ρ e^(−ρ²/2) a second, B the root mean square
 * of frequency about its mean. Rice, Bell Syst. Tech. J. 24, 46 (1945), MEMORY. It counts the values between independent
 * ones, which the loudest makes use of.
 */
export const expectedCrossings = (level: number, seconds: number, spread: number): number =>
  seconds * Math.sqrt(2 * Math.PI) * spread * level * Math.exp((-level * level) / 2);

/** The level that Gaussian noise rises through once in `seconds`. */
export function expectedLoudest(seconds: number, spread: number): number {
  let level = 3;
  for (let i = 0; i < 60; i++) level = loudestOf(seconds * Math.sqrt(2 * Math.PI) * spread * level);
  return level;
}

/** Probability that the loudest in `seconds` of Gaussian noise is at least `snr`. */
export const chanceOf = (snr: number, seconds: number, spread: number): number =>
  -Math.expm1(-expectedCrossings(Math.max(1, snr), seconds, spread));
