import { describe, expect, test } from 'vitest';
import {
  medianBias,
  medianVarianceFactor,
  welchVarianceFactor,
} from '../../src/core/kernels/window-figures-averages';
import { makeWindow } from '../../src/core/kernels/windows';
import { oracle } from '../oracle/oracle';

const hann = makeWindow('hann', 4096);

test('Hann at 50 %: correlation of neighbours is 1/36 (Welch 1967)', () => {
  expect(welchVarianceFactor(hann, 2048, 10)).toBeCloseTo((1 + (2 * 0.9) / 36) / 10, 12);
  expect(welchVarianceFactor(hann, 2048, 1)).toBe(1);
  expect(welchVarianceFactor(hann, 4096, 7)).toBe(1 / 7);
});

test('bias of the median equals SciPy', () => {
  for (const [n, bias] of Object.entries(
    oracle<{ median_bias: Record<string, number> }>('windows').median_bias,
  ))
    expect(medianBias(Number(n))).toBeCloseTo(bias, 14);
  expect(medianBias(100_001)).toBeCloseTo(Math.LN2, 5);
});

test('median of independent periodograms: exact for few, 1/(ln 2)² times the mean for many', () => {
  const box = makeWindow('boxcar', 8);
  expect(medianVarianceFactor(box, 8, 1)).toBe(1);
  expect(medianVarianceFactor(box, 8, 2)).toBe(0.5);
  expect(medianVarianceFactor(box, 8, 3)).toBeCloseTo(0.52, 14);
  expect(20_001 * medianVarianceFactor(box, 8, 20_001)).toBeCloseTo(1 / Math.LN2 ** 2, 3);
});

test('misuse', () => {
  expect(() => medianBias(0)).toThrow(/0 averages/);
  expect(() => welchVarianceFactor(hann, 0, 3)).toThrow(/step 0/);
});

/** xorshift32 and Box–Muller: fixed seed, so the numbers below repeat. */
function gaussians(seed: number): () => number {
  let s = seed;
  const uniform = (): number => {
    s ^= s << 13;
    s ^= s >>> 17;
    s ^= s << 5;
    return ((s >>> 0) + 0.5) / 2 ** 32;
  };
  return () => Math.sqrt(-2 * Math.log(uniform())) * Math.cos(2 * Math.PI * uniform());
}

/** Mean and variance of mean and bias-corrected median of the power in one bin of white noise, in units of the density. */
function simulate(
  w: Float64Array,
  step: number,
  averages: number,
  trials: number,
): Record<'mean' | 'median', [number, number]> {
  const normal = gaussians(12345);
  const n = w.length;
  const bin = Math.floor(n / 4) + 1;
  const squares = w.reduce((a, v) => a + v * v, 0);
  const c = w.map((v, i) => v * Math.cos((2 * Math.PI * bin * i) / n));
  const s = w.map((v, i) => v * Math.sin((2 * Math.PI * bin * i) / n));
  const sums = { mean: [0, 0], median: [0, 0] };
  for (let t = 0; t < trials; t++) {
    const x = new Float64Array(n + step * (averages - 1)).map(normal);
    const p = new Float64Array(averages).map((_, k) => {
      let re = 0;
      let im = 0;
      for (let i = 0; i < n; i++) {
        re += c[i] * x[k * step + i];
        im += s[i] * x[k * step + i];
      }
      return (re * re + im * im) / squares;
    });
    const mean = p.reduce((a, v) => a + v, 0) / averages;
    p.sort();
    const median = (p[(averages - 1) >> 1] + p[averages >> 1]) / 2 / medianBias(averages);
    [mean, median].forEach((v, i) => {
      const sum = i === 0 ? sums.mean : sums.median;
      sum[0] += v / trials;
      sum[1] += (v * v) / trials;
    });
  }
  const moments = ([a, b]: number[]): [number, number] => [a, b - a * a];
  return { mean: moments(sums.mean), median: moments(sums.median) };
}

describe('variance factors agree with simulated white noise', () => {
  const n = 32;
  // Limits of median variance over formula: 1 but for the stated shortfall with overlap, ± 3 standard errors (4 %).
  test.each([
    ['boxcar', n, 5, 0.96, 1.04],
    ['boxcar', n, 8, 0.96, 1.04],
    ['hann', n / 2, 8, 0.96, 1.06],
    ['hann', n / 2, 31, 0.96, 1.06],
    ['hann', n / 4, 8, 1.1, 1.22],
    ['hann', n / 4, 16, 1.04, 1.13],
    ['hann', n / 4, 33, 0.99, 1.08],
  ] as const)('%s, step %i of 32, %i averages', (name, step, averages, low, high) => {
    const w = makeWindow(name, n);
    const found = simulate(w, step, averages, 20_000);
    expect(Math.abs(found.mean[1] / welchVarianceFactor(w, step, averages) - 1)).toBeLessThan(0.04);
    const ratio = found.median[1] / medianVarianceFactor(w, step, averages);
    expect(ratio).toBeGreaterThan(low);
    expect(ratio).toBeLessThan(high);
    expect(Math.abs(found.mean[0] - 1)).toBeLessThan(0.01);
  });
});
