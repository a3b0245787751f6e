import { beforeAll, describe, expect, test } from 'vitest';
import type { Kernels } from '../../src/core/kernels/kernels';
import { oracle } from '../oracle/oracle';
import { BUILD_TIME, loadKernels, relativeError, samples } from './load-kernels';

interface Case {
  n: number;
  bins: number[];
  re: number[];
  im: number[];
  rms: number;
  realRe: number[];
  realIm: number[];
}
const { cases } = oracle<{ cases: Case[] }>('fft');

let wasm: Kernels;
let plain: Kernels;
beforeAll(async () => {
  ({ wasm, plain } = await loadKernels());
}, BUILD_TIME);

const both = (z: { re: ArrayLike<number>; im: ArrayLike<number> }): number[] => [
  ...Array.from(z.re),
  ...Array.from(z.im),
];
const single = (x: Float64Array): Float32Array => Float32Array.from(x);

/** Error of the bins in the oracle, relative to the rms of all bins. */
function binError(
  c: Case,
  z: { re: ArrayLike<number>; im: ArrayLike<number> },
  re: number[],
  im: number[],
): number {
  let sum = 0;
  re.forEach((v, i) => {
    sum += (z.re[c.bins[i]] - v) ** 2 + (z.im[c.bins[i]] - im[i]) ** 2;
  });
  return Math.sqrt(sum / re.length) / c.rms;
}

// SciPy in long double (test/oracle/fft.py). The bounds are the rounding errors of one transform, growing as √log n:
// double 1.2e-16 and single 6e-8 times a small factor (Gentleman and Sande 1966, MEMORY).
describe('transforms against SciPy in long double', () => {
  test.each(cases)('length $n', (c) => {
    const [re, im] = [samples(c.n, c.n + 1), samples(c.n, c.n + 2)];
    const size = c.n & (c.n - 1) ? 2.5 : 1; // other lengths than powers of two need more operations
    const growth = size * Math.sqrt(1 + Math.log2(c.n));
    for (const k of [wasm, plain]) {
      expect(binError(c, k.fft(re, im), c.re, c.im), `${k.kind} complex`).toBeLessThan(1.6e-16 * growth);
      expect(binError(c, k.rfft(re), c.realRe, c.realIm), `${k.kind} real`).toBeLessThan(1.6e-16 * growth);
      expect(binError(c, k.fft(single(re), single(im)), c.re, c.im), `${k.kind} single`).toBeLessThan(
        8e-8 * growth,
      );
      expect(binError(c, k.rfft(single(re)), c.realRe, c.realIm), `${k.kind} real single`).toBeLessThan(
        8e-8 * growth,
      );
    }
  });

  test('accuracy at 2^20: 3e-16 in double, 1.6e-7 in single', () => {
    const c = cases.find((x) => x.n === 2 ** 20)!;
    const [re, im] = [samples(c.n, c.n + 1), samples(c.n, c.n + 2)];
    expect(binError(c, wasm.fft(re, im), c.re, c.im)).toBeLessThan(5e-16);
    expect(binError(c, wasm.fft(single(re), single(im)), c.re, c.im)).toBeLessThan(2.5e-7);
  });
});

describe('wasm against its plain twin', () => {
  const primes = [2, 3, 5, 7, 11, 13, 17, 31, 61, 127, 257, 509, 1021, 2039, 4093];
  const powers = Array.from({ length: 13 }, (_, i) => 2 ** i);
  const any = Array.from(samples(60, 5), (u) => 1 + Math.floor((u + 0.5) * 4096));
  const fast = [
    10, 18, 36, 45, 50, 72, 96, 144, 160, 200, 225, 360, 400, 480, 625, 720, 900, 960, 1500, 1920, 2400, 3600,
  ];
  test.each([...new Set([...primes, ...powers, ...fast, ...any])].sort((a, b) => a - b))('length %i', (n) => {
    const [re, im] = [samples(n, 2 * n + 1), samples(n, 2 * n + 2)];
    const forward = wasm.fft(re, im);
    expect(relativeError(both(forward), both(plain.fft(re, im)))).toBeLessThan(2e-15);
    expect(relativeError(both(wasm.ifft(forward.re, forward.im)), both({ re, im }))).toBeLessThan(2e-15);
    const real = wasm.rfft(re);
    expect(relativeError(both(real), both(plain.rfft(re)))).toBeLessThan(2e-15);
    expect(relativeError(wasm.irfft(real.re, real.im, n), re)).toBeLessThan(2e-15);
    expect(relativeError(plain.irfft(real.re, real.im, n), re)).toBeLessThan(2e-15);
    const [r4, i4] = [single(re), single(im)];
    const forward4 = wasm.fft(r4, i4);
    expect(forward4.re).toBeInstanceOf(Float32Array);
    expect(relativeError(both(forward4), both(forward))).toBeLessThan(6e-7);
    expect(relativeError(both(wasm.ifft(forward4.re, forward4.im)), both({ re, im }))).toBeLessThan(9e-7);
    const real4 = wasm.rfft(r4);
    expect(relativeError(both(real4), both(real))).toBeLessThan(6e-7);
    expect(relativeError(wasm.irfft(real4.re, real4.im, n), re)).toBeLessThan(9e-7);
  });
});

describe('identities', () => {
  const lengths = [1, 2, 12, 100, 127, 256, 1000, 4096, 6000, 8192, 65536];
  test.each(lengths)('Parseval: Σ|x|² = Σ|X|²/n, length %i', (n) => {
    const [re, im] = [samples(n, 3), samples(n, 4)];
    const energy = (z: { re: Float64Array; im: Float64Array }): number =>
      z.re.reduce((s, v, k) => s + v * v + z.im[k] ** 2, 0);
    const ratio = energy(wasm.fft(re, im)) / n / energy({ re, im });
    expect(Math.abs(ratio - 1)).toBeLessThan(1e-12);
  });
  test.each(lengths)('linear, length %i', (n) => {
    const [a, b] = [samples(n, 8), samples(n, 9)];
    const zero = new Float64Array(n);
    const [fa, fb] = [wasm.fft(a, zero), wasm.fft(b, zero)];
    const sum = wasm.fft(
      a.map((v, k) => 2 * v - 3 * b[k]),
      zero,
    );
    const expected = {
      re: fa.re.map((v, k) => 2 * v - 3 * fb.re[k]),
      im: fa.im.map((v, k) => 2 * v - 3 * fb.im[k]),
    };
    expect(relativeError(both(sum), both(expected))).toBeLessThan(2e-15);
  });
  test.each([64, 96, 77])('a shifted impulse is a phase, length %i', (n) => {
    const x = new Float64Array(n);
    x[5] = 1;
    const { re, im } = wasm.fft(x, new Float64Array(n));
    for (let k = 0; k < n; k++) {
      expect(re[k]).toBeCloseTo(Math.cos((2 * Math.PI * 5 * k) / n), 14);
      expect(im[k]).toBeCloseTo(-Math.sin((2 * Math.PI * 5 * k) / n), 14);
    }
  });
});

describe('plans', () => {
  test.each(['f64', 'f32'] as const)('in place equals out of place, %s', (precision) => {
    for (const kernels of [wasm, plain]) {
      for (const n of [1, 4, 5, 7, 12, 30, 64, 128, 256, 512, 1024, 2048, 240, 1920, 4096]) {
        const plan = kernels.fftPlan(n, precision);
        const [x, y] = [kernels.complex(n, precision), kernels.complex(n, precision)];
        x.re.set(samples(n, 6));
        x.im.set(samples(n, 7));
        plan.forward(x, y);
        plan.forward(x, x);
        expect(Array.from(x.re.slice()), `${kernels.kind} ${n}`).toEqual(Array.from(y.re.slice()));
        expect(Array.from(x.im.slice()), `${kernels.kind} ${n}`).toEqual(Array.from(y.im.slice()));
        plan.backward(y, x);
        plan.backward(y, y);
        expect(Array.from(x.re.slice())).toEqual(Array.from(y.re.slice()));
        x.free();
        y.free();
      }
    }
  });

  test('memory does not grow with use, and plans survive being dropped', () => {
    const plan = wasm.fftPlan(1024, 'f64');
    const x = wasm.complex(1024, 'f64');
    x.re.set(samples(1024, 1));
    const run = (): Float64Array => {
      const y = wasm.complex(1024, 'f64');
      plan.forward(x, y);
      const out = y.re.slice();
      y.free();
      return out;
    };
    const first = run();
    const before = wasm.memory();
    for (let i = 0; i < 200; i++) {
      run();
      wasm.rfft(samples(300 + (i % 5), 2));
    }
    wasm.trim();
    expect(run()).toEqual(first);
    expect(wasm.memory().used).toBeLessThanOrEqual(before.used);
    expect(wasm.memory().reserved).toBe(before.reserved);
    x.free();
  });

  test('tables over the limit of 256 MiB are dropped, and come back', () => {
    const lengths = [2 ** 22, 2 ** 22 + 2 ** 20, 2 ** 22 + 2 ** 21, 3 * 2 ** 21];
    const x = wasm.complex(2 ** 23, 'f64');
    x.re.view()[1] = 1;
    const plans = lengths.map((n) => wasm.fftPlan(n, 'f64'));
    for (const plan of [...plans, ...plans]) {
      const y = x.sub(0, plan.length);
      plan.forward(y, y);
      const phase = (-2 * Math.PI * 12345) / plan.length;
      expect(y.re.view()[12345]).toBeCloseTo(Math.cos(phase), 13);
      expect(y.im.view()[12345]).toBeCloseTo(Math.sin(phase), 13);
      x.re.fill(0);
      x.im.fill(0);
      x.re.view()[1] = 1;
    }
    x.free();
    const { used } = wasm.memory();
    wasm.trim();
    expect(used - wasm.memory().used).toBeLessThan(256 * 2 ** 20 + 2 * 2 ** 23 * 8 + 2 ** 20);
  });

  test('plans of one length share their tables', () => {
    const x = wasm.complex(4096, 'f64');
    const [a, b] = [wasm.fftPlan(4096, 'f64'), wasm.fftPlan(4096, 'f64')];
    a.forward(x, x);
    const { used } = wasm.memory();
    b.forward(x, x);
    expect(wasm.memory().used).toBe(used);
    x.free();
  });

  test('misuse is refused with a sentence', () => {
    expect(() => wasm.fftPlan(0, 'f64')).toThrow(/from 1 to 2\^27, not 0/);
    expect(() => wasm.fftPlan(2 ** 24 + 1, 'f64')).toThrow(
      /16777217 samples is too long.*prime factors above 5/,
    );
    expect(() => wasm.array(-1, 'f64')).toThrow(/cannot have -1 numbers/);
    expect(() => wasm.fft(new Float64Array(4), new Float64Array(5))).toThrow(/same length/);
    expect(() => wasm.irfft(new Float64Array(4), new Float64Array(4), 8)).toThrow(
      /spectrum of 5 bins, not 4/,
    );
    const x = wasm.complex(8, 'f64');
    expect(() => wasm.fftPlan(16, 'f64').forward(x, x)).toThrow(/needs 16 numbers, the array has 8/);
    expect(() => wasm.fftPlan(8, 'f64').forward(plain.complex(8, 'f64'), x)).toThrow(/other kernels/);
    x.free();
    expect(() => x.re.view()).toThrow(/freed/);
  });
});
