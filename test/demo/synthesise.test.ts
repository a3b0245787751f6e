import { describe, expect, test } from 'vitest';
import { halfFromReal } from '../../src/core/demo/transform';
import { noiseDensity } from '../../src/core/demo/noise-curve';
import { DEMO_RATE, DEMO_SITES, GRID, SIGNAL } from '../../src/core/demo/scenario';
import { roundedGeometry, synthesise } from '../../src/core/demo/synthesise';
import { lightTravelTime } from '../../src/core/sites/antenna';
import { samplesSha256 } from '../../src/host/demo-strain';
import { oracle } from '../oracle/oracle';

interface Oracle {
  sites: Record<string, { geometry: [number, number, number]; snr: number }>;
  burstAmplitude: number;
}
const want = oracle<Oracle>('demo-signal');
const data = DEMO_SITES.map(synthesise);
const [alder, birch] = data;

/** Mean of Hann periodograms of 4 s, half overlapping, from `from` s on: one-sided density on bins of 0.25 Hz. */
function density(samples: Float64Array, from: number): Float64Array {
  const n = 4 * DEMO_RATE;
  const out = new Float64Array(n / 2 + 1);
  let count = 0;
  for (let at = from * DEMO_RATE; at + n <= samples.length; at += n / 2, count++) {
    const part = samples.slice(at, at + n).map((v, i) => v * (0.5 - 0.5 * Math.cos((2 * Math.PI * i) / n)));
    const { re, im } = halfFromReal(part);
    for (let k = 0; k < out.length; k++) out[k] += (2 * (re[k] ** 2 + im[k] ** 2)) / (DEMO_RATE * 0.375 * n);
  }
  return out.map((v) => v / count);
}

test('samples are the same to the bit wherever this runs', () => {
  expect(data.map((d) => samplesSha256(d.samples))).toEqual([
    'daa33a4a897be5e6f9569bbc689496e80def69bf22f85ecf214e10743a1a23be',
    '2a94f3079c464a99c810d270b29582ac22294cda10d471466020671cc1d93554',
  ]);
});

test('the gap is 3 s of NaN and nothing else is', () => {
  const missing = alder.samples.reduce((c, v) => c + Number(Number.isNaN(v)), 0);
  expect(missing).toBe(3 * DEMO_RATE);
  expect(alder.samples.slice(41 * DEMO_RATE, 44 * DEMO_RATE).every(Number.isNaN)).toBe(true);
  expect(birch.samples.some(Number.isNaN)).toBe(false);
});

describe.each(DEMO_SITES.map((demo, i) => ({ demo, i, title: demo.site.title })))('$title', ({ demo, i }) => {
  const spectrum = density(data[i].samples, 104);

  // 104 s to 256 s: 75 averages; a band of 100 bins is good to about 2 %
  test.each([
    [2, 4],
    [9, 11],
    [60, 90],
    [105, 130],
    [165, 190],
    [210, 240],
    [650, 900],
    [1500, 1990],
  ])('noise from %d to %d Hz follows its curve', (low, high) => {
    let ratio = 0;
    for (let k = low * 4; k < high * 4; k++) ratio += spectrum[k] / noiseDensity(demo.noise, k / 4);
    ratio /= (high - low) * 4;
    expect(Math.abs(ratio - 1)).toBeLessThan(3 / Math.sqrt(75 * (high - low) * 2) + 0.02);
  });

  test.each(demo.mains.harmonics)('mains line $order stands at its frequency with its amplitude', (h) => {
    const k = h.order * GRID.frequency * 4;
    // the line's power in a density: A²/2 over the noise bandwidth of 0.375 Hz
    const height = h.amplitude ** 2 / 2 / 0.375 + noiseDensity(demo.noise, k / 4);
    expect(Math.abs(spectrum[k] / height - 1)).toBeLessThan(0.15);
    expect(spectrum[k]).toBeGreaterThan(4 * spectrum[k + 6]);
  });

  test.each(demo.noise.resonances)('resonance at $frequency Hz holds the power of its Lorentzian', (r) => {
    const k = Math.round(r.frequency * 4);
    const reach = 4 * 5; // 5 Hz to either side
    let power = 0;
    let curve = 0;
    for (let b = k - reach; b <= k + reach; b++) power += spectrum[b] / 4;
    for (let f = (k - reach) / 4; f < (k + reach) / 4; f += 1e-3) curve += noiseDensity(demo.noise, f) * 1e-3;
    // A line of width f/Q has about 2 π (f/Q) T independent values in T seconds.
    const values = 2 * Math.PI * (r.frequency / r.q) * 152;
    expect(Math.abs(power / curve - 1)).toBeLessThan(4 / Math.sqrt(values) + 0.05);
  });

  test('geometry and optimal SNR agree with NumPy and Astropy', () => {
    const { plus, cross, delay, snr } = data[i].signal;
    const numpy = want.sites[demo.site.name];
    expect(plus).toBeCloseTo(numpy.geometry[0], 5);
    expect(cross).toBeCloseTo(numpy.geometry[1], 5);
    expect(delay).toBeCloseTo(numpy.geometry[2], 7);
    expect(Math.abs(snr / numpy.snr - 1)).toBeLessThan(1e-5);
  });

  test('no engine’s last digit can move the rounded geometry', () => {
    const a = roundedGeometry(demo);
    expect(a).toEqual(roundedGeometry(demo, 1e-13));
    expect(a).toEqual(roundedGeometry(demo, -1e-13));
  });
});

test('the network SNR is about 18, each site above 10, arrivals within the light travel time', () => {
  const snr = data.map((d) => d.signal.snr);
  expect(Math.hypot(...snr)).toBeCloseTo(18, 1);
  expect(Math.min(...snr)).toBeGreaterThan(10);
  const apart = Math.abs(alder.signal.delay - birch.signal.delay);
  expect(apart).toBeLessThan(lightTravelTime(DEMO_SITES[0].site, DEMO_SITES[1].site));
  expect(apart).toBeGreaterThan(0.001);
});

test('the glitch has the amplitude that NumPy finds for its SNR, and stands out where it was put', () => {
  expect(birch.burstAmplitudes[0] / want.burstAmplitude).toBeCloseTo(1, 9);
  const [burst] = DEMO_SITES[1].bursts;
  // power from 100 to 200 Hz in half a second about it against the next seconds
  const band = (at: number): number => {
    const n = DEMO_RATE / 2;
    const from = Math.round(at * DEMO_RATE) - n / 2;
    const { re, im } = halfFromReal(
      birch.samples.slice(from, from + n).map((v, k) => v * Math.sin((Math.PI * k) / n) ** 4),
    );
    let sum = 0;
    for (let k = 50; k <= 100; k++) sum += re[k] ** 2 + im[k] ** 2;
    return sum;
  };
  const around = [2, 3, 4, 5, 6].map((s) => band(burst.time + s));
  expect(band(burst.time)).toBeGreaterThan(5 * Math.max(...around));
  expect(Math.abs(burst.time - SIGNAL.time)).toBeGreaterThan(60);
});
