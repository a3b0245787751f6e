import { describe, expect, test } from 'vitest';
import { parseNoiseCurve, interpolateCurve } from '../../src/core/noise/curve-file';
import { noiseDensity, type NoiseCurve } from '../../src/core/demo/noise-curve';
import { noiseTable } from '../../src/core/demo/noise-table';
import { DEMO_SITES } from '../../src/core/demo/scenario';
import { oracle } from '../oracle/oracle';

interface Oracle {
  sites: Record<string, { f: number[]; density: number[] }>;
}
const want = oracle<Oracle>('demo-signal').sites;

const quiet = { level: 1e-40, at: 40 };
const plain: NoiseCurve = {
  wall: { level: 1e-18, knee: 4 },
  slope: quiet,
  floor: { level: 1e-23, corner: 200 },
  resonances: [],
};

test.each(DEMO_SITES)('$site.title equals NumPy', ({ site, noise }) => {
  const { f, density } = want[site.name];
  f.forEach((x, i) => expect(noiseDensity(noise, x) / density[i]).toBeCloseTo(1, 12));
});

describe('shape', () => {
  test('wall falls as f⁻¹⁰ in amplitude, floor rises as f', () => {
    const wall = { ...plain, floor: { level: 1e-40, corner: 1e3 } };
    expect(Math.sqrt(noiseDensity(wall, 20) / noiseDensity(wall, 40))).toBeCloseTo(2 ** 10, 5);
    expect(Math.sqrt(noiseDensity(plain, 2e5) / noiseDensity(plain, 1e5))).toBeCloseTo(2, 5);
    expect(noiseDensity(plain, 200) / 2e-46).toBeCloseTo(1, 9);
  });

  test('a resonance has its peak and is half as high in power a half width f/(2Q) away', () => {
    const line = { frequency: 500, q: 2000, peak: 1e-21 };
    const curve = { ...plain, resonances: [line] };
    expect(noiseDensity(curve, 500) / 1e-42).toBeCloseTo(1, 2);
    for (const side of [-1, 1])
      expect(noiseDensity(curve, 500 + (side * 500) / 4000) / 1e-42).toBeCloseTo(0.5, 2);
  });
});

test.each(DEMO_SITES)(
  'table of $site.title read back gives the curve within 1 % between its rows',
  ({ site, noise }) => {
    const table = parseNoiseCurve(noiseTable(noise, site.title), 'table', 'amplitude density');
    const f = Float64Array.from({ length: 8000 }, (_, i) => 1 + i * 0.2558);
    const got = interpolateCurve(table, f);
    got.forEach((s, i) =>
      expect(Math.abs(s / noiseDensity(noise, f[i]) - 1), `${f[i]} Hz`).toBeLessThan(0.01),
    );
    expect(table.frequency[0]).toBe(1);
    expect(table.frequency.at(-1)).toBe(2048);
  },
);
