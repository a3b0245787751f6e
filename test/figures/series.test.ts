import { describe, expect, test } from 'vitest';
import type { Series } from '../../src/core/data/kinds';
import type { Figure } from '../../src/core/figures/figure';
import { seriesFigure } from '../../src/core/figures/series';
import { gaussianNoise, seriesOf } from '../steps/synthetic';

const line = (f: Figure) => {
  const t = f.traces[0];
  if (t.type !== 'line') throw new Error('expected a line');
  return t;
};

describe('seriesFigure', () => {
  const fs = 4096;
  const at = 271_828;
  const x = gaussianNoise(fs * 200, 1, 9);
  x[at] = 50;
  let reads: [number, number][] = [];
  const plain = seriesOf(x, fs);
  const series: Series = {
    ...plain,
    read: (from, to, into) => {
      reads.push([from, to]);
      return plain.read(from, to, into);
    },
  };

  test.each([100, 900, 3000])('a one-sample spike is there at any zoom, %d pixels wide', (width) => {
    const t = at / fs;
    for (let half = 200; half > 1e-3; half /= 3.1) {
      const view: [number, number] = [Math.max(0, t - 0.31 * half), Math.min(200, t + half)];
      const figure = seriesFigure(series, { width, x: view });
      const { x: px, y: py } = line(figure);
      const k = py.indexOf(50);
      expect(k, `±${half} s`).toBeGreaterThanOrEqual(0);
      expect(Math.abs(px[k] - t)).toBeLessThanOrEqual((view[1] - view[0]) / width);
      expect(px.filter((v) => v >= view[0] && v <= view[1]).length).toBeLessThanOrEqual(2 * width + 2);
      expect(figure.x.range![0]).toBeCloseTo(view[0], 9);
      expect(figure.x.extent).toEqual([0, 200]);
    }
  });

  test('a close zoom shows the samples themselves, and reads no more than it shows', () => {
    seriesFigure(series, { width: 900 });
    reads = [];
    const { x: px, y: py } = line(seriesFigure(series, { width: 900, x: [10, 10.1] }));
    expect(px.length).toBeGreaterThanOrEqual(410);
    px.forEach((v, i) => expect(py[i]).toBe(x[Math.round(v * fs)]));
    expect(reads.reduce((n, [a, b]) => n + b - a, 0)).toBeLessThan(420);
  });

  test('zooming out again does not read everything anew', () => {
    seriesFigure(series, { width: 900 });
    reads = [];
    seriesFigure(series, { width: 900 });
    expect(reads).toEqual([]);
  });

  test('words, units, link and epoch', () => {
    const figure = seriesFigure(series, { width: 900 });
    expect(figure.x).toMatchObject({ unit: 's', link: 'time', epoch: '1400000000', scale: 'linear' });
    expect(figure.y).toMatchObject({ label: 'Strain', unit: '' });
    expect(figure.caption).toContain('GPS 1400000000 (2024-05-17T16:53:02Z)');
    expect(figure.caption).toContain('to 50 strain');
    expect(figure.caption).not.toContain('NaN');
    expect(seriesFigure({ ...plain, unit: 'V' }, { width: 900 }).y).toMatchObject({ unit: 'V' });
  });

  test('gaps are marks; many in one pixel column share one', () => {
    const y = gaussianNoise(fs * 100, 1, 2);
    y.fill(NaN, 10 * fs, 20 * fs);
    for (let i = 0; i < 50; i++) y[50 * fs + 3 * i] = NaN;
    const figure = seriesFigure(seriesOf(y, fs), { width: 500 });
    expect(figure.marks).toMatchObject([
      { role: 'gap', from: 10, to: 20, label: 'gap, 10 s' },
      { role: 'gap', label: '50 gaps, 0.01221 s' },
    ]);
    expect(figure.caption).toContain('51 gaps marked');
    expect(line(figure).y.some(Number.isNaN)).toBe(true);
    expect(seriesFigure(seriesOf(y, fs), { width: 500, x: [30, 40] }).marks).toEqual([]);
  });

  test('a view without a valid sample says so', () => {
    const y = gaussianNoise(fs * 10, 1).fill(NaN, 2 * fs, 4 * fs);
    const figure = seriesFigure(seriesOf(y, fs), { width: 500, x: [2.5, 3.5] });
    expect(figure.caption).toContain('No valid sample in view.');
  });

  test('a view outside the data falls back to all of it', () => {
    expect(seriesFigure(series, { width: 500, x: [300, 400] }).x.range).toBeUndefined();
  });
});
