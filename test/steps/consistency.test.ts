import { beforeAll, describe, expect, test } from 'vitest';
import type { Kernels } from '../../src/core/kernels/kernels';
import { checkPeak, planConsistency } from '../../src/core/search/consistency-peak';
import consistency from '../../src/core/steps/consistency';
import matchedFilter from '../../src/core/steps/matched-filter';
import type { SnrSeries, Waveform } from '../../src/core/data/kinds';
import { BUILD_TIME, loadKernels } from '../kernels/load-kernels';
import { addWave } from '../search/inject-wave';
import { burst, inspiral, spectrumOf } from '../search/waves';
import { runStep } from './run-step';
import { gaussianNoise, seriesOf } from './synthetic';

let kernels: Kernels;
beforeAll(async () => {
  ({ wasm: kernels } = await loadKernels());
}, BUILD_TIME);

const rate = 1024;
const S = 1e-46;
const white = spectrumOf(() => S, 0.25, rate / 2);
const noise = (seconds: number, seed: number): Float64Array =>
  gaussianNoise(seconds * rate, Math.sqrt((S * rate) / 2), seed);
const template = inspiral(1e-4, 1e-22);
const filtered = async (samples: Float64Array, wave: Waveform = template): Promise<SnrSeries> =>
  (await runStep(matchedFilter, [seriesOf(samples, rate), wave, white], { reach: 1, block: 16 }, { kernels }))
    .outcome.data;

/** σ of a wave in white noise, from the step itself. */
const sigmaOf = async (wave: Waveform): Promise<number> =>
  (await filtered(noise(32, 1), wave)).template.sigma;

const mean = (x: readonly number[]): number => x.reduce((s, v) => s + v, 0) / x.length;

describe('in Gaussian noise, at times not chosen by their loudness', () => {
  test('χ² has mean 2p − 2 and variance 4p − 4, p values and shape ratios are as they should be', async () => {
    const found = [];
    for (let seed = 1; seed <= 4; seed++) {
      const snr = await filtered(noise(256, 40 + seed));
      const plan = planConsistency(kernels, snr, 16, 0.05);
      const [{ from, to }] = snr.valid;
      // A second apart: several times the template's autocorrelation.
      for (let at = from; at < to; at += rate) found.push(checkPeak(kernels, plan, at));
    }
    const n = found.length;
    expect(n).toBeGreaterThan(900);
    const chi = found.map((f) => f.chiSquared);
    // The soft edge of the truncated inverse spectrum takes a quarter of the lowest band's part: over 24 other seeds the
    // mean is 29.65, and p values are a little large.
    expect(Math.abs(mean(chi) - 30)).toBeLessThan(0.02 * 30 + 3 * Math.sqrt(60 / n));
    // Kurtosis of χ² with 30 degrees of freedom: variance of the variance (2 + 12/30) 60²/n.
    const variance = mean(chi.map((c) => (c - mean(chi)) ** 2));
    expect(Math.abs(variance - 60)).toBeLessThan(3 * 60 * Math.sqrt(2.4 / n));
    expect(found[0].freedom).toBe(30);
    for (const key of ['pValue', 'shapePValue'] as const) {
      const below = found.filter((f) => f[key] < 0.1).length / n;
      expect(Math.abs(below - 0.1), key).toBeLessThan(key === 'pValue' ? 0.045 : 0.05);
    }
    expect(Math.abs(mean(found.map((f) => f.shape)) - 1)).toBeLessThan(0.1);
    // The bands' sum is the SNR of the matched filter itself.
    const snr = await filtered(noise(64, 50));
    const plan = planConsistency(kernels, snr, 16, 0.05);
    const i = 20 * rate;
    expect(checkPeak(kernels, plan, i).snr).toBeCloseTo(Math.hypot(snr.re[i], snr.im[i]), 5);
  }, 60_000);
});

describe('a signal and a disturbance of the same loudness', () => {
  test('the signal passes; the burst has large χ², a wrong shape and a lower re-weighted SNR', async () => {
    const good = noise(64, 60);
    addWave(good, rate, template, 30.0003, 20 / (await sigmaOf(template)), 0.4);
    const bad = noise(64, 61);
    const blip = burst(150, 0.01, 1e-22);
    addWave(bad, rate, blip, 30, 60 / (await sigmaOf(blip)));
    const [a, b] = [
      await runStep(consistency, [await filtered(good)]),
      await runStep(consistency, [await filtered(bad)]),
    ];
    expect(a.number('snr')).toBeGreaterThan(16);
    expect(a.number('p-value')).toBeGreaterThan(1e-3);
    expect(a.number('shape-p-value')).toBeGreaterThan(1e-3);
    expect(a.number('reduced')).toBeLessThan(2);
    expect(a.outcome.data.peaks).toHaveLength(5);
    expect(b.number('snr')).toBeGreaterThan(8);
    expect(b.number('reduced')).toBeGreaterThan(5);
    expect(b.number('reweighted')).toBeLessThan(0.6 * b.number('snr'));
    expect(b.number('shape')).toBeGreaterThan(5);
    expect(b.codes).toEqual(['not-like-template']);
  });
});

describe('what it says', () => {
  test('a time of one’s own, table, pictures', async () => {
    const samples = noise(64, 62);
    addWave(samples, rate, template, 30, 12 / (await sigmaOf(template)));
    const snr = await filtered(samples);
    const run = await runStep(consistency, [snr], { time: '1400000030', bands: 8 });
    expect(run.number('freedom')).toBe(14);
    expect(run.outcome.tables![0].rows).toHaveLength(1);
    expect(run.outcome.tables![0].rows[0][0]).toBe('1400000030');
    const [bands, shape] = run.figures();
    const bars = bands.traces[0];
    if (bars.type !== 'bars') throw new Error('no bars');
    expect(bars.counts.reduce((s, v) => s + v, 0)).toBeCloseTo(run.number('chi-squared'), 9);
    expect(bars.edges).toHaveLength(9);
    const model = shape.traces[1];
    if (model.type !== 'line') throw new Error('no model');
    expect(Math.max(...model.y)).toBeCloseTo(run.number('snr'), 9);
    expect(run.outcome.sentence).toContain('8 bands');
  });

  test('a time in a dropped edge is refused', async () => {
    const snr = await filtered(noise(32, 63));
    await expect(runStep(consistency, [snr], { time: '1400000000.1' })).rejects.toThrow(/no valid SNR/);
    await expect(runStep(consistency, [snr], { time: '1300000000' })).rejects.toThrow(/no valid SNR/);
  });

  test('notes of the data are repeated', async () => {
    const series = seriesOf(noise(32, 64), rate, { notes: ['contains an injection'] });
    const snr = (await runStep(matchedFilter, [series, template, white], { reach: 1 })).outcome;
    expect(snr.sentence).toContain('contains an injection');
    const run = await runStep(consistency, [snr.data]);
    expect(run.outcome.sentence).toContain('contains an injection');
    expect(run.figures()[0].caption).toContain('contains an injection');
  });
});
