import { describe, expect, test } from 'vitest';
import { UserError } from '../../src/core/data/errors';
import { addSeconds, gpsTime } from '../../src/core/data/gps-time';
import { coherenceLevel } from '../../src/core/noise/coherence-level';
import coherence from '../../src/core/steps/coherence';
import { samples } from '../kernels/load-kernels';
import { oracle } from '../oracle/oracle';
import { runStep } from './run-step';
import { gaussianNoise, seriesOf } from './synthetic';

const WINDOWS: Record<string, string> = { flattop: 'flat-top' };
const numbers = oracle<{
  rate: number;
  whole: {
    n: number;
    segment: number;
    overlap: number;
    window: string;
    detrend: string;
    coherence: number[];
    re: number[];
    im: number[];
  }[];
  gappy: { n: number; spans: [number, number][]; size: number; segments: number; coherence: number[] };
}>('coherence');
const { rate } = numbers;
const start = gpsTime(1_400_000_000);

/** The two channels of test/oracle/coherence.py. */
function pair(n: number): [Float64Array, Float64Array] {
  const common = samples(n + 3, 5);
  const line = (i: number): number => 0.05 * Math.sin((2 * Math.PI * 60 * i) / rate);
  return [
    samples(n, 21).map((v, i) => 1e-21 * (v + 0.5 * common[i + 3] + line(i) + 0.2)),
    samples(n, 22).map((v, i) => 3e-22 * (0.8 * v + 0.3 * common[i] + line(i))),
  ];
}

const both = (x: readonly [Float64Array, Float64Array], fs = rate) => [
  seriesOf(x[0], fs),
  seriesOf(x[1], fs, { label: 'birch /strain', channel: 'birch' }),
];

describe('against scipy.signal', () => {
  test.each(numbers.whole)('$window, $n samples, $segment s, overlap $overlap', async (c) => {
    const run = await runStep(coherence, both(pair(c.n)), {
      segment: c.segment,
      overlap: c.overlap,
      window: WINDOWS[c.window] ?? c.window,
      detrend: c.detrend,
    });
    const { values, frequency } = run.outcome.data;
    expect(values.length).toBe(c.coherence.length);
    // Bin 0 holds nothing but the rounding of the mean once that is taken off.
    const skip = c.detrend === 'none' ? 0 : 1;
    const worst = Math.max(...c.coherence.slice(skip).map((v, k) => Math.abs(v - values[k + skip])));
    expect(worst).toBeLessThan(1e-10);
    // scipy.signal.csd takes the conjugate of the first channel: the phase changes sign.
    for (const row of run.outcome.tables![0].rows) {
      const k = frequency.indexOf(row[2] as number);
      expect(row[3]).toBe(values[k]);
      expect(row[4] as number).toBeCloseTo((Math.atan2(-c.im[k], c.re[k]) * 180) / Math.PI, 6);
    }
  });

  test('only segments valid in both enter', async () => {
    const c = numbers.gappy;
    const [a, b] = pair(c.n);
    // Each channel lacks what the other has: what is left is the spans of the oracle.
    a[1500] = NaN;
    b.fill(NaN, 2000, 2300);
    const run = await runStep(coherence, both([a, b]), { segment: c.size / rate });
    expect(run.number('segments')).toBe(c.segments);
    const { values } = run.outcome.data;
    c.coherence.forEach((v, k) => {
      if (k > 0) expect(Math.abs(values[k] - v)).toBeLessThan(1e-10);
    });
  });

  test('the plain and the streamed result do not depend on the blocks', async () => {
    const n = (1 << 18) * 2 + 12_345;
    const x = [gaussianNoise(n, 1, 3), gaussianNoise(n, 1, 4)] as const;
    const run = await runStep(coherence, both([x[0], x[1]]), { segment: 1, overlap: 0.25 });
    expect(run.blocks).toBeGreaterThan(2);
    const [f, size, step] = [37, 512, 384];
    const phasor = Float64Array.from({ length: 2 * size }, (_, i) =>
      (i < size ? Math.cos : Math.sin)((2 * Math.PI * f * i) / size),
    );
    let [pa, pb, re, im] = [0, 0, 0, 0];
    for (let at = 0; at + size <= n; at += step) {
      const [ar, ai, br, bi] = [0, 1].flatMap((c) => {
        let mean = 0;
        for (let i = 0; i < size; i++) mean += x[c][at + i] / size;
        let [sr, si] = [0, 0];
        for (let i = 0; i < size; i++) {
          const v = (x[c][at + i] - mean) * Math.sin((Math.PI * i) / size) ** 2;
          sr += v * phasor[i];
          si -= v * phasor[size + i];
        }
        return [sr, si];
      });
      pa += ar * ar + ai * ai;
      pb += br * br + bi * bi;
      re += ar * br + ai * bi;
      im += ai * br - ar * bi;
    }
    expect(run.outcome.data.values[f]).toBeCloseTo((re * re + im * im) / (pa * pb), 10);
  });
});

describe('closed forms', () => {
  const fs = 256;

  // Carter, Knapp, Nuttall 1973: without common signal P(C > x) = (1 − x)^(n − 1), mean 1/n.
  test.each([
    ['hann', 0.5, 40],
    ['hann', 0, 12],
    ['nuttall', 0.75, 64],
    ['boxcar', 0, 100],
  ])('nothing in common (%s, overlap %d, %d s): floor and level hold', async (window, overlap, seconds) => {
    let [bins, above, sum, any] = [0, 0, 0, 0];
    const p = 0.05;
    let floor = 0;
    const runs = 60;
    for (let seed = 1; seed <= runs; seed++) {
      const x = [gaussianNoise(fs * seconds, 1, seed), gaussianNoise(fs * seconds, 3, 1000 + seed)] as const;
      const run = await runStep(coherence, both([x[0], x[1]], fs), {
        segment: 1,
        window,
        overlap,
        'false-probability': p,
      });
      const { values, expected, high } = run.outcome.data;
      floor = expected;
      values.slice(4, -4).forEach((v) => {
        bins++;
        sum += v / expected;
        if (v > high) above++;
      });
      if (run.number('ranges') > 0) any++;
    }
    expect(floor).toBeLessThan(1 / 5);
    // A window ties neighbouring bins; at most two bins in a row count as one.
    expect(Math.abs(sum / bins - 1)).toBeLessThan(0.04);
    expect(above / bins / p).toBeGreaterThan(0.8);
    expect(above / bins / p).toBeLessThan(1.25);
    // At most the stated probability that any range is found in a spectrum; three standard deviations.
    expect(any).toBeLessThanOrEqual(p * runs + 3 * Math.sqrt(p * runs));
  });

  test('the level is what the formula gives', () => {
    expect(coherenceLevel(0.05, 2)).toBeCloseTo(0.95, 14);
    expect(coherenceLevel(0.01, 101)).toBeCloseTo(1 - 10 ** (-2 / 100), 14);
  });

  test('common noise of a known share has the coherence of that share', async () => {
    const n = fs * 2000;
    const [a, b, c] = [1, 2, 3].map((seed) => gaussianNoise(n, 1, seed));
    // Powers 1 + 1 and 1 + 4·1: C = (1·1)² / (2 · 5) with common power 1 in each.
    const run = await runStep(
      coherence,
      both([a.map((v, i) => v + c[i]), b.map((v, i) => 2 * v + c[i])], fs),
      { segment: 0.25 },
    );
    const values = run.outcome.data.values.slice(2, -2);
    const mean = values.reduce((x, y) => x + y, 0) / values.length;
    expect(mean).toBeCloseTo(0.1, 2);
    expect(run.codes).toContain('coherent-broadband');
    const strongest = run.outcome.numbers.find((q) => q.id === 'strongest')!;
    expect(strongest.low).toBeLessThan(strongest.value);
    expect(strongest.high).toBeGreaterThan(strongest.value);
  });

  test('a common line is found, with the phase of its delay', async () => {
    const delay = 0.003;
    const line = (t: number): number => 0.3 * Math.sin(2 * Math.PI * 50.1 * t);
    const a = gaussianNoise(fs * 256, 1, 5).map((v, i) => v + line(i / fs));
    const b = gaussianNoise(fs * 256, 1, 6).map((v, i) => v + line(i / fs - delay));
    const run = await runStep(coherence, both([a, b], fs));
    const rows = run.outcome.tables![0].rows as number[][];
    expect(rows.length).toBe(1);
    expect(Math.abs(rows[0][2] - 50.1)).toBeLessThan(0.25);
    expect(rows[0][4]).toBeCloseTo(360 * 50.1 * delay, -1);
    expect(run.number('strongest')).toBeGreaterThan(0.8);
    const figure = run.figures()[0];
    expect(figure.marks).toMatchObject([{ role: 'event' }]);
    expect(figure.marks[0].label).toContain('coherent');
    expect(figure.x.link).toBe('frequency');
    expect(figure.caption).toContain('1 range marked');
  });
});

describe('alignment', () => {
  const fs = 256;
  const x = gaussianNoise(fs * 80, 1, 9);

  test('the common span is found by GPS time: shifted copies have coherence 1', async () => {
    const late = seriesOf(x.slice(fs * 10), fs, { start: addSeconds(start, 10), label: 'birch /strain' });
    const run = await runStep(coherence, [seriesOf(x.slice(0, fs * 60), fs), late], { segment: 1 });
    expect(run.number('segments')).toBe(99);
    expect(run.outcome.data.values.slice(1).every((v) => Math.abs(v - 1) < 1e-12)).toBe(true);
    expect(run.codes).toEqual(['same-data']);
  });

  test('a fraction of a sample is said', async () => {
    const late = seriesOf(gaussianNoise(fs * 80, 1, 4), fs, { start: addSeconds(start, 0.3 / fs) });
    const run = await runStep(coherence, [seriesOf(x, fs), late], { segment: 1 });
    expect(run.outcome.warnings).toMatchObject([{ code: 'sampling-offset' }]);
    expect(run.outcome.warnings[0].value).toBeCloseTo(0.3, 5);
  });

  test('notes of both are repeated once', async () => {
    const notes = ['contains an injection'];
    const run = await runStep(
      coherence,
      [seriesOf(x, fs, { notes }), seriesOf(gaussianNoise(fs * 80, 1, 4), fs, { notes })],
      { segment: 1 },
    );
    expect(run.outcome.sentence.split('contains an injection').length).toBe(2);
  });

  test.each([
    ['rates-differ', { rate: 512 }, {}, /256 Hz and .* 512 Hz; put a resample step to 256 Hz after birch/],
    [
      'no-common-span',
      { start: addSeconds(start, 80) },
      {},
      /GPS 1400000000 to 1400000080\) and .*1400000080 to/,
    ],
    ['one-segment', {}, { segment: 80 }, /one segment of 80 s .*"segment" to 10 s/],
    ['one-segment', {}, { segment: 79, overlap: 0.95 }, /one segment of 79 s/],
    [
      'one-segment',
      {},
      { segment: 72, overlap: 0.95 },
      /3 segments of 72 s .* worth only 1\.\d+ independent/,
    ],
    ['segment-long', {}, { segment: 100 }, /time common to alder \/strain and birch \/strain is 80 s/],
    ['segment-short', {}, { segment: 0.01 }, /at least 0\.0625 s/],
  ])('refuses with %s', async (code, over, params, message) => {
    const other = seriesOf(gaussianNoise(fs * 80, 1, 4), fs, { label: 'birch /strain', ...over });
    const run = runStep(coherence, [seriesOf(x, fs), other], params);
    await expect(run).rejects.toThrow(UserError);
    await expect(run).rejects.toMatchObject({ code, message: expect.stringMatching(message) as string });
  });

  test('spans of validity that do not meet are refused', async () => {
    const a = x.slice();
    const b = x.slice();
    a.fill(NaN, 0, fs * 40);
    b.fill(NaN, fs * 40);
    await expect(runStep(coherence, both([a, b], fs))).rejects.toMatchObject({ code: 'no-data' });
  });
});

describe('warnings', () => {
  const fs = 256;
  test('few averages', async () => {
    const run = await runStep(
      coherence,
      both([gaussianNoise(fs * 8, 1, 1), gaussianNoise(fs * 8, 1, 2)], fs),
      { segment: 2 },
    );
    expect(run.outcome.warnings).toMatchObject([{ code: 'few-averages', severity: 'caution' }]);
    expect(run.outcome.warnings[0].value).toBeCloseTo(7 / (1 + (2 * 6) / 7 / 36), 10);
  });

  test('a constant channel has no coherence anywhere, and no figure breaks', async () => {
    const run = await runStep(
      coherence,
      both([gaussianNoise(fs * 40, 1, 1), new Float64Array(fs * 40).fill(0)], fs),
      { segment: 1 },
    );
    expect(run.codes).toContain('zero-bins');
    expect(run.outcome.numbers.every((q) => Number.isFinite(q.value))).toBe(true);
    expect(run.outcome.tables![0].rows).toEqual([]);
    expect(run.figures()[0].y.extent).toEqual([0, 1]);
  });
});
