import { describe, expect, test } from 'vitest';
import { CancelledError, UserError } from '../../src/core/data/errors';
import highPass from '../../src/core/steps/high-pass';
import { samples } from '../kernels/load-kernels';
import { oracle } from '../oracle/oracle';
import { amplitude, sine, worst } from './filters';
import { runStep } from './run-step';
import { gaussianNoise, seriesOf } from './synthetic';

interface Filtered {
  readonly keep: readonly number[];
  readonly 'zero-phase': readonly number[];
  readonly causal: readonly number[];
  readonly half: readonly number[];
}
const numbers = oracle<Record<string, Filtered>>('filters');
const rate = 2048;
const n = 8192;
const noise = samples(n, 5);

describe('valid samples equal scipy.signal', () => {
  test.each([
    ['high-pass butterworth', { frequency: 20, order: 4 }],
    ['high-pass elliptic', { frequency: 40, order: 5, family: 'elliptic', ripple: 0.5, attenuation: 60 }],
  ] as const)('%s', async (name, params) => {
    const expected = numbers[name];
    for (const direction of ['zero-phase', 'causal'] as const) {
      const run = await runStep(highPass, [seriesOf(noise, rate)], { ...params, direction });
      expect(worst(run.outcome.data, expected.keep, expected[direction]), direction).toBeLessThan(1e-9);
    }
  });

  test('a span after a gap is filtered on its own, and nothing is read across', async () => {
    const x = noise.slice();
    x.fill(NaN, n / 2 - 7, n / 2);
    const run = await runStep(highPass, [seriesOf(x, rate)], { frequency: 20, order: 4 });
    const { data } = run.outcome;
    const half = numbers['high-pass butterworth'].half;
    const keep = half.map((_, k) => n / 2 + 61 * k);
    expect(worst(data, keep, half)).toBeLessThan(1e-9);
    expect(data.valid).toHaveLength(2);
    expect(data.read(n / 2 - 7, n / 2).every(Number.isNaN)).toBe(true);
    expect(data.spoilt).toHaveLength(4);
  });
});

describe('closed forms', () => {
  test('a sine in the pass band keeps amplitude and phase; at a Butterworth edge it is halved, causal it is −3 dB', async () => {
    const on = async (f: number, direction: string): Promise<number> =>
      amplitude(
        (await runStep(highPass, [seriesOf(sine(n, rate, f), rate)], { frequency: 64, direction })).outcome
          .data,
      );
    expect(await on(512, 'zero-phase')).toBeCloseTo(1, 4);
    expect(await on(64, 'zero-phase')).toBeCloseTo(0.5, 2);
    expect(await on(64, 'causal')).toBeCloseTo(Math.SQRT1_2, 2);
  });

  test('the stated numbers: gain at the edge −6.02 dB, half power above it', async () => {
    const run = await runStep(highPass, [seriesOf(noise, rate)], { frequency: 64 });
    expect(run.number('gain-at-edge')).toBeCloseTo(-6.0206, 3);
    // |H|⁴ = ½ where (tan-warped) (f0/f)⁸ = √2 − 1, for the order 4.
    const warp = (f: number): number => Math.tan((Math.PI * f) / rate);
    const corner = (rate / Math.PI) * Math.atan(warp(64) / (Math.SQRT2 - 1) ** (1 / 8));
    expect(run.number('corner')).toBeCloseTo(corner, 6);
    expect(run.outcome.sentence).toMatch(/high-passed at 64 Hz/);
  });
});

test('long data in blocks equal short memory and one piece', async () => {
  const x = gaussianNoise(400_000, 1, 3);
  const series = seriesOf(x, rate, { notes: ['contains an injection'] });
  const small = await runStep(highPass, [series], { frequency: 30 }, { memoryLimit: 8 * 2 ** 20 });
  const { data } = small.outcome;
  const whole = (await runStep(highPass, [series], { frequency: 30 })).outcome.data;
  expect(small.blocks).toBeGreaterThan(2);
  const a = data.read(131_000, 131_200);
  const b = whole.read(131_000, 131_200);
  a.forEach((v, i) => expect(Math.abs(v - b[i])).toBeLessThan(1e-12));
  expect(small.outcome.sentence).toContain('contains an injection');
  expect(data.notes).toEqual(['contains an injection']);
});

describe('errors and warnings', () => {
  const short = seriesOf(noise, rate);
  const code = async (params: object, series = short): Promise<string> =>
    runStep(highPass, [series], { ...params }).then(
      () => '',
      (e: unknown) => (e instanceof UserError ? e.code : String(e)),
    );
  test('an edge at half the rate, a filter longer than the data, no data at all', async () => {
    expect(await code({ frequency: 1024 })).toBe('filter-edges');
    expect(await code({ frequency: 0.2 })).toBe('filter-long');
    expect(await code({}, seriesOf(new Float64Array(100).fill(NaN), rate))).toBe('no-data');
  });

  test('causal delays, a short crop leaves ringing, edges take most', async () => {
    const run = await runStep(highPass, [short], { frequency: 5, direction: 'causal', crop: 0.01 });
    expect(run.codes).toEqual(['delayed', 'short-crop']);
    expect((await runStep(highPass, [short], { frequency: 2 })).codes).toEqual(['mostly-edges']);
    expect((await runStep(highPass, [short], { frequency: 64 })).codes).toEqual([]);
  });

  test('stops when told to', async () => {
    const onBlock = (): never => {
      throw new CancelledError();
    };
    await expect(runStep(highPass, [short], {}, { onBlock })).rejects.toThrow(CancelledError);
  });
});

test('figures: the data with their edges marked, and the response with its edge', async () => {
  const run = await runStep(highPass, [seriesOf(noise, rate)], { frequency: 64 });
  const [series, response] = run.figures();
  expect(series.marks.map((m) => m.role)).toEqual(['cropped', 'cropped']);
  expect(response.id).toBe('response');
  expect(response.marks).toHaveLength(1);
  const trace = response.traces[0];
  expect(trace.type === 'line' && trace.y.every((v) => v <= 0.001)).toBe(true);
});
