import { describe, expect, test } from 'vitest';
import noiseSpectrum from '../../src/core/steps/noise-spectrum';
import { runStep } from './run-step';
import { gaussianNoise, seriesOf } from './synthetic';

const fs = 512;
const noise = (seconds: number, sigma = 1, seed = 11): Float64Array =>
  gaussianNoise(seconds * fs, sigma, seed);
const run = (x: Float64Array, params: Record<string, unknown> = {}, unit = 'strain') =>
  runStep(noiseSpectrum, [seriesOf(x, fs, { unit })], params);

/** Noise with a wall: white noise plus very loud noise below 20 Hz (a twice integrated and leaking random walk). */
function walled(seconds: number, height: number): Float64Array {
  const drive = noise(seconds, 1, 5);
  let a = 0;
  let b = 0;
  return noise(seconds, 1, 6).map((v, i) => {
    a = 0.995 * a + drive[i];
    b = 0.995 * b + a;
    return v + height * b;
  });
}

test('steady white noise in plenty gives no warning', async () => {
  for (const average of ['mean', 'median', 'median-mean'])
    expect((await run(noise(64), { average })).codes).toEqual([]);
});

describe('few-averages', () => {
  test('below eight segments, with the number, the interval and a shorter segment as remedy', async () => {
    const r = await run(noise(10));
    const w = r.outcome.warnings.find((x) => x.code === 'few-averages')!;
    expect(w.value).toBe(4);
    expect(w.severity).toBe('caution');
    expect(w.fix).toMatchObject({ kind: 'set', params: { segment: 2 } });
    const fixed = await run(noise(10), { segment: 2 });
    expect(fixed.number('segments')).toBeGreaterThanOrEqual(8);
    expect(fixed.codes).not.toContain('few-averages');
  });

  test('one segment is a problem', async () => {
    const r = await run(noise(5));
    expect(r.outcome.warnings[0]).toMatchObject({ code: 'few-averages', severity: 'problem', value: 1 });
  });
});

describe('window-leakage', () => {
  test('a boxcar or Tukey window under a wall of more than six decades is named; Hann passes', async () => {
    const x = walled(128, 30);
    const hann = await run(x);
    expect(hann.number('decades')).toBeGreaterThan(6);
    expect(hann.codes).not.toContain('window-leakage');
    const boxcar = await run(x, { window: 'boxcar' });
    const w = boxcar.outcome.warnings.find((v) => v.code === 'window-leakage')!;
    expect(w.found).toContain('boxcar window');
    expect(w.fix).toMatchObject({ params: { window: 'hann' } });
    // The warning is true: the boxcar floor is too high by far.
    expect(boxcar.number('floor') / hann.number('floor')).toBeGreaterThan(3);
  });

  test('a boxcar window on white noise is fine', async () => {
    expect((await run(noise(64), { window: 'boxcar' })).codes).toEqual([]);
  });
});

describe('mean-median-differ', () => {
  const burst = noise(64);
  for (let i = 0; i < fs; i++) burst[30 * fs + i] *= 12;

  test('a loud second is found, timed and offered to be left out', async () => {
    const r = await run(burst, { average: 'median', segment: 2 });
    const w = r.outcome.warnings.find((v) => v.code === 'mean-median-differ')!;
    expect(w.value).toBeGreaterThan(0.5);
    if (w.fix?.kind !== 'set') throw new Error('no fix is offered');
    const exclude = w.fix.params['exclude'] as number[];
    expect(exclude[0]).toBeLessThanOrEqual(30);
    expect(exclude[1]).toBeGreaterThanOrEqual(31);
    const fixed = await run(burst, { average: 'median', segment: 2, exclude });
    expect(fixed.codes).not.toContain('mean-median-differ');
    expect(fixed.number('floor') / Math.sqrt(2 / fs)).toBeCloseTo(1, 1);
  });

  test('with the mean the remedy is the median', async () => {
    const r = await run(burst, { average: 'mean', segment: 2 });
    const w = r.outcome.warnings.find((v) => v.code === 'mean-median-differ')!;
    expect(w.fix).toMatchObject({ params: { average: 'median' } });
    const fixed = await run(burst, { average: 'median', segment: 2 });
    expect(r.number('floor') / fixed.number('floor')).toBeGreaterThan(1.3);
  });

  test('does not cry wolf: thirty stretches of steady noise, few and short segments', async () => {
    for (let seed = 1; seed <= 30; seed++) {
      const r = await run(noise(3, 1, seed), { segment: 0.5 });
      expect(r.codes, `seed ${seed}`).not.toContain('mean-median-differ');
    }
  });

  test('a high-Q resonance driven by noise, whose own power wanders, is not taken for it', async () => {
    // y[n] = 2 r cos(θ) y[n−1] − r² y[n−2] + drive: 150 Hz, width 0.05 Hz, far above everything else of its octave.
    const r = Math.exp((-Math.PI * 0.05) / fs);
    const c = 2 * r * Math.cos((2 * Math.PI * 150) / fs);
    const drive = noise(128, 1, 21);
    let [y1, y2] = [0, 0];
    const x = noise(128, 1, 22).map((v, i) => {
      [y1, y2] = [c * y1 - r * r * y2 + drive[i], y1];
      return v + y1;
    });
    expect((await run(x)).codes).not.toContain('mean-median-differ');
  });
});

describe('data-left-out', () => {
  test('many gaps leave stretches no segment fits into', async () => {
    const x = noise(64);
    for (let s = 5; s < 64; s += 6) x[s * fs] = NaN;
    const r = await run(x);
    const w = r.outcome.warnings.find((v) => v.code === 'data-left-out')!;
    expect(w.value).toBeGreaterThan(0.2);
    expect((await run(x, { segment: 0.25 })).codes).not.toContain('data-left-out');
  });
});

describe('exclude-outside', () => {
  test('a span given in GPS time does nothing, and that is said', async () => {
    const r = await run(noise(64), { exclude: [1400000010, 1400000012] });
    expect(r.outcome.warnings).toMatchObject([{ code: 'exclude-outside', value: 1 }]);
    expect((await run(noise(64), { exclude: [10, 12] })).codes).toEqual([]);
  });
});

describe('zero-bins', () => {
  test('constant data have nothing but empty bins', async () => {
    const r = await run(new Float64Array(64 * fs).fill(2.5));
    expect(r.outcome.warnings).toMatchObject([{ code: 'zero-bins', severity: 'problem' }]);
    expect(r.figures()[0].traces.length).toBeGreaterThan(0);
  });
});

describe('float32-rounding', () => {
  const x = noise(64, 1e-4).map((v) => v + 1000);

  test('a small signal on a large offset stored in single precision', async () => {
    const r = await run(x.map(Math.fround), {}, 'V');
    const w = r.outcome.warnings.find((v) => v.code === 'float32-rounding')!;
    // Rounding of values just below 1024: steps of 2^-14, an error of 2^-14/√12 spread up to half the rate.
    const exact = (2 ** -14 / Math.sqrt(12)) * Math.sqrt(2 / fs);
    expect(w.value! / exact).toBeGreaterThan(0.5);
    expect(w.value! / exact).toBeLessThan(2);
  });

  test('float64 samples, and float32 samples without an offset, give none', async () => {
    expect((await run(x)).codes).not.toContain('float32-rounding');
    expect((await run(noise(64).map(Math.fround))).codes).not.toContain('float32-rounding');
  });
});

test('notes of the series are repeated', async () => {
  const series = seriesOf(noise(64), fs, { notes: ['contains an injection'] });
  const r = await runStep(noiseSpectrum, [series]);
  expect(r.outcome.sentence).toContain('Note: contains an injection.');
});
