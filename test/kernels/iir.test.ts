import { describe, expect, test } from 'vitest';
import { designIir, IIR_BANDS, IIR_FAMILIES, type IirSpec } from '../../src/core/kernels/iir-design';
import { sectionsGain } from '../../src/core/kernels/sections-response';
import { impulseResponse, ringing, slowestPole } from '../../src/core/kernels/sections-response-ringing';
import { oracle } from '../oracle/oracle';

/** Lowpass frequency in units of its edge onto which the bilinear and band transformations map f. */
function prototypeFrequency({ band, edges, rate }: IirSpec, f: number): number {
  const [x, low, high] = [f, ...edges].map((v) => Math.tan((Math.PI * v) / rate));
  if (band === 'lowpass') return x / low;
  if (band === 'highpass') return low / x;
  const pass = Math.abs((x * x - low * high) / (x * (high - low)));
  return band === 'bandpass' ? pass : 1 / pass;
}

/** Chebyshev polynomial T_n(x). */
const chebyshev = (n: number, x: number): number =>
  x <= 1 ? Math.cos(n * Math.acos(x)) : Math.cosh(n * Math.acosh(x));

const level = (decibel: number): number => 10 ** (-decibel / 20);
const epsilon2 = (decibel: number): number => 10 ** (decibel / 10) - 1;

/** |H|² by the law each family is defined by. */
function law(spec: IirSpec, f: number): number {
  const x = prototypeFrequency(spec, f);
  const { family, order: n, ripple = 0, attenuation = 0 } = spec;
  if (family === 'butterworth') return 1 / (1 + x ** (2 * n));
  if (family === 'chebyshev-1') return 1 / (1 + epsilon2(ripple) * chebyshev(n, x) ** 2);
  const t = chebyshev(n, 1 / x) ** 2 * epsilon2(attenuation);
  return 1 / (1 + epsilon2(attenuation) ** 2 / t);
}

const frequencies = (rate: number): Float64Array =>
  Float64Array.from({ length: 400 }, (_, i) => 0.3 * ((0.49 * rate) / 0.3) ** (i / 399));

describe('gain follows the closed form of its family', () => {
  const specs: IirSpec[] = [
    // Where the transfer-function form gives NaN (order 8, 20 to 300 Hz at 16384 Hz), and low edges at high rates.
    ...IIR_FAMILIES.slice(0, 3).flatMap((family): IirSpec[] => [
      { family, band: 'bandpass', order: 8, edges: [20, 300], rate: 16384, ripple: 0.5, attenuation: 60 },
      { family, band: 'highpass', order: 10, edges: [8], rate: 16384, ripple: 0.1, attenuation: 80 },
      { family, band: 'lowpass', order: 12, edges: [40], rate: 65536, ripple: 1, attenuation: 100 },
      { family, band: 'bandstop', order: 4, edges: [59, 61], rate: 16384, ripple: 0.2, attenuation: 40 },
      { family, band: 'bandpass', order: 3, edges: [300, 1900], rate: 4096, ripple: 2, attenuation: 30 },
      { family, band: 'lowpass', order: 1, edges: [900], rate: 2048, ripple: 1, attenuation: 20 },
    ]),
  ];
  test.each(
    specs.map(
      (s) => [`${s.family} ${s.band} ${s.order}: ${s.edges.join('–')} Hz at ${s.rate} Hz`, s] as const,
    ),
  )('%s', (_, spec) => {
    const f = frequencies(spec.rate);
    const gain = sectionsGain(designIir(spec), f, spec.rate);
    f.forEach((v, i) => {
      const expected = Math.sqrt(law(spec, v));
      // Near a zero of an inverse Chebyshev filter only the absolute gain is defined by the coefficients.
      const floor = spec.family === 'chebyshev-2' ? 1e-8 * level(spec.attenuation!) : 0;
      expect(Math.abs(gain[i] - expected), `${v} Hz`).toBeLessThan(3e-8 * expected + floor);
    });
  });
});

describe('elliptic filters', () => {
  test.each([
    [1, 0.5, 40],
    [2, 1, 30],
    [5, 0.1, 60],
    [8, 0.01, 90],
    [9, 1, 50],
  ])(
    'order %i, ripple %d dB, attenuation %d dB: equal ripples in both bands',
    (order, ripple, attenuation) => {
      const rate = 4096;
      const rows = designIir({
        family: 'elliptic',
        band: 'lowpass',
        order,
        edges: [300],
        rate,
        ripple,
        attenuation,
      });
      const at = (f: number): number => sectionsGain(rows, Float64Array.of(f), rate)[0];
      const dense = (from: number, to: number): number[] =>
        Array.from({ length: 20_000 }, (_, i) => at(from + ((to - from) * i) / 19_999));
      const pass = dense(0, 300);
      expect(Math.max(...pass)).toBeCloseTo(1, 6);
      expect(Math.min(...pass)).toBeCloseTo(level(ripple), 6);
      expect(at(300)).toBeCloseTo(level(ripple), 8);
      expect(at(0)).toBeCloseTo(order % 2 === 0 ? level(ripple) : 1, 10);
      if (order === 1) return;
      const stopFrom = dense(300, 2047).findIndex((g) => g <= level(attenuation));
      const stop = dense(300 + ((2047 - 300) * stopFrom) / 19_999, 2047);
      expect(Math.max(...stop) / level(attenuation)).toBeGreaterThan(1 - 1e-3);
      expect(Math.max(...stop) / level(attenuation)).toBeLessThan(1 + 1e-6);
      const onCircle = rows.filter(([b0, b1, b2]) => Math.abs(b2 / b0 - 1) < 1e-12 && Math.abs(b1 / b0) < 2);
      expect(onCircle.length).toBe(Math.floor(order / 2));
    },
  );
});

test('gain of a Butterworth band filter in dB (COMPUTED with SciPy)', () => {
  const rows = designIir({ family: 'butterworth', band: 'bandpass', order: 4, edges: [20, 500], rate: 4096 });
  const gain = sectionsGain(rows, Float64Array.of(10, 20, 500, 1000), 4096);
  const decibel = Array.from(gain, (g) => 20 * Math.log10(g));
  [-25.1129, -3.0103, -3.0103, -31.3733].forEach((v, i) =>
    expect(Math.abs(decibel[i] - v)).toBeLessThan(1e-3),
  );
  const exact = oracle<{ decibel_at_10_20_500_1000: number[] }>('iir').decibel_at_10_20_500_1000;
  exact.forEach((v, i) => expect(decibel[i]).toBeCloseTo(v, 9));
});

describe('every family and band', () => {
  const edges = { lowpass: [100], highpass: [100], bandpass: [30, 300], bandstop: [30, 300] };
  test.each(IIR_FAMILIES.flatMap((family) => IIR_BANDS.map((band) => [family, band] as const)))(
    '%s %s: stable at every order, energy of the impulse response equals ∫|H|²',
    (family, band) => {
      for (const order of [1, 2, 7, 30]) {
        const spec = { family, band, order, edges: edges[band], rate: 1024, ripple: 0.5, attenuation: 20 };
        const rows = designIir(spec);
        expect(slowestPole(rows)).toBeLessThan(1);
        if (order > 7) continue;
        // Parseval: mean of |H|² over frequencies = Σ h².
        const n = 2 * Math.ceil(ringing(rows, 1, 1e-20).length + 64);
        const h = impulseResponse(rows, n);
        const grid = Float64Array.from({ length: n / 2 }, (_, i) => ((i + 0.5) * 1024) / n);
        const mean = sectionsGain(rows, grid, 1024).reduce((sum, g) => sum + g * g, 0) / (n / 2);
        const energy = h.reduce((sum, v) => sum + v * v, 0);
        expect(energy / mean).toBeCloseTo(1, 9);
      }
    },
  );
});

describe('what cannot be designed is refused in one sentence', () => {
  const good: IirSpec = {
    family: 'elliptic',
    band: 'bandpass',
    order: 4,
    edges: [20, 300],
    rate: 4096,
    ripple: 1,
    attenuation: 40,
  };
  test.each([
    [{ order: 0 }, 'filter-order', /filter order 0: it must be a whole number from 1 to 30/],
    [{ order: 2.5 }, 'filter-order', /filter order 2.5/],
    [
      { edges: [20, 2048] },
      'filter-edges',
      /edge 2048 Hz: it must lie above 0 and below 2048 Hz, half the sample rate/,
    ],
    [{ edges: [0, 300] }, 'filter-edges', /edge 0 Hz/],
    [{ edges: [NaN, 300] }, 'filter-edges', /edge NaN Hz/],
    [
      { edges: [300, 20] },
      'filter-edges',
      /bandpass from 300 to 20 Hz: the low edge must be below the high edge/,
    ],
    [{ edges: [300] }, 'filter-edges', /a bandpass filter has two edges, low and high; 1 given/],
    [{ band: 'highpass' as const }, 'filter-edges', /a highpass filter has one edge; 2 given/],
    [{ rate: 0 }, 'filter-rate', /sample rate 0 Hz/],
    [{ ripple: 0 }, 'filter-ripple', /a pass-band ripple above 0 dB, not 0/],
    [
      { family: 'chebyshev-2' as const, attenuation: -3 },
      'filter-attenuation',
      /stop-band attenuation above 0 dB, not -3/,
    ],
    [
      { ripple: 41 },
      'filter-attenuation',
      /more attenuation in the stop band \(40 dB\) than ripple in the pass band \(41 dB\)/,
    ],
  ])('%o', (change, code, message) => {
    const run = (): unknown => designIir({ ...good, ...change });
    expect(run).toThrow(message);
    expect(run).toThrow(expect.objectContaining({ code }) as Error);
  });
});
