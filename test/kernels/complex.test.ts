import { beforeAll, describe, expect, test } from 'vitest';
import type { ComplexArray, Kernels, Precision } from '../../src/core/kernels/kernels';
import { BUILD_TIME, loadKernels, relativeError, samples, largestError } from './load-kernels';

let all: Kernels[];
beforeAll(async () => {
  const { wasm, plain } = await loadKernels();
  all = [wasm, plain];
}, BUILD_TIME);

function random(k: Kernels, n: number, precision: Precision, seed: number): ComplexArray {
  const z = k.complex(n, precision);
  z.re.set(samples(n, seed));
  z.im.set(samples(n, seed + 1));
  return z;
}
const parts = (z: ComplexArray): [number[], number[]] => [Array.from(z.re.view()), Array.from(z.im.view())];
// Lengths around the width of vectors and of the blocks of 4096 bytes.
const lengths = [1, 2, 3, 4, 5, 7, 8, 63, 511, 512, 513, 1023, 1024, 1025, 5000];

describe.each(['f64', 'f32'] as const)('element-wise work in %s', (precision) => {
  const eps = precision === 'f64' ? 4e-16 : 3e-7;

  test.each(lengths)('products, length %i', (n) => {
    for (const k of all) {
      const [a, b, out] = [random(k, n, precision, 3), random(k, n, precision, 5), k.complex(n, precision)];
      for (const [conjugate, run] of [
        [1, (x: ComplexArray, y: ComplexArray, z: ComplexArray) => k.multiply(x, y, z)],
        [-1, (x: ComplexArray, y: ComplexArray, z: ComplexArray) => k.multiplyConj(x, y, z)],
      ] as const) {
        run(a, b, out);
        const [[p, q], [r, s]] = [parts(a), parts(b)];
        const re = p.map((_, i) => p[i] * r[i] - conjugate * q[i] * s[i]);
        const im = p.map((_, i) => conjugate * p[i] * s[i] + q[i] * r[i]);
        expect(largestError(out.re.view(), re)).toBeLessThan(eps);
        expect(largestError(out.im.view(), im)).toBeLessThan(eps);
        const kept = [Array.from(out.re.slice()), Array.from(out.im.slice())];
        const place = random(k, n, precision, 3);
        run(place, b, place);
        expect([Array.from(place.re.slice()), Array.from(place.im.slice())]).toEqual(kept);
        place.free();
      }
      for (const z of [a, b, out]) z.free();
    }
  });

  test.each(lengths)('energy and peak, length %i', (n) => {
    for (const k of all) {
      const z = random(k, n, precision, 7);
      const squares = Array.from(z.re.view(), (v, i) => v * v + z.im.view()[i] ** 2);
      const out = k.array(n, precision);
      const { sum, max } = k.energy(z, out);
      expect(relativeError(out.slice(), squares)).toBeLessThan(eps);
      expect(Math.abs(sum / squares.reduce((s, v) => s + v, 0) - 1)).toBeLessThan(n * eps);
      expect(Math.abs(max / Math.max(...squares) - 1)).toBeLessThan(eps);
      expect(k.energy(z)).toEqual({ sum, max });
      for (const place of [0, n >> 1, n - 1]) {
        z.re.view()[place] = 2;
        const found = k.peak(z);
        expect(found.index).toBe(place);
        expect(Math.abs(found.value / (4 + z.im.view()[place] ** 2) - 1)).toBeLessThan(eps);
        z.re.view()[place] = 0.25;
      }
      z.free();
      out.free();
    }
  });

  test('the first of equal peaks is given; NaN never is the peak', () => {
    for (const k of all) {
      const z = k.complex(3000, precision);
      z.re.view()[700] = 1;
      z.re.view()[2500] = 1;
      z.im.view()[20] = NaN;
      expect(k.peak(z)).toEqual({ index: 700, value: 1 });
      expect(k.energy(z).max).toBe(1);
      z.re.fill(NaN);
      expect(k.peak(z).index).toBe(-1);
      z.free();
    }
  });

  test.each([1, 3, 8, 100])('weights and zeros, %i numbers into 120', (n) => {
    for (const k of all) {
      const [z, out, w] = [random(k, n, precision, 2), random(k, 120, precision, 4), k.array(n, precision)];
      w.set(samples(n, 6));
      k.windowed(z, w, 3, out);
      for (let i = 0; i < 120; i++) {
        const c = i < n ? 3 * w.view()[i] : 0;
        expect(Math.abs(out.re.view()[i] - (i < n ? c * z.re.view()[i] : 0))).toBeLessThan(eps);
        expect(Math.abs(out.im.view()[i] - (i < n ? c * z.im.view()[i] : 0))).toBeLessThan(eps);
      }
      k.windowed(z, undefined, -1, out);
      expect(out.re.view()[0]).toBe(-z.re.view()[0]);
      for (const x of [z, out, w]) x.free();
    }
  });

  test('a template is found where it was put, without copies', () => {
    for (const k of all) {
      const n = 4096;
      const bins = n / 2 + 1;
      const shift = 1234;
      const template = samples(n, 3);
      const data = template.map((_, i) => template[(i - shift + n) % n]);
      const real = k.rfftPlan(n, precision);
      const [x, h, d] = [k.array(n, precision), k.complex(bins, precision), k.complex(bins, precision)];
      x.set(template);
      real.forward(x, h);
      x.set(data);
      real.forward(x, d);
      const [product, series] = [k.complex(n, precision), k.complex(n, precision)];
      k.multiplyConj(d, h, product.sub(0, bins));
      k.fftPlan(n, precision).backward(product, series);
      const { index, value } = k.peak(series);
      expect(index).toBe(shift);
      // Half the spectrum: the real part is half the autocorrelation n Σ x², the zero bin counted once more.
      const energy = template.reduce((s, v) => s + v * v, 0);
      expect(Math.abs(Math.sqrt(value) / ((n * energy) / 2) - 1)).toBeLessThan(5e-3);
      for (const z of [x, h, d, product, series]) z.free();
    }
  });
});

test('arrays too short and freed twice are refused', () => {
  for (const k of all) {
    const [a, b] = [k.complex(8, 'f64'), k.complex(4, 'f64')];
    expect(() => k.multiply(a, b, a)).toThrow(/multiply: needs 8 numbers, the array has 4/);
    expect(() => a.re.sub(2, 9)).toThrow(/part 2..9 is not inside an array of 8/);
    expect(() => a.re.sub(0, 4).free()).toThrow(/free the whole/);
    a.free();
    expect(() => a.free()).toThrow(/freed/);
    b.free();
  }
});
