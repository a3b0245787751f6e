import { expect, test } from 'vitest';
import { fillGaussian } from '../../src/core/demo/counter-noise';
import { halfFromReal, realFromHalf } from '../../src/core/demo/transform';

test.each([4, 8, 16, 64])('length %i equals the defining sum', (n) => {
  const x = fillGaussian(3, n, new Float64Array(n));
  const { re, im } = halfFromReal(x);
  for (let k = 0; k <= n / 2; k++) {
    let a = 0;
    let b = 0;
    x.forEach((v, i) => {
      a += v * Math.cos((2 * Math.PI * k * i) / n);
      b -= v * Math.sin((2 * Math.PI * k * i) / n);
    });
    expect(re[k]).toBeCloseTo(a, 12);
    expect(im[k]).toBeCloseTo(b, 12);
  }
});

test('the two are each other’s inverse, and power is kept (Parseval)', () => {
  const n = 1 << 14;
  const x = fillGaussian(3, 1, new Float64Array(n));
  const { re, im } = halfFromReal(x);
  realFromHalf(re, im).forEach((v, i) => expect(Math.abs(v - x[i])).toBeLessThan(2e-15 * 14));
  let bins = re[0] ** 2 + re[n / 2] ** 2;
  for (let k = 1; k < n / 2; k++) bins += 2 * (re[k] ** 2 + im[k] ** 2);
  const samples = x.reduce((s, v) => s + v * v, 0);
  expect(bins / n / samples).toBeCloseTo(1, 13);
});

test('other lengths are refused', () => {
  expect(() => halfFromReal(new Float64Array(12))).toThrow('power of two');
  expect(() => realFromHalf(new Float64Array(4), new Float64Array(4))).toThrow('power of two');
});
