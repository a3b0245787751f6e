import { describe, expect, test } from 'vitest';
import { formatGps } from '../../src/core/data/gps-time';
import type { SnrSeries, Spectrum } from '../../src/core/data/kinds';
import { spanLength } from '../../src/core/data/spans';
import { kolmogorovTail } from '../../src/core/kernels/special-kolmogorov';
import { expectedCrossings } from '../../src/core/search/peaks';
import matchedFilter from '../../src/core/steps/matched-filter';
import { addWave } from '../search/inject-wave';
import { burst, inspiral, spectrumOf, waveformOf } from '../search/waves';
import { runStep, type StepRun } from './run-step';
import { gaussianNoise, seriesOf } from './synthetic';

const rate = 1024;
const S = 1e-46;
const white = spectrumOf(() => S, 0.25, rate / 2);
/** White noise of one-sided density S: variance S · rate / 2. */
const noise = (seconds: number, seed: number): Float64Array =>
  gaussianNoise(seconds * rate, Math.sqrt((S * rate) / 2), seed);
const wave = burst(150, 0.02, 1e-22);

const filter = (
  samples: Float64Array,
  given: Record<string, unknown> = {},
  spectrum: Spectrum = white,
  template = wave,
): Promise<StepRun<'snr'>> => runStep(matchedFilter, [seriesOf(samples, rate), template, spectrum], given);

/** |SNR| at samples so far apart that they are independent. */
function thinned(snr: SnrSeries, step: number): number[] {
  const out: number[] = [];
  for (const { from, to } of snr.valid)
    for (let i = from; i < to; i += step) out.push(Math.hypot(snr.re[i], snr.im[i]));
  return out;
}

describe('in Gaussian noise', () => {
  test('|SNR| follows Rayleigh (Kolmogorov–Smirnov), root mean square √2; crossings as Rice 1945', async () => {
    const values: number[] = [];
    let crossings = 0;
    let expected = 0;
    for (let seed = 1; seed <= 12; seed++) {
      const { outcome } = await filter(noise(128, 100 + seed));
      const snr = outcome.data;
      values.push(...thinned(snr, 100));
      const [{ from, to }] = snr.valid;
      for (let i = from + 1; i < to; i++)
        if (Math.hypot(snr.re[i], snr.im[i]) > 3 && Math.hypot(snr.re[i - 1], snr.im[i - 1]) <= 3)
          crossings++;
      expected += expectedCrossings(3, spanLength(snr.valid) / rate, snr.filter.spread);
    }
    values.sort((a, b) => a - b);
    const n = values.length;
    const distance = values.reduce((d, v, i) => {
      const cdf = 1 - Math.exp((-v * v) / 2);
      return Math.max(d, cdf - i / n, (i + 1) / n - cdf);
    }, 0);
    expect(n).toBeGreaterThan(15_000);
    expect(kolmogorovTail(Math.sqrt(n) * distance)).toBeGreaterThan(0.01);
    const rms = Math.sqrt(values.reduce((s, v) => s + v * v, 0) / n);
    // ρ² is exponential of mean 2: its mean has a relative error 1/√n.
    expect(Math.abs(rms / Math.SQRT2 - 1)).toBeLessThan(3 / (2 * Math.sqrt(n)));
    expect(expected).toBeGreaterThan(200);
    expect(Math.abs(crossings - expected)).toBeLessThan(4 * Math.sqrt(expected));
  });

  test('chance of the loudest is uniform over seeds, and the numbers say what is expected', async () => {
    let below = 0;
    for (let seed = 0; seed < 60; seed++) {
      const run = await filter(noise(32, 700 + seed));
      if (run.number('chance') < 0.5) below++;
      if (seed > 0) continue;
      expect(run.number('median')).toBeCloseTo(Math.sqrt(2 * Math.LN2), 1);
      expect(run.number('rms')).toBeCloseTo(Math.SQRT2, 1);
      expect(run.number('above')).toBeCloseTo(0.05, 1.5);
      expect(run.number('variance')).toBeCloseTo(1, 9);
      expect(run.codes).toEqual([]);
    }
    // Binomial 60 × ½: 30 ± 3.9.
    expect(Math.abs(below - 30)).toBeLessThan(12);
  });
});

describe('a known signal', () => {
  test('200 seeds: the in-phase part has mean the optimal SNR and variance 1, the other mean 0', async () => {
    const inPhase: number[] = [];
    const other: number[] = [];
    const at = 4.2;
    for (let seed = 0; seed < 200; seed++) {
      const samples = noise(8, 5000 + seed);
      // Optimal SNR of the template itself by Parseval: √(4 Σ|h̃|²/S df).
      const sigma = optimal();
      addWave(samples, rate, wave, Math.round(at * rate) / rate, 8 / sigma);
      const { data } = (await filter(samples)).outcome;
      const i = Math.round(at * rate);
      inPhase.push(data.re[i]);
      other.push(data.im[i]);
    }
    const mean = (x: number[]): number => x.reduce((s, v) => s + v, 0) / x.length;
    const variance = (x: number[]): number => mean(x.map((v) => (v - mean(x)) ** 2));
    expect(Math.abs(mean(inPhase) - 8)).toBeLessThan(3 / Math.sqrt(200));
    expect(Math.abs(mean(other))).toBeLessThan(3 / Math.sqrt(200));
    for (const x of [inPhase, other]) expect(Math.abs(variance(x) - 1)).toBeLessThan(3 * Math.sqrt(2 / 200));
  });

  test('without noise: SNR, time between samples, phase and effective distance come back', async () => {
    const template = inspiral(1e-4, 1e-22);
    const samples = new Float64Array(32 * rate);
    addWave(samples, rate, template, 17.3004, 5, 1.1);
    const run = await filter(samples, { reach: 2 }, white, template);
    const { data } = run.outcome;
    // The parabola through three samples of a peak some four samples wide is good to a few parts in a thousand.
    expect(Math.abs(run.number('snr') / (5 * run.number('sigma')) - 1)).toBeLessThan(0.003);
    expect(Math.abs(run.number('time') - 17.3004)).toBeLessThan(0.02 / rate);
    expect(Math.abs(run.number('phase') - (1.1 * 180) / Math.PI)).toBeLessThan(1);
    expect(run.number('effective-distance')).toBeCloseTo(100 / 5, 1);
    expect(data.template.distance).toBe(100);
    const [row] = run.outcome.tables![0].rows;
    expect(row[1]).toMatch(/^1400000017\.300/);
    expect(row[2]).toMatch(/^2024-05-17T16:53:19\.300/);
    expect(run.outcome.sentence).toContain('GPS 1400000017.300');
  });

  test('σ of a sine of 16 s, amplitude 1e-22, in 1e-46 per hertz is A √(T/S) = 40', async () => {
    const T = 16;
    const sine = waveformOf(
      (f) => {
        const x = Math.PI * (f - 250) * T;
        return [((1e-22 * T) / 2) * (x === 0 ? 1 : Math.sin(x) / x), 0];
      },
      { low: 5, high: 505 },
    );
    const run = await filter(noise(128, 8), { low: 5 }, white, sine);
    // Beyond the band lies a share of about 1/(π² T Δf) = 2.6e-5 per side of the sine's energy.
    expect(run.number('sigma') / 40).toBeCloseTo(1, 4);
  });
});

function optimal(): number {
  const f = Float64Array.from({ length: 8 * 500 }, (_, k) => k / 8);
  const { re } = wave.at(f);
  return Math.sqrt((4 * re.reduce((s, v) => s + v * v, 0)) / 8 / S);
}

describe('long data, gaps, edges', () => {
  const coloured = spectrumOf((f) => S * (1 + (60 / Math.max(f, 10)) ** 4), 0.25, rate / 2);

  test('blocks of 16 s give what one block gives', async () => {
    const samples = noise(128, 21);
    const [one, many] = [await filter(samples, {}, coloured), await filter(samples, { block: 16 }, coloured)];
    const [a, b] = [one.outcome.data, many.outcome.data];
    expect(a.filter.size).toBe(128 * rate);
    expect(b.filter.size).toBe(16 * rate);
    expect(many.blocks).toBeGreaterThan(8);
    expect(Math.abs(b.valid[0].from - a.valid[0].from)).toBeLessThan(20);
    let worst = 0;
    for (let i = b.valid[0].from + 20; i < b.valid[0].to - 20; i++)
      worst = Math.max(worst, Math.hypot(a.re[i] - b.re[i], a.im[i] - b.im[i]));
    // What differs is the share 1e-6 of the filter's energy beyond the samples said to enter.
    expect(worst).toBeLessThan(1e-5);
  });

  test('values next to a gap are dropped and marked, spans stand on their own', async () => {
    const samples = noise(64, 22);
    samples.fill(NaN, 30 * rate, 31 * rate);
    // A short stretch that cannot hold one value.
    samples.fill(NaN, 31.5 * rate, 32 * rate);
    const run = await filter(samples);
    const { outcome } = run;
    const { valid, spoilt, filter: f, re } = outcome.data;
    const before = f.lead + f.fade;
    const after = f.tail + f.fade;
    expect(valid).toEqual([
      { from: before, to: 30 * rate - after },
      { from: 32 * rate + before, to: 64 * rate - after },
    ]);
    expect(spoilt).toContainEqual({ from: 31 * rate, to: 31.5 * rate });
    re.forEach((v, i) => expect(Number.isFinite(v)).toBe(valid.some((s) => i >= s.from && i < s.to)));
    const [figure] = run.figures();
    expect(figure.x.link).toBe('time');
    expect(figure.marks.filter((m) => m.role === 'gap')).toHaveLength(2);
    expect(figure.marks.filter((m) => m.role === 'cropped').length).toBeGreaterThanOrEqual(4);
    expect(figure.marks.filter((m) => m.role === 'event')).toHaveLength(5);
  });

  test('the listed peaks are apart by the window and in falling order', async () => {
    const { outcome } = await filter(noise(64, 23), { window: 2, count: 12 });
    const { peaks } = outcome.data;
    expect(peaks).toHaveLength(12);
    peaks.forEach((p, i) => {
      if (i > 0) expect(p.snr).toBeLessThanOrEqual(peaks[i - 1].snr);
      for (const q of peaks.slice(0, i)) expect(Math.abs(p.at - q.at)).toBeGreaterThan(2 * rate - 2);
    });
  });
});

describe('the spectrum', () => {
  test('left out: the median spectrum of the data, named in the sentence', async () => {
    const run = await runStep(matchedFilter, [seriesOf(noise(128, 31), rate), wave]);
    expect(run.outcome.sentence).toContain('own median spectrum');
    expect(run.number('sigma') / optimal()).toBeCloseTo(1, 1);
    expect(run.codes).toEqual([]);
  });

  test('a loud signal within the span of a mean spectrum is warned of; with the median it is not', async () => {
    const samples = noise(32, 32);
    addWave(samples, rate, wave, 16, 25 / optimal());
    const estimate = {
      average: 'mean',
      segments: 15,
      segmentSeconds: 4,
      overlap: 0.5,
      window: 'hann',
      enbw: 0.375,
      relativeError: 0.3,
      band: [0.5, 1.5],
      start: seriesOf(samples, rate).start,
      duration: 32,
      rate,
    } as const;
    expect((await filter(samples, {}, { ...white, estimate })).codes).toEqual(['own-signal-in-noise']);
    expect(
      (await filter(samples, {}, { ...white, estimate: { ...estimate, average: 'median' } })).codes,
    ).toEqual([]);
    const early = { ...estimate, duration: 10 };
    expect((await filter(samples, {}, { ...white, estimate: early })).codes).toEqual([]);
  });

  test('one that does not describe the noise, in another unit, or that leaves out part of the band is warned of', async () => {
    const samples = noise(64, 33);
    const quieter = spectrumOf(() => S / 4, 0.25, rate / 2);
    expect((await filter(samples, {}, quieter)).codes).toEqual(['not-rayleigh']);
    expect((await filter(samples, {}, { ...white, unit: 'V²/Hz' })).codes).toEqual(['unit-mismatch']);
    const short = spectrumOf(() => S, 0.25, 300);
    const late = { ...short, frequency: short.frequency.slice(160), density: short.density.slice(160) };
    const run = await filter(samples, {}, late);
    expect(run.codes).toEqual(['band-narrowed']);
    expect([run.outcome.data.filter.low, run.outcome.data.filter.high]).toEqual([40, 300]);
  });

  test('a strong narrow line that the limited reach lets through is warned of, with the remedy', async () => {
    const line = spectrumOf((f) => (f === 150 ? 1e6 * S : S), 0.25, rate / 2);
    const run = await filter(noise(64, 34), {}, line);
    const warning = run.outcome.warnings.find((w) => w.code === 'lines-not-resolved');
    expect(warning?.fix).toMatchObject({ params: { reach: 8 } });
  });

  test('a hole in the band is refused', async () => {
    const holed = spectrumOf((f) => (f === 100 ? 0 : S), 0.25, rate / 2);
    await expect(filter(noise(8, 1), {}, holed)).rejects.toThrow(/density 0 at 100 Hz/);
  });
});

describe('refusals say what to do', () => {
  test.each([
    ['a span shorter than the template', 2, {}, /longest valid span/],
    ['a band above the samples', 16, { low: 600 }, /no band is left/],
    ['a band too narrow for the reach', 16, { low: 100, high: 100.5 }, /too narrow/],
  ])('%s', async (_, seconds, given, message) => {
    const template = seconds === 2 ? inspiral(3e-5, 1e-22) : wave;
    await expect(filter(noise(seconds, 1), given, white, template)).rejects.toThrow(message);
  });

  test('no valid sample, more data than memory', async () => {
    await expect(filter(new Float64Array(8 * rate).fill(NaN))).rejects.toThrow(/no valid sample/);
    const input = [seriesOf(noise(64, 1), rate), wave, white];
    await expect(runStep(matchedFilter, input, {}, { memoryLimit: 1e6 })).rejects.toThrow(/resample first/);
  });

  test('an unknown start makes no UTC', async () => {
    const series = seriesOf(noise(16, 1), rate, { startUnknown: true });
    const run = await runStep(matchedFilter, [series, wave, white]);
    const { outcome } = run;
    expect(outcome.tables![0].rows[0][2]).toBe('unknown');
    expect(outcome.sentence).not.toContain('Z)');
    expect(run.figures()[0].x.label).toBe('Time after the first sample');
    expect(formatGps(series.start)).toBe('1400000000');
  });
});
