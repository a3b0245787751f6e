import { describe, expect, test } from 'vitest';
import { gpsTime } from '../../src/core/data/gps-time';
import type { Spectrum } from '../../src/core/data/kinds';
import type { Figure } from '../../src/core/figures/figure';
import { spectrumFigure } from '../../src/core/figures/spectrum';

const df = 0.25;
const bins = 32_769;
const peakBin = 20_401;
const spectrum: Spectrum = {
  kind: 'spectrum',
  label: 'noise of alder',
  frequency: Float64Array.from({ length: bins }, (_, k) => k * df),
  density: Float64Array.from({ length: bins }, (_, k) => (k === peakBin ? 1e-38 : 1e-46)),
  df,
  unit: 'strain²/Hz',
  estimate: {
    average: 'median',
    segments: 63,
    segmentSeconds: 4,
    overlap: 0.5,
    window: 'hann',
    enbw: 0.375,
    relativeError: 0.2,
    band: [0.7, 1.5],
    start: gpsTime(1_400_000_000),
    duration: 128,
    rate: 16_384,
  },
};
const line = (f: Figure) => {
  const t = f.traces.find((v) => v.type === 'line');
  if (t?.type !== 'line') throw new Error('expected a line');
  return t;
};

describe('spectrumFigure', () => {
  test.each([100, 900, 2000])('a line one bin wide is there at any zoom, %d pixels wide', (width) => {
    const f = peakBin * df;
    for (let half = 8000; half > 0.3; half /= 2.7) {
      const x: [number, number] = [Math.max(1, f - half), Math.min(8192, f + 0.6 * half)];
      const figure = spectrumFigure([{ spectrum, role: 'data', band: true }], { width, x });
      const { x: px, y: py } = line(figure);
      const k = py.indexOf(1e-19);
      expect(k, `±${half} Hz`).toBeGreaterThanOrEqual(0);
      expect(px[k]).toBe(f);
      expect(px.length).toBeLessThanOrEqual(2 * width + 4);
      const band = figure.traces[0];
      if (band.type !== 'range') throw new Error('expected a band');
      expect(Math.max(...band.high)).toBeCloseTo(1e-19 * Math.sqrt(1.5), 25);
    }
  });

  test('axes, units, link group and words', () => {
    const figure = spectrumFigure([{ spectrum, role: 'data', band: true }], { width: 900 });
    expect(figure.x).toMatchObject({ unit: 'Hz', scale: 'log', link: 'frequency', extent: [0.25, 8192] });
    expect(figure.y).toMatchObject({
      label: 'Amplitude spectral density, one-sided',
      unit: 'strain/√Hz',
      scale: 'log',
    });
    expect(figure.y.extent[0] / 1e-23).toBeCloseTo(1, 12);
    expect(figure.y.extent[1]).toBe(1e-19);
    expect(figure.caption).toContain('(ENBW) 0.375 Hz');
    expect(figure.caption).toContain('90 % interval');
    expect(figure.traces.map((t) => t.role)).toEqual(['interval', 'data']);
  });

  test('bins of density zero or without a value break the line and leave the axis alone', () => {
    const density = spectrum.density.slice();
    density.fill(0, 4000, 8000);
    density.fill(NaN, 0, 40);
    const figure = spectrumFigure([{ spectrum: { ...spectrum, density }, role: 'data' }], { width: 300 });
    expect(figure.x.extent).toEqual([10, 8192]);
    expect(figure.y.extent[0]).toBeGreaterThan(0);
    expect(line(figure).y.some(Number.isNaN)).toBe(true);
    expect(line(figure).y.every((v) => !(v <= 0))).toBe(true);
  });

  test('nothing but zeros still makes a figure', () => {
    const flat = { ...spectrum, density: new Float64Array(bins) };
    const figure = spectrumFigure([{ spectrum: flat, role: 'data', band: true }], { width: 300 });
    expect(figure.y.extent[1]).toBeGreaterThan(figure.y.extent[0]);
  });

  test('several curves share the axes', () => {
    const model: Spectrum = {
      kind: 'spectrum',
      label: 'model',
      frequency: Float64Array.from([0.1, 100, 20_000]),
      density: Float64Array.from([1e-40, 1e-46, 1e-44]),
      df: 0,
      unit: 'strain²/Hz',
    };
    const figure = spectrumFigure(
      [
        { spectrum, role: 'data' },
        { spectrum: model, role: 'reference', name: 'fit' },
      ],
      { width: 900 },
    );
    expect(figure.x.extent).toEqual([0.1, 20_000]);
    expect(figure.traces.map((t) => t.name)).toEqual(['noise of alder', 'fit']);
    expect(figure.caption).toContain('fit: one-sided');
    expect(() => spectrumFigure([], { width: 900 })).toThrow(RangeError);
  });
});
