import { describe, expect, test } from 'vitest';
import { CancelledError } from '../../src/core/data/errors';
import stationarity from '../../src/core/steps/stationarity';
import { runStep } from './run-step';
import { gaussianNoise, seriesOf } from './synthetic';

const rate = 1024;
const on = (x: Float64Array, params: object = {}) =>
  runStep(stationarity, [seriesOf(x, rate)], { ...params });

describe('steady Gaussian noise', () => {
  test('scatters as expected: boxcar segments without overlap have 1/√(segments · bins) in closed form', async () => {
    const run = await on(gaussianNoise(512 * rate, 1, 3), {
      bands: [100, 300],
      window: 'boxcar',
      overlap: 0,
      segment: 1,
      stride: 8,
    });
    // Bins of 1 Hz from 100 to 300 Hz.
    expect(run.number('expected-1')).toBeCloseTo(100 / Math.sqrt(8 * 201), 2);
    expect(run.number('excess-1')).toBeGreaterThan(0.8);
    expect(run.number('excess-1')).toBeLessThan(1.25);
  });

  test('over many seeds the scatter is the expected one, for bands and reach, with window and overlap', async () => {
    const squares = [0, 0, 0, 0];
    const small = [0, 0, 0, 0];
    const seeds = 24;
    for (let seed = 1; seed <= seeds; seed++) {
      const run = await on(gaussianNoise(128 * rate, 2, 50 + seed), {
        stride: 8,
        bands: [20, 60, 60, 300, 300, 500],
      });
      for (let i = 0; i < 4; i++) {
        squares[i] += run.number(`excess-${i + 1}`) ** 2 / seeds;
        if (run.number(`p-value-${i + 1}`) < 0.1) small[i]++;
      }
    }
    // χ² over its freedom has mean 1 and variance 2/(15 · 24).
    for (const s of squares) expect(Math.abs(s - 1)).toBeLessThan(4 * Math.sqrt(2 / (15 * seeds)));
    for (const n of small) expect(n).toBeLessThan(9);
  });
});

test('a louder stretch is the furthest stride, is warned of and can be left out; noise that breathes drifts', async () => {
  const x = gaussianNoise(256 * rate, 1, 7);
  for (let i = 80 * rate; i < 84 * rate; i++) x[i] *= 2;
  const run = await on(x, { bands: [60, 300] });
  expect(run.codes).toEqual(['excursion']);
  expect(run.outcome.tables![0].rows[0][3]).toBe('1400000080');
  const fix = run.outcome.warnings[0].fix;
  if (fix?.kind !== 'set') throw new Error('a fix');
  expect(fix.params).toEqual({ exclude: [80, 88] });
  expect((await on(x, { bands: [60, 300], ...fix.params })).codes).toEqual(['empty-strides']);
  const y = gaussianNoise(512 * rate, 1, 9).map(
    (v, i) => v * (1 + 0.05 * Math.sin((2 * Math.PI * i) / (100 * rate))),
  );
  expect((await on(y, { bands: [60, 300] })).codes).toContain('drift');
});

test('gaps break the line and nothing leaks; notes are repeated', async () => {
  const x = gaussianNoise(128 * rate, 1, 4);
  x.fill(NaN, 40 * rate, 50 * rate);
  const run = await runStep(stationarity, [seriesOf(x, rate, { notes: ['contains an injection'] })], {
    bands: [60, 300],
  });
  const [curve] = run.outcome.data.curves;
  // The gap takes all of stride 5 (40 to 48 s) and a quarter of the next.
  expect([...curve.values].map(Number.isNaN).indexOf(true)).toBe(5);
  expect(curve.values.filter(Number.isNaN)).toHaveLength(1);
  expect(run.outcome.sentence).toContain('contains an injection');
  expect(run.figures()).toHaveLength(2);
  expect(run.figures()[0].traces.map((t) => t.type)).toEqual(['range', 'line']);
});

test('errors say what to set; it stops when told to', async () => {
  const x = gaussianNoise(64 * rate, 1, 4);
  await expect(on(x, { stride: 30 })).rejects.toMatchObject({ code: 'few-strides' });
  await expect(on(x, { segment: 6 })).rejects.toMatchObject({ code: 'stride-short' });
  await expect(on(x, { bands: [100, 101] })).rejects.toMatchObject({ code: 'band-narrow' });
  await expect(on(x, { bands: [300, 100] })).rejects.toMatchObject({ code: 'band-empty' });
  const onBlock = (): never => {
    throw new CancelledError();
  };
  await expect(runStep(stationarity, [seriesOf(x, rate)], {}, { onBlock })).rejects.toThrow(CancelledError);
});
