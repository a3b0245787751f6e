import { beforeAll, describe, expect, test } from 'vitest';
import { UserError } from '../../src/core/data/errors';
import { addSeconds, gpsTime } from '../../src/core/data/gps-time';
import type { Spectrum } from '../../src/core/data/kinds';
import type { Kernels } from '../../src/core/kernels/kernels';
import { fQuantile } from '../../src/core/noise/f-distribution';
import { digamma, trigamma } from '../../src/core/noise/polygamma';
import compareNoise from '../../src/core/steps/compare-noise';
import noiseSpectrum from '../../src/core/steps/noise-spectrum';
import { loadKernels, samples } from '../kernels/load-kernels';
import { oracle } from '../oracle/oracle';
import { runStep } from './run-step';
import { gaussianNoise, seriesOf } from './synthetic';

const numbers = oracle<{
  rate: number;
  f: [p: number, d1: number, d2: number, lower: number, upper: number][];
  digamma: [number, number][];
  trigamma: [number, number][];
  ratio: { same: number[]; coarse: { frequency: number[]; ratio: number[] } };
}>('compare-noise');

const fs = 256;
let wasm: Kernels;
beforeAll(async () => (wasm = (await loadKernels()).wasm));

async function spectrum(
  x: Float64Array,
  params: Record<string, unknown> = {},
  rate = fs,
  over: Parameters<typeof seriesOf>[2] = {},
): Promise<Spectrum> {
  const run = await runStep(
    noiseSpectrum,
    [seriesOf(x, rate, over)],
    { segment: 1, ...params },
    { kernels: wasm },
  );
  return run.outcome.data;
}
const birch = { label: 'birch /strain', channel: 'birch' };

describe('against SciPy and NumPy', () => {
  test('quantiles of F', () => {
    for (const [p, a, b, lower, upper] of numbers.f) {
      expect(fQuantile(p, a, b, 'lower') / lower).toBeCloseTo(1, 8);
      expect(fQuantile(p, a, b, 'upper') / upper).toBeCloseTo(1, 8);
      // Two degrees of freedom have the closed form (b/2)(p^(−2/b) − 1), from which SciPy 1.17 is off by 5e-10 at 1e-7.
      if (a === 2)
        expect(fQuantile(p, a, b, 'upper') / ((b / 2) * Math.expm1((-2 / b) * Math.log(p)))).toBeCloseTo(
          1,
          12,
        );
      // A denominator known exactly is the limit of many degrees of freedom.
      expect(fQuantile(p, a, Infinity, 'upper') / fQuantile(p, a, 1e9, 'upper')).toBeCloseTo(1, 6);
      expect(fQuantile(p, Infinity, b, 'upper') / fQuantile(p, 1e9, b, 'upper')).toBeCloseTo(1, 6);
    }
    expect(fQuantile(0.01, Infinity, Infinity, 'upper')).toBe(1);
  });

  test('ψ and ψ′', () => {
    for (const [x, v] of numbers.digamma) expect(digamma(x)).toBeCloseTo(v, 11);
    for (const [x, v] of numbers.trigamma) expect(trigamma(x) / v).toBeCloseTo(1, 12);
  });

  test('the ratio on equal frequencies', async () => {
    const { rate } = numbers;
    const [a, b] = await Promise.all(
      [21, 23].map((seed) => spectrum(samples(20_000, seed), { average: 'mean' }, rate)),
    );
    const run = await runStep(compareNoise, [a, b]);
    expect(run.codes).not.toContain('grids-differ');
    expect(run.outcome.data.frequency[0]).toBe(1);
    numbers.ratio.same.slice(1).forEach((v, k) => {
      expect(run.outcome.data.values[k] / v).toBeCloseTo(1, 10);
    });
  });

  test('the finer grid is interpolated at the coarser one', async () => {
    const { rate } = numbers;
    const fine = await spectrum(samples(20_000, 21), { average: 'mean' }, rate);
    const coarse = await spectrum(samples(30_000, 22), { average: 'mean', segment: 0.25 }, rate, birch);
    const { frequency, ratio } = numbers.ratio.coarse;
    for (const order of [1, -1]) {
      const run = await runStep(compareNoise, order > 0 ? [fine, coarse] : [coarse, fine]);
      expect([...run.outcome.data.frequency]).toEqual(frequency);
      // Below the second bin of the fine one lies only bin zero, which has no place in log frequency.
      run.outcome.data.values.forEach((v, k) => {
        expect(v / ratio[k] ** order).toBeCloseTo(1, 10);
      });
      expect(run.outcome.warnings.find((w) => w.code === 'grids-differ')).toMatchObject({
        severity: 'caution',
        value: 0.25,
      });
      expect(run.outcome.sentence).toContain('(noise of alder /strain interpolated)');
    }
  });
});

describe('equal noise', () => {
  test.each<[string, Record<string, unknown>, Record<string, unknown>]>([
    ['two means', { average: 'mean' }, { average: 'mean' }],
    ['mean and median', { average: 'mean' }, { average: 'median' }],
    ['two medians', { average: 'median' }, { average: 'median' }],
    ['mean, median-mean', { average: 'mean', window: 'nuttall', overlap: 0.75 }, { average: 'median-mean' }],
  ])('lies in its band as often as stated (%s)', async (_, p, q) => {
    let [outside, bins, ranges, covered, bands] = [0, 0, 0, 0, 0];
    const runs = 60;
    for (let seed = 1; seed <= runs; seed++) {
      const a = await spectrum(gaussianNoise(fs * 60, 1, seed), p);
      const b = await spectrum(gaussianNoise(fs * 30, 1, 500 + seed), q, fs, birch);
      const run = await runStep(compareNoise, [a, b], { 'false-bins': 1, bands: [10, 60, 60, 120] });
      bins += run.number('bins');
      outside += run.number('outside') * run.number('bins');
      ranges += run.number('ranges');
      for (const n of run.outcome.numbers.filter((v) => v.id.startsWith('ratio'))) {
        bands++;
        if (n.low! < 1 && n.high! > 1) covered++;
      }
    }
    expect(Math.abs(outside / bins - 0.1)).toBeLessThan(0.015);
    expect(ranges).toBeLessThanOrEqual(runs + 3 * Math.sqrt(runs));
    expect(ranges).toBeGreaterThan(0.25 * runs);
    // 90 % of 120 intervals hold the truth; three standard deviations.
    expect(covered / bands).toBeGreaterThan(0.9 - 3 * Math.sqrt(0.09 / bands));
    expect(covered / bands).toBeLessThan(0.9 + 3 * Math.sqrt(0.09 / bands));
  });

  test('by default next to nothing is marked in 50 pairs', async () => {
    let ranges = 0;
    for (let seed = 1; seed <= 50; seed++) {
      const a = await spectrum(gaussianNoise(fs * 40, 1, seed));
      const b = await spectrum(gaussianNoise(fs * 40, 1, 700 + seed), {}, fs, birch);
      const run = await runStep(compareNoise, [a, b]);
      ranges += run.number('ranges');
      expect(run.codes).toEqual(['band-outside']);
    }
    expect(ranges).toBeLessThanOrEqual(5 + 3 * Math.sqrt(5));
  });
});

describe('unequal noise', () => {
  test('a known factor between the levels comes out, with its interval', async () => {
    const a = await spectrum(gaussianNoise(fs * 400, 1.3e-21, 3));
    const b = await spectrum(gaussianNoise(fs * 400, 1e-21, 4), {}, fs, birch);
    const run = await runStep(compareNoise, [a, b]);
    const q = run.outcome.numbers.find((n) => n.id === 'ratio-60-120')!;
    expect(q.low).toBeLessThan(1.3);
    expect(q.high).toBeGreaterThan(1.3);
    expect(q.high! / q.low!).toBeLessThan(1.03);
    expect(run.number('outside')).toBeGreaterThan(0.9);
    expect(run.outcome.sentence).toContain('noise of alder /strain over that of noise of birch /strain');
  });

  test('a line in one of them is the one range that differs', async () => {
    const x = gaussianNoise(fs * 200, 1, 5).map((v, i) => v + 0.5 * Math.sin((2 * Math.PI * 77.3 * i) / fs));
    const a = await spectrum(gaussianNoise(fs * 200, 1, 6));
    const b = await spectrum(x, {}, fs, birch);
    const run = await runStep(compareNoise, [a, b]);
    const rows = run.outcome.tables![0].rows as [number, number, string][];
    expect(rows.length).toBe(1);
    expect(rows[0][0]).toBeLessThan(77.3);
    expect(rows[0][1]).toBeGreaterThan(77.3);
    expect(rows[0][2]).toBe('noise of birch /strain');
    const figure = run.figures()[0];
    expect(figure.marks).toMatchObject([{ role: 'event' }]);
    expect(figure.marks[0].label).toContain('quieter');
    expect(figure.y.scale).toBe('log');
  });

  test('against a curve the error is that of the estimate alone', async () => {
    const a = await spectrum(gaussianNoise(fs * 100, 1, 8), { average: 'mean' });
    const curve: Spectrum = {
      kind: 'spectrum',
      label: 'curve',
      frequency: Float64Array.of(1, 200),
      density: Float64Array.of(2 / fs, 2 / fs),
      df: 0,
      unit: a.unit,
    };
    const run = await runStep(compareNoise, [a, curve]);
    expect(run.outcome.warnings.map((w) => [w.code, w.severity])).toEqual([
      ['grids-differ', 'note'],
      ['band-outside', 'note'],
    ]);
    // Chi-square over its degrees of freedom: the reciprocal of the interval the estimate itself states.
    expect(run.outcome.data.low).toBeCloseTo(1 / Math.sqrt(a.estimate!.band[1]), 9);
    expect(run.outcome.data.high).toBeCloseTo(1 / Math.sqrt(a.estimate!.band[0]), 9);
    expect(run.number('ratio-20-60')).toBeCloseTo(1, 1);
    const curves = await runStep(compareNoise, [curve, curve]);
    expect(curves.codes).toContain('no-error');
    expect(curves.outcome.data.values.every((v) => v === 1)).toBe(true);
  });
});

describe('what may enter, and what is said', () => {
  test('bins without density have no ratio', async () => {
    const a = await spectrum(gaussianNoise(fs * 60, 1, 1));
    const b = await spectrum(gaussianNoise(fs * 60, 1, 2), {}, fs, birch);
    const broken = { ...b, density: b.density.map((s, k) => (k === 40 ? 0 : s)) };
    const run = await runStep(compareNoise, [a, broken]);
    expect(run.outcome.data.values[39]).toBeNaN();
    expect(run.outcome.numbers.every((q) => Number.isFinite(q.value))).toBe(true);
    expect(run.number('bins')).toBe((await runStep(compareNoise, [a, b])).number('bins') - 1);
    const empty = { ...b, density: b.density.map(() => 0) };
    await expect(runStep(compareNoise, [a, empty])).rejects.toMatchObject({ code: 'no-common-band' });
  });

  test('the same data twice are not independent; later data of the channel are', async () => {
    const x = gaussianNoise(fs * 100, 1, 1);
    const a = await spectrum(x);
    const b = await spectrum(x, { average: 'mean', window: 'nuttall' });
    const run = await runStep(compareNoise, [a, b]);
    expect(run.codes).toEqual(['windows-differ', 'not-independent', 'band-outside']);
    expect(run.outcome.warnings[1].value).toBe(100);
    const later = await spectrum(x, {}, fs, { start: addSeconds(gpsTime(1_400_000_000), 100) });
    expect((await runStep(compareNoise, [a, later])).codes).toEqual(['band-outside']);
  });

  test('few averages are said', async () => {
    const a = await spectrum(gaussianNoise(fs * 3, 1, 1));
    const b = await spectrum(gaussianNoise(fs * 60, 1, 2), {}, fs, birch);
    expect((await runStep(compareNoise, [a, b])).codes).toContain('few-averages');
  });

  test('without a band that fits, the whole range is one', async () => {
    const [a, b] = await Promise.all(
      [1, 2].map((s) => spectrum(gaussianNoise(16 * 400, 1, s), { segment: 4 }, 16)),
    );
    const run = await runStep(compareNoise, [a, b]);
    expect(run.outcome.warnings.find((w) => w.code === 'band-outside')!.consequence).toContain('whole range');
    expect(run.outcome.tables![1].rows.length).toBe(1);
  });

  test.each([
    [{ low: 300, high: 400 }, 'empty-band', /from 300 to 400 Hz; .* 1 to 128 Hz in common/],
    [{ bands: [60, 20] }, 'band-order', /the pair 60, 20/],
  ])('refuses %j', async (params, code, message) => {
    const a = await spectrum(gaussianNoise(fs * 60, 1, 1));
    const run = runStep(compareNoise, [a, { ...a, label: 'other' }], params);
    await expect(run).rejects.toThrow(UserError);
    await expect(run).rejects.toMatchObject({ code, message: expect.stringMatching(message) as string });
  });

  test('refuses units that differ and frequencies that do not meet', async () => {
    const a = await spectrum(gaussianNoise(fs * 60, 1, 1));
    await expect(runStep(compareNoise, [a, { ...a, unit: 'V²/Hz' }])).rejects.toMatchObject({
      code: 'units-differ',
      message: expect.stringContaining('strain²/Hz and noise of alder /strain in V²/Hz') as string,
    });
    const far: Spectrum = {
      ...a,
      df: 0,
      frequency: Float64Array.of(500, 600),
      density: Float64Array.of(1, 1),
    };
    await expect(runStep(compareNoise, [a, far])).rejects.toMatchObject({ code: 'no-common-band' });
  });
});
