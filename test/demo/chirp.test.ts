import { describe, expect, test } from 'vitest';
import { chirpAmplitude, lastStableFrequency, phaseTurns, projectedChirp } from '../../src/core/demo/chirp';

const pair = (mass1: number, mass2: number) => ({ mass1, mass2, distance: 100, inclination: 0, phase: 0 });

describe('phase', () => {
  // COMPUTED with mpmath (40 digits) from the energy and flux of Blanchet, Living Rev. Relativity 17, 2 (2014)
  test.each([
    [1.4, 1.4, [12037.07832303169, 2537.5036849448443, 733.3034538529582, 174.2561907619948]],
    [2, 1.2, [10249.659782236256, 2140.9740746513085, 605.0100008977288, 132.24916242905516]],
    [30, 30, [1.1033755837826162, -38.10276530549136, -36.140725788172375, -26.76298883292916]],
    [10, 1.4, [2429.3629277795644, 373.2874118456633, 19.446964221804375, -61.59494999033654]],
  ])('3.5PN sum for %d + %d at 20, 50, 100, 200 Hz', (m1, m2, want) => {
    [20, 50, 100, 200].forEach((f, i) => {
      const got = phaseTurns(pair(m1, m2), f) * 2 * Math.PI + Math.PI / 4;
      expect(Math.abs(got - want[i])).toBeLessThan(1e-12 * Math.abs(want[i]) + 1e-12);
    });
  });

  test('time before coalescence falls towards the lowest-order law 5/256 M_c^{−5/3}(πf)^{−8/3} at low frequency', () => {
    const b = pair(1.4, 1.4);
    const chirp = 1.2187707886145736 * 4.9254909476412675e-6;
    const f = 2;
    const before = (phaseTurns(b, f + 1e-3) - phaseTurns(b, f - 1e-3)) / 2e-3;
    const law = (5 / 256) * chirp ** (-5 / 3) * (Math.PI * f) ** (-8 / 3);
    expect(-before / law).toBeGreaterThan(1);
    expect(-before / law).toBeLessThan(1.03);
  });
});

test('last stable orbit: 4397.1748 Hz · M☉/M', () => {
  expect(lastStableFrequency(pair(0.5, 0.5))).toBeCloseTo(4397.174760636802, 8);
});

test('amplitude gives the horizon of a flat noise in closed form', () => {
  // 1.4 + 1.4, S = 1e-46/Hz, 20 Hz to the last stable orbit, SNR 8: 270.1032 Mpc (COMPUTED, Finn & Chernoff 1993)
  const b = pair(1.4, 1.4);
  const end = lastStableFrequency(b);
  const steps = 20_000;
  let sum = 0;
  for (let i = 0; i < steps; i++) {
    const f = 20 * (end / 20) ** ((i + 0.5) / steps);
    sum += (chirpAmplitude(b, f) ** 2 * f * Math.log(end / 20)) / steps;
  }
  expect((b.distance * Math.sqrt((4 * sum) / 1e-46)) / 8).toBeCloseTo(270.1032398, 4);
});

describe('projection', () => {
  const b = { ...pair(14, 11), inclination: 0.09 };
  const bins = 4096;
  const make = (plus: number, cross: number, time: number) =>
    projectedChirp(b, { plus, cross }, time, [9, 11], 1 / 8, bins);

  test('a delay turns the phase by 2πfτ and leaves the amplitude', () => {
    const at0 = make(0.4, 0.5, 0);
    const at1 = make(0.4, 0.5, 0.013);
    const k = 8 * 60;
    const angle = (w: { re: Float64Array; im: Float64Array }) => Math.atan2(w.im[k], w.re[k]);
    const turned = (angle(at0) - angle(at1)) / (2 * Math.PI) - 60 * 0.013;
    expect(Math.abs(turned - Math.round(turned))).toBeLessThan(1e-12);
    expect(Math.hypot(at1.re[k], at1.im[k])).toBeCloseTo(Math.hypot(at0.re[k], at0.im[k]), 35);
  });

  test('seen face on, a quarter turn between plus and cross is a quarter turn of the phase', () => {
    const face = { ...b, inclination: 0 };
    const p = projectedChirp(face, { plus: 1, cross: 0 }, 0, [9, 11], 1 / 8, bins);
    const x = projectedChirp(face, { plus: 0, cross: 1 }, 0, [9, 11], 1 / 8, bins);
    for (let k = 100; k < 1200; k += 100) {
      // x = −i p
      expect(x.re[k]).toBeCloseTo(p.im[k], 35);
      expect(x.im[k]).toBeCloseTo(-p.re[k], 35);
    }
  });

  test('nothing below the onset or beyond the cut; one half at the last stable orbit', () => {
    const w = make(1, 0, 0);
    const size = (f: number): number => Math.hypot(w.re[f * 8], w.im[f * 8]);
    expect(size(8)).toBe(0);
    expect(size(Math.ceil(1.05 * lastStableFrequency(b)) + 1)).toBe(0);
    const end = lastStableFrequency(b);
    const cut = projectedChirp(b, { plus: 1, cross: 0 }, 0, [9, 11], end / 64, 80);
    const c = Math.cos(2 * Math.PI * 0.09);
    expect(Math.hypot(cut.re[64], cut.im[64]) / ((chirpAmplitude(b, end) * (1 + c * c)) / 2)).toBeCloseTo(
      0.5,
      10,
    );
  });
});
