import { beforeAll, describe, expect, test } from 'vitest';
import type { Kernels } from '../../src/core/kernels/kernels';
import { steadyState } from '../../src/core/kernels/sections-run';
import { oracle } from '../oracle/oracle';
import { BUILD_TIME, loadKernels, relativeError, samples } from './load-kernels';

interface Case {
  name: string;
  sos: number[][];
  n: number;
  zi: number[];
  keep: number[];
  causal: number[];
  zf: number[];
  both: number[];
}
const { cases } = oracle<{ cases: Case[] }>('zero-phase');
const thirteen = cases.find((c) => c.sos.length === 13)!.sos;

let wasm: Kernels;
let plain: Kernels;
beforeAll(async () => {
  ({ wasm, plain } = await loadKernels());
}, BUILD_TIME);

describe('against scipy.signal', () => {
  test.each(cases)('$name on $n samples: sosfilt_zi, sosfilt, sosfiltfilt', (c) => {
    const x = samples(c.n, c.n).map((v) => v + 0.5);
    expect(relativeError(steadyState(c.sos), c.zi)).toBeLessThan(1e-9);
    for (const k of [wasm, plain]) {
      const { y, zf } = k.filterSections(c.sos, x, { zi: c.zi.map((z) => z * x[0]) });
      expect(
        relativeError(
          c.keep.map((i) => y[i]),
          c.causal,
        ),
      ).toBeLessThan(1e-11);
      expect(relativeError(zf, c.zf)).toBeLessThan(1e-10);
      const both = k.zeroPhase(c.sos, x);
      expect(
        relativeError(
          c.keep.map((i) => both[i]),
          c.both,
        ),
      ).toBeLessThan(1e-10);
    }
  });
});

describe('the wavefront equals the plain loop to the last bit', () => {
  const lengths = [0, 1, 2, 7, 8, 15, 16, 17, 33, 1000, 16384, 16385, 40000];
  test.each([1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11, 12, 13])('%i sections', (count) => {
    const sos = thirteen.slice(0, count);
    const zi = samples(2 * count, 9);
    for (const n of lengths) {
      const x = samples(n, n + 1);
      for (const direction of ['forward', 'backward'] as const) {
        const a = wasm.filterSections(sos, x, { zi, direction });
        const b = plain.filterSections(sos, x, { zi, direction });
        expect(a.y.every((v, i) => v === b.y[i])).toBe(true);
        expect(a.zf.every((v, i) => v === b.zf[i])).toBe(true);
      }
    }
  });
});

describe('use', () => {
  test('streaming in blocks of any length equals one call', () => {
    for (const k of [wasm, plain]) {
      const x = samples(50000, 4);
      const whole = k.filterSections(thirteen, x);
      const filter = k.createSectionsFilter(thirteen);
      const out = x.slice();
      for (const [from, to] of [
        [0, 3],
        [3, 20],
        [20, 20],
        [20, 30000],
        [30000, 30001],
        [30001, 50000],
      ]) {
        filter.process(out.subarray(from, to));
      }
      expect(out.every((v, i) => v === whole.y[i])).toBe(true);
      expect(filter.state).toEqual(whole.zf);
      filter.reset();
      expect(filter.state.every((z) => z === 0)).toBe(true);
      filter.free();
    }
  });
  test('zero-phase in place, and symmetric in time', () => {
    const x = samples(20001, 8);
    const expected = wasm.zeroPhase(thirteen, x);
    const place = x.slice();
    expect(wasm.zeroPhase(thirteen, place, place)).toBe(place);
    expect(place).toEqual(expected);
    const impulse = new Float64Array(4001);
    impulse[2000] = 1;
    const y = wasm.zeroPhase(cases[0].sos, impulse);
    const mirrored = y.slice().reverse();
    expect(relativeError(mirrored, y)).toBeLessThan(1e-6);
  });
  test('misuse is refused with a sentence', () => {
    expect(() => wasm.zeroPhase(thirteen, samples(81, 1))).toThrow(/more than 81 samples, not 81/);
    expect(() => wasm.filterSections([], samples(8, 1))).toThrow(/at least one/);
    expect(() => wasm.filterSections([[1, 0, 0, 0, 0, 0]], samples(8, 1))).toThrow(
      /section 1 .* a0 not zero/,
    );
    expect(() => wasm.filterSections([[1, 2, 3]], samples(8, 1))).toThrow(/section 1 must be six/);
    expect(() => wasm.filterSections(thirteen, samples(8, 1), { zi: [0] })).toThrow(/26 states, not 1/);
    expect(() => steadyState([[1, 0, 0, 1, -1, 0]])).toThrow(/pole at zero frequency/);
  });
  test('no memory is left behind', () => {
    const before = wasm.memory().used;
    wasm.zeroPhase(thirteen, samples(5000, 1));
    expect(() => wasm.filterSections(thirteen, samples(8, 1), { zi: [0] })).toThrow();
    expect(wasm.memory().used).toBe(before);
  });
});
