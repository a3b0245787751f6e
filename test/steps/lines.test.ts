import { describe, expect, test } from 'vitest';
import { gpsTime } from '../../src/core/data/gps-time';
import type { LineList, Spectrum } from '../../src/core/data/kinds';
import { DEMO_RATE, DEMO_SITES, DEMO_START, GRID } from '../../src/core/demo/scenario';
import { synthesise } from '../../src/core/demo/synthesise';
import { findFamilies } from '../../src/core/noise/line-families';
import { binLaw } from '../../src/core/noise/line-law';
import { lorentzian } from '../../src/core/noise/line-shape';
import lines from '../../src/core/steps/lines';
import noiseSpectrum from '../../src/core/steps/noise-spectrum';
import notch from '../../src/core/steps/notch';
import { runStep } from './run-step';
import { gaussianNoise, seriesOf, uniform } from './synthetic';

const fs = 256;
const quiet = (seed: number, seconds = 256) => gaussianNoise(fs * seconds, 1, seed);
/** White noise of density 2/fs per Hz with sines put in. */
function withSines(sines: readonly (readonly [number, number])[], seed = 3, seconds = 256): Float64Array {
  const x = quiet(seed, seconds);
  for (const [f, a] of sines)
    for (let i = 0; i < x.length; i++) x[i] += a * Math.sin((2 * Math.PI * f * i) / fs + f);
  return x;
}
const nearest = (list: LineList, f: number) =>
  list.lines.reduce((a, b) => (Math.abs(a.frequency - f) < Math.abs(b.frequency - f) ? a : b));

describe('law of one bin', () => {
  test('median of 7 exponentials: the binomial sum of order statistics', () => {
    // relative variance of the median of 7: Σ 1/k² over (Σ 1/k)², k = 4..7
    const k = [4, 5, 6, 7];
    const mean = k.reduce((s, i) => s + 1 / i, 0);
    const law = binLaw('median', k.reduce((s, i) => s + 1 / i ** 2, 0) / mean ** 2);
    const t = law.above(1e-4) * mean;
    const above = Math.exp(-t);
    const choose = [35, 21, 7, 1];
    const p = choose.reduce((s, c, i) => s + c * above ** (4 + i) * (1 - above) ** (3 - i), 0);
    expect(p / 1e-4).toBeCloseTo(1, 6);
    expect(law.median).toBeCloseTo(Math.LN2 / mean, 8);
  });

  // scipy.stats.gamma(10).isf(1e-4)/10 and .median()/10
  test('mean of 10 exponentials is gamma distributed', () => {
    const law = binLaw('mean', 0.1);
    const x = law.above(1e-4) * 10;
    let [term, sum] = [1, 1];
    for (let i = 1; i < 10; i++) sum += term *= x / i;
    expect((sum * Math.exp(-x)) / 1e-4).toBeCloseTo(1, 8);
  });
});

describe('Gaussian noise', () => {
  test.each(['median', 'mean'])('100 seeds, %s: no more lines than stated', async (average) => {
    let [count, stated] = [0, 0];
    for (let seed = 1; seed <= 100; seed++) {
      const run = await runStep(lines, [seriesOf(quiet(seed * 7919, 16), fs)], {
        segment: 0.5,
        average,
        'false-alarms': 0.3,
      });
      count += run.number('lines');
      stated += 0.3;
    }
    // Poisson of mean 30: 50 or more with probability 5e-4. Fewer than 5 would mean that the threshold is far too high.
    expect(count).toBeLessThan(50);
    expect(count).toBeGreaterThanOrEqual(5);
    expect(stated).toBeCloseTo(30);
  });
});

describe('planted sines', () => {
  const planted = [
    [31.3, 0.4],
    [47.02, 0.1],
    [77.77, 0.09],
  ] as const;
  test('frequency, power, height, limit of the width', async () => {
    const run = await runStep(lines, [seriesOf(withSines(planted), fs)], { segment: 8, average: 'mean' });
    const list = run.outcome.data;
    expect(list.lines).toHaveLength(3);
    for (const [f, a] of planted) {
      const l = nearest(list, f);
      expect(Math.abs(l.frequency - f)).toBeLessThan(0.02);
      expect(l.frequencyError).toBeLessThan(0.02);
      expect(l.unresolved).toBe(true);
      expect(l.width).toBeLessThan(0.125);
      expect(l.q).toBeCloseTo(l.frequency / l.width);
      expect(l.stability).toBe('stable');
      // a²/2, less what the sum over three widths of noise adds: 9 bins of 2/fs · 1/8 · 13 % at most
      expect(Math.abs(l.power - a ** 2 / 2)).toBeLessThan(0.02 * a ** 2 + 9 * (2 / fs / 8) * 0.3);
    }
    expect(run.codes).toEqual(['unresolved-lines']);
    expect(run.number('lines')).toBe(3);
    expect(run.outcome.tables?.[0].rows).toHaveLength(3);
    const [figure] = run.figures();
    expect(figure.marks).toHaveLength(3);
    expect(figure.traces.map((t) => t.name)).toEqual(['noise of alder /strain', 'local floor', 'threshold']);
  });

  test('a given spectrum is searched as it is; a notch takes the result', async () => {
    const series = seriesOf(withSines(planted), fs);
    const noise = await runStep(noiseSpectrum, [series], { segment: 8, average: 'mean' });
    const own = await runStep(lines, [series], { segment: 8, average: 'mean' });
    const run = await runStep(lines, [series, noise.outcome.data], { segment: 3 });
    expect(run.outcome.data.lines).toEqual(own.outcome.data.lines);
    const cleaned = await runStep(notch, [series, run.outcome.data], { height: 1 });
    expect(cleaned.outcome.tables?.[0].rows).toHaveLength(3);
  });

  test('the same twice, and across gaps', async () => {
    const x = withSines(planted);
    const [a, b] = [await runStep(lines, [seriesOf(x, fs)]), await runStep(lines, [seriesOf(x, fs)])];
    expect(b.outcome.data.lines).toEqual(a.outcome.data.lines);
    x.fill(NaN, 50 * fs, 61 * fs);
    x[150 * fs] = NaN;
    const run = await runStep(lines, [seriesOf(x, fs)]);
    expect(run.outcome.data.lines).toHaveLength(3);
    for (const [f] of planted)
      expect(Math.abs(nearest(run.outcome.data, f).frequency - f)).toBeLessThan(0.03);
  });

  test('a line that moves by a quarter of a hertz, or doubles, is drifting', async () => {
    const x = quiet(5);
    let phase = 0;
    for (let i = 0; i < x.length; i++) {
      phase += (2 * Math.PI * (40 + (0.25 * i) / x.length)) / fs;
      x[i] += 0.4 * Math.sin(phase) + (i < x.length / 2 ? 0.2 : 0.4) * Math.sin((2 * Math.PI * 90 * i) / fs);
    }
    const run = await runStep(lines, [seriesOf(x, fs)]);
    expect(nearest(run.outcome.data, 40.1).stability).toBe('drifting');
    expect(nearest(run.outcome.data, 90).stability).toBe('drifting');
    expect(run.codes).toContain('drifting-lines');
  });
});

test('width of a resonance: noise through a two-pole resonator', async () => {
  // Poles r e^(±iθ): full width at half power f_s (1 − r)/π, for r near 1.
  const [f, width] = [60, 0.8];
  const r = 1 - (Math.PI * width) / fs;
  const drive = gaussianNoise(fs * 512, 0.05, 9);
  const x = quiet(10, 512);
  let [a, b] = [0, 0];
  for (let i = 0; i < x.length; i++) {
    const y = drive[i] + 2 * r * Math.cos((2 * Math.PI * f) / fs) * a - r * r * b;
    [a, b] = [y, a];
    x[i] += y;
  }
  const { data } = (await runStep(lines, [seriesOf(x, fs)], { average: 'mean' })).outcome;
  expect(data.lines).toHaveLength(1);
  const [l] = data.lines;
  expect(l.unresolved).toBe(false);
  expect(Math.abs(l.frequency - f)).toBeLessThan(Math.max(0.05, 4 * l.frequencyError));
  expect(l.width / width).toBeGreaterThan(0.6);
  expect(l.width / width).toBeLessThan(1.5);
});

test('Voigt width: limits and the approximation solved back', () => {
  expect(lorentzian(1, 1)).toBe(0);
  expect(lorentzian(2, 0)).toBeCloseTo(2, 3);
  const l = lorentzian(2, 1.44);
  expect(0.5346 * l + Math.sqrt(0.2166 * l * l + 1.44 ** 2)).toBeCloseTo(2, 12);
});

describe('families', () => {
  const at = (frequency: number) => ({ frequency, frequencyError: 0.003 });
  test('mains and a comb are told apart; what is left has none', () => {
    const found = findFamilies(
      [50, 100.02, 150, 34.6, 7.3, 14.6, 21.9, 36.5, 331.7].map(at),
      [50, 60],
      0.125,
    );
    expect(found.map((f) => f.members.map((m) => m.harmonic))).toEqual([
      [1, 2, 3, 5],
      [1, 2, 3],
    ]);
    expect(found[0].fundamental).toBeCloseTo(7.3, 2);
    expect(found[1].fundamental).toBeCloseTo(50, 1);
    for (const f of found) expect(f.chance).toBeLessThan(0.01);
  });
  test('random lines rarely make one: at most the stated 1 % of lists, by Poisson', () => {
    const next = uniform(77);
    let lists = 0;
    for (let i = 0; i < 1000; i++) {
      const list = Array.from({ length: 12 }, () => at(5 + 1000 * next()));
      if (findFamilies(list, [50, 60], 0.125).length > 0) lists++;
    }
    expect(lists).toBeLessThan(25);
  });
});

describe('demo data', () => {
  test.each(DEMO_SITES.map((d) => [d.site.title, d] as const))(
    '%s: every planted line within one bin',
    async (_, demo) => {
      const series = seriesOf(synthesise(demo).samples, DEMO_RATE, { start: gpsTime(DEMO_START) });
      const { data } = (await runStep(lines, [series])).outcome;
      const df = data.spectrum.df;
      const planted = [
        ...demo.noise.resonances.map((r) => r.frequency),
        ...demo.mains.harmonics.map((h) => h.order * GRID.frequency),
      ];
      for (const f of planted) expect(Math.abs(nearest(data, f).frequency - f), `${f}`).toBeLessThan(df);
      const mains = data.lines.filter((l) => Math.abs((l.family?.fundamental ?? 0) - GRID.frequency) < 0.05);
      expect(mains.map((l) => l.family!.harmonic)).toEqual(demo.mains.harmonics.map((h) => h.order));
      // Two false ones or more where 0.1 is the mean: probability 0.005.
      expect(data.lines.length, data.lines.map((l) => l.frequency.toFixed(2)).join(' ')).toBeLessThanOrEqual(
        planted.length + 1,
      );
    },
  );
});

describe('errors and warnings', () => {
  const series = seriesOf(quiet(1, 64), fs);
  test('one clear error', async () => {
    await expect(runStep(lines, [series], { segment: 40 })).rejects.toThrow(/at least 4 are needed/);
    await expect(runStep(lines, [series], { segment: 100 })).rejects.toThrow(/no segment of 100 s fits/);
    await expect(runStep(lines, [series], { low: 500 })).rejects.toThrow(/no bin to search from 500/);
    const noise = (await runStep(noiseSpectrum, [series])).outcome.data;
    const model: Spectrum = {
      kind: 'spectrum',
      label: 'model',
      frequency: noise.frequency,
      density: noise.density,
      df: noise.df,
      unit: noise.unit,
    };
    await expect(runStep(lines, [series, model])).rejects.toThrow(/not an averaged estimate/);
  });
  test('few averages, stability not tested', async () => {
    expect((await runStep(lines, [series], { segment: 16 })).codes).toEqual([
      'few-averages',
      'stability-not-tested',
    ]);
  });
});
