import { describe, expect, test } from 'vitest';
import { notch, notchRinging } from '../../src/core/kernels/notch';
import {
  groupDelay,
  sectionsGain,
  sectionsResponse,
  zeroPhaseGain,
} from '../../src/core/kernels/sections-response';
import { impulseResponse, ringing } from '../../src/core/kernels/sections-response-ringing';
import { designIir } from '../../src/core/kernels/iir-design';
import { oracle } from '../oracle/oracle';

interface Numbers {
  readonly notches: readonly { f0: number; q: number; rate: number; b: number[]; a: number[] }[];
  readonly delay: { f: number[]; seconds: number[] };
}
const numbers = oracle<Numbers>('iir');

describe('notch', () => {
  test('coefficients at 60 Hz, Q 30, 4096 Hz (COMPUTED with SciPy)', () => {
    const [b0, b1, b2, a0, a1, a2] = notch(60, 30, 4096);
    expect([b0, b1, b2, a0, a1, a2]).toEqual([b0, b1, b0, 1, b1, a2]);
    expect(b0).toBeCloseTo(0.9984683675055748, 14);
    expect(b1).toBeCloseTo(-1.9884845294775426, 14);
    expect(a2).toBeCloseTo(0.9969367350111495, 14);
  });
  test.each(numbers.notches)('$f0 Hz, Q $q at $rate Hz equals SciPy', ({ f0, q, rate, b, a }) => {
    [...b, ...a].forEach((v, i) => expect(Math.abs(notch(f0, q, rate)[i] - v)).toBeLessThan(1e-13));
  });
  test('gain: 0 at the centre, 1 at both ends, half power at the width', () => {
    const [f0, q, rate] = [331.7, 20, 4096];
    // Edges from the definition on the bent frequency axis: tan(ω/2) of the edges differ by the width and multiply to the centre².
    const t = Math.tan((Math.PI * f0) / rate);
    const half = (Math.tan((Math.PI * f0) / q / rate) * (1 + t * t)) / 2;
    const low = (rate / Math.PI) * Math.atan(Math.sqrt(t * t + half * half) - half);
    const high = (rate / Math.PI) * Math.atan(Math.sqrt(t * t + half * half) + half);
    const gain = sectionsGain([notch(f0, q, rate)], Float64Array.of(f0, 0, rate / 2, low, high), rate);
    expect(gain[0]).toBeLessThan(1e-12);
    expect(gain[1]).toBeCloseTo(1, 12);
    expect(gain[2]).toBeCloseTo(1, 12);
    expect(gain[3]).toBeCloseTo(Math.SQRT1_2, 10);
    expect(gain[4]).toBeCloseTo(Math.SQRT1_2, 10);
    expect(high - low).toBeCloseTo(f0 / q, 10);
  });
  test.each([
    [60, 30, 0.7329],
    [60, 300, 7.329],
  ])(
    'ringing at %i Hz, Q %i lasts 4.6 Q/(π f) s, as seen in the output when the line starts',
    (f0, q, seconds) => {
      expect(notchRinging(f0, q)).toBeCloseTo(seconds, 3);
      // 0.74 and 7.3 s were measured for these two.
      const rate = 4096;
      const [b0, b1, b2, , a1, a2] = notch(f0, q, rate);
      let [z0, z1, last, first] = [0, 0, 0, 0];
      for (let n = 0; n < 20 * rate; n++) {
        const x = Math.sin((2 * Math.PI * f0 * n) / rate);
        const y = b0 * x + z0;
        z0 = b1 * x - a1 * y + z1;
        z1 = b2 * x - a2 * y;
        if (n < rate / f0) first = Math.max(first, Math.abs(y));
        if (Math.abs(y) > 0.01) last = n;
      }
      expect(first).toBeGreaterThan(0.9);
      expect(Math.abs(last / rate / notchRinging(f0, q) - 1)).toBeLessThan(0.03);
    },
  );
  test('misuse', () => {
    expect(() => notch(2048, 30, 4096)).toThrow(/notch at 2048 Hz: it must lie above 0 and below 2048 Hz/);
    expect(() => notch(60, 0, 4096)).toThrow(/Q must be a number/);
    expect(() => notch(1000, 0.1, 4096)).toThrow(/10000 Hz wide/);
  });
});

describe('response of sections', () => {
  const rows = designIir({ family: 'butterworth', band: 'lowpass', order: 3, edges: [100], rate: 4096 });

  test('group delay equals SciPy and the slope of the phase', () => {
    const f = Float64Array.from(numbers.delay.f);
    const delay = groupDelay(rows, f, 4096);
    delay.forEach((v, i) => expect(Math.abs(v / numbers.delay.seconds[i] - 1)).toBeLessThan(1e-9));
    const step = 1e-3;
    f.forEach((v, i) => {
      const { re, im } = sectionsResponse(rows, Float64Array.of(v - step, v + step), 4096);
      const turn = Math.atan2(im[1] * re[0] - re[1] * im[0], re[1] * re[0] + im[1] * im[0]);
      expect(-turn / (4 * Math.PI * step)).toBeCloseTo(delay[i], 7);
    });
  });
  test('one sample of delay, and a zero on the frequency', () => {
    expect(groupDelay([[0, 1, 0, 1, 0, 0]], Float64Array.of(10), 100)[0]).toBeCloseTo(0.01, 14);
    expect(groupDelay([[1, 0, 1, 1, 0, 0]], Float64Array.of(25), 100)[0]).toBeCloseTo(0.01, 10);
  });
  test('forwards and backwards: half the gain at the edge (0.71 becomes 0.50)', () => {
    const edge = Float64Array.of(100);
    expect(sectionsGain(rows, edge, 4096)[0]).toBeCloseTo(Math.SQRT1_2, 10);
    expect(zeroPhaseGain(rows, edge, 4096)[0]).toBeCloseTo(0.5, 10);
  });
  test('rows need not be scaled to a0 = 1', () => {
    const scaled = rows.map((r) => r.map((v) => -3 * v));
    const f = Float64Array.of(3, 300);
    sectionsResponse(scaled, f, 4096).re.forEach((v, i) =>
      expect(v).toBeCloseTo(sectionsResponse(rows, f, 4096).re[i], 12),
    );
  });
  test('response is the Fourier sum of the impulse response', () => {
    const h = impulseResponse(rows, 4096);
    const f = 137;
    const { re, im } = sectionsResponse(rows, Float64Array.of(f), 4096);
    let [x, y] = [0, 0];
    h.forEach((v, n) => {
      x += v * Math.cos((2 * Math.PI * f * n) / 4096);
      y -= v * Math.sin((2 * Math.PI * f * n) / 4096);
    });
    expect(x).toBeCloseTo(re[0], 12);
    expect(y).toBeCloseTo(im[0], 12);
  });
});

describe('ringing', () => {
  test('a notch: the pole gives 4.6 Q/(π f), the impulse response itself far less', () => {
    const found = ringing([notch(60, 30, 4096)], 4096);
    expect(found.decay).toBeCloseTo(notchRinging(60, 30), 3);
    expect(found.impulse).toBeLessThan(found.decay);
    expect(found.length).toBe(found.decay);
  });
  test('one real pole: energy r^2n is left after n samples', () => {
    const r = 0.99;
    const { decay, impulse } = ringing([[1, 0, 0, 1, -r, 0]], 1, 1e-6);
    expect(decay).toBeCloseTo(Math.log(1e-6) / 2 / Math.log(r), 9);
    expect(impulse).toBe(Math.ceil(decay) - 1);
  });
  test('four equal poles ring longer than one, by the negative binomial law of their energy', () => {
    const r = 0.9;
    const rows = Array.from({ length: 4 }, () => [1, 0, 0, 1, -r, 0]);
    const h = Array.from({ length: 2000 }, (_, n) => (((n + 1) * (n + 2) * (n + 3)) / 6) * r ** n);
    const total = h.reduce((s, v) => s + v * v, 0);
    const { decay, impulse, length } = ringing(rows, 1, 1e-4);
    const after = (n: number): number => h.slice(n).reduce((s, v) => s + v * v, 0) / total;
    expect(after(impulse + 1)).toBeLessThan(1e-4);
    expect(after(impulse)).toBeGreaterThanOrEqual(1e-4);
    expect(impulse).toBeGreaterThan(decay);
    expect(length).toBe(impulse);
  });
  test('no feedback: ends with the coefficients; too long to sum: the pole decides; unstable: refused', () => {
    expect(ringing([[1, 1, 1, 1, 0, 0]], 1).length).toBe(2);
    const slow = ringing([[1, 0, 0, 1, -(1 - 1e-9), 0]], 1);
    expect(slow.impulse).toBe(slow.decay);
    expect(slow.decay).toBeCloseTo(4.605e9, -8);
    expect(() => ringing([[1, 0, 0, 1, -1, 0]], 1)).toThrow(/pole of the filter lies at radius 1/);
    expect(() => ringing([[1, 0, 0, 1, 0, 0]], 1, 2)).toThrow(/energy fraction 2/);
  });
});
