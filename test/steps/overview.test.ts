import { describe, expect, test } from 'vitest';
import type { Series } from '../../src/core/data/kinds';
import { scanSamples } from '../../src/core/data/scan';
import type { Trace } from '../../src/core/figures/figure';
import overview from '../../src/core/steps/overview';
import { samples } from '../kernels/load-kernels';
import { oracle } from '../oracle/oracle';
import { runStep } from './run-step';
import { gaussianNoise, seriesOf } from './synthetic';

const fs = 1024;
const noise = (seconds: number, sigma = 1, seed = 3): Float64Array =>
  gaussianNoise(seconds * fs, sigma, seed);
const look = (x: Float64Array, over: Partial<Series> = {}) =>
  runStep(overview, [seriesOf(x, over.rate ?? fs, { unit: 'V', ...over })]);
const trace = <T extends Trace['type']>(traces: readonly Trace[], type: T): Extract<Trace, { type: T }> =>
  traces.find((t): t is Extract<Trace, { type: T }> => t.type === type)!;

describe('numbers', () => {
  test('equal NumPy and SciPy', async () => {
    const { rate, moments } = oracle<{ rate: number; moments: Record<string, number> }>('noise-spectrum');
    const x = samples(moments['n'], 21).map(
      (v, i) => v + 0.3 + 0.1 * Math.sin((2 * Math.PI * 60 * i) / rate),
    );
    const run = await look(x, { rate });
    for (const id of ['min', 'max', 'mean', 'rms', 'deviation'])
      expect(run.number(id) / moments[id], id).toBeCloseTo(1, 12);
    expect(run.number('robust-width') / moments['width']).toBeCloseTo(1, 12);
  });

  test('only valid samples count, and the others are counted', async () => {
    const x = noise(8);
    const broken = x.slice();
    broken.fill(NaN, 100, 110);
    broken[5000] = -Infinity;
    const run = await look(broken);
    expect(run.number('unusable')).toBe(11);
    const left = x.filter((_, i) => Number.isFinite(broken[i]));
    const mean = left.reduce((a, b) => a + b, 0) / left.length;
    expect(run.number('mean')).toBeCloseTo(mean, 12);
  });

  test('samples spoilt by a filter edge do not count, although they exist', async () => {
    const x = noise(8).fill(1e3, 0, fs);
    const valid = [{ from: fs, to: 8 * fs }];
    const run = await look(x, { valid, spoilt: [{ from: 0, to: fs }] });
    expect(run.number('max')).toBeLessThan(10);
    expect(run.codes).toEqual([]);
    const [figure, histogram] = run.figures();
    expect(figure.marks).toMatchObject([{ role: 'cropped', from: 0, to: 1 }]);
    expect(trace(histogram.traces, 'bars').counts.reduce((a, b) => a + b, 0)).toBe(7 * fs);
  });

  test('what the first reading of an input found is used and gives the same', async () => {
    const x = noise(600);
    x.fill(NaN, 1000, 5000);
    const bare = seriesOf(x, fs, { unit: 'V' });
    const scan = await scanSamples((a, b, into) => bare.read(a, b, into), x.length, { rate: fs });
    const a = await runStep(overview, [bare]);
    const b = await runStep(overview, [{ ...bare, scan }]);
    expect(b.outcome.numbers).toEqual(a.outcome.numbers);
    expect(b.blocks).toBeLessThan(a.blocks);
    expect(b.blocks).toBeGreaterThan(1);
  });

  test('tables give start in GPS and UTC, spans and gaps', async () => {
    const x = noise(8);
    x.fill(NaN, 2 * fs, 4 * fs);
    const [facts, spans] = (await look(x)).outcome.tables!;
    expect(facts.rows.map((r) => r[1])).toEqual(
      expect.arrayContaining(['1400000000', '2024-05-17T16:53:02Z', '1400000008', 8, 8192]),
    );
    expect(spans.rows.map((r) => r.slice(0, 4))).toEqual([
      ['data', 0, 2, 2048],
      ['gap', 2, 2, 2048],
      ['data', 4, 4, 4096],
    ]);
  });
});

describe('histogram', () => {
  test('covers ±6 robust widths, keeps outliers in the end bins and follows the Gaussian', async () => {
    const x = noise(256, 2);
    x[77] = 1e6;
    x[78] = -1e6;
    const [, figure] = (await look(x)).figures();
    const bars = trace(figure.traces, 'bars');
    expect(bars.counts.length).toBe(120);
    expect(bars.edges[120] - bars.edges[0]).toBeCloseTo(12 * 2, 0);
    expect(bars.counts.reduce((a, b) => a + b, 0)).toBe(x.length);
    expect(bars.counts[0]).toBe(1);
    expect(bars.counts[119]).toBe(1);
    const model = trace(figure.traces, 'line');
    let chi = 0;
    let bins = 0;
    bars.counts.forEach((n, k) => {
      if (!(model.y[k] > 25)) return;
      chi += (n - model.y[k]) ** 2 / model.y[k];
      bins++;
    });
    // Chi-square of `bins` bins: mean `bins`, standard deviation √(2 bins); five of them.
    expect(bins).toBeGreaterThan(50);
    expect(chi).toBeLessThan(bins + 5 * Math.sqrt(2 * bins));
    expect(figure.caption).toContain('end bins also hold everything beyond');
  });

  test('bins of whole numbers hold equally many of them', async () => {
    const x = noise(64, 200).map(Math.round);
    const [, figure] = (await look(x, { unit: 'counts' })).figures();
    const { edges } = trace(figure.traces, 'bars');
    expect(edges[1] - edges[0]).toBe(20);
    expect(edges[0] % 1).not.toBe(0);
  });
});

describe('warnings', () => {
  test('clean data give none', async () => {
    expect((await look(noise(16))).codes).toEqual([]);
  });

  test('not-finite: short runs', async () => {
    const x = noise(16);
    x[100] = NaN;
    x[200] = Infinity;
    x[201] = NaN;
    expect((await look(x)).outcome.warnings).toMatchObject([
      { code: 'not-finite', severity: 'caution', value: 3 },
    ]);
  });

  test('gaps: a second or more', async () => {
    const x = noise(16);
    x.fill(NaN, 3 * fs, 5.5 * fs);
    const run = await look(x);
    expect(run.outcome.warnings).toMatchObject([{ code: 'gaps', value: 2.5 }]);
    expect(run.figures()[0].marks).toMatchObject([{ role: 'gap', from: 3, to: 5.5, label: 'gap, 2.5 s' }]);
    expect(run.outcome.sentence).toContain('1 gap.');
  });

  test('no-valid-samples', async () => {
    const run = await look(new Float64Array(fs).fill(NaN));
    expect(run.outcome.warnings[0]).toMatchObject({ code: 'no-valid-samples', severity: 'problem' });
    expect(run.outcome.numbers.every((n) => Number.isFinite(n.value))).toBe(true);
    expect(run.figures()).toHaveLength(2);
  });

  test('constant', async () => {
    const run = await look(new Float64Array(fs).fill(0.25));
    expect(run.codes).toEqual(['constant']);
    expect(run.outcome.warnings[0].severity).toBe('problem');
    expect(run.figures()).toHaveLength(2);
  });

  test('saturated: clipped at both ends, marked in the picture', async () => {
    const x = Float64Array.from({ length: 16 * fs }, (_, i) => {
      const v = 1.2 * Math.sin((2 * Math.PI * 3 * i) / fs);
      return Math.max(-1, Math.min(1, v));
    });
    const run = await look(x);
    expect(run.codes).toEqual(['saturated']);
    expect(run.number('saturated')).toBeGreaterThan(x.length / 4);
    expect(run.figures()[0].marks.some((m) => m.role === 'saturated')).toBe(true);
  });

  test('digital-zeros: a filled gap', async () => {
    const run = await look(noise(16).fill(0, 5 * fs, 7 * fs));
    expect(run.outcome.warnings).toMatchObject([{ code: 'digital-zeros', value: 2 }]);
  });

  test('unscaled-counts: whole numbers under another unit', async () => {
    const x = noise(16, 300).map(Math.round);
    expect((await look(x, { unit: 'strain' })).codes).toEqual(['unscaled-counts']);
    expect((await look(x, { unit: 'counts' })).codes).toEqual([]);
    x[4000] += 0.5;
    expect((await look(x, { unit: 'strain' })).codes).toEqual([]);
  });

  test.each([
    [4100, 'caution'],
    [4095.9873, 'caution'],
    [4096, undefined],
    [44100, undefined],
    [1000, undefined],
    [0.5, undefined],
    [256.4, 'caution'],
  ])('rate-doubtful: %d Hz', async (rate, severity) => {
    const run = await look(noise(4), { rate });
    expect(run.outcome.warnings[0]?.severity).toBe(severity);
    if (severity) expect(run.outcome.warnings[0]).toMatchObject({ code: 'rate-doubtful', value: rate });
  });

  test('float32-underflow: strain stored as float32, but not as float64', async () => {
    expect((await look(noise(16, 1e-22), { unit: 'strain' })).outcome.warnings).toEqual([]);
    const run = await look(noise(16, 1e-22).map(Math.fround), { unit: 'strain' });
    expect(run.outcome.warnings).toMatchObject([{ code: 'float32-underflow', severity: 'note' }]);
    // The warning is true: in single precision the density of these samples is zero.
    expect(Math.fround(run.outcome.warnings[0].value!)).toBe(0);
  });
});
