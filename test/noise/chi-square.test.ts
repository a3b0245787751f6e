import { expect, test } from 'vitest';
import { incompleteGamma } from '../../src/core/kernels/special-incomplete-gamma';
import { chiSquareQuantile } from '../../src/core/noise/chi-square';
import { oracle } from '../oracle/oracle';

const numbers = oracle<{ chi2: [number, number, number][]; gamma: [number, number, number][] }>(
  'noise-spectrum',
);

test.each(numbers.chi2)(
  'chi-square quantile: p %d, %d degrees of freedom (scipy.stats.chi2.ppf)',
  (p, v, expected) => {
    expect(chiSquareQuantile(p, v) / expected).toBeCloseTo(1, 9);
  },
);

test.each(numbers.gamma)(
  'incomplete gamma function: a %d, x %d (scipy.special.gammainc)',
  (a, x, expected) => {
    const got = incompleteGamma(a, x).lower;
    if (expected < 1e-290) expect(got).toBeLessThan(1e-280);
    else expect(got / expected).toBeCloseTo(1, 9);
  },
);

test('refuses probabilities outside (0, 1)', () => {
  expect(() => chiSquareQuantile(0, 2)).toThrow(RangeError);
  expect(() => incompleteGamma(-1, 2)).toThrow(RangeError);
});
