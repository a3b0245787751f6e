import { describe, expect, test } from 'vitest';
import { designIir, type IirSpec } from '../../src/core/kernels/iir-design';
import { sectionsResponse } from '../../src/core/kernels/sections-response';
import { oracle } from '../oracle/oracle';

interface Case {
  readonly spec: IirSpec;
  readonly sos: readonly (readonly number[])[];
  readonly f: readonly number[];
  readonly re: readonly number[];
  readonly im: readonly number[];
}
const { cases } = oracle<{ cases: Case[] }>('iir');
const name = ({ spec: s }: Case): string =>
  `${s.family} ${s.band} order ${s.order}, ${s.edges.join('–')} Hz at ${s.rate} Hz`;

describe('sections and response equal SciPy 1.17', () => {
  test.each(cases.map((c) => [name(c), c] as const))('%s', (_, c) => {
    const rows = designIir(c.spec);
    expect(rows.length).toBe(c.sos.length);
    rows.forEach((row, i) => {
      // The first row carries the gain, so its numerator has a scale of its own.
      const scale = Math.max(...c.sos[i].slice(0, 3).map(Math.abs));
      row.forEach((v, j) => {
        expect(Math.abs(v - c.sos[i][j]) / (j < 3 ? scale : 1), `row ${i} column ${j}`).toBeLessThan(1e-9);
      });
    });
    const h = sectionsResponse(rows, Float64Array.from(c.f), c.spec.rate);
    // Near a zero on the unit circle the rounding of its coefficients is what is left of the gain.
    const floor = /chebyshev-2|elliptic/.test(c.spec.family) ? 1e-13 : 0;
    c.f.forEach((f, i) => {
      const off = Math.hypot(h.re[i] - c.re[i], h.im[i] - c.im[i]);
      expect(off, `${f} Hz`).toBeLessThan(1e-9 * Math.hypot(c.re[i], c.im[i]) + floor);
    });
  });
});
