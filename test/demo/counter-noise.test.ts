import { createHash } from 'node:crypto';
import { describe, expect, test } from 'vitest';
import { fillGaussian, philox, uniform } from '../../src/core/demo/counter-noise';
import { oracle } from '../oracle/oracle';

interface Oracle {
  blocks: { counter: number[]; key: number[]; words: number[] }[];
  gaussian: number[];
  far: number[];
}
const { blocks, gaussian, far } = oracle<Oracle>('demo-random');

const hex = (words: Uint32Array): string => [...words].map((w) => w.toString(16).padStart(8, '0')).join(' ');
const draw = ([a, b, c, d]: number[], [k, l]: number[]): Uint32Array =>
  philox(new Uint32Array(4), a, b, c, d, k, l);

describe('Philox4x32-10', () => {
  const F = 0xffffffff;
  // Known-answer vectors published with Salmon et al. 2011 (MEMORY; 3 × 128 bits do not agree by accident).
  test.each([
    [[0, 0, 0, 0], [0, 0], '6627e8d5 e169c58d bc57ac4c 9b00dbd8'],
    [[F, F, F, F], [F, F], '408f276d 41c83b0e a20bc7c6 6d5451fd'],
    [
      [0x243f6a88, 0x85a308d3, 0x13198a2e, 0x03707344],
      [0xa4093822, 0x299f31d0],
      'd16cfe09 94fdcceb 5001e420 24126ea1',
    ],
  ])('known answer %#', (counter, key, words) => expect(hex(draw(counter, key))).toBe(words));

  test.each(blocks)('equals the Python form whose 64-bit sister equals NumPy’s: $counter', (b) =>
    expect([...draw(b.counter, b.key)]).toEqual(b.words),
  );
});

describe('uniform numbers', () => {
  test('lie in the open interval and are evenly spread, also in their low bits', () => {
    const n = 100_000;
    const high = new Float64Array(100);
    const low = new Float64Array(64);
    for (let i = 0; i < n; i++) {
      const u = uniform(11, 4, i);
      expect(u > 0 && u < 1).toBe(true);
      high[Math.floor(u * 100)] += 1;
      low[Math.floor((u * 2 ** 46) % 64)] += 1;
    }
    const chi2 = (counts: Float64Array): number =>
      counts.reduce((sum, c) => sum + (c - n / counts.length) ** 2 / (n / counts.length), 0);
    // 99 and 63 degrees of freedom: mean ± 4 standard deviations
    expect(Math.abs(chi2(high) - 99)).toBeLessThan(4 * Math.sqrt(2 * 99));
    expect(Math.abs(chi2(low) - 63)).toBeLessThan(4 * Math.sqrt(2 * 63));
  });

  test('seed, stream and index each change the number; indices beyond 2³² are distinct', () => {
    const all = [
      uniform(1, 1, 0),
      uniform(2, 1, 0),
      uniform(1, 2, 0),
      uniform(1, 1, 1),
      uniform(1, 1, 2 ** 33),
    ];
    expect(new Set(all).size).toBe(all.length);
  });
});

describe('Gaussian numbers', () => {
  test('agree with NumPy’s log and cosine', () => {
    fillGaussian(20240519, 1, new Float64Array(128)).forEach((g, i) =>
      expect(Math.abs(g - gaussian[i])).toBeLessThan(1e-14),
    );
    fillGaussian(7, 3, new Float64Array(8), 2 ** 34).forEach((g, i) =>
      expect(Math.abs(g - far[i])).toBeLessThan(1e-14),
    );
  });

  test('any stretch can be drawn alone', () => {
    const whole = fillGaussian(5, 6, new Float64Array(1000));
    expect(fillGaussian(5, 6, new Float64Array(200), 400)).toEqual(whole.slice(400, 600));
    expect(() => fillGaussian(5, 6, new Float64Array(3))).toThrow('in pairs');
  });

  test('are the same to the bit wherever this runs', () => {
    const g = fillGaussian(1, 1, new Float64Array(4096));
    const bytes = new DataView(new ArrayBuffer(8 * g.length));
    g.forEach((v, i) => bytes.setFloat64(8 * i, v, true));
    expect(createHash('sha256').update(bytes).digest('hex')).toBe(
      '326244298360eb87cc67ea0084e292cda85fb616e45f12b4aad54f7bf29ed8d7',
    );
  });

  test('have the moments and the distribution of a Gaussian, and streams do not know each other', () => {
    const n = 1 << 18;
    const a = fillGaussian(20240519, 1, new Float64Array(n));
    const b = fillGaussian(20240519, 2, new Float64Array(n));
    const moment = (p: number): number => a.reduce((s, v) => s + v ** p, 0) / n;
    expect(Math.abs(moment(1)) * Math.sqrt(n)).toBeLessThan(4);
    expect(Math.abs(moment(2) - 1) * Math.sqrt(n / 2)).toBeLessThan(4);
    expect(Math.abs(moment(3)) * Math.sqrt(n / 15)).toBeLessThan(4);
    expect(Math.abs(moment(4) - 3) * Math.sqrt(n / 96)).toBeLessThan(4);
    const cross = a.reduce((s, v, i) => s + v * b[i], 0);
    expect(Math.abs(cross) / Math.sqrt(n)).toBeLessThan(4);
    // Kolmogorov–Smirnov: √n D below 1.95 is p > 0.001
    const sorted = a.slice().sort();
    let d = 0;
    sorted.forEach((v, i) => {
      const p = normal(v);
      d = Math.max(d, p - i / n, (i + 1) / n - p);
    });
    expect(d * Math.sqrt(n)).toBeLessThan(1.95);
  });
});

/** Normal distribution function by the series of Marsaglia, J. Stat. Softw. 11, 4 (2004); good to 1e-14 for |x| < 6. */
function normal(x: number): number {
  let sum = x;
  let term = x;
  for (let i = 3; i < 200 && Math.abs(term) > 1e-17; i += 2) {
    term *= (x * x) / i;
    sum += term;
  }
  return 0.5 + sum * Math.exp(-0.5 * x * x - 0.9189385332046727);
}
