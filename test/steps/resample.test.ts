import { describe, expect, test } from 'vitest';
import { STOP_BANDS } from '../../src/core/condition/resample-params';
import { CancelledError, UserError } from '../../src/core/data/errors';
import { spanLength } from '../../src/core/data/spans';
import resample from '../../src/core/steps/resample';
import { largestError } from '../kernels/load-kernels';
import { oracle } from '../oracle/oracle';
import { runStep } from './run-step';
import { gaussianNoise, seriesOf } from './synthetic';

interface Case {
  readonly up: number;
  readonly down: number;
  readonly n: number;
  readonly y: readonly number[];
}
const numbers = oracle<{ cases: Case[]; strong: Case }>('resample');
/** The series of test/oracle/resample.py. */
const noise = (n: number): Float64Array =>
  Float64Array.from({ length: n }, (_, k) => ((k * 7919 + ((k * k) % 1009)) % 2003) / 1001.5 - 1);
const orZero = (v: number): number => (Number.isNaN(v) ? 0 : v);
const sine = (n: number, rate: number, f: number, phase = 0.3): Float64Array =>
  Float64Array.from({ length: n }, (_, i) => Math.sin((2 * Math.PI * f * i) / rate + phase));

describe('valid samples equal scipy.signal.resample_poly', () => {
  test.each([
    ...numbers.cases.filter((c) => c.n > 30).map((c) => ({ ...c, stop: '53 dB' })),
    { ...numbers.strong, stop: '90 dB' },
  ])('$n samples by $up/$down, $stop', async ({ up, down, n, y, stop }) => {
    const run = await runStep(resample, [seriesOf(noise(n), 1000 * down)], {
      rate: 1000 * up,
      'stop-band': stop,
    });
    const { data } = run.outcome;
    expect(data.length).toBe(y.length);
    expect(data.valid.length).toBe(1);
    const found = data.read(0, data.length);
    found.forEach((v, i) => {
      if (i >= data.valid[0].from && i < data.valid[0].to) expect(Math.abs(v - y[i])).toBeLessThan(1e-12);
      else expect(v).toBeNaN();
    });
    expect(spanLength([...data.valid, ...data.spoilt!])).toBe(data.length);
  });
});

describe('closed forms', () => {
  test.each([
    [4096, 1024, 100],
    [4096, 1000, 333.3],
    [1000, 1024, 250],
    [512, 2048, 200],
    [16384, 4096, 1700],
  ])('a sine keeps time and amplitude from %d to %d Hz', async (rate, to, f) => {
    const run = await runStep(resample, [seriesOf(sine(8 * rate, rate, f), rate)], { rate: to });
    const { data } = run.outcome;
    expect(data.rate).toBe(to);
    expect(data.start).toEqual(seriesOf(new Float64Array(1), 1).start);
    const { from, to: end } = data.valid[0];
    const x = data.read(from, end);
    // The phase at each sample's own time shows a shift of 1e-3 samples as 1e-3 · 2πf/rate.
    let worst = 0;
    x.forEach((v, i) => {
      worst = Math.max(worst, Math.abs(v - Math.sin((2 * Math.PI * f * (from + i)) / to + 0.3)));
    });
    expect(worst).toBeLessThan(0.01);
  });

  test.each(['53 dB', '90 dB'] as const)('the stated edges of the %s filter hold', async (name) => {
    const { clean, decibel } = STOP_BANDS[name];
    const rate = 4096;
    const gain = async (f: number): Promise<number> => {
      const run = await runStep(resample, [seriesOf(sine(4 * rate, rate, f), rate)], {
        rate: 1024,
        'stop-band': name,
      });
      return run.number('rms') * Math.SQRT2;
    };
    for (const f of [50, 0.5 * 512, clean * 512]) expect(Math.abs((await gain(f)) - 1)).toBeLessThan(0.011);
    for (let f = Math.ceil((2 - clean) * 512); f < 2048; f += 97)
      expect(-20 * Math.log10(await gain(f)), `${f} Hz`).toBeGreaterThan(decibel - 0.5);
    // Half the amplitude at the new Nyquist frequency; just below it what folds is added.
    expect(await gain(512 - 0.37)).toBeGreaterThan(0.45);
  });

  test('left empty, the rate is halved', async () => {
    const run = await runStep(resample, [seriesOf(gaussianNoise(4096, 1), 512)]);
    expect(run.number('rate')).toBe(256);
    expect(run.number('up')).toBe(1);
    expect(run.number('down')).toBe(2);
    // White noise loses the half above the new Nyquist frequency.
    expect(run.number('rms')).toBeGreaterThan(0.65);
    expect(run.number('rms')).toBeLessThan(0.76);
    expect(run.codes).toEqual([]);
  });
});

test('each valid span on its own: nothing of a gap leaks, samples far from it are the same', async () => {
  const x = gaussianNoise(6000, 1, 3);
  const whole = (await runStep(resample, [seriesOf(x, 4000)], { rate: 3000 })).outcome.data;
  const y = x.slice();
  y.fill(NaN, 2500, 2517);
  y[4000] = NaN;
  const run = await runStep(
    resample,
    [seriesOf(y, 4000, { notes: ['contains an injection'], startUnknown: true })],
    { rate: 3000 },
  );
  const { data } = run.outcome;
  expect(data.valid.length).toBe(3);
  expect(data.notes).toEqual(['contains an injection']);
  expect(data.startUnknown).toBe(true);
  expect(run.outcome.sentence).toContain('contains an injection');
  const a = whole.read(0, whole.length);
  const b = data.read(0, data.length);
  for (const s of data.valid) for (let i = s.from; i < s.to; i++) expect(b[i]).toBe(a[i]);
  // Output 1875 lies at the first missing sample, 1888 is the first after it; ten samples of the lower rate are dropped.
  expect(data.valid[0].to).toBe(1865);
  expect(data.valid[1].from).toBe(1898);
  const inSpans = data.spoilt!.some((s) => s.from <= 1880 && s.to > 1880);
  expect(inSpans).toBe(false);
});

test('samples do not depend on how they are read, nor on what is kept of them', async () => {
  const series = seriesOf(gaussianNoise(1_100_000, 1, 5), 1000);
  const big = (await runStep(resample, [series], { rate: 800 })).outcome.data;
  const small = (await runStep(resample, [series], { rate: 800 }, { memoryLimit: 1 })).outcome.data;
  const a = big.read(0, big.length);
  expect(largestError(small.read(0, small.length).map(orZero), a.map(orZero))).toBe(0);
  expect(a.findIndex(Number.isFinite)).toBe(small.valid[0].from);
  expect(small.read(131_000, 131_300)).toEqual(a.slice(131_000, 131_300));
});

test('gates follow', async () => {
  const series = seriesOf(gaussianNoise(4000, 1), 1000, { gates: [{ from: 2000, to: 2100 }] });
  const { data } = (await runStep(resample, [series], { rate: 500 })).outcome;
  // Ten samples of the new rate on either side have met gated ones.
  expect(data.gates).toEqual([{ from: 990, to: 1060 }]);
});

describe('warnings and errors', () => {
  const series = seriesOf(gaussianNoise(4096, 1), 1024);
  test('upsampling makes nothing new', async () => {
    expect((await runStep(resample, [series], { rate: 2048 })).codes).toEqual(['upsampled']);
  });
  test('same rate', async () => {
    const run = await runStep(resample, [series], { rate: 1024 });
    expect(run.codes).toEqual(['same-rate']);
    expect(run.outcome.data.read(0, 4096)).toEqual(gaussianNoise(4096, 1));
  });
  test('mostly edges', async () => {
    expect((await runStep(resample, [series], { rate: 16 })).codes).toEqual(['mostly-edges']);
  });
  test('no ratio: the nearest rates are named and can be had', async () => {
    const error = await runStep(resample, [series], { rate: 100 * Math.PI }).catch((e: unknown) => e);
    expect(error).toBeInstanceOf(UserError);
    const { message, code } = error as UserError;
    expect(code).toBe('resample-ratio');
    const named = [...message.matchAll(/(\d+\.?\d*) Hz/g)].slice(2).map((m) => Number(m[1]));
    expect(named.length).toBe(2);
    for (const rate of named) {
      expect(Math.abs(rate / (100 * Math.PI) - 1)).toBeLessThan(1e-2);
      expect((await runStep(resample, [series], { rate })).outcome.data.rate).toBe(rate);
    }
  });
  test('too short for the filter; no samples at all', async () => {
    await expect(runStep(resample, [series], { rate: 1 })).rejects.toMatchObject({ code: 'filter-long' });
    await expect(
      runStep(resample, [seriesOf(new Float64Array(64).fill(NaN), 64)], { rate: 32 }),
    ).rejects.toMatchObject({ code: 'no-data' });
  });
  test('a cancel ends it', async () => {
    let calls = 0;
    const onBlock = () => {
      if (++calls === 2) throw new CancelledError();
    };
    const long = seriesOf(new Float64Array(1_000_000), 1024);
    await expect(runStep(resample, [long], { rate: 512 }, { onBlock })).rejects.toBeInstanceOf(
      CancelledError,
    );
    expect(calls).toBe(2);
  });
});

test('figure: edges marked, unit kept', async () => {
  const run = await runStep(resample, [seriesOf(gaussianNoise(4096, 1), 1024)], { rate: 512 });
  const [figure] = run.figures();
  expect(figure.marks.map((m) => m.role)).toEqual(['cropped', 'cropped']);
  expect(figure.y.label).toBe('Strain');
});
