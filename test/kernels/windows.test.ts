import { describe, expect, test } from 'vitest';
import { makeWindow } from '../../src/core/kernels/windows';
import { WINDOW_NAMES, type WindowName, type WindowShape } from '../../src/core/kernels/windows-names';
import { oracle } from '../oracle/oracle';

interface Case {
  readonly name: WindowName;
  readonly shape: WindowShape;
  readonly n: number;
  readonly periodic: boolean;
  readonly w: readonly number[];
}
const { windows } = oracle<{ windows: Case[] }>('windows');

describe('windows equal SciPy 1.17 within 1e-14', () => {
  const groups = new Map<string, Case[]>();
  for (const c of windows) {
    const key = `${c.name} ${JSON.stringify(c.shape)}`;
    groups.set(key, [...(groups.get(key) ?? []), c]);
  }
  test.each([...groups])('%s', (_, cases) => {
    for (const c of cases) {
      const w = makeWindow(c.name, c.n, { ...c.shape, periodic: c.periodic });
      expect(w.length).toBe(c.w.length);
      const off = Math.max(...c.w.map((v, i) => Math.abs(v - w[i])));
      expect(off, `${c.n} ${c.periodic ? 'periodic' : 'symmetric'}`).toBeLessThan(1e-14);
    }
  });
});

describe('every window', () => {
  test.each(WINDOW_NAMES)(
    '%s: symmetric form is symmetric, periodic form is it without the last sample',
    (name) => {
      for (const n of [16, 17]) {
        const shape = { std: 3 };
        const whole = makeWindow(name, n + 1, { ...shape, periodic: false });
        const period = makeWindow(name, n, shape);
        period.forEach((v, i) => expect(v).toBeCloseTo(whole[i], 14));
        whole.forEach((v, i) => expect(v).toBeCloseTo(whole[n - i], 14));
      }
    },
  );
  test.each(WINDOW_NAMES)('%s: weights are finite, the peak is in the middle', (name) => {
    const w = makeWindow(name, 64);
    expect(w.every(Number.isFinite)).toBe(true);
    expect(Math.max(...w)).toBeCloseTo(w[32], 14);
    expect(Array.from(makeWindow(name, 1))).toEqual([1]);
  });
});

test('long windows keep their digits: Hann of 2^24 samples has its known values within one rounding', () => {
  const n = 2 ** 24;
  const w = makeWindow('hann', n);
  expect(Math.abs(w[n / 4] - 0.5)).toBeLessThan(2e-16);
  expect(w[n / 2]).toBe(1);
  // sin² = (1 − cos)/2 near the start, where the difference has lost its digits unless the angle is exact.
  expect(w[1] * n ** 2).toBeCloseTo(Math.PI ** 2, 1);
  expect(w[n - 1]).toBe(w[1]);
});

describe('misuse is one sentence', () => {
  test.each([
    [() => makeWindow('han' as WindowName, 8), /there is no window "han". Did you mean "hann"/],
    [() => makeWindow('hann', 0), /window length 0: it must be a whole number of samples, at least 1/],
    [() => makeWindow('hann', 8.5), /window length 8.5/],
    [() => makeWindow('tukey', 8, { alpha: 1.5 }), /tukey window: alpha is 1.5; it must be between 0/],
    [() => makeWindow('kaiser', 8, { beta: -1 }), /kaiser window: beta is -1/],
    [() => makeWindow('gaussian', 8, { std: 0 }), /gaussian window: std is 0/],
  ])('%#', (run, message) => {
    expect(run).toThrow(message);
  });
});
