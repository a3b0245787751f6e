import type { Overview } from '../data/kinds';
import type { Span } from '../data/spans';
import { columnsOf, timeAxis } from './axis';
import { keepEnvelope } from './envelope';
import type { Figure, Viewport } from './figure';
import { histogramFigure } from './histogram';
import { seriesFigure, spanMarks } from './series';

/** What the overview step adds to the data kind for its pictures. */
export interface OverviewDetail extends Overview {
  readonly robust: { readonly median: number; readonly width: number };
  readonly saturated: readonly Span[];
}

const hasDetail = (data: Overview): data is OverviewDetail => 'robust' in data && 'saturated' in data;

/** The series against time, and the histogram of its values beside a Gaussian of the same robust width. */
export function overviewFigures(data: Overview, viewport: Viewport): readonly Figure[] {
  const { series, histogram } = data;
  keepEnvelope(series, data.envelope);
  const detail = hasDetail(data) ? data : undefined;
  const columns = columnsOf(timeAxis(series.start, series.length / series.rate, viewport), viewport);
  const width = detail?.robust.width ?? 0;
  return [
    seriesFigure(series, viewport, {
      id: 'trace',
      title: 'Samples against time',
      marks: spanMarks(detail?.saturated ?? [], series, columns, 'saturated', 'saturated run'),
    }),
    histogramFigure({
      id: 'histogram',
      title: 'Histogram of sample values',
      label: series.label,
      unit: series.unit,
      edges: histogram.edges,
      counts: histogram.counts,
      ...(detail && width > 0 ? { gaussian: { centre: detail.robust.median, width } } : {}),
    }),
  ];
}
