import { expect, test } from 'vitest';
import type { LineList, NoiseLine } from '../../src/core/data/kinds';
import notch from '../../src/core/steps/notch';
import { samples } from '../kernels/load-kernels';
import { oracle } from '../oracle/oracle';
import { amplitude, sine, worst } from './filters';
import { runStep } from './run-step';
import { seriesOf } from './synthetic';

const numbers =
  oracle<Record<string, { keep: number[]; 'zero-phase': number[]; causal: number[] }>>('filters');
const rate = 2048;
const n = 8192;
const series = seriesOf(samples(n, 5), rate);
const long = seriesOf(samples(8 * n, 5), rate);

const line = (frequency: number, height: number): NoiseLine => ({
  frequency,
  frequencyError: 0.01,
  width: 0.1,
  unresolved: true,
  height,
  power: 1,
  q: frequency / 0.1,
  stability: 'stable',
});
const lines: LineList = {
  kind: 'lines',
  label: 'lines of alder',
  lines: [line(60, 100), line(119.9, 50), line(333, 5), line(2000, 100)],
  spectrum: {
    kind: 'spectrum',
    label: '',
    frequency: Float64Array.of(0, 1),
    density: Float64Array.of(1, 1),
    df: 1,
    unit: 'strain²/Hz',
  },
  floor: Float64Array.of(1, 1),
};

test('valid samples equal scipy.signal', async () => {
  const { keep, ...both } = numbers['notch'];
  for (const direction of ['zero-phase', 'causal'] as const) {
    const run = await runStep(notch, [series], { frequencies: [60], harmonics: 3, q: 20, direction });
    expect(worst(run.outcome.data, keep, both[direction]), direction).toBeLessThan(1e-9);
  }
});

test('a line on the notch goes, one beside it stays; the ringing is 4.6 Q/(π f)', async () => {
  const on = async (f: number): Promise<number> =>
    amplitude(
      (await runStep(notch, [seriesOf(sine(4 * n, rate, f), rate)], { frequencies: [60] })).outcome.data,
    );
  expect(await on(60)).toBeLessThan(0.01);
  expect(await on(90)).toBeCloseTo(1, 2);
  const run = await runStep(notch, [series], { frequencies: [60] });
  expect(run.number('crop')).toBeCloseTo((Math.log(100) * 30) / (Math.PI * 60), 3);
  expect(run.number('width')).toBeCloseTo(2, 9);
});

test('found lines are taken by height, once each, and those above the band are left out', async () => {
  const run = await runStep(notch, [long, lines], { frequencies: [60, 120], height: 10 });
  expect(run.outcome.tables![0].rows.map((r) => r[0])).toEqual([60, 120]);
  expect(run.codes).toEqual(['lines-above-band']);
  const all = await runStep(notch, [series, lines], { height: 1 });
  expect(all.outcome.tables![0].rows.map((r) => [r[0], r[3]])).toEqual([
    [60, 'lines'],
    [119.9, 'lines'],
    [333, 'lines'],
  ]);
});

test('errors and warnings', async () => {
  await expect(runStep(notch, [series])).rejects.toMatchObject({ code: 'no-notch' });
  await expect(runStep(notch, [series, lines], { height: 1000 })).rejects.toThrow(/lower "height"/);
  await expect(runStep(notch, [series], { frequencies: [1500] })).rejects.toMatchObject({
    code: 'notch-frequency',
  });
  expect((await runStep(notch, [long], { frequencies: [60, 62] })).codes).toEqual(['notches-overlap']);
  expect((await runStep(notch, [series], { frequencies: [60], harmonics: 16, q: 8 })).codes).toContain(
    'much-notched',
  );
});

test('the response shows each notch at the bottom', async () => {
  const run = await runStep(notch, [series], { frequencies: [60, 331.7] });
  const response = run.figures()[1];
  expect(response.marks.map((m) => m.from)).toEqual([60, 331.7]);
  const trace = response.traces[0];
  if (trace.type !== 'line') throw new Error('a line');
  const near = (f: number): number => Math.min(...trace.y.filter((_, i) => Math.abs(trace.x[i] - f) < 0.01));
  expect(near(60)).toBeLessThan(-80);
  expect(near(331.7)).toBeLessThan(-80);
});
