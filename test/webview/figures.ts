import type { Figure, Trace } from '../../src/core/figures/figure';
import type { Theme } from '../../webview/figure/theme';

export const theme: Theme = {
  kind: 'light',
  text: 'rgba(0, 0, 0, 1)',
  muted: 'rgba(80, 80, 80, 1)',
  grid: 'rgba(0, 0, 0, 0.1)',
  ground: 'rgba(255, 255, 255, 1)',
  font: 'sans-serif',
  fontSize: 11,
};

const f64 = (values: readonly number[]): Float64Array => Float64Array.from(values);

export const line = (x: readonly number[], y: readonly number[]): Trace => ({
  type: 'line',
  name: 'line',
  role: 'data',
  x: f64(x),
  y: f64(y),
});

/** A time series figure of ten seconds. */
export const timeFigure = (extra: Partial<Figure> = {}): Figure => ({
  id: 'trace',
  title: 'Samples',
  caption: 'Samples against time.',
  x: {
    label: 'Time after GPS 1400000000',
    unit: 's',
    scale: 'linear',
    link: 'time',
    epoch: '1400000000',
    extent: [0, 10],
  },
  y: { label: 'Strain', unit: 'strain', scale: 'linear', extent: [-5, 5] },
  traces: [line([0, 2, 4, 6, 8, 10], [1, -1, 2, NaN, -2, 0])],
  marks: [],
  ...extra,
});

/** A spectrum from 1 Hz to 1 kHz. */
export const spectrumFigure = (extra: Partial<Figure> = {}): Figure => ({
  id: 'spectrum',
  title: 'Noise spectrum',
  caption: 'One-sided amplitude density.',
  x: { label: 'Frequency', unit: 'Hz', scale: 'log', link: 'frequency', extent: [1, 1000] },
  y: { label: 'Amplitude spectral density', unit: 'strain/√Hz', scale: 'log', extent: [1e-24, 1e-20] },
  traces: [line([1, 10, 100, 1000], [1e-20, 1e-22, 1e-24, 0])],
  marks: [],
  ...extra,
});
