import { describe, expect, test } from 'vitest';
import { whiteStatistics } from '../../src/core/condition/whiten-statistics';
import { CancelledError } from '../../src/core/data/errors';
import type { Series, Spectrum } from '../../src/core/data/kinds';
import noiseSpectrum from '../../src/core/steps/noise-spectrum';
import whiten from '../../src/core/steps/whiten';
import { oracle } from '../oracle/oracle';
import { runStep } from './run-step';
import { gaussianNoise, seriesOf } from './synthetic';

const numbers = oracle<{
  rate: number;
  n: number;
  frequency: number[];
  density: number[];
  cases: {
    given: boolean;
    low: number;
    high: number | null;
    reach: number;
    segment: number;
    numbers: Record<string, number>;
    x: (number | null)[];
  }[];
}>('whiten');

function curve(
  frequency: ArrayLike<number>,
  density: (f: number) => number,
  over: Partial<Spectrum> = {},
): Spectrum {
  const f = Float64Array.from(frequency);
  return {
    kind: 'spectrum',
    label: 'the curve',
    frequency: f,
    density: f.map(density),
    df: f[1] - f[0],
    unit: 'strain²/Hz',
    ...over,
  };
}
const grid = (to: number, df: number, from = 0): number[] =>
  Array.from({ length: Math.round((to - from) / df) + 1 }, (_, k) => from + k * df);
const flat = (level: number, to: number, over: Partial<Spectrum> = {}): Spectrum =>
  curve(grid(to, 0.5), () => level, over);

/** The series of test/oracle/whiten.py. */
function wall(n: number, rate: number): Float64Array {
  const x = Float64Array.from({ length: n }, (_, k) => {
    const noise = ((k * 7919 + ((k * k) % 1009)) % 2003) / 1001.5 - 1;
    const wave = (f: number): number => Math.sin((2 * Math.PI * f * k) / rate);
    return 1e-21 * (noise + 300 * wave(1.3) + 3 * wave(60.25));
  });
  x.fill(NaN, 9000, 9100);
  x[15000] = NaN;
  return x;
}

describe('equal to NumPy and SciPy within 1e-9 standard deviations', () => {
  test.each(numbers.cases)('given $given, $low to $high Hz, reach $reach s', async (c) => {
    const { rate, n, frequency, density } = numbers;
    const given = curve(frequency, (f) => density[f]);
    const run = await runStep(whiten, [seriesOf(wall(n, rate), rate), ...(c.given ? [given] : [])], {
      low: c.low,
      high: c.high,
      reach: c.reach,
      segment: c.segment,
    });
    const y = run.outcome.data.read(0, n);
    c.x.forEach((v, i) => {
      if (v === null) expect(y[37 * i]).toBeNaN();
      else expect(Math.abs(y[37 * i] - v)).toBeLessThan(1e-9);
    });
    for (const [id, value] of Object.entries(c.numbers))
      expect(Math.abs(run.number(id) - value), id).toBeLessThan(1e-8 * Math.abs(value) + 1e-12);
  });
});

describe('closed forms', () => {
  const rate = 256;

  test('a flat spectrum over the full band scales and does nothing else', async () => {
    const x = gaussianNoise(8000, 3e-22, 7);
    // One-sided density of white noise: 2 σ²/rate.
    const run = await runStep(whiten, [seriesOf(x, rate), flat((2 * 9e-44) / rate, 128)], { low: 0 });
    const { data } = run.outcome;
    const [{ from, to }] = data.valid;
    const y = data.read(from, to);
    let worst = 0;
    y.forEach((v, i) => (worst = Math.max(worst, Math.abs(v - x[from + i] / 3e-22))));
    expect(worst).toBeLessThan(1e-11);
    expect(run.number('expected')).toBeCloseTo(1, 12);
    expect([from, data.length - to]).toEqual([511, 511]);
    expect(data.unit).toBe('');
  });

  test.each([40, 61.3, 100])('a sine of %d Hz: no delay, gain √(2/(rate S))', async (f) => {
    const density = (g: number): number => 1e-44 * (1 + (g / 50) ** 2);
    const x = Float64Array.from({ length: 8000 }, (_, i) => 1e-21 * Math.cos((2 * Math.PI * f * i) / rate));
    const run = await runStep(whiten, [seriesOf(x, rate), curve(grid(128, 0.5), density)]);
    const gain = 1e-21 * Math.sqrt(2 / (rate * density(f)));
    const [{ from, to }] = run.outcome.data.valid;
    let worst = 0;
    run.outcome.data.read(from, to).forEach((v, i) => {
      worst = Math.max(worst, Math.abs(v / gain - Math.cos((2 * Math.PI * f * (from + i)) / rate)));
    });
    expect(worst).toBeLessThan(2e-3);
  });

  test('a wall below the band stays out', async () => {
    // A slow wave a million times the noise: a Hann truncation would let 1e-6 of it in.
    const x = gaussianNoise(20_000, 1e-22, 2);
    x.forEach((_, i) => (x[i] += 1e-16 * Math.sin((2 * Math.PI * 3.7 * i) / rate)));
    const run = await runStep(whiten, [seriesOf(x, rate), flat((2 * 1e-44) / rate, 128)]);
    expect(run.number('variance')).toBeLessThan(0.9);
    expect(run.number('expected')).toBeCloseTo((128 - 21) / 128, 2);
  });
});

describe('coloured Gaussian noise comes out white', () => {
  const rate = 1024;
  const n = 128 * rate;
  // x(i) = a x(i−1) + b x(i−2) + w(i): density 2 σ²/rate / |1 − a z − b z²|², z = e^(−2πif/rate), over two decades.
  const [a, b] = [1.2, -0.5];
  const coloured = (seed: number): Float64Array => {
    const w = gaussianNoise(n, 1e-21, seed);
    for (let i = 0; i < n; i++) w[i] += a * (i > 0 ? w[i - 1] : 0) + b * (i > 1 ? w[i - 2] : 0);
    return w;
  };
  const truth = (f: number): number => {
    const p = (2 * Math.PI * f) / rate;
    const re = 1 - a * Math.cos(p) - b * Math.cos(2 * p);
    const im = a * Math.sin(p) + b * Math.sin(2 * p);
    return (2 * 1e-42) / rate / (re * re + im * im);
  };

  async function check(inputs: readonly (Series | Spectrum)[], share: number): Promise<void> {
    const run = await runStep(whiten, inputs, {
      low: share < 1 ? 30 : 0,
      ...(share < 1 ? { high: 400 } : {}),
    });
    const kept = run.number('kept') * rate;
    const error = Math.sqrt(2 / (kept * share));
    expect(Math.abs(run.number('variance') / run.number('expected') - 1)).toBeLessThan(3.5 * error);
    expect(Math.abs(run.number('expected') - share)).toBeLessThan(0.01);
    expect(run.number('p-value')).toBeGreaterThan(0.005);
    expect(Math.abs(run.number('kurtosis'))).toBeLessThan(4 * Math.sqrt(24 / (kept * share)));
    expect(run.codes).toEqual([]);
    // Flat: in each eighth of the band the mean density is 2/rate within its error.
    const { density, frequency } = (
      await runStep(noiseSpectrum, [run.outcome.data], { segment: 1, average: 'mean' })
    ).outcome.data;
    const [lo, hi] = share < 1 ? [34, 396] : [4, 508];
    for (let part = 0; part < 8; part++) {
      const inside = density.filter(
        (_, k) =>
          frequency[k] >= lo + ((hi - lo) * part) / 8 && frequency[k] < lo + ((hi - lo) * (part + 1)) / 8,
      );
      const mean = inside.reduce((s, v) => s + v, 0) / inside.length;
      expect(Math.abs((mean * rate) / 2 - 1)).toBeLessThan(4 / Math.sqrt(inside.length * 120) + 0.005);
    }
  }

  test('by its known spectrum, all of the band', () =>
    check([seriesOf(coloured(3), rate), curve(grid(512, 0.25), truth)], 1));
  test('by its known spectrum, 30 to 400 Hz', () =>
    check([seriesOf(coloured(4), rate), curve(grid(512, 0.25), truth)], (400 - 30 - 2) / 512));
  test('by its own spectrum', () => check([seriesOf(coloured(5), rate)], 1));
});

describe('spans', () => {
  const rate = 256;
  const spectrum = flat(1e-44, 128);

  test('each on its own: nothing of one shows in another, and nothing of a gap', async () => {
    const x = gaussianNoise(9000, 1e-21, 1);
    const whole = (await runStep(whiten, [seriesOf(x, rate), spectrum], { reach: 1 })).outcome.data;
    const y = x.slice();
    y[3000] = NaN;
    y.fill(NaN, 6000, 6100);
    y.fill(5, 6100, 6400); // too short a span for the filter, and wild
    y[6400] = NaN;
    const run = await runStep(
      whiten,
      [
        seriesOf(y, rate, {
          notes: ['contains an injection'],
          startUnknown: true,
          gates: [{ from: 4000, to: 4010 }],
        }),
        spectrum,
      ],
      { reach: 1 },
    );
    const { data } = run.outcome;
    expect(data.valid).toEqual([
      { from: 255, to: 2745 },
      { from: 3256, to: 5745 },
      { from: 6656, to: 8745 },
    ]);
    const [a, b] = [whole, data].map((s) => s.read(0, 9000));
    for (const s of data.valid)
      for (let i = s.from; i < s.to; i++) expect(Math.abs(a[i] - b[i])).toBeLessThan(1e-10);
    expect(b.filter((v) => Number.isNaN(v)).length).toBe(9000 - (2490 + 2489 + 2089));
    expect(data.spoilt).toContainEqual({ from: 6100, to: 6400 });
    expect(data.gates).toEqual([{ from: 4000 - 255, to: 4010 + 255 }]);
    expect(data.notes).toEqual(['contains an injection']);
    expect(data.startUnknown).toBe(true);
    expect(run.outcome.sentence).toContain('contains an injection');
  });

  test('samples do not depend on how they are read, nor on what is kept of them', async () => {
    const series = seriesOf(gaussianNoise(700_000, 1e-21, 5), rate);
    const big = (await runStep(whiten, [series, spectrum])).outcome.data;
    const small = (await runStep(whiten, [series, spectrum], {}, { memoryLimit: 1 })).outcome.data;
    const a = big.read(600, 699_000);
    const b = small.read(600, 699_000);
    expect(a.findIndex((v, i) => v !== b[i])).toBe(-1);
    expect(small.read(260_000, 264_000)).toEqual(a.slice(259_400, 263_400));
  });
});

describe('warnings', () => {
  const rate = 256;
  const noise = (n: number, over: Partial<Series> = {}): Series =>
    seriesOf(gaussianNoise(n, 1e-21, 8), rate, over);
  const level = (2 * 1e-42) / rate;

  test('own spectrum of few segments, mostly edges', async () => {
    const run = await runStep(whiten, [noise(8 * rate)], { segment: 4, reach: 3 });
    expect(run.codes).toEqual(['few-averages', 'mostly-edges']);
    expect(run.outcome.warnings[0].found).toContain('of these same data');
  });
  test('a unit that is not the data’s', async () => {
    const run = await runStep(whiten, [noise(9000), flat(level, 128, { unit: 'V²/Hz' })]);
    expect(run.codes).toEqual(['unit-mismatch']);
  });
  test('a spectrum that ends below half the rate', async () => {
    const run = await runStep(whiten, [noise(9000), flat(level, 100)]);
    expect(run.codes).toEqual(['band-narrowed']);
    expect(run.number('high')).toBe(100);
    expect(run.number('variance')).toBeLessThan(0.7);
  });
  test('a spectrum coarser than the filter', async () => {
    const run = await runStep(whiten, [noise(9000), curve(grid(128, 2), () => level)]);
    expect(run.codes).toEqual(['spectrum-coarse']);
    expect(run.outcome.warnings[0].fix).toMatchObject({ params: { reach: 0.68 } });
  });
  test('a line narrower than the filter resolves', async () => {
    const lined = curve(grid(128, 0.125), (f) => level * (f === 60 ? 3000 : 1));
    const x = gaussianNoise(18_000, 1e-21, 8);
    // The line's power: 3000 times the level over one bin, and as the density of a sine A²/2 = S df.
    const amplitude = Math.sqrt(2 * 3000 * level * 0.125);
    x.forEach((_, i) => (x[i] += amplitude * Math.sin((2 * Math.PI * 60 * i) / rate)));
    const run = await runStep(whiten, [seriesOf(x, rate), lined], { reach: 1 });
    expect(run.codes).toContain('lines-not-resolved');
    expect(run.number('variance') / run.number('expected')).toBeGreaterThan(0.9);
    expect(run.number('variance') / run.number('expected')).toBeLessThan(1.1);
    const longer = await runStep(whiten, [seriesOf(x, rate), lined], { reach: 12 });
    expect(longer.codes).not.toContain('lines-not-resolved');
  });
  test('a spectrum of other data; samples that are not Gaussian', async () => {
    expect((await runStep(whiten, [noise(9000), flat(2 * level, 128)])).codes).toEqual(['variance-off']);
    const uniform = Float64Array.from(
      { length: 40_000 },
      (_, k) => ((k * 7919 + ((k * k) % 1009)) % 2003) / 1001.5 - 1,
    );
    const run = await runStep(whiten, [seriesOf(uniform, rate), flat(2 / 3 / rate, 128)], { low: 0 });
    expect(run.codes).toEqual(['not-gaussian']);
    // Excess kurtosis of a uniform distribution: −1.2.
    expect(run.number('kurtosis')).toBeCloseTo(-1.2, 1);
  });
  test('gates in the data the spectrum is made of', async () => {
    const run = await runStep(whiten, [noise(20_000, { gates: [{ from: 1000, to: 2000 }] })]);
    expect(run.codes).toEqual(['gates-in-spectrum']);
  });
});

describe('errors', () => {
  const rate = 256;
  const series = seriesOf(gaussianNoise(9000, 1e-21), rate);
  test.each([
    [{ low: 200 }, 'band-empty'],
    [{ low: 50, high: 40 }, 'band-empty'],
    [{ low: 50, high: 52 }, 'band-narrow'],
    [{ reach: 20 }, 'filter-long'],
    [{ segment: 60 }, 'segment-long'],
  ])('%o', async (params, code) => {
    await expect(runStep(whiten, [series], params)).rejects.toMatchObject({ name: 'UserError', code });
  });
  test('a hole in the spectrum, no samples', async () => {
    const hole = curve(grid(128, 1), (f) => (f === 50 ? 0 : 1e-44));
    await expect(runStep(whiten, [series, hole])).rejects.toMatchObject({ code: 'spectrum-hole' });
    const none = seriesOf(new Float64Array(1000).fill(NaN), rate);
    await expect(runStep(whiten, [none, flat(1, 128)])).rejects.toMatchObject({ code: 'no-data' });
  });
  test('a cancel ends it', async () => {
    let calls = 0;
    const onBlock = () => {
      if (++calls === 3) throw new CancelledError();
    };
    const long = seriesOf(new Float64Array(800_000), rate);
    await expect(runStep(whiten, [long, flat(1, 128)], {}, { onBlock })).rejects.toBeInstanceOf(
      CancelledError,
    );
    expect(calls).toBe(3);
  });
});

test('figure: edges marked', async () => {
  const run = await runStep(whiten, [seriesOf(gaussianNoise(9000, 1e-21), 256)]);
  const [figure] = run.figures();
  expect(figure.marks.map((m) => m.role)).toEqual(['cropped', 'cropped']);
  expect(figure.y.unit).toBe('');
});

test('its own spectrum of n segments makes the variance too large by about 0.75/n', async () => {
  const rate = 512;
  for (const [seconds, segments] of [
    [32, 15],
    [128, 63],
  ]) {
    let excess = 0;
    const runs = 480 / segments;
    for (let seed = 1; seed <= runs; seed++) {
      const run = await runStep(whiten, [
        seriesOf(gaussianNoise(seconds * rate, 1, seed), rate, { unit: '' }),
      ]);
      excess += (run.number('variance') / run.number('share') - 1) / runs;
    }
    // Of 480 segments' worth of data in all: the mean of so many variances is known to 0.2 %.
    expect(Math.abs(excess - 0.75 / segments)).toBeLessThan(0.006 + 0.2 / segments);
    expect(excess).toBeGreaterThan(0.3 / segments);
  }
});

test('the probability of the distribution test is uniform in Gaussian noise, if slightly large', () => {
  let [low, middle] = [0, 0];
  const runs = 1000;
  for (let seed = 1; seed <= runs; seed++) {
    const taker = whiteStatistics(2000, 1);
    taker.take(gaussianNoise(2000, 3, seed));
    const { pValue } = taker.result();
    if (pValue < 0.05) low++;
    if (pValue < 0.5) middle++;
  }
  expect(low).toBeLessThan(0.05 * runs + 3 * Math.sqrt(0.05 * runs));
  expect(low).toBeGreaterThan(0.02 * runs);
  expect(middle).toBeGreaterThan(0.35 * runs);
  expect(middle).toBeLessThan(0.55 * runs);
});
