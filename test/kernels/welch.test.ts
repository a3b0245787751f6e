import { beforeAll, describe, expect, test } from 'vitest';
import type { Kernels, WelchAverage, WelchOptions } from '../../src/core/kernels/kernels';
import { medianBias } from '../../src/core/kernels/welch-stores';
import { oracle } from '../oracle/oracle';
import { BUILD_TIME, hann, loadKernels, relativeError, samples } from './load-kernels';

interface Span {
  n: number;
  segment: number;
  step: number;
}
interface WelchCase extends Span {
  average: 'mean' | 'median';
  detrend: 'constant' | 'none';
  density: number[];
}
const numbers = oracle<{
  rate: number;
  welch: WelchCase[];
  pair: Span & { re: number[]; im: number[]; coherence: number[] };
  magnitudes: Span & { mean: number[]; variance: number[] };
}>('welch');

let all: Kernels[];
beforeAll(async () => {
  const { wasm, plain } = await loadKernels();
  all = [wasm, plain];
}, BUILD_TIME);

const series = (n: number, seed: number): Float64Array =>
  samples(n, seed).map((v, i) => v + 3 + 0.25 * (i % 7));
const startsOf = ({ n, segment, step }: Span): number[] =>
  Array.from({ length: Math.floor((n - segment) / step) + 1 }, (_, i) => i * step);

/** Runs all passes over the segments. */
function estimate(k: Kernels, x: Float64Array, starts: number[], options: Omit<WelchOptions, 'segments'>) {
  const w = k.createWelch({ segments: starts.length, ...options });
  do for (const at of starts) w.add(x, at);
  while (w.endPass());
  const { power } = w.result();
  const { passes } = w;
  w.free();
  return { power, passes };
}

function oneSided(power: Float64Array, window: Float64Array, rate: number): Float64Array {
  const n = window.length;
  const scale = 1 / (rate * window.reduce((s, w) => s + w * w, 0));
  return power.map((p, k) => p * scale * (k === 0 || 2 * k === n ? 1 : 2));
}

describe('density against scipy.signal.welch', () => {
  test.each(numbers.welch)(
    '$average, detrend $detrend, $n samples in segments of $segment every $step',
    (c) => {
      const window = hann(c.segment);
      for (const k of all) {
        const { power } = estimate(k, series(c.n, 11), startsOf(c), { ...c, window });
        const density = oneSided(power, window, numbers.rate);
        // Bin by bin: small bins must be right too, except those that only hold the rounding of a large mean.
        const floor = 1e-13 * Math.max(...c.density);
        density.forEach((v, i) =>
          expect(Math.abs(v - c.density[i])).toBeLessThan(1e-10 * c.density[i] + floor),
        );
      }
    },
  );
});

describe('medians', () => {
  const span = { n: 5000, segment: 120, step: 60 };
  const x = series(span.n, 21);
  const powersOf = (k: Kernels, at: number): Float64Array =>
    estimate(k, x, [at], { ...span, window: hann(120), detrend: 'constant', average: 'mean' }).power;

  test.each(['median', 'median-mean'] as WelchAverage[])(
    '%s: several passes give the same as one',
    (average) => {
      for (const k of all) {
        for (const count of [1, 2, 9, 40]) {
          const starts = startsOf(span).slice(0, count);
          const options = { ...span, window: hann(120), detrend: 'constant' as const, average };
          const whole = estimate(k, x, starts, options);
          const parts = estimate(k, x, starts, { ...options, memoryLimit: 16 * 8 * count });
          expect(whole.passes).toBe(1);
          expect(parts.passes).toBe(4);
          expect(parts.power).toEqual(whole.power);
        }
      }
    },
  );

  test.each([1, 2, 3, 4, 25, 26, 81])('median and median-mean of %i segments by sorting', (count) => {
    const starts = startsOf(span).slice(0, count);
    const sorted = (which: Float64Array[], bin: number): number => {
      const column = which.map((p) => p[bin]).sort((a, b) => a - b);
      const half = column.length >> 1;
      const middle = column.length & 1 ? column[half] : (column[half - 1] + column[half]) / 2;
      return middle / medianBias(column.length);
    };
    for (const k of all) {
      const powers = starts.map((at) => powersOf(k, at));
      const options = { ...span, window: hann(120), detrend: 'constant' as const };
      const median = estimate(k, x, starts, { ...options, average: 'median' }).power;
      const halves = estimate(k, x, starts, { ...options, average: 'median-mean' }).power;
      const even = powers.filter((_, i) => i % 2 === 0);
      const odd = powers.filter((_, i) => i % 2 === 1);
      for (let bin = 0; bin < median.length; bin++) {
        expect(median[bin] / sorted(powers, bin)).toBeCloseTo(1, 13);
        const expected = count === 1 ? powers[0][bin] : (sorted(even, bin) + sorted(odd, bin)) / 2;
        expect(halves[bin] / expected).toBeCloseTo(1, 13);
      }
    }
  });

  test('columns with many equal powers, and columns longer than the sampled pivots', () => {
    const segment = 8;
    const count = 1500;
    const y = Float64Array.from({ length: segment * count }, (_, i) => Math.floor(i / segment) % 3);
    const starts = Array.from({ length: count }, (_, i) => i * segment);
    const window = new Float64Array(segment).fill(1);
    for (const k of all) {
      const { power } = estimate(k, y, starts, { segment, window, detrend: 'none', average: 'median' });
      expect(power[0] * medianBias(count)).toBe(64); // a third each of 0, (8·1)² and (8·2)²
      const wide = series(count * segment, 31);
      const a = estimate(k, wide, starts, { segment, window, detrend: 'none', average: 'median' }).power;
      const b = estimate(all[1], wide, starts, { segment, window, detrend: 'none', average: 'median' }).power;
      expect(relativeError(a, b)).toBeLessThan(1e-13);
    }
  });

  test('the bias tends to ln 2', () => {
    expect(medianBias(1)).toBe(1);
    expect(medianBias(3)).toBeCloseTo(5 / 6, 15);
    expect(medianBias(4)).toBe(medianBias(3));
    expect(medianBias(100001)).toBeCloseTo(Math.LN2, 5);
  });
});

describe('two channels and magnitudes', () => {
  test('cross-spectrum against scipy.signal.csd and coherence', () => {
    const c = numbers.pair;
    const x = series(c.n, 11);
    const y = series(c.n, 12).map((v, i) => v + 0.5 * x[i]);
    const window = hann(c.segment);
    for (const k of all) {
      const cross = k.createCrossSpectrum({ segment: c.segment, window, detrend: 'constant' });
      for (const at of startsOf(c)) cross.add(x, y, at);
      const r = cross.result();
      cross.free();
      expect(relativeError(oneSided(r.re, window, numbers.rate), c.re)).toBeLessThan(1e-12);
      const im = oneSided(r.im, window, numbers.rate).map((v) => -v);
      expect(relativeError(im, c.im)).toBeLessThan(1e-12);
      const coherence = r.re.map((v, i) => (v * v + r.im[i] ** 2) / (r.power1[i] * r.power2[i]));
      // The lowest bins hold almost nothing after the mean is taken off.
      expect(relativeError(coherence.slice(1), c.coherence.slice(1))).toBeLessThan(1e-10);
    }
  });

  test('mean and variance of |X|, sharing one transform with a mean spectrum', () => {
    const c = numbers.magnitudes;
    const window = hann(c.segment);
    for (const k of all) {
      const options = { segment: c.segment, window, detrend: 'constant' as const };
      const transform = k.createSegmentTransform(options);
      const magnitudes = k.createMagnitudes({ ...options, transform });
      const starts = startsOf(c);
      const welch = k.createWelch({ ...options, transform, average: 'mean', segments: starts.length });
      for (const at of starts) {
        transform.load(series(c.n, 11), at);
        magnitudes.addLoaded();
        welch.addLoaded();
      }
      welch.endPass();
      const { mean, variance } = magnitudes.result();
      expect(relativeError(mean, c.mean)).toBeLessThan(1e-12);
      expect(relativeError(variance, c.variance)).toBeLessThan(1e-12);
      const power = mean.map((m, i) => m * m + variance[i]);
      expect(relativeError(power, welch.result().power)).toBeLessThan(1e-13);
      for (const object of [magnitudes, welch, transform]) object.free();
    }
  });

  test('white Gaussian noise: the ratio is that of Rayleigh, √(4/π − 1)', () => {
    const n = 64 * 2000;
    const u = samples(2 * n, 77);
    const noise = Float64Array.from(
      { length: n },
      (_, i) => Math.sqrt(-2 * Math.log(u[2 * i] + 0.5 + 1e-9)) * Math.cos(2 * Math.PI * u[2 * i + 1]),
    );
    const magnitudes = all[0].createMagnitudes({ segment: 64, window: hann(64), detrend: 'constant' });
    for (let at = 0; at < n; at += 64) magnitudes.add(noise, at);
    const { mean, variance } = magnitudes.result();
    magnitudes.free();
    for (let k = 2; k < 31; k++) {
      expect(Math.abs(Math.sqrt(variance[k]) / mean[k] - Math.sqrt(4 / Math.PI - 1))).toBeLessThan(0.035);
    }
  });
});

describe('use', () => {
  const options = { segment: 16, window: hann(16), detrend: 'constant' as const, average: 'median' as const };
  test('addRun takes every segment of a run', () => {
    for (const k of all) {
      const w = k.createWelch({ ...options, segments: 9, step: 8 });
      expect(w.addRun(series(80, 3))).toBe(9);
      expect(w.endPass()).toBe(false);
      const { power } = estimate(k, series(80, 3), startsOf({ n: 80, segment: 16, step: 8 }), options);
      expect(w.result()).toEqual({ power, segments: 9 });
      w.free();
    }
  });
  test('misuse is refused with a sentence', () => {
    for (const k of all) {
      expect(() => k.createWelch({ ...options, window: hann(15), segments: 1 })).toThrow(
        /15 weights.*16 samples/,
      );
      const w = k.createWelch({ ...options, segments: 1 });
      expect(() => w.endPass()).toThrow(/at least one segment/);
      const bad = new Float64Array(16);
      bad[3] = NaN;
      expect(() => w.add(bad)).toThrow(/sample 0 holds NaN/);
      bad[3] = Infinity;
      expect(() => w.add(bad)).toThrow(/infinite/);
      expect(() => w.add(series(10, 1))).toThrow(/not inside 10 samples/);
      expect(() => w.result()).toThrow(/1 more passes/);
      w.add(series(16, 1));
      expect(() => w.add(series(16, 1))).toThrow(/only 1 segments were announced/);
      w.free();
    }
  });
});
