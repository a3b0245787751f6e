import { describe, expect, it } from 'vitest';
import type { Figure } from '../../src/core/figures/figure';
import { keyAction } from '../../webview/figure/keys';
import { viewAfter } from '../../webview/figure/view-after';
import { isWhole, panned, valueRange, zoomed } from '../../webview/figure/ranges';
import { nearest, readoutAt } from '../../webview/figure/readout';
import { tablesOf } from '../../webview/figure/table-of';
import { themeKind } from '../../webview/figure/theme-kind';
import { outline, toPlotly } from '../../webview/figure/to-plotly';
import { spectrumFigure, theme, timeFigure } from './figures';

interface PlotAxis {
  type: string;
  range: number[];
  title?: { text: string };
  autorange: boolean;
  dtick?: number | string;
}
const axes = (figure: Figure, view = {}): { x: PlotAxis; y: PlotAxis } => {
  const { layout } = toPlotly(figure, view, theme);
  return { x: layout['xaxis'] as PlotAxis, y: layout['yaxis'] as PlotAxis };
};

describe('figure to library', () => {
  it('gives logarithmic axes their ranges as powers of ten and never leaves the range to the library', () => {
    const { x, y } = axes(spectrumFigure());
    expect(x).toMatchObject({ type: 'log', range: [0, 3], autorange: false, dtick: 1 });
    expect(x.title?.text).toBe('Frequency [Hz]');
    expect(y.autorange).toBe(false);
    // The smallest positive value counts; the zero has no place on the axis.
    expect(y.range[0]).toBeCloseTo(-24.2, 9);
    expect(y.range[1]).toBeCloseTo(-19.8, 9);
  });

  it('labels less than a decade and a half at 1, 2 and 5', () => {
    expect(axes(spectrumFigure(), { x: [50, 500] }).x.dtick).toBe('D2');
  });

  it('scales values to what the view shows', () => {
    const { y } = axes(timeFigure(), { x: [0, 3] });
    expect(y.range[0]).toBeCloseTo(-1.1, 12);
    expect(y.range[1]).toBeCloseTo(1.1, 12);
  });

  it('draws bars on their edges with their widths', () => {
    const figure = timeFigure({
      traces: [
        {
          type: 'bars',
          name: 'Samples',
          role: 'data',
          edges: Float64Array.of(0, 1, 3),
          counts: Float64Array.of(5, 7),
        },
      ],
    });
    const [bar] = toPlotly(figure, {}, theme).data;
    expect(bar).toMatchObject({
      type: 'bar',
      x: Float64Array.of(0.5, 2),
      y: Float64Array.of(5, 7),
      width: Float64Array.of(1, 2),
    });
    expect(valueRange(figure, [0, 3])).toEqual([-5, 5]);
  });

  it('closes a band at every gap', () => {
    const x = Float64Array.of(0, 1, 2, 3, 4);
    const low = Float64Array.of(0, 0, NaN, 0, 0);
    const high = Float64Array.of(1, 2, NaN, 3, 4);
    expect(outline(x, low, high)).toEqual({
      x: [0, 1, 1, 0, 0, 3, 3, 4, 4, 3, 3],
      y: [1, 2, 0, 0, 1, null, 3, 4, 0, 0, 3],
    });
  });

  it('draws marks as shapes over the whole height, an instant as a line', () => {
    const marks = [
      { role: 'gap', from: 1, to: 2, label: 'gap' },
      { role: 'event', from: 5, to: 5, label: 'event' },
    ] as const;
    const shapes = toPlotly(timeFigure({ marks }), {}, theme).layout['shapes'] as { type: string }[];
    expect(shapes).toMatchObject([
      { type: 'rect', x0: 1, x1: 2, yref: 'paper', y0: 0, y1: 1 },
      { type: 'line', x0: 5, x1: 5 },
    ]);
  });

  it('leaves the title of the value axis to the panel when asked', () => {
    const { layout } = toPlotly(spectrumFigure(), {}, theme, { titles: 'x' });
    expect(layout['xaxis']).toHaveProperty('title');
    expect(layout['yaxis']).not.toHaveProperty('title');
  });
});

describe('ranges', () => {
  const { x: time } = timeFigure();
  const { x: frequency } = spectrumFigure();
  it('zooms in the units of the axis, around a point, not beyond the extent', () => {
    expect(zoomed([0, 10], 0.5, time)).toEqual([2.5, 7.5]);
    expect(zoomed([0, 10], 0.5, time, 2)).toEqual([1, 6]);
    expect(zoomed([4, 6], 100, time)).toEqual([0, 10]);
    const [a, b] = zoomed([1, 1000], 1 / 3, frequency);
    expect(a).toBeCloseTo(10, 9);
    expect(b).toBeCloseTo(100, 9);
  });
  it('moves without changing the width and stops at the ends', () => {
    expect(panned([2, 4], 0.5, time)).toEqual([3, 5]);
    expect(panned([8, 10], 1, time)).toEqual([8, 10]);
    expect(panned([0.5, 2.5], -1, time)).toEqual([0, 2]);
  });
  it('knows when everything is shown', () => {
    expect(isWhole([0.001, 10], time)).toBe(true);
    expect(isWhole([1, 10], time)).toBe(false);
  });
});

describe('keys and drags', () => {
  it('moves and zooms by keys, and shows all on 0', () => {
    const figure = timeFigure();
    expect(keyAction('+', figure, {})).toEqual({ x: [2, 8] });
    expect(keyAction('ArrowRight', figure, { x: [2, 8] })).toEqual({ x: [2.9, 8.9] });
    expect(keyAction('-', figure, { x: [2, 8] })).toEqual({});
    expect(keyAction('0', figure, { x: [2, 8], y: [0, 1] })).toEqual({});
    expect(keyAction('ArrowUp', figure, { y: [0, 1] })).toEqual({ y: [0.15, 1.15] });
    expect(keyAction('q', figure, {})).toBeUndefined();
  });
  it('reads a drag in the units of the axis and drops a value range that only fits the data', () => {
    const figure = spectrumFigure();
    expect(viewAfter(figure, {}, { 'xaxis.range[0]': 1, 'xaxis.range[1]': 2 })).toEqual({ x: [10, 100] });
    const fitted = valueRange(figure, figure.x.extent).map(Math.log10);
    expect(
      viewAfter(
        figure,
        {},
        {
          'xaxis.range': [1, 2],
          'yaxis.range[0]': fitted[0],
          'yaxis.range[1]': fitted[1],
        },
      ),
    ).toEqual({ x: [10, 100] });
    expect(viewAfter(figure, {}, { 'yaxis.range': [2, 3] })).toEqual({ y: [100, 1000] });
    expect(viewAfter(figure, {}, { width: 400 })).toBeUndefined();
  });
});

describe('readout and text', () => {
  it('finds the nearest point', () => {
    const x = Float64Array.of(0, 1, 2, 3);
    expect([nearest(x, -5), nearest(x, 1.4), nearest(x, 1.6), nearest(x, 9)]).toEqual([0, 1, 2, 3]);
    expect(nearest(new Float64Array(0), 1)).toBeUndefined();
  });
  it('gives GPS and UTC on a time axis and every value with its unit', () => {
    const { at, values } = readoutAt(timeFigure(), 2.1);
    expect(at).toBe('2.1 s · GPS 1400000002.1 · 2024-05-17T16:53:04.1Z');
    expect(values).toEqual(['−1 strain']);
    expect(readoutAt(timeFigure(), 6).values).toEqual([undefined]);
    expect(readoutAt(spectrumFigure(), 10).at).toBe('Frequency 10 Hz');
  });
  it('lists the points with units, missing ones as missing, and the marks', () => {
    const marks = [{ role: 'gap', from: 5, to: 7, label: '1 gap, 2 s' }] as const;
    const tables = tablesOf(timeFigure({ marks }));
    expect(tables[0].columns.map((c) => [c.label, c.unit])).toEqual([
      ['Time after GPS 1400000000', 's'],
      ['line', 'strain'],
    ]);
    expect(tables[0].rows[3]).toEqual([6, null]);
    expect(tables[1].rows).toEqual([['gap', 5, 7, '1 gap, 2 s']]);
  });
});

describe('theme', () => {
  it('knows the four kinds; high contrast light carries both of its classes', () => {
    expect(themeKind(['vscode-light'])).toBe('light');
    expect(themeKind(['vscode-dark'])).toBe('dark');
    expect(themeKind(['vscode-high-contrast'])).toBe('contrast-dark');
    expect(themeKind(['vscode-high-contrast', 'vscode-high-contrast-light'])).toBe('contrast-light');
  });
});
