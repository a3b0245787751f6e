import { beforeAll, describe, expect, test } from 'vitest';
import { UserError } from '../../src/core/data/errors';
import type { Kernels } from '../../src/core/kernels/kernels';
import { makeWindow } from '../../src/core/kernels/windows';
import type { WindowName } from '../../src/core/kernels/windows-names';
import {
  GAUSSIAN_RATIO,
  RATIO_BIAS,
  RATIO_VARIANCE,
  ratioLaw,
  ratioQuantile,
} from '../../src/core/noise/magnitude-ratio';
import { neighbourFactor, powerCorrelation } from '../../src/core/noise/power-correlation';
import gaussianity from '../../src/core/steps/gaussianity';
import { loadKernels } from '../kernels/load-kernels';
import { runStep } from './run-step';
import { gaussianNoise, seriesOf, uniform } from './synthetic';

const fs = 256;
let wasm: Kernels;
beforeAll(async () => (wasm = (await loadKernels()).wasm));

describe('Rayleigh’s law', () => {
  test('mean √(π/2), rms √2 of unit complex Gaussian magnitudes, from the kernel', () => {
    const n = 256;
    const window = makeWindow('hann', n);
    const squares = window.reduce((s, w) => s + w * w, 0);
    const m = wasm.createMagnitudes({ segment: n, window, detrend: 'none' });
    const x = gaussianNoise(n * 4000, 1, 11);
    for (let at = 0; at + n <= x.length; at += n) m.add(x, at);
    const { mean, variance } = m.result();
    m.free();
    // Each part of the transform of unit noise has variance Σw²/2; 4000 × 120/1.94 independent values.
    const unit = Math.sqrt(squares / 2);
    const inner = mean.slice(4, 124);
    const average = inner.reduce((a, b) => a + b, 0) / inner.length / unit;
    const power = inner.reduce((a, b, i) => a + b * b + variance[4 + i], 0) / inner.length / unit ** 2;
    const independent = (4000 * 120) / 1.94;
    expect(Math.abs(average - Math.sqrt(Math.PI / 2))).toBeLessThan(4 * Math.sqrt(0.43 / independent));
    expect(Math.abs(Math.sqrt(power) - Math.SQRT2)).toBeLessThan(4 * Math.sqrt(0.5 / independent));
    expect(GAUSSIAN_RATIO).toBeCloseTo(0.52272, 5);
    expect(Math.sqrt(2 / (Math.PI / 2) - 1)).toBeCloseTo(GAUSSIAN_RATIO, 14);
  });

  // Moments of Rayleigh's distribution by NumPy's simulation of the ratio itself (2·10⁶ draws of n = 128): −0.680, 0.1372.
  test('bias and variance by the delta method', () => {
    expect(RATIO_BIAS).toBeCloseTo(-0.672, 3);
    expect(RATIO_VARIANCE).toBeCloseTo(0.13788, 5);
  });

  test.each([8, 32, 128])('quantiles against simulation, %d segments', (n) => {
    const next = uniform(n);
    const draws = 60_000;
    const law = ratioLaw(new Float64Array([1]), 1, n);
    const probabilities = [1e-3, 0.01, 0.05];
    const limits = probabilities.map((p) => [ratioQuantile(law, p, 'lower'), ratioQuantile(law, p, 'upper')]);
    const beyond = probabilities.map(() => [0, 0]);
    let [sum, squares] = [0, 0];
    for (let d = 0; d < draws; d++) {
      let [m, q] = [0, 0];
      for (let i = 0; i < n; i++) {
        const power = -2 * Math.log(next());
        m += Math.sqrt(power) / n;
        q += power / n;
      }
      const r = Math.sqrt(q - m * m) / m;
      sum += r;
      squares += r * r;
      limits.forEach(([low, high], k) => {
        if (r < low) beyond[k][0]++;
        if (r > high) beyond[k][1]++;
      });
    }
    const mean = sum / draws;
    const deviation = Math.sqrt(squares / draws - mean * mean);
    expect((mean - law.mean) / law.deviation).toBeLessThan(0.03);
    expect(deviation / law.deviation).toBeCloseTo(1, 1);
    const tolerated = n < 32 ? 1.6 : 1.2;
    probabilities.forEach((p, k) => {
      for (const count of beyond[k]) {
        const scatter = 4 / Math.sqrt(p * draws);
        expect(count / (p * draws), `${p}`).toBeLessThan(tolerated + scatter);
        expect(count / (p * draws), `${p}`).toBeGreaterThan(1 / tolerated - scatter);
      }
    });
  });

  test('correlations of a Hann window: neighbours (2/3)² and (1/6)², half a segment on 1/36', () => {
    const w = makeWindow('hann', 4096);
    expect(powerCorrelation(w, 0, 1)).toBeCloseTo(4 / 9, 12);
    expect(powerCorrelation(w, 0, 2)).toBeCloseTo(1 / 36, 12);
    expect(powerCorrelation(w, 0, 3)).toBeCloseTo(0, 12);
    expect(powerCorrelation(w, 2048, 0)).toBeCloseTo(1 / 36, 12);
    expect(neighbourFactor(w)).toBeCloseTo(1 + 2 * (4 / 9 + 1 / 36), 10);
  });
});

describe('Gaussian noise', () => {
  test.each<[WindowName, number, number]>([
    ['hann', 0.5, 1],
    ['hann', 0.75, 1],
    ['nuttall', 0.75, 1],
    ['blackman', 0.66, 0.5],
  ])('lies in its band as often as stated (%s, overlap %d)', async (window, overlap, segment) => {
    let [outside, bins, ranges, squares] = [0, 0, 0, 0];
    const runs = 60;
    for (let seed = 1; seed <= runs; seed++) {
      // Coloured: the level changes by orders of magnitude from bin to bin, the ratio must not.
      const x = gaussianNoise(fs * 100, 1, seed);
      for (let i = 1; i < x.length; i++) x[i] += 0.97 * x[i - 1];
      const run = await runStep(
        gaussianity,
        [seriesOf(x, fs)],
        { segment, window, overlap, probability: 0.9, 'false-ranges': 0.5 },
        { kernels: wasm },
      );
      const { values, low, high, expected } = run.outcome.data;
      for (const v of values) {
        bins++;
        if (v < low || v > high) outside++;
        squares += ((v - expected) / (high - low)) ** 2;
      }
      ranges += run.number('ranges-low') + run.number('ranges-high');
      const q = run.outcome.numbers.find((n) => n.id === 'outside')!;
      expect(q.high).toBeGreaterThan(0.1);
    }
    const scatter = Math.sqrt((0.09 * 2) / bins);
    expect(Math.abs(outside / bins - 0.1)).toBeLessThan(4 * scatter + 0.006);
    expect(Math.sqrt(squares / bins) * 2 * 1.645).toBeCloseTo(1, 1);
    expect(ranges).toBeLessThanOrEqual(0.5 * runs + 3 * Math.sqrt(0.5 * runs));
    expect(ranges).toBeGreaterThan(0.1 * runs);
  });

  test('the default marks next to nothing in 100 stretches', async () => {
    let ranges = 0;
    for (let seed = 1; seed <= 100; seed++) {
      const run = await runStep(
        gaussianity,
        [seriesOf(gaussianNoise(fs * 80, 1, seed), fs)],
        {},
        { kernels: wasm },
      );
      ranges += run.outcome.tables![0].rows.length;
      expect(run.codes, `${seed}`).toEqual([]);
    }
    expect(ranges).toBeLessThanOrEqual(20);
  });
});

describe('what is not Gaussian', () => {
  const noise = gaussianNoise(fs * 200, 1, 7);

  test('a steady line is too low, at its frequency', async () => {
    const x = noise.map((v, i) => v + 2 * Math.sin((2 * Math.PI * 60.2 * i) / fs));
    const run = await runStep(gaussianity, [seriesOf(x, fs)]);
    expect(run.number('ranges-high')).toBe(0);
    const [row] = run.outcome.tables![0].rows;
    expect(run.outcome.tables![0].rows.length).toBe(1);
    expect(row[0]).toBeLessThan(60.2);
    expect(row[1]).toBeGreaterThan(60.2);
    expect(row[2]).toBe('steady line');
    expect(run.outcome.sentence).toContain('1 range too low (steady line)');
    expect(run.figures()[0].marks.length).toBe(1);
  });

  test('noise whose level is doubled a quarter of the time has the ratio of its mixture', async () => {
    // Magnitudes of a mixture: mean √(π/2)(3/4 + 2/4), mean square 2(3/4 + 4/4).
    const x = noise.map((v, i) => (Math.floor(i / (fs * 50)) === 2 ? 2 * v : v));
    const run = await runStep(gaussianity, [seriesOf(x, fs)], { segment: 1 });
    const exact = Math.sqrt((2 * 1.75) / ((Math.PI / 2) * 1.25 ** 2) - 1);
    expect(run.number('median')).toBeCloseTo(exact, 1);
    expect(run.outcome.warnings).toMatchObject([{ code: 'not-gaussian' }]);
    expect(run.outcome.warnings[0].found).toContain('bursts');
    expect(run.number('above')).toBeGreaterThan(0.9);
  });

  test('one short loud burst at 80 Hz is seen there and nowhere else, and goes when its time is left out', async () => {
    const x = noise.map((v, i) => {
      const t = i / fs - 100.3;
      return v + 15 * Math.exp(-((t / 0.15) ** 2)) * Math.sin(2 * Math.PI * 80 * t);
    });
    const run = await runStep(gaussianity, [seriesOf(x, fs)], { segment: 0.5 });
    const rows = run.outcome.tables![0].rows as [number, number, string][];
    expect(rows.length).toBe(1);
    expect(rows[0][2]).toBe('bursts or drift');
    expect(rows[0][0]).toBeGreaterThan(70);
    expect(rows[0][1]).toBeLessThan(90);
    const without = await runStep(gaussianity, [seriesOf(x, fs)], { segment: 0.5, exclude: [99, 101.5] });
    expect(without.outcome.tables![0].rows).toEqual([]);
  });
});

describe('what may enter', () => {
  test('bad samples never reach the ratio', async () => {
    const x = gaussianNoise(fs * 100, 1, 3);
    x[5000] = NaN;
    x[9000] = Infinity;
    const run = await runStep(gaussianity, [seriesOf(x, fs)]);
    expect(run.outcome.data.values.every((v) => v > 0.2 && v < 1)).toBe(true);
  });

  test('a constant series has no ratio, and that is said', async () => {
    const run = await runStep(gaussianity, [seriesOf(new Float64Array(fs * 100), fs)]);
    expect(run.codes).toEqual(['zero-bins']);
    expect(run.outcome.numbers.every((q) => Number.isFinite(q.value))).toBe(true);
    expect(run.figures()[0].traces.length).toBe(3);
  });

  test('few segments are said', async () => {
    const run = await runStep(gaussianity, [seriesOf(gaussianNoise(fs * 24, 1), fs)]);
    expect(run.outcome.warnings).toMatchObject([{ code: 'few-averages', value: 23 }]);
  });

  test.each([
    [{ segment: 30 }, 'few-segments', /5 segments of 30 s fit, .* at least 8 .* 9\.4 s or less/],
    [{ segment: 40, overlap: 0.95 }, 'few-segments', /worth only [4-7]\.\d+ independent/],
    [{ low: 300, high: 400 }, 'empty-band', /every 0\.5 Hz from 1\.5 to 126\.5 Hz/],
    [{ exclude: [5, 4] }, 'exclude-order', /the pair 5, 4/],
  ])('refuses %j', async (params, code, message) => {
    const run = runStep(gaussianity, [seriesOf(gaussianNoise(fs * 100, 1), fs)], params);
    await expect(run).rejects.toThrow(UserError);
    await expect(run).rejects.toMatchObject({ code, message: expect.stringMatching(message) as string });
  });
});
