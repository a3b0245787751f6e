import { describe, expect, test } from 'vitest';
import {
  chiSquareQuantile,
  chiSquareTail,
  clopperPearson,
  poissonInterval,
  poissonUpperLimit,
  wilsonInterval,
} from '../../src/core/kernels/special-intervals';
import { kolmogorovSmirnov, kolmogorovTail, smirnovTail } from '../../src/core/kernels/special-kolmogorov';
import { kolmogorovExact } from '../../src/core/kernels/special-kolmogorov-exact';
import { oracle } from '../oracle/oracle';

const numbers = oracle<Record<string, number[][]>>('special');

const close = (found: number, expected: number, relative: number, what: string): void =>
  expect(Math.abs(found - expected), `${what}: ${found} for ${expected}`).toBeLessThanOrEqual(
    relative * Math.abs(expected),
  );

describe('quantiles and intervals equal SciPy', () => {
  test.each(['lower', 'upper'] as const)('chi-squared, %s tail', (tail) => {
    for (const [p, k, x] of numbers[`chi2_${tail}`])
      close(chiSquareQuantile(p, k, tail), x, 1e-11, `${p}, ${k}`);
  });
  test('Clopper–Pearson and Wilson', () => {
    for (const [topic, f] of [
      ['clopper_pearson', clopperPearson],
      ['wilson', wilsonInterval],
    ] as const)
      for (const [k, n, level, low, high] of numbers[topic]) {
        const found = f(k, n, level);
        expect(Math.abs(found.low - low), `${topic} ${k}/${n}`).toBeLessThan(1e-12);
        expect(Math.abs(found.high - high), `${topic} ${k}/${n}`).toBeLessThan(1e-12);
      }
  });
});

describe('published values', () => {
  test('Poisson 90 % upper limits for 0, 1, 2, 3 counts (MEMORY: 2.303, 3.890, 5.322, 6.681)', () => {
    [2.303, 3.89, 5.322, 6.681].forEach((v, k) =>
      expect(Math.abs(poissonUpperLimit(k, 0.9) - v)).toBeLessThan(5.1e-4),
    );
    expect(poissonUpperLimit(0, 0.9)).toBeCloseTo(Math.LN10, 13);
  });
  test('central Poisson interval: Garwood 1936 for 5 counts at 95 % is 1.62 to 11.67 (MEMORY)', () => {
    const { low, high } = poissonInterval(5, 0.95);
    expect(low).toBeCloseTo(1.62, 2);
    expect(high).toBeCloseTo(11.67, 2);
    expect(poissonInterval(0, 0.9)).toEqual({ low: 0, high: expect.closeTo(-Math.log(0.05), 12) as number });
  });
  test('chi-squared with 1 degree of freedom is the square of a normal variable', () => {
    expect(chiSquareQuantile(0.05, 1, 'upper')).toBeCloseTo(1.959963984540054 ** 2, 12);
    expect(chiSquareTail(3.841458820694124, 1)).toBeCloseTo(0.05, 12);
    expect(chiSquareTail(-1, 3)).toBe(1);
    expect(chiSquareTail(2 * Math.log(50), 2)).toBeCloseTo(0.02, 14);
  });
  test('no success in ten: 1 − (α/2)^(1/10); Wilson z²/(n + z²)', () => {
    expect(clopperPearson(0, 10, 0.95).high).toBeCloseTo(1 - 0.025 ** 0.1, 13);
    const z2 = 1.959963984540054 ** 2;
    expect(wilsonInterval(0, 10, 0.95)).toEqual({
      low: 0,
      high: expect.closeTo(z2 / (10 + z2), 13) as number,
    });
    expect(wilsonInterval(10, 10, 0.95).high).toBe(1);
  });
  test('Clopper–Pearson covers at least what it says, by summing the binomial law', () => {
    const [n, level] = [12, 0.9];
    const intervals = Array.from({ length: n + 1 }, (_, k) => clopperPearson(k, n, level));
    const choose = (k: number): number => (k === 0 ? 1 : (choose(k - 1) * (n - k + 1)) / k);
    for (let f = 0.01; f < 1; f += 0.013) {
      let covered = 0;
      intervals.forEach(({ low, high }, k) => {
        if (low <= f && f <= high) covered += choose(k) * f ** k * (1 - f) ** (n - k);
      });
      expect(covered, `${f}`).toBeGreaterThanOrEqual(level);
    }
  });
});

describe('Kolmogorov–Smirnov', () => {
  test('limit and one-sided distribution equal SciPy', () => {
    for (const [x, p] of numbers['kolmogorov']) close(kolmogorovTail(x), p, 1e-12, `${x}`);
    for (const [n, d, p] of numbers['smirnov']) close(smirnovTail(d, n), p, 1e-12, `${n}, ${d}`);
  });
  test('exact p-values equal SciPy, by expansion within 1e-6 above 1000 samples', () => {
    for (const [n, d, p] of numbers['ks']) {
      const off = Math.abs(kolmogorovSmirnov(d, n) - p);
      expect(off, `n = ${n}, d = ${d}: ${kolmogorovSmirnov(d, n)} for ${p}`).toBeLessThan(
        n <= 1000 || n * d * d > 4 ? 1e-10 * p : 1.1e-6,
      );
    }
  });
  test('published: P(D₁₀ < 0.274) = 0.628480 (Marsaglia, Tsang, Wang 2003, MEMORY)', () => {
    expect(kolmogorovExact(0.274, 10)).toBeCloseTo(0.6284796154565043, 13);
    expect(kolmogorovSmirnov(0.274, 10)).toBeCloseTo(1 - 0.6284796154565043, 13);
  });
  test('published: the 5 % point of D₁₀ is 0.409 (table of Miller 1956, MEMORY)', () => {
    expect(kolmogorovSmirnov(0.409, 10)).toBeCloseTo(0.05, 3);
  });
  test('closed forms: one sample is uniform; the ends', () => {
    // For n = 1, D = max(u, 1 − u): P(D ≥ d) = 2(1 − d).
    expect(kolmogorovSmirnov(0.7, 1)).toBeCloseTo(0.6, 14);
    expect(kolmogorovSmirnov(0, 5)).toBe(1);
    expect(kolmogorovSmirnov(1, 5)).toBe(0);
    expect(kolmogorovTail(0)).toBe(1);
    expect(smirnovTail(0, 5)).toBe(1);
    // P(D⁺ ≥ d) for n = 1 is 1 − d.
    expect(smirnovTail(0.3, 1)).toBeCloseTo(0.7, 14);
  });
});

test('misuse', () => {
  expect(() => clopperPearson(3, 2, 0.9)).toThrow(/3 of 2/);
  expect(() => wilsonInterval(1, 2, 1)).toThrow(/confidence level 1/);
  expect(() => poissonUpperLimit(-1, 0.9)).toThrow(/-1 of/);
  expect(() => kolmogorovSmirnov(1.2, 3)).toThrow(/distance 1.2 and 3 samples/);
});
