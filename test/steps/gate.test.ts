import { describe, expect, test } from 'vitest';
import { bandTaps } from '../../src/core/condition/gate-search';
import { CancelledError } from '../../src/core/data/errors';
import type { Series } from '../../src/core/data/kinds';
import gate from '../../src/core/steps/gate';
import noiseSpectrum from '../../src/core/steps/noise-spectrum';
import { runStep } from './run-step';
import { gaussianNoise, seriesOf } from './synthetic';

const rate = 256;
const ones = (seconds: number): Float64Array => new Float64Array(seconds * rate).fill(1);

describe('closed forms', () => {
  test('zero inside, half a cosine outside, 1 beyond: seconds after the start and GPS alike', async () => {
    for (const params of [{ spans: [10, 11.5] }, { 'gps-spans': [1_400_000_010, 1_400_000_011.5] }]) {
      const run = await runStep(gate, [seriesOf(ones(20), rate)], { ...params, taper: 0.25 });
      const y = run.outcome.data.read(0, 20 * rate);
      const [from, to, m] = [2560, 2944, 64];
      y.forEach((v, i) => {
        const d = i < from ? from - i : i >= to ? i - to + 1 : 0;
        const w = d > m ? 1 : Math.sin((Math.PI * d) / (2 * (m + 1))) ** 2;
        expect(Math.abs(v - w)).toBeLessThan(1e-15);
      });
      expect(run.number('gates')).toBe(1);
      expect(run.number('zero')).toBe(1.5);
      expect(run.number('gated')).toBe(2);
      expect(run.number('share')).toBe(0.1);
      // Σ (1 − sin⁴(πd/2(m + 1))) over d = 1 … m is 5(m + 1)/8 − 1/2.
      const lost = (1.5 * rate + 2 * ((5 * (m + 1)) / 8 - 0.5)) / (20 * rate);
      expect(run.number('power-lost')).toBeCloseTo(lost, 13);
      expect(run.number('rms')).toBeCloseTo(Math.sqrt(1 - lost), 13);
      expect(run.outcome.data.gates).toEqual([{ from: from - m, to: to + m }]);
      expect(run.outcome.data.valid).toEqual([{ from: 0, to: 20 * rate }]);
      expect(run.outcome.data.notes).toEqual(['gated: 1 span, 2 s']);
    }
  });

  test('gates whose tapers would meet become one; touching ones do not', async () => {
    const far = await runStep(gate, [seriesOf(ones(20), rate)], { spans: [5, 6, 6.5, 7] });
    expect(far.number('gates')).toBe(2);
    const near = await runStep(gate, [seriesOf(ones(20), rate)], { spans: [6.45, 7, 5, 6] });
    expect(near.number('gates')).toBe(1);
    expect(near.number('zero')).toBe(2);
  });

  test('steady noise loses what is stated, in its mean spectrum too', async () => {
    const series = seriesOf(gaussianNoise(400 * rate, 1, 3), rate);
    const run = await runStep(gate, [series], { spans: [50, 80, 200, 230] });
    const lost = run.number('power-lost');
    expect(lost).toBeCloseTo(0.15, 2);
    const level = async (s: Series): Promise<number> => {
      const { density } = (await runStep(noiseSpectrum, [s], { segment: 1, average: 'mean' })).outcome.data;
      return density.reduce((a, b) => a + b, 0);
    };
    expect((await level(run.outcome.data)) / (await level(series))).toBeCloseTo(1 - lost, 2);
    expect(run.codes).toEqual(['gated-much']);
  });

  test('the band filter: half at its edges, 1 inside, nothing beyond', () => {
    for (const [low, high] of [
      [20, 100],
      [20, null],
      [null, 40],
    ] as const) {
      const taps = bandTaps(1024, low, high);
      const gain = (f: number): number =>
        taps.reduce((s, h, k) => s + (k === 0 ? 1 : 2) * h * Math.cos((2 * Math.PI * f * k) / 1024), 0);
      const soft = (low ?? high) / 2;
      for (const edge of [low, high]) if (edge !== null) expect(gain(edge)).toBeCloseTo(0.5, 3);
      for (let f = 0; f <= 512; f += 0.7) {
        const inside = f > (low === null ? -1 : low + soft) && f < (high === null ? 513 : high - soft);
        const beyond = f < (low === null ? -1 : low - soft) || f > (high === null ? 513 : high + soft);
        if (inside) expect(Math.abs(gain(f) - 1)).toBeLessThan(1e-4);
        if (beyond) expect(Math.abs(gain(f))).toBeLessThan(1e-4);
      }
    }
  });
});

describe('search', () => {
  /** Gaussian noise with two bursts of 40 standard deviations, at 10 s and at 30 s. */
  const bursts = (wall = 0): Float64Array => {
    const x = gaussianNoise(60 * rate, 1, 6);
    for (const at of [10 * rate, 30 * rate]) x[at] = 40;
    x.forEach((_, i) => (x[i] += wall * Math.sin((2 * Math.PI * 2 * i) / rate)));
    return x;
  };

  test('finds what stands out and nothing else', async () => {
    const run = await runStep(gate, [seriesOf(bursts(), rate, { unit: '' })], { threshold: 20 });
    expect(run.number('over')).toBe(2);
    expect(run.number('gates')).toBe(2);
    expect(run.number('zero')).toBeCloseTo(2 * (0.5 + 1 / rate), 12);
    expect(run.number('width')).toBeCloseTo(1, 1);
    expect(run.number('loudest')).toBeCloseTo(40 / run.number('width'), 0);
    expect(run.codes).toEqual([]);
    const [table] = run.outcome.tables!;
    expect(table.rows.map((r) => [r[0], r[1], r[4], r[6]])).toEqual([
      ['1400000009.75', 9.75, 'found', 1],
      ['1400000029.75', 29.75, 'found', 1],
    ]);
  });

  test('under a wall of slow motion a band is needed', async () => {
    const series = seriesOf(bursts(1000), rate);
    const plain = await runStep(gate, [series], { threshold: 10 });
    expect(plain.codes).toEqual(['no-gate', 'searched-as-is']);
    const run = await runStep(gate, [series], { threshold: 10, low: 20, spans: [9.9, 10.1] });
    expect(run.codes).toEqual([]);
    expect(run.number('gates')).toBe(2);
    expect(run.outcome.tables![0].rows.map((r) => r[4])).toEqual(['given, found', 'found']);
    expect(run.number('searched')).toBeCloseTo(60 - (2 * 50) / rate, 12);
    // What comes out is the data, not the copy of the band.
    expect(run.outcome.data.read(20 * rate, 21 * rate)).toEqual(bursts(1000).slice(20 * rate, 21 * rate));
  });

  test('the number expected by chance is that found in Gaussian noise', async () => {
    const series = seriesOf(gaussianNoise(4000 * rate, 1, 9), rate, { unit: '' });
    const run = await runStep(gate, [series], { threshold: 3.5, margin: 0, taper: 0.05 });
    const n = run.number('chance');
    expect(n).toBeGreaterThan(400);
    // The width itself is known to 0.2 %, which moves the count by 2.5 %.
    expect(Math.abs(run.number('over') - n)).toBeLessThan(4 * Math.sqrt(n) + 0.05 * n);
    expect(run.codes).toContain('threshold-low');
  });
});

test('gaps stay gaps, gates and notes of the input are kept, reading by parts is the same', async () => {
  const x = gaussianNoise(20 * rate, 1, 2);
  x.fill(NaN, 1000, 1100);
  const series = seriesOf(x, rate, {
    gates: [{ from: 4000, to: 4100 }],
    notes: ['contains an injection'],
    startUnknown: true,
  });
  const { data, sentence } = (await runStep(gate, [series], { spans: [3.5, 5, 12, 13] })).outcome;
  expect(data.valid).toEqual(series.valid);
  expect(data.gates).toEqual([
    { from: 832, to: 1000 },
    { from: 1100, to: 1344 },
    { from: 3008, to: 3392 },
    { from: 4000, to: 4100 },
  ]);
  expect(data.startUnknown).toBe(true);
  expect(data.notes?.[0]).toBe('contains an injection');
  expect(sentence).toContain('contains an injection');
  const whole = data.read(0, data.length);
  whole.forEach((v, i) => expect(Number.isNaN(v)).toBe(i >= 1000 && i < 1100));
  for (const [a, b] of [
    [830, 840],
    [950, 1001],
    [1099, 1350],
    [3100, 3101],
    [3391, 5000],
  ])
    expect(data.read(a, b)).toEqual(whole.slice(a, b));
});

describe('warnings', () => {
  const series = seriesOf(gaussianNoise(60 * rate, 1, 2), rate);
  test.each([
    [{}, ['no-gate']],
    [{ spans: [1, 2], taper: 0 }, ['no-taper']],
    [{ spans: [1, 2], 'gps-spans': [1, 2] }, ['gate-outside']],
    [{ spans: [0, 40] }, ['gated-much']],
    [{ threshold: 50, low: 0.2 }, ['no-gate', 'not-searched']],
  ])('%o', async (params, codes) => {
    expect((await runStep(gate, [series], params)).codes).toEqual(codes);
  });
  test('more than half gated is a problem', async () => {
    const [w] = (await runStep(gate, [series], { spans: [0, 40] })).outcome.warnings;
    expect(w.severity).toBe('problem');
  });
});

describe('errors', () => {
  const series = seriesOf(gaussianNoise(60 * rate, 1, 2), rate);
  test.each([
    [{ spans: [2, 1] }, 'gate-order'],
    [{ 'gps-spans': [1_400_000_002, 1_400_000_001] }, 'gate-order'],
    [{ threshold: 20, low: 50, high: 20 }, 'band-empty'],
    [{ threshold: 20, low: 200 }, 'band-empty'],
    [{ threshold: 20, low: 0.1 }, 'filter-long'],
  ])('%o', async (params, code) => {
    await expect(runStep(gate, [series], params)).rejects.toMatchObject({ name: 'UserError', code });
  });
  test('no samples', async () => {
    const none = seriesOf(new Float64Array(100).fill(NaN), rate);
    await expect(runStep(gate, [none], { spans: [0, 1] })).rejects.toMatchObject({ code: 'no-data' });
  });
  test('a cancel ends it', async () => {
    let calls = 0;
    const onBlock = () => {
      if (++calls === 2) throw new CancelledError();
    };
    const long = seriesOf(new Float64Array(800_000), rate);
    await expect(runStep(gate, [long], { spans: [1, 2] }, { onBlock })).rejects.toBeInstanceOf(
      CancelledError,
    );
    expect(calls).toBe(2);
  });
});

test('figure: gates marked', async () => {
  const run = await runStep(gate, [seriesOf(ones(20), rate)], { spans: [5, 6, 10, 11] });
  const [figure] = run.figures();
  expect(figure.marks.map((m) => [m.role, m.from])).toEqual([
    ['event', 4.75],
    ['event', 9.75],
  ]);
  expect(figure.caption).toContain('2 gates marked');
});
