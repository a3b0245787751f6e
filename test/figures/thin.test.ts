import { describe, expect, test } from 'vitest';
import {
  columnCentre,
  columnFinder,
  lowerBound,
  thinLine,
  thinRange,
  visible,
} from '../../src/core/figures/thin';
import { uniform } from '../steps/synthetic';

const ramp = (n: number): Float64Array => Float64Array.from({ length: n }, (_, i) => i);
const linear = (from: number, to: number, width: number) => ({ from, to, width, scale: 'linear' as const });
const log = (from: number, to: number, width: number) => ({ from, to, width, scale: 'log' as const });

describe('thinLine', () => {
  test('keeps at most two points per column, and the smallest and largest sample of each', () => {
    const next = uniform(4);
    const x = ramp(100_000);
    const y = x.map(() => next());
    const c = linear(0, 100_000, 500);
    const { x: px, y: py } = thinLine(x, y, c);
    expect(px.length).toBeLessThanOrEqual(2 * 500);
    const find = columnFinder(c);
    for (let k = 0; k < 500; k++) {
      const inside = y.slice(k * 200, (k + 1) * 200);
      const shown = py.filter((_, i) => find(px[i]) === k);
      expect(Math.min(...shown)).toBe(Math.min(...inside));
      expect(Math.max(...shown)).toBe(Math.max(...inside));
    }
    // Every point shown is a sample at its own place, in order.
    px.forEach((v, i) => expect(py[i]).toBe(y[v]));
    expect(px.every((v, i) => i === 0 || v > px[i - 1])).toBe(true);
  });

  test.each([50, 333, 900, 2500])('a one-sample spike is there at any zoom, %d pixels wide', (width) => {
    const n = 60_000;
    const at = 41_237;
    const y = new Float64Array(n);
    y[at] = 7;
    for (const scale of ['linear', 'log'] as const)
      for (let half = 30_000; half > 1; half = Math.floor(half / 3)) {
        const c = { from: Math.max(1, at - half * 0.7), to: Math.min(n, at + half), width, scale };
        const shown = thinLine(ramp(n), y, c);
        const k = shown.y.indexOf(7);
        expect(k, `±${half} ${scale}`).toBeGreaterThanOrEqual(0);
        expect(shown.x[k]).toBe(at);
      }
  });

  test('on a logarithmic axis positions at and below zero do not exist', () => {
    const { x } = thinLine(ramp(10), ramp(10), log(1, 9, 100));
    expect(x[0]).toBe(1);
    const wide = thinLine(ramp(10_000), ramp(10_000), log(1, 9999, 100));
    expect(Math.min(...wide.x)).toBe(1);
    expect(wide.x.length).toBeLessThanOrEqual(200 + 2);
  });

  test('few samples per column are given as they are, with one neighbour outside on each side', () => {
    const { x } = thinLine(ramp(1000), ramp(1000), linear(99.5, 110.5, 100));
    expect([...x]).toEqual([99, 100, 101, 102, 103, 104, 105, 106, 107, 108, 109, 110, 111]);
  });

  test('columns without a value break the line; a gap narrower than a column does not', () => {
    const y = ramp(10_000).fill(1);
    y.fill(NaN, 3000, 5000);
    y[7000] = NaN;
    const shown = thinLine(ramp(10_000), y, linear(0, 10_000, 100));
    const breaks = [...shown.x].filter((_, i) => Number.isNaN(shown.y[i]));
    expect(breaks.length).toBe(20);
    expect(Math.min(...breaks)).toBe(3000);
    expect(Math.max(...breaks)).toBe(4900);
  });

  test('a single sample between gaps is widened to one column, so that it is drawn', () => {
    for (const n of [50, 10_000]) {
      const y = ramp(n).fill(NaN);
      y[n / 2] = 3;
      const shown = thinLine(ramp(n), y, linear(0, n, 100));
      const at = [...shown.x].filter((_, i) => shown.y[i] === 3);
      expect(at.length).toBe(2);
      expect(at[1] - at[0]).toBeCloseTo(n / 100, 9);
      expect((at[0] + at[1]) / 2).toBeCloseTo(n / 2, 9);
    }
  });

  test('nothing in, nothing out', () => {
    expect(thinLine([], [], linear(0, 1, 100)).x.length).toBe(0);
    expect(thinLine([5], [1], linear(0, 1, 100)).x.length).toBeLessThanOrEqual(2);
  });
});

describe('thinRange', () => {
  test('spans the smallest low and the largest high of a column', () => {
    const x = ramp(10_000);
    const low = x.map((i) => (i === 4321 ? -9 : 0));
    const high = x.map((i) => (i === 8765 ? 9 : 1));
    const shown = thinRange(x, low, high, linear(0, 10_000, 100));
    expect(shown.x.length).toBe(100);
    expect(Math.min(...shown.low)).toBe(-9);
    expect(Math.max(...shown.high)).toBe(9);
    expect(shown.x[0]).toBeCloseTo(50, 9);
  });

  test('has no value where there is none', () => {
    const none = ramp(1000).fill(NaN);
    const shown = thinRange(ramp(1000), none, none, linear(0, 1000, 100));
    expect(shown.low.every(Number.isNaN)).toBe(true);
  });
});

test('columns divide a logarithmic axis evenly in the logarithm', () => {
  const c = log(10, 1000, 20);
  expect(columnCentre(c, -0.5)).toBeCloseTo(10, 9);
  expect(columnCentre(c, 9.5)).toBeCloseTo(100, 9);
  expect(columnFinder(c)(99.9)).toBe(9);
  expect(columnFinder(c)(100.1)).toBe(10);
  expect(() => columnFinder(log(10, 10, 20))).toThrow(RangeError);
  expect(() => columnFinder(log(0, 10, 20))).toThrow(RangeError);
});

test('bounds by bisection', () => {
  const x = [1, 2, 2, 3];
  expect([0, 1, 1.5, 2, 2.5, 3, 4].map((v) => lowerBound(x, v))).toEqual([0, 0, 1, 1, 3, 3, 4]);
  expect(visible(x, linear(2, 2, 10))).toEqual({ from: 0, to: 4 });
});
