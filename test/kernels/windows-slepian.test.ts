import { describe, expect, test } from 'vitest';
import { slepianTapers } from '../../src/core/kernels/windows-slepian';
import { oracle } from '../oracle/oracle';

interface Case {
  readonly n: number;
  readonly nw: number;
  readonly tapers: readonly (readonly number[])[];
  readonly ratios: readonly number[];
}
const { slepian } = oracle<{ slepian: Case[] }>('windows');

describe('Slepian tapers', () => {
  test.each(slepian)('$n samples, NW $nw: equal to SciPy, sign included', ({ n, nw, tapers, ratios }) => {
    const found = slepianTapers(n, nw, tapers.length);
    tapers.forEach((v, k) => {
      v.forEach((x, i) => expect(Math.abs(found.tapers[k][i] - x), `taper ${k}`).toBeLessThan(1e-11));
      expect(Math.abs(found.concentration[k] - ratios[k])).toBeLessThan(1e-12);
    });
  });
  test('leakage at 1024 samples, NW 4 (Slepian, Thomson; COMPUTED with SciPy)', () => {
    const { concentration } = slepianTapers(1024, 4, 4);
    [2.944e-10, 2.767e-8, 1.2097e-6, 3.2437e-5].forEach((v, k) =>
      expect(Math.abs((1 - concentration[k]) / v - 1)).toBeLessThan(1e-3),
    );
  });
  test('orthonormal, even and odd in turn, even for long ones', () => {
    const n = 20_001;
    const { tapers } = slepianTapers(n, 3.5, 6);
    tapers.forEach((a, j) => {
      tapers.forEach((b, k) => {
        expect(a.reduce((sum, v, i) => sum + v * b[i], 0)).toBeCloseTo(j === k ? 1 : 0, 9);
      });
      const parity = j % 2 === 0 ? 1 : -1;
      for (let i = 0; i < n; i += 997) expect(a[i]).toBeCloseTo(parity * a[n - 1 - i], 9);
    });
  });
  test('misuse', () => {
    expect(() => slepianTapers(1, 0.2, 1)).toThrow(/taper length 1/);
    expect(() => slepianTapers(64, 32, 1)).toThrow(
      /half bandwidth 32 bins: it must lie above 0 and below 32/,
    );
    expect(() => slepianTapers(64, 4, 65)).toThrow(/65 tapers of 64 samples/);
  });
});
