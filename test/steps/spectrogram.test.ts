import { describe, expect, test } from 'vitest';
import { CancelledError } from '../../src/core/data/errors';
import spectrogram from '../../src/core/steps/spectrogram';
import { samples } from '../kernels/load-kernels';
import { oracle } from '../oracle/oracle';
import { runStep } from './run-step';
import { gaussianNoise, seriesOf } from './synthetic';

const rate = 1024;
const numbers = oracle<{ f: number[]; t: number[]; root: number[][] }>('spectrogram');

test('densities equal scipy.signal.spectrogram, at its frequencies and times', async () => {
  const run = await runStep(spectrogram, [seriesOf(samples(8192, 7), rate)], {
    scale: 'density',
    low: 20,
    high: 118,
  });
  const [{ rows }] = run.outcome.data.planes;
  expect(rows.map((r) => r.frequency)).toEqual(numbers.f);
  rows.forEach((row, k) => {
    expect(row.values).toHaveLength(numbers.t.length);
    row.values.forEach((v, i) => {
      expect(row.offset + (i + 0.5) * row.cell).toBeCloseTo(numbers.t[i], 9);
      expect(Math.abs(v / numbers.root[k][i] - 1)).toBeLessThan(1e-5);
    });
  });
});

describe('closed forms', () => {
  test('white noise of standard deviation σ has density 2σ²/rate; over the median its mean is 1/ln 2', async () => {
    const series = seriesOf(gaussianNoise(256 * rate, 3, 4), rate);
    const cells = (data: { planes: readonly { rows: readonly { values: Float32Array }[] }[] }): number[] =>
      data.planes[0].rows.flatMap((r) => Array.from(r.values));
    const density = cells((await runStep(spectrogram, [series], { scale: 'density' })).outcome.data);
    const power = density.reduce((s, v) => s + v * v, 0) / density.length;
    expect(Math.abs(power / (18 / rate) - 1)).toBeLessThan(0.01);
    const relative = cells((await runStep(spectrogram, [series])).outcome.data);
    expect(relative.reduce((s, v) => s + v, 0) / relative.length).toBeCloseTo(1 / Math.LN2, 1);
  });

  test('a burst is the loudest cell at its time and frequency; a gap takes away what touches it', async () => {
    const x = gaussianNoise(64 * rate, 1, 8);
    for (let i = 0; i < 256; i++) x[30 * rate + i] += 8 * Math.sin((2 * Math.PI * 200 * i) / rate);
    x.fill(NaN, 40 * rate, 41 * rate);
    const run = await runStep(spectrogram, [seriesOf(x, rate, { notes: ['contains an injection'] })]);
    expect(Math.abs(run.number('loudest-time') - 30.125)).toBeLessThan(0.26);
    expect(run.number('loudest-frequency')).toBe(200);
    expect(run.outcome.sentence).toContain('contains an injection');
    const [{ rows }] = run.outcome.data.planes;
    // Segments of half a second every quarter: those that begin from 39.75 to 40.75 touch the gap.
    const missing = rows[0].values.reduce((n, v) => n + (Number.isNaN(v) ? 1 : 0), 0);
    expect(missing).toBe(5);
    const [figure] = run.figures({ width: 400 });
    expect(figure.marks.map((m) => [m.role, m.from, m.to])).toEqual([['gap', 40, 41]]);
    const [image] = figure.traces;
    if (image.type !== 'image') throw new Error('an image');
    expect(Math.max(...image.values.filter(Number.isFinite))).toBeCloseTo(run.number('loudest'), 3);
  });
});

test('errors, warnings and cancel', async () => {
  const series = seriesOf(gaussianNoise(8 * rate, 1, 1), rate);
  const on = (params: object, memoryLimit = 2 ** 29) =>
    runStep(spectrogram, [series], { ...params }, { memoryLimit });
  await expect(on({ segment: 0.001 })).rejects.toMatchObject({ code: 'segment-short' });
  await expect(on({ segment: 8 })).rejects.toMatchObject({ code: 'segment-long' });
  await expect(on({ low: 500, high: 501 })).rejects.toMatchObject({ code: 'band-empty' });
  expect((await on({ segment: 1 })).codes).toEqual(['few-segments']);
  expect((await on({}, 2 ** 16)).codes).toContain('map-shortened');
  const onBlock = (): never => {
    throw new CancelledError();
  };
  await expect(runStep(spectrogram, [series], {}, { onBlock })).rejects.toThrow(CancelledError);
});
