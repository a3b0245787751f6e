import { beforeAll, describe, expect, test } from 'vitest';
import { CancelledError } from '../../src/core/data/errors';
import { gpsTime } from '../../src/core/data/gps-time';
import type { Kernels } from '../../src/core/kernels/kernels';
import { kolmogorovSmirnov } from '../../src/core/kernels/special-kolmogorov';
import { loudTiles, tileSnr } from '../../src/core/picture/loud-tiles';
import { qTiling } from '../../src/core/picture/q-tiling';
import { qTransform } from '../../src/core/picture/q-transform';
import map from '../../src/core/steps/constant-q-map';
import { loadKernels } from '../kernels/load-kernels';
import { BUILD_TIME } from '../kernels/load-kernels';
import { runStep } from './run-step';
import { gaussianNoise, seriesOf } from './synthetic';

let kernels: Kernels;
beforeAll(async () => {
  ({ wasm: kernels } = await loadKernels());
}, BUILD_TIME);

const rate = 1024;
const quiet = () => Promise.resolve();

/** A burst e^(−(t/τ)²) cos with Q = 2πfτ and an optimal SNR in white noise of variance 1 (ρ² = Σ h²). */
function burst(n: number, at: number, f: number, q: number, snr: number, phase = 0.4): Float64Array {
  const tau = q / (2 * Math.PI * f);
  const x = Float64Array.from({ length: n }, (_, i) => {
    const t = i / rate - at;
    return Math.exp(-((t / tau) ** 2)) * Math.cos(2 * Math.PI * f * t + phase);
  });
  const size = Math.sqrt(x.reduce((s, v) => s + v * v, 0));
  return x.map((v) => (v * snr) / size);
}

/** Largest distance of an empirical distribution from a stated one. */
function largestDistance(values: ArrayLike<number>, cdf: (v: number) => number): number {
  const sorted = Float64Array.from(values).sort();
  const n = sorted.length;
  return sorted.reduce((d, v, i) => Math.max(d, cdf(v) - i / n, (i + 1) / n - cdf(v)), 0);
}

describe('the tiling', () => {
  test('no burst loses more than the mismatch, at any time, frequency and Q between the tiles', async () => {
    const n = 8 * rate;
    const mismatch = 0.1;
    const planes = qTiling({ qLow: 5, qHigh: 40, low: 40, high: 300, top: rate / 2, duration: 8, mismatch });
    let worst = 0;
    for (let k = 0; k < 12; k++) {
      // Spread over the whole by multiples of irrational numbers.
      const part = (a: number): number => (0.5 + k * a) % 1;
      const q = 5 * 8 ** part(Math.SQRT2);
      const f = 45 * (220 / 45) ** part(Math.PI);
      const x = Float32Array.from(burst(n, 3.5 + part(Math.E), f, q, 30));
      const white = { samples: x, rate, holes: [], power: () => 1 };
      const [best] = loudTiles(await qTransform(kernels, white, planes, quiet), 1, 1);
      worst = Math.max(worst, 1 - best.energy / 450);
    }
    // The bisquare window is not quite the burst's own shape: 0.8 % more.
    expect(worst).toBeLessThan(mismatch + 0.008);
    expect(worst).toBeGreaterThan(0.01);
  });

  test('rows keep one ratio, as notes of a scale do (Brown 1991), and the mismatch sets their number', () => {
    const [plane] = qTiling({
      qLow: 20,
      qHigh: 20,
      low: 50,
      high: 400,
      top: 512,
      duration: 1,
      mismatch: 0.2,
    });
    const ratios = plane.rows.slice(1).map((r, i) => r.frequency / plane.rows[i].frequency);
    for (const r of ratios) expect(r).toBeCloseTo(ratios[0], 12);
    // Metric (2 + Q²)/(4φ²) and steps of 2√(μ/3).
    const last = Math.min(400, 512 / (1 + Math.sqrt(11) / 20));
    const expected = Math.ceil((0.5 * Math.sqrt(402) * Math.log(last / 50)) / (2 * Math.sqrt(0.2 / 3)));
    expect(plane.rows).toHaveLength(expected);
  });
});

describe('the step on white noise', () => {
  test('energies of noise are exponential with mean 1 (Kolmogorov–Smirnov)', async () => {
    const run = await runStep(
      map,
      [seriesOf(gaussianNoise(64 * rate, 1, 11), rate)],
      { whitening: 'none', low: 32 },
      { kernels },
    );
    expect(run.number('mean-energy')).toBeCloseTo(1, 1);
    for (const { q = 0, rows } of run.outcome.data.planes)
      for (const row of rows.filter((_, i) => i % 6 === 0)) {
        // One value per tile length is independent of the next.
        const stride = Math.ceil(q / row.frequency / row.cell);
        const values = row.values.filter((v, i) => i % stride === 0 && Number.isFinite(v));
        const d = largestDistance(values, (e) => -Math.expm1(-e));
        expect(kolmogorovSmirnov(d, values.length), `Q ${q}, ${row.frequency} Hz`).toBeGreaterThan(1e-4);
      }
  });

  test('a burst of known SNR comes back at its time, frequency and Q, with that SNR over many seeds', async () => {
    const ratios: number[] = [];
    for (let seed = 1; seed <= 12; seed++) {
      const [f, q] = [80 + 4 * seed, 6 + (seed % 5) * 5];
      const x = gaussianNoise(8 * rate, 1, 100 + seed);
      burst(x.length, 4.1, f, q, 20, seed).forEach((v, i) => (x[i] += v));
      const run = await runStep(
        map,
        [seriesOf(x, rate)],
        { whitening: 'none', mismatch: 0.05, low: 40 },
        { kernels },
      );
      expect(Math.abs(run.number('time') - 4.1)).toBeLessThan((2 * q) / (2 * Math.PI * f));
      expect(Math.abs(run.number('frequency') / f - 1)).toBeLessThan(1.2 / q);
      expect(Math.abs(Math.log(run.number('q') / q))).toBeLessThan(0.6);
      ratios.push(run.number('snr'));
    }
    const mean = ratios.reduce((s, v) => s + v, 0) / ratios.length;
    // SNR scatters by 1; the loudest of several tiles is a little louder, the mismatch takes at most 2.5 %.
    expect(mean).toBeGreaterThan(20 * Math.sqrt(1 - 0.06) - 3 / Math.sqrt(12));
    expect(mean).toBeLessThan(20 + 0.3 + 3 / Math.sqrt(12));
  });
});

test('coloured noise with a wall and a gap: whitened inside, energies of mean 1, nothing touches the gap', async () => {
  const x = gaussianNoise(64 * rate, 1, 5);
  for (let i = 1; i < x.length; i++) x[i] += 0.95 * x[i - 1];
  x.fill(NaN, 30 * rate, 31 * rate);
  const series = seriesOf(x, rate, { notes: ['contains an injection'] });
  const run = await runStep(map, [series], { low: 32 }, { kernels });
  expect(run.number('mean-energy')).toBeCloseTo(1, 1);
  expect(run.codes).toEqual([]);
  expect(run.outcome.sentence).toContain('contains an injection');
  const { data } = run.outcome;
  expect(data.holes).toHaveLength(1);
  const [hole] = data.holes;
  for (const { rows } of data.planes)
    for (const { values, offset, cell } of rows) {
      const inside = Math.round(((hole.from + hole.to) / 2 - offset) / cell);
      expect(values[inside]).toBeNaN();
    }
  const [figure] = run.figures();
  const image = figure.traces[0];
  if (image.type !== 'image') throw new Error('an image');
  expect(image.values.some(Number.isNaN)).toBe(true);
});

test('the loudest tile never vanishes in the picture, and zooming shows finer cells', async () => {
  const x = gaussianNoise(64 * rate, 1, 9);
  burst(x.length, 40.2, 200, 6, 30).forEach((v, i) => (x[i] += v));
  const run = await runStep(map, [seriesOf(x, rate)], { whitening: 'none', low: 40 }, { kernels });
  for (const view of [{ width: 300 }, { width: 900 }, { width: 900, x: [40, 40.5] as [number, number] }]) {
    const [image] = run.figures(view)[0].traces;
    if (image.type !== 'image') throw new Error('an image');
    expect(Math.max(...image.values.filter(Number.isFinite))).toBeCloseTo(run.number('energy'), 3);
  }
});

describe('errors and warnings', () => {
  const noise = seriesOf(gaussianNoise(32 * rate, 1, 2), rate);
  const on = (params: object, series = noise, memoryLimit = 512 * 2 ** 20) =>
    runStep(map, [series], { ...params }, { kernels, memoryLimit });
  test('what cannot be done is said with what to do', async () => {
    await expect(on({ 'q-low': 10, 'q-high': 5 })).rejects.toMatchObject({ code: 'q-order' });
    await expect(on({ low: 510 })).rejects.toMatchObject({ code: 'band-empty' });
    await expect(on({ start: '1500000000' })).rejects.toMatchObject({ code: 'no-data' });
    await expect(on({ duration: 30, mismatch: 0.01 }, noise, 4 * 2 ** 20)).rejects.toMatchObject({
      code: 'map-long',
    });
    await expect(on({}, seriesOf(new Float64Array(4096).fill(NaN), rate))).rejects.toMatchObject({
      code: 'no-data',
    });
  });
  test('a span, a shortened map, data that are not white', async () => {
    const part = await on({ start: '1400000010', duration: 4 });
    expect(part.outcome.data.start).toEqual(gpsTime(1_400_000_010));
    expect(part.outcome.data.duration).toBe(4);
    expect((await on({}, noise, 2 ** 20)).codes).toContain('map-shortened');
    const loud = seriesOf(gaussianNoise(32 * rate, 3, 2), rate);
    expect((await on({ whitening: 'none' }, loud)).codes).toEqual(['not-white']);
  });
  test('stops when told to', async () => {
    let calls = 0;
    const onBlock = (): void => {
      if (++calls > 3) throw new CancelledError();
    };
    await expect(runStep(map, [noise], {}, { kernels, onBlock })).rejects.toThrow(CancelledError);
  });
});

test('SNR of a tile: 0 for what noise has on average', () => {
  expect(tileSnr(1)).toBe(0);
  expect(tileSnr(51)).toBe(10);
});
