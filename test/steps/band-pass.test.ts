import { describe, expect, test } from 'vitest';
import bandPass from '../../src/core/steps/band-pass';
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

describe('valid samples equal scipy.signal', () => {
  test.each([
    ['band-pass chebyshev-1', { low: 30, high: 300, order: 3, family: 'chebyshev-1', ripple: 1 }],
    ['band-pass chebyshev-2', { low: 20, high: 400, order: 4, family: 'chebyshev-2', attenuation: 50 }],
  ] as const)('%s', async (name, params) => {
    for (const direction of ['zero-phase', 'causal'] as const) {
      const run = await runStep(bandPass, [series], { ...params, direction });
      expect(worst(run.outcome.data, numbers[name].keep, numbers[name][direction]), direction).toBeLessThan(
        1e-9,
      );
    }
  });
});

test('a sine inside passes, one outside does not; both edges of a Butterworth band halve', async () => {
  const on = async (f: number): Promise<number> =>
    amplitude(
      (await runStep(bandPass, [seriesOf(sine(n, rate, f), rate)], { low: 64, high: 256 })).outcome.data,
    );
  expect(await on(128)).toBeCloseTo(1, 3);
  expect(await on(64)).toBeCloseTo(0.5, 2);
  expect(await on(256)).toBeCloseTo(0.5, 2);
  expect(await on(16)).toBeLessThan(1e-3);
  expect(await on(800)).toBeLessThan(1e-3);
});

test('half power lies inside the edges, the middle keeps its gain', async () => {
  const run = await runStep(bandPass, [series], { low: 64, high: 256 });
  expect(run.number('gain-low')).toBeCloseTo(-6.0206, 3);
  expect(run.number('gain-high')).toBeCloseTo(-6.0206, 3);
  expect(run.number('gain-middle')).toBeCloseTo(0, 3);
  expect(run.number('low-corner')).toBeGreaterThan(64);
  expect(run.number('high-corner')).toBeLessThan(256);
  expect(run.codes).toEqual([]);
});

test('errors name the edge; a narrow band is said to ring', async () => {
  await expect(runStep(bandPass, [series], { low: 300, high: 30 })).rejects.toMatchObject({
    code: 'filter-edges',
  });
  await expect(runStep(bandPass, [series], { high: 1500 })).rejects.toThrow(/1024 Hz, half the sample rate/);
  expect((await runStep(bandPass, [series], { low: 100, high: 104, order: 2 })).codes).toContain(
    'narrow-band',
  );
});
