import { describe, expect, test } from 'vitest';
import { uniform } from '../../src/core/demo/counter-noise';
import { coveringLattice, metricCount } from '../../src/core/search/bank-lattice';
import { chirpMetric, chirpTimePhase, massesOf } from '../../src/core/search/bank-metric';
import { binaryOf, chirpTimes } from '../../src/core/waveforms/binary';
import { inspiralPhase } from '../../src/core/waveforms/inspiral-phase';
import { spectrumOf } from './waves';

const f0 = 40;
const band: readonly [number, number] = [40, 600];
const density = (f: number): number => 1e-46 * ((60 / Math.max(f, 1)) ** 4 + 1 + (f / 200) ** 2);
const spectrum = spectrumOf(density, 0.25, 1024);
const binary = binaryOf({ mass: 2.4 }, { mass: 1.3 });
const { tau0, tau3 } = chirpTimes(binary, f0);

test('phase in chirp times is the 2PN phase in v', () => {
  const phase = inspiralPhase(binary, '2PN');
  for (const f of [40, 97, 310, 600]) {
    const value = phase.at(f);
    expect(Math.abs(chirpTimePhase(f, tau0, tau3, f0) - value)).toBeLessThan(1e-10 * Math.abs(value) + 1e-8);
  }
});

test('masses come back from chirp times; beyond equal masses there are none', () => {
  const back = massesOf(tau0, tau3, f0);
  expect(back?.mass1).toBeCloseTo(2.4, 9);
  expect(back?.mass2).toBeCloseTo(1.3, 9);
  expect(massesOf(tau0, 0.8 * tau3, f0)).toBeUndefined();
});

/** Largest overlap over time and phase of two inspirals that differ in chirp times, summed over bins. */
function overlap(d0: number, d3: number): number {
  const at = (t: number): number => {
    let [re, im, sum] = [0, 0, 0];
    for (let f = band[0]; f <= band[1]; f += 0.25) {
      const w = f ** (-7 / 3) / density(f);
      const p =
        chirpTimePhase(f, tau0 + d0, tau3 + d3, f0) - chirpTimePhase(f, tau0, tau3, f0) + 2 * Math.PI * f * t;
      re += w * Math.cos(p);
      im += w * Math.sin(p);
      sum += w;
    }
    return Math.hypot(re, im) / sum;
  };
  let [a, b] = [-0.004, 0.004];
  for (let i = 0; i < 60; i++) {
    const [p, q] = [a + (b - a) / 3, b - (b - a) / 3];
    if (at(p) < at(q)) a = p;
    else b = q;
  }
  return at((a + b) / 2);
}

test('mismatch by the metric is that of overlaps', () => {
  const [a, b, c] = chirpMetric(spectrum, band, [tau0, tau3], f0);
  for (const angle of [0, 0.7, 1.5, 2.2, 2.9]) {
    const [x, y] = [Math.cos(angle) / Math.sqrt(a), Math.sin(angle) / Math.sqrt(c)];
    const scale = Math.sqrt(1e-3 / (a * x * x + 2 * b * x * y + c * y * y));
    const mismatch = 1 - overlap(scale * x, scale * y);
    expect(Math.abs(mismatch / 1e-3 - 1), `angle ${angle}`).toBeLessThan(0.02);
  }
});

test('a band without bins is an error that says so', () => {
  expect(() => chirpMetric(spectrum, [2000, 3000], [tau0, tau3], f0)).toThrow(/0 usable bins from 2000/);
});

describe('lattice', () => {
  const metric = chirpMetric(spectrum, band, [tau0, tau3], f0);
  const [a, b, c] = metric;
  const box = { tau0: [tau0 - 0.5, tau0 + 0.5], tau3: [tau3 - 0.1, tau3 + 0.1] } as const;
  const points = coveringLattice(metric, 0.97, box);

  test('no point of the box, corners included, is further than the minimal match', () => {
    let worst = 0;
    for (let i = 0; i < 2000; i++) {
      const [u, v] = i < 4 ? [i & 1, i >> 1] : [uniform(5, 0, i), uniform(5, 1, i)];
      const [x, y] = [box.tau0[0] + u, box.tau3[0] + 0.2 * v];
      let best = Infinity;
      for (const [p, q] of points)
        best = Math.min(best, a * (x - p) ** 2 + 2 * b * (x - p) * (y - q) + c * (y - q) ** 2);
      worst = Math.max(worst, best);
    }
    expect(worst).toBeLessThanOrEqual(0.03 * (1 + 1e-9));
    // The lattice is no denser than it must be.
    expect(worst).toBeGreaterThan(0.025);
  });

  test('as many as the metric asks for, and a rim that shrinks as the radius of a disc', () => {
    const excess = (match: number): number =>
      coveringLattice(metric, match, box).length / metricCount(metric, match, 0.2) - 1;
    // A tenth and a hundredth of the radius: the rim goes with perimeter times radius.
    const [fine, finer] = [excess(0.9997), excess(0.999997)];
    expect(fine).toBeGreaterThan(0);
    expect(fine).toBeLessThan(0.1);
    expect(fine / finer).toBeGreaterThan(8);
    expect(fine / finer).toBeLessThan(12);
  });
});
