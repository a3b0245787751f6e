import { describe, expect, test } from 'vitest';
import {
  CLEAN_FRACTION,
  planResample,
  resample,
  resampledLength,
  resampleEdges,
} from '../../src/core/kernels/resample-poly';
import { ratioOfRates } from '../../src/core/kernels/resample-poly-ratio';
import { createResampler } from '../../src/core/kernels/resample-poly-stream';
import { oracle } from '../oracle/oracle';

interface Case {
  readonly up: number;
  readonly down: number;
  readonly n: number;
  readonly beta?: number;
  readonly y: readonly number[];
}
const numbers = oracle<{ cases: Case[]; strong: Case }>('resample');

/** The series the oracle resamples. */
const series = (n: number): Float64Array =>
  Float64Array.from({ length: n }, (_, k) => ((k * 7919 + ((k * k) % 1009)) % 2003) / 1001.5 - 1);

describe('equal to scipy.signal.resample_poly within 1e-12', () => {
  test.each([...numbers.cases, numbers.strong])('$n samples by $up/$down', ({ up, down, n, beta, y }) => {
    const found = resample(series(n), up, down, beta).y;
    expect(found.length).toBe(y.length);
    y.forEach((v, i) => expect(Math.abs(found[i] - v)).toBeLessThan(1e-12));
  });
});

describe('in blocks', () => {
  test.each([
    [1, 4],
    [3, 2],
    [147, 160],
    [1, 1],
    [1, 64],
  ])('by %i/%i: the same numbers to the last bit whatever the blocks', (up, down) => {
    const x = series(5000);
    const whole = resample(x, up, down).y;
    for (const sizes of [[5000], [1, 2, 3, 4990, 4], Array.from({ length: 50 }, () => 100)]) {
      const r = createResampler(planResample(up, down));
      let at = 0;
      const parts = sizes.map((size) => r.push(x.subarray(at, (at += size))));
      parts.push(r.finish());
      const joined = parts.flatMap((p) => Array.from(p));
      expect(joined.length).toBe(whole.length);
      expect(joined).toEqual(Array.from(whole));
    }
  });
});

describe('marked edges', () => {
  test.each([
    [1, 4, 1000],
    [2, 3, 1001],
    [3, 1, 77],
    [160, 147, 500],
    [1, 8, 20],
  ])('by %i/%i, %i samples: changing what lies outside changes marked outputs only', (up, down, n) => {
    const plan = planResample(up, down);
    const { start, end } = resampleEdges(plan, n);
    const outputs = resampledLength(plan, n);
    expect(resample(series(n), up, down).edges).toEqual({ start, end });
    // The same record between two stretches of other samples, aligned to the output grid.
    const before = 40 * down;
    const outside = series(n + 2 * before);
    const inside = outside.subarray(before, before + n);
    const cut = resample(inside, up, down).y;
    const long = resample(outside, up, down).y;
    const shift = 40 * up;
    const touched = (m: number): boolean => Math.abs(cut[m] - long[m + shift]) > 1e-12;
    for (let m = start; m < outputs - end; m++) expect(touched(m), `output ${m}`).toBe(false);
    // Most of those marked are touched (interpolation keeps every up-th sample as it is): the marks are not too wide.
    const wrong = Array.from({ length: outputs }, (_, m) => m).filter(touched).length;
    expect(wrong).toBeGreaterThanOrEqual(Math.min(outputs, start + end) * 0.6 - 2);
  });
  test('an integer decimation loses ten output samples at each end', () => {
    expect(resampleEdges(planResample(1, 4), 4096)).toEqual({ start: 10, end: 10 });
    expect(resampleEdges(planResample(1, 1), 4096)).toEqual({ start: 0, end: 0 });
    expect(resampleEdges(planResample(1, 4), 8)).toEqual({ start: 2, end: 2 });
  });
});

describe('anti-alias filter', () => {
  /** Gain of the filter at f in units of the new Nyquist frequency. */
  const gain = (f: number, beta?: number): number => {
    const down = 16;
    const { phases, half } = planResample(1, down, beta);
    return phases.reduce((sum, h, i) => sum + h * Math.cos((Math.PI * f * (i - half)) / down), 0);
  };
  const worst = (from: number, to: number, off: (f: number) => number): number =>
    Math.max(...Array.from({ length: 400 }, (_, i) => off(from + ((to - from) * i) / 399)));

  test('within 1 % up to the stated fraction, −53 dB beyond its mirror, −6 dB between', () => {
    expect(worst(0, CLEAN_FRACTION, (f) => Math.abs(gain(f) - 1))).toBeLessThan(0.01);
    expect(worst(2 - CLEAN_FRACTION, 8, (f) => Math.abs(gain(f)))).toBeLessThan(10 ** (-53 / 20));
    expect(20 * Math.log10(gain(1))).toBeCloseTo(-6.02, 1);
  });
  test('a larger β: −90 dB, clean to 0.71', () => {
    expect(worst(0, 0.71, (f) => Math.abs(gain(f, 9) - 1))).toBeLessThan(0.01);
    expect(worst(2 - 0.71, 8, (f) => Math.abs(gain(f, 9)))).toBeLessThan(10 ** (-90 / 20));
  });
  test('a sine below it passes with its phase, a sine above it does not fold down', () => {
    const sine = (f: number, rate: number, n: number): Float64Array =>
      Float64Array.from({ length: n }, (_, i) => Math.sin((2 * Math.PI * f * i) / rate));
    const low = resample(sine(50, 4096, 8192), 1, 4).y;
    const same = sine(50, 1024, 2048);
    for (let i = 10; i < 2038; i++) expect(Math.abs(low[i] - same[i])).toBeLessThan(2.5e-3);
    const high = resample(sine(974, 4096, 8192), 1, 4).y;
    expect(Math.max(...high.slice(10, 2038).map(Math.abs))).toBeLessThan(10 ** (-53 / 20));
  });
});

describe('ratios', () => {
  test.each([
    [16384, 4096, 1, 4],
    [16384, 44100, 11025, 4096],
    [65536, 1, 1, 65536],
    [4096, 4096, 1, 1],
    [0.1, 0.3, 3, 1],
    [4096, 4100, 1025, 1024],
    [1 / 3, 1, 3, 1],
  ])('%d Hz to %d Hz is %i/%i', (from, to, up, down) => {
    expect(ratioOfRates(from, to)).toEqual({ up, down });
  });
  test('what has no sensible ratio is refused', () => {
    expect(() => ratioOfRates(16384, 1000 * Math.PI)).toThrow(
      /16384 Hz to 3141.59.* Hz: no ratio of whole numbers up to 65536/,
    );
    expect(() => ratioOfRates(16384, 0)).toThrow(/sample rate 0 Hz/);
    expect(() => ratioOfRates(Infinity, 1)).toThrow(/sample rate Infinity Hz/);
    expect(() => resample(series(10), 100_003, 100_000)).toThrow(
      /100003\/100000 \(in lowest terms\) needs a filter of 2000061 taps/,
    );
    expect(() => resample(series(10), 1.5, 1)).toThrow(/1.5\/1: both must be whole numbers/);
    expect(() => resample(series(10), 0, 1)).toThrow(/0\/1/);
    expect(() => resample(new Float64Array(0), 1, 2)).toThrow(/empty record/);
  });
});
