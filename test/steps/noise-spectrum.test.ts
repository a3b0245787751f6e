import { describe, expect, test } from 'vitest';
import { UserError } from '../../src/core/data/errors';
import type { AverageKind } from '../../src/core/data/kinds';
import noiseSpectrum from '../../src/core/steps/noise-spectrum';
import { samples } from '../kernels/load-kernels';
import { oracle } from '../oracle/oracle';
import { runStep } from './run-step';
import { gaussianNoise, seriesOf } from './synthetic';

const WINDOWS: Record<string, string> = { flattop: 'flat-top' };
const numbers = oracle<{
  rate: number;
  scale: number;
  welch: {
    n: number;
    segment: number;
    overlap: number;
    window: string;
    average: AverageKind;
    density: number[];
    floor: number;
    enbw: number;
    parseval: number;
  }[];
  gappy: {
    spans: [number, number][];
    segment: number;
    average: AverageKind;
    segments: number;
    density: number[];
  }[];
}>('noise-spectrum');
const { rate, scale } = numbers;

/** The samples of test/oracle/noise-spectrum.py. */
const strain = (n: number): Float64Array =>
  samples(n, 21).map((v, i) => scale * (v + 0.3 + 0.1 * Math.sin((2 * Math.PI * 60 * i) / rate)));

/** Largest relative difference of a bin; bins that detrending empties hold only rounding of the mean and are left out. */
const worst = (density: Float64Array, expected: readonly number[], skip = 0): number =>
  expected.reduce((m, e, k) => (k < skip ? m : Math.max(m, Math.abs(density[k] / scale ** 2 / e - 1))), 0);

describe('against scipy.signal.welch', () => {
  test.each(numbers.welch)(
    '$average, $window, $n samples, segment $segment s, overlap $overlap',
    async (c) => {
      const { segment, overlap, average } = c;
      const window = WINDOWS[c.window] ?? c.window;
      const run = await runStep(noiseSpectrum, [seriesOf(strain(c.n), rate)], {
        segment,
        overlap,
        average,
        window,
      });
      const { density } = run.outcome.data;
      expect(density.length).toBe(c.density.length);
      expect(worst(density, c.density, 1)).toBeLessThan(1e-10);
      expect(Math.abs(density[0] / scale ** 2 - c.density[0])).toBeLessThan(1e-10 * Math.max(...c.density));
      expect(run.number('floor') / scale / c.floor).toBeCloseTo(1, 10);
      expect(run.number('resolution') / c.enbw).toBeCloseTo(1, 12);
      expect(run.number('parseval') / scale / c.parseval).toBeCloseTo(1, 10);
    },
  );

  test.each(numbers.gappy)('$average over spans with gaps, segment $segment s', async (c) => {
    const x = strain(6000);
    const kept = new Uint8Array(x.length);
    for (const [from, to] of c.spans) kept.fill(1, from, to);
    const series = seriesOf(
      x.map((v, i) => (kept[i] ? v : NaN)),
      rate,
    );
    const run = await runStep(noiseSpectrum, [series], { segment: c.segment, average: c.average });
    expect(run.number('segments')).toBe(c.segments);
    expect(worst(run.outcome.data.density, c.density, 1)).toBeLessThan(1e-10);
  });

  test('a median that needs several passes is the same to the last bit', async () => {
    const series = seriesOf(strain(40_000), rate);
    for (const average of ['median', 'median-mean']) {
      const once = await runStep(noiseSpectrum, [series], { segment: 1, average });
      const often = await runStep(noiseSpectrum, [series], { segment: 1, average }, { memoryLimit: 60_000 });
      expect(once.outcome.sentence).not.toContain('read');
      expect(often.outcome.sentence).toMatch(/read \d+ times/);
      expect(often.outcome.data.density).toEqual(once.outcome.data.density);
      expect(often.outcome.numbers).toEqual(once.outcome.numbers);
    }
  });
});

describe('closed forms', () => {
  const fs = 1024;
  const sigma = 3e-21;
  const white = seriesOf(gaussianNoise(fs * 300, sigma, 7), fs);

  test.each([
    ['mean', 0.5],
    ['median', 0.5],
    ['median-mean', 0.5],
    ['mean', 0.75],
    ['median', 0.75],
    ['median-mean', 0],
  ])('white noise has density 2σ²/rate (%s, overlap %d)', async (average, overlap) => {
    const run = await runStep(noiseSpectrum, [white], { segment: 1, average, overlap });
    const { density, estimate } = run.outcome.data;
    const inner = density.slice(3, -3).map((s) => s / ((2 * sigma ** 2) / fs));
    const mean = inner.reduce((a, b) => a + b, 0) / inner.length;
    const spread = Math.sqrt(inner.reduce((a, b) => a + (b - mean) ** 2, 0) / inner.length);
    // The Hann window ties a bin to its neighbours (1.5 bins wide): inner.length / 1.5 independent ones; five sigma.
    expect(Math.abs(mean - 1)).toBeLessThan((5 * estimate!.relativeError) / Math.sqrt(inner.length / 1.5));
    expect(spread / estimate!.relativeError).toBeGreaterThan(0.85);
    expect(spread / estimate!.relativeError).toBeLessThan(1.15);
    // 90 % of the bins have the true density inside their interval; three standard deviations of the count.
    const [low, high] = estimate!.band;
    const inside = inner.filter((s) => s * low < 1 && 1 < s * high).length / inner.length;
    expect(Math.abs(inside - 0.9)).toBeLessThan(3 * Math.sqrt((0.09 * 1.5) / inner.length));
  });

  test('Parseval: the mean estimate holds the power of its windowed segments exactly', async () => {
    const x = gaussianNoise(4000, sigma, 3);
    const run = await runStep(noiseSpectrum, [seriesOf(x, fs)], {
      segment: 0.25,
      average: 'mean',
      detrend: 'none',
    });
    let power = 0;
    let squares = 0;
    let count = 0;
    const w = Float64Array.from({ length: 256 }, (_, i) => Math.sin((Math.PI * i) / 256) ** 2);
    for (const v of w) squares += v * v;
    for (let at = 0; at + 256 <= x.length; at += 128, count++)
      for (let i = 0; i < 256; i++) power += (w[i] * x[at + i]) ** 2 / squares;
    expect(run.number('parseval') / Math.sqrt(power / count)).toBeCloseTo(1, 12);
  });

  test('Parseval: the sum over the spectrum is near the rms of white noise', async () => {
    const run = await runStep(noiseSpectrum, [white], { average: 'mean' });
    // Variance of σ̂² from n samples is 2σ⁴/n; the window leaves about a quarter unused at the ends.
    expect(Math.abs(run.number('parseval-ratio') - 1)).toBeLessThan(0.01);
    expect(run.number('rms') / sigma).toBeCloseTo(1, 2);
  });

  test.each([
    ['hann', 100],
    ['hann', 100.37],
    ['blackman-harris', 100.5],
    ['HFT95', 99.8],
  ])('a sine of amplitude A holds A²/2 under its peak (%s, %d Hz)', async (window, f) => {
    const amplitude = 2e-20;
    const x = gaussianNoise(fs * 32, 1e-24).map(
      (v, i) => v + amplitude * Math.sin((2 * Math.PI * f * i) / fs),
    );
    const run = await runStep(noiseSpectrum, [seriesOf(x, fs)], { segment: 2, window, average: 'mean' });
    const { density, df } = run.outcome.data;
    const peak = Math.round(f / df);
    let power = 0;
    for (let k = peak - 12; k <= peak + 12; k++) power += density[k] * df;
    expect(power / (amplitude ** 2 / 2)).toBeCloseTo(1, 4);
  });

  // Worked example of Heinzel, Rüdiger, Schilling, report of 15 Feb 2002 (READ in citing sources; the estimates COMPUTED
  // with SciPy): true values 2 Vrms, 0.70711 Vrms and a rounding floor of 1e-3 V / √(6 rate).
  test.each([
    ['flat-top', 1.999119, 0.707144],
    ['hann', 1.75584, 0.703554],
  ])('two sines of the 2002 report with the %s window', async (window, first, second) => {
    const fsV = 10_000;
    const u = Float64Array.from(
      { length: 1_000_000 },
      (_, i) =>
        Math.round(
          1000 *
            (2.82842712474619 * Math.sin((2 * Math.PI * 1234 * i) / fsV) +
              Math.sin((2 * Math.PI * 2500.2157 * i) / fsV)),
        ) / 1000,
    );
    const run = await runStep(noiseSpectrum, [seriesOf(u, fsV, { unit: 'V' })], {
      segment: 4096 / fsV,
      window,
      average: 'mean',
    });
    const { density, df, estimate, unit } = run.outcome.data;
    const rms = density.map((s) => Math.sqrt(s * estimate!.enbw));
    const near = (f: number): number =>
      Math.max(...rms.slice(Math.round(f / df) - 3, Math.round(f / df) + 4));
    expect(unit).toBe('V²/Hz');
    expect(near(1234)).toBeCloseTo(first, 5);
    expect(near(2500.2157)).toBeCloseTo(second, 5);
    const quiet = density.slice(Math.round(3000 / df), Math.round(4500 / df)).sort();
    const floor = Math.sqrt(quiet[quiet.length >> 1]);
    if (window === 'flat-top') expect(floor / (1e-3 / Math.sqrt(6 * fsV))).toBeCloseTo(1, 1);
  });

  test('the power of a steady line is exact in a mean and 1/ln 2 times too large in a median', async () => {
    const x = gaussianNoise(fs * 256, 1e-24).map(
      (v, i) => v + 1e-20 * Math.sin((2 * Math.PI * 100 * i) / fs),
    );
    const power = async (average: string) =>
      (await runStep(noiseSpectrum, [seriesOf(x, fs)], { segment: 2, average })).number('parseval-ratio') **
      2;
    expect(await power('mean')).toBeCloseTo(1, 4);
    expect(await power('median')).toBeCloseTo(1 / Math.LN2, 1);
  });

  test('resolution and spacing are apart: Hann 4 s has 0.375 Hz and 0.25 Hz', async () => {
    const run = await runStep(noiseSpectrum, [white]);
    expect(run.number('resolution')).toBeCloseTo(0.375, 12);
    expect(run.number('spacing')).toBe(0.25);
  });
});

describe('what may enter', () => {
  const fs = 256;

  test('one sample that is not a number never reaches the spectrum', async () => {
    const x = gaussianNoise(fs * 64, 1, 5);
    const broken = x.slice();
    broken[5000] = NaN;
    broken[9000] = Infinity;
    const run = await runStep(noiseSpectrum, [seriesOf(broken, fs)], { segment: 1 });
    expect(run.outcome.data.density.every((s) => s > 0 && Number.isFinite(s))).toBe(true);
    expect(run.number('segments')).toBeLessThan(127);
  });

  test('an excluded span does not enter: the result does not depend on what is in it', async () => {
    const x = gaussianNoise(fs * 64, 1, 5);
    const loud = x.slice().fill(1e6, 20 * fs, 21 * fs);
    const exclude = [20, 21, [40, 41.5]].flat();
    const a = await runStep(noiseSpectrum, [seriesOf(x, fs)], { segment: 1, average: 'mean', exclude });
    const b = await runStep(noiseSpectrum, [seriesOf(loud, fs)], { segment: 1, average: 'mean', exclude });
    expect(b.outcome.data.density).toEqual(a.outcome.data.density);
    expect(a.outcome.sentence).toContain('2 spans left out');
  });

  test.each([
    [{ segment: 200 }, 'segment-long', /longest valid span .* is 64 s; set "segment" to 16 s/],
    [{ segment: 8, exclude: [0, 30, 34, 64] }, 'segment-long', /outside the excluded ones .* is 4 s/],
    [{ segment: 0.01 }, 'segment-short', /at least 0\.0625 s/],
    [{ exclude: [3, 2] }, 'exclude-order', /the pair 3, 2/],
    [{ exclude: [0, 64] }, 'no-data', /no valid span outside the excluded ones/],
    [
      { low: 300, high: 400 },
      'empty-band',
      /"low" 300 Hz and "high" 400 Hz; bins are every 0\.25 Hz up to 128 Hz/,
    ],
  ])('refuses %j', async (params, code, message) => {
    const run = runStep(noiseSpectrum, [seriesOf(gaussianNoise(fs * 64, 1), fs)], params);
    await expect(run).rejects.toThrow(UserError);
    await expect(run).rejects.toMatchObject({ code, message: expect.stringMatching(message) as string });
  });

  test('a series without a valid sample is refused', async () => {
    const run = runStep(noiseSpectrum, [seriesOf(new Float64Array(1000).fill(NaN), fs)]);
    await expect(run).rejects.toMatchObject({ code: 'no-data' });
  });
});
