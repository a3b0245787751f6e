import { describe, expect, test } from 'vitest';
import { createKernels } from '../../src/core/kernels/kernels';
import {
  chiSquaredParts,
  chiSquaredTail,
  equalBands,
  reweighted,
} from '../../src/core/search/consistency-bands';
import { autocorrelation, chooseLags } from '../../src/core/search/consistency-shape';
import { loudestOf, RAYLEIGH_MEDIAN } from '../../src/core/search/peaks';

const total = (x: Float64Array): number => x.reduce((s, v) => s + v, 0);

describe('χ²', () => {
  test('all of a ratio of 10 in one of 16 equal bands: ρ²(p − 1) = 1500 (algebra)', () => {
    const re = new Float64Array(16);
    re[5] = 10;
    const parts = chiSquaredParts(re, new Float64Array(16), new Float64Array(16).fill(1 / 16));
    expect(total(parts)).toBeCloseTo(1500, 9);
  });

  test('a ratio spread as the shares are: 0', () => {
    const shares = Float64Array.of(0.2, 0.3, 0.5);
    const parts = chiSquaredParts(
      shares.map((q) => 8 * q),
      shares.map((q) => -3 * q),
      shares,
    );
    expect(total(parts)).toBeCloseTo(0, 12);
  });

  test('tail: mean 30 of 30 degrees of freedom has probability 0.4656 (scipy.stats.chi2.sf)', () => {
    expect(chiSquaredTail(30, 30)).toBeCloseTo(0.46565371, 7);
  });
});

test('re-weighted SNR of the published formula (Babak et al. 2013, MEMORY)', () => {
  expect(reweighted(10, 2)).toBeCloseTo(7.782717162260106, 12);
  expect(reweighted(10, 4)).toBeCloseTo(5.59782657857667, 12);
  expect(reweighted(8, 1.5)).toBeCloseTo(7.021533572531501, 12);
  expect(reweighted(8, 0.7)).toBe(8);
});

describe('bands', () => {
  test('hold equal shares to within a bin, cover every bin once', () => {
    const weights = Float64Array.from({ length: 5000 }, (_, k) => (k < 200 || k > 4000 ? 0 : k ** (-7 / 3)));
    const { bounds, shares } = equalBands(weights, 16);
    expect(bounds[0]).toBe(200);
    expect(bounds[16]).toBe(4001);
    expect(total(shares)).toBeCloseTo(1, 12);
    const sum = total(weights);
    shares.forEach((q, l) => {
      expect(Math.abs(q - 1 / 16)).toBeLessThan(weights[200] / sum);
      expect(total(weights.slice(bounds[l], bounds[l + 1])) / sum).toBeCloseTo(q, 12);
    });
  });

  test('more bands than the template has bins are refused', () => {
    const weights = new Float64Array(100);
    weights.fill(1, 40, 45);
    expect(() => equalBands(weights, 16)).toThrow(/set "bands" lower/);
  });
});

test('autocorrelation of a flat band is the Dirichlet kernel', () => {
  const weights = new Float64Array(129);
  weights.fill(1, 10, 20);
  const r = autocorrelation(createKernels(undefined), weights, 256, 30);
  expect(r.re[0]).toBeCloseTo(1, 12);
  for (let j = 1; j <= 30; j++) {
    const expected = Math.abs(Math.sin((Math.PI * 10 * j) / 256) / (10 * Math.sin((Math.PI * j) / 256)));
    expect(Math.hypot(r.re[j], r.im[j])).toBeCloseTo(expected, 12);
  }
});

test('lags are thinned evenly and keep zero', () => {
  const lags = chooseLags(5000, 2000);
  expect(lags.length).toBeLessThanOrEqual(401);
  expect(lags).toContain(0);
  expect([lags[0] >= -5000, lags.at(-1)! <= 2000]).toEqual([true, true]);
  expect([...chooseLags(3, 2)]).toEqual([-3, -2, -1, 0, 1, 2]);
});

test('loudest of a million independent values: N e^(−ρ²/2) = 1 at 5.2565; median √(2 ln 2) (laws)', () => {
  expect(loudestOf(1e6)).toBeCloseTo(5.256521769756932, 12);
  expect(RAYLEIGH_MEDIAN).toBeCloseTo(1.1774100225154747, 12);
  // One false alarm a year with 1000 independent times a second and 2e5 templates lies between 8 and 10 (common practice, no source).
  const year = loudestOf(3.15576e7 * 1000 * 2e5);
  expect(year).toBeGreaterThan(8);
  expect(year).toBeLessThan(10);
});
