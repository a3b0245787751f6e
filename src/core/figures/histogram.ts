import { extentOf } from './axis';
import type { Figure, Trace } from './figure';
import { numberText, withUnit } from './number-text';

export interface HistogramInput {
  readonly id: string;
  readonly title: string;
  readonly label: string;
  readonly unit: string;
  /** One more entry than `counts`. */
  readonly edges: Float64Array;
  /** The end bins also hold everything beyond them. */
  readonly counts: Float64Array;
  /** Gaussian to compare with; absent when the values have no width. */
  readonly gaussian?: { readonly centre: number; readonly width: number };
}

/** Expected count per bin of a Gaussian with the same total. Below half a sample it is cut to NaN. */
function gaussianCounts(edges: Float64Array, total: number, centre: number, width: number): Float64Array {
  const out = new Float64Array(edges.length - 1);
  for (let k = 0; k < out.length; k++) {
    const middle = (edges[k] + edges[k + 1]) / 2;
    const z = (middle - centre) / width;
    const n = (total * (edges[k + 1] - edges[k]) * Math.exp(-0.5 * z * z)) / (width * Math.sqrt(2 * Math.PI));
    out[k] = n >= 0.5 ? n : NaN;
  }
  return out;
}

/** Histogram of sample values on a logarithmic count axis, so that single outliers can be seen beside millions. */
export function histogramFigure(h: HistogramInput): Figure {
  const total = h.counts.reduce((a, b) => a + b, 0);
  const traces: Trace[] = [{ type: 'bars', name: 'Samples', role: 'data', edges: h.edges, counts: h.counts }];
  const bins = h.counts.length;
  const ends = h.counts[0] + h.counts[bins - 1];
  let words = `Histogram of ${numberText(total, 9)} sample values of ${h.label} in ${bins} bins; the end bins also hold everything beyond them (${numberText(ends, 9)} samples).`;
  if (h.gaussian) {
    const { centre, width } = h.gaussian;
    traces.push({
      type: 'line',
      name: 'Gaussian of the same robust width',
      role: 'model',
      x: Float64Array.from(h.counts, (_, k) => (h.edges[k] + h.edges[k + 1]) / 2),
      y: gaussianCounts(h.edges, total, centre, width),
    });
    words += ` The line is a Gaussian around the median ${numberText(centre)} with the robust width ${withUnit(width, h.unit)}.`;
  }
  const [, most] = extentOf([h.counts], 'log');
  return {
    id: h.id,
    title: h.title,
    caption: words,
    x: {
      label: h.unit === 'strain' ? 'Strain' : 'Sample value',
      unit: h.unit === 'strain' ? '' : h.unit,
      scale: 'linear',
      extent: [h.edges[0], h.edges.at(-1)!],
    },
    y: { label: 'Samples per bin', unit: '', scale: 'log', extent: [0.5, most * 2] },
    traces,
    marks: [],
  };
}
