import { expect, test } from 'vitest';
import { cosTurns, exp, log, power, sinTurns } from '../../src/core/demo/elementary';

/** 20 000 points spread evenly over [low, high] by a golden-ratio sequence. */
function* points(low: number, high: number): Generator<number> {
  for (let i = 0, x = 0.5; i < 20_000; i++, x = (x + 0.6180339887498949) % 1) yield low + (high - low) * x;
}
const EPS = 2 ** -52;

test('log agrees with the engine to 2 ulp, absolute where it passes through 0', () => {
  const near = (x: number): void =>
    expect(Math.abs(log(x) - Math.log(x))).toBeLessThan(2 * EPS * Math.max(Math.abs(Math.log(x)), 1e-3));
  for (const e of points(-700, 700)) near(Math.exp(e));
  for (const x of points(0.5, 2)) near(x);
  expect(log(1)).toBe(0);
  expect(log(2)).toBe(Math.LN2);
});

test('exp agrees with the engine to 2 ulp for small and to its argument’s rounding for large arguments', () => {
  for (const x of points(-1, 1)) expect(Math.abs(exp(x) / Math.exp(x) - 1)).toBeLessThan(2.1 * EPS);
  for (const x of points(-690, 690)) expect(Math.abs(exp(x) / Math.exp(x) - 1)).toBeLessThan(4 * EPS);
  expect(exp(0)).toBe(1);
});

test('power is exp of log', () => {
  for (const x of points(1e-3, 1e3))
    expect(Math.abs(power(x, -7 / 6) / x ** (-7 / 6) - 1)).toBeLessThan(16 * EPS);
});

test('cosine and sine of turns: exact at quarters, squares add to 1, agree with the engine', () => {
  const quarters = [0, 0.25, 0.5, 0.75, 1, -3.25, 1e6 + 0.5];
  quarters.forEach((t, i) => expect(Math.abs(cosTurns(t) - [1, 0, -1, 0, 1, 0, -1][i])).toBe(0));
  quarters.forEach((t, i) => expect(Math.abs(sinTurns(t) - [0, 1, 0, -1, 0, -1, 0][i])).toBe(0));
  for (const t of points(-0.5, 0.5)) {
    expect(Math.abs(cosTurns(t) - Math.cos(2 * Math.PI * t))).toBeLessThan(1e-15);
    expect(Math.abs(sinTurns(t) - Math.sin(2 * Math.PI * t))).toBeLessThan(1e-15);
    expect(Math.abs(cosTurns(t) ** 2 + sinTurns(t) ** 2 - 1)).toBeLessThan(4 * EPS);
  }
});

test('large phases lose nothing: whole turns do not count', () => {
  for (const t of points(0, 1)) {
    const big = t + 4096;
    expect(cosTurns(big)).toBe(cosTurns(big - 4096));
  }
});

test('arguments outside the domain are refused', () => {
  for (const x of [0, -1, NaN, Infinity, 1e-310]) expect(() => log(x)).toThrow('normal positive number');
  for (const x of [701, -701, NaN]) expect(() => exp(x)).toThrow('out of range');
});
