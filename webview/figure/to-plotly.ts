import type { Axis, Figure, Mark, Trace } from '../../src/core/figures/figure';
import { fillOf, markStyle, strokeOf } from '../../src/core/figures/colours';
import { imageUrl, type ImageTrace } from '../../src/core/figures/image';
import type { PlotlyLayout, PlotlyTrace } from './plotly-types';
import { inPlace, valueRange, type Range, type View } from './ranges';
import type { Theme } from './theme';

/** Config for every plot: our own buttons and keys instead of the library's bar. */
export const PLOT_CONFIG = {
  displayModeBar: false,
  responsive: false,
  doubleClick: false,
  showTips: false,
  scrollZoom: false,
} as const;

/** Room around the plotting area in pixels. */
export const PLOT_MARGIN = { l: 76, r: 14, t: 8, b: 42 } as const;

/**
 * A figure as the library's traces and layout, for a view of it in a theme. The panel writes the title of the value
 * axis above the plot, where it can be long; elsewhere `titles` puts it beside the axis.
 */
export function toPlotly(
  figure: Figure,
  view: View,
  theme: Theme,
  { titles = 'both', width = 900 }: { readonly titles?: 'both' | 'x'; readonly width?: number } = {},
): { data: PlotlyTrace[]; layout: PlotlyLayout } {
  const layout = layoutOf(figure, view, theme, titles === 'both', width);
  return { data: figure.traces.flatMap((t) => traceOf(t, theme)), layout };
}

function traceOf(trace: Trace, theme: Theme): PlotlyTrace[] {
  const { colour, width, dash } = strokeOf(trace.role, theme.kind);
  const common = { name: trace.name, showlegend: false, hoverinfo: 'none' };
  switch (trace.type) {
    case 'line':
      return [
        {
          ...common,
          type: 'scatter',
          mode: 'lines',
          x: trace.x,
          y: trace.y,
          connectgaps: false,
          line: { color: colour, width, dash, simplify: false },
        },
      ];
    case 'range': {
      const { x, y } = outline(trace.x, trace.low, trace.high);
      const interval = trace.role === 'interval';
      return [
        {
          ...common,
          type: 'scatter',
          mode: 'lines',
          x,
          y,
          fill: 'toself',
          fillcolor: fillOf(trace.role, theme.kind),
          line: { color: colour, width: interval ? 0 : 1, simplify: false },
          hoverinfo: 'skip',
        },
      ];
    }
    case 'bars': {
      const centre = Float64Array.from(trace.counts, (_, i) => (trace.edges[i] + trace.edges[i + 1]) / 2);
      const widths = Float64Array.from(trace.counts, (_, i) => trace.edges[i + 1] - trace.edges[i]);
      return [
        {
          ...common,
          type: 'bar',
          x: centre,
          y: trace.counts,
          width: widths,
          marker: { color: fillOf(trace.role, theme.kind), line: { color: colour, width: 0 } },
        },
      ];
    }
    case 'points':
      return [
        {
          ...common,
          type: 'scatter',
          mode: 'markers',
          x: trace.x,
          y: trace.y,
          marker: { symbol: 'circle-open', size: 12, color: colour, line: { color: colour, width: 2 } },
        },
      ];
    case 'image':
      // The picture itself is part of the layout; an unseen line along its bottom lets the pointer find its columns.
      return [
        {
          ...common,
          type: 'scatter',
          mode: 'lines',
          x: columnCentres(trace),
          y: new Float64Array(trace.columns).fill(trace.y[0]),
          line: { color: 'rgba(0, 0, 0, 0)', width: 1 },
        },
      ];
  }
}

/** Middle of each column of an image in axis units; time axes are linear. */
function columnCentres({ x: [from, to], columns }: ImageTrace): Float64Array {
  return Float64Array.from({ length: columns }, (_, i) => from + ((i + 0.5) * (to - from)) / columns);
}

/** An image in the plane of the axes, behind everything else. */
function pictureIn(trace: ImageTrace, { x, y }: Figure, theme: Theme): Record<string, unknown> {
  const [left, right] = inPlace(trace.x, x);
  const [bottom, top] = inPlace(trace.y, y);
  return {
    source: imageUrl(trace, theme.kind),
    xref: 'x',
    yref: 'y',
    x: left,
    y: top,
    sizex: right - left,
    sizey: top - bottom,
    sizing: 'stretch',
    layer: 'below',
  };
}

/** Closed outlines, one per unbroken stretch, since a fill between two lines bridges their gaps. */
export function outline(
  x: Float64Array,
  low: Float64Array,
  high: Float64Array,
): { x: number[]; y: (number | null)[] } {
  const outX: number[] = [];
  const outY: (number | null)[] = [];
  const good = (i: number): boolean => Number.isFinite(low[i]) && Number.isFinite(high[i]);
  for (let i = 0; i < x.length; i++) {
    if (!good(i)) continue;
    let end = i;
    while (end < x.length && good(end)) end++;
    if (outX.length > 0) {
      outX.push(x[i]);
      outY.push(null);
    }
    for (let k = i; k < end; k++) {
      outX.push(x[k]);
      outY.push(high[k]);
    }
    for (let k = end - 1; k >= i; k--) {
      outX.push(x[k]);
      outY.push(low[k]);
    }
    outX.push(x[i]);
    outY.push(high[i]);
    i = end;
  }
  return { x: outX, y: outY };
}

function layoutOf(
  figure: Figure,
  view: View,
  theme: Theme,
  valueTitle: boolean,
  width: number,
): PlotlyLayout {
  const x = view.x ?? figure.x.extent;
  const y = view.y ?? valueRange(figure, x);
  return {
    autosize: true,
    margin: { ...PLOT_MARGIN, pad: 0 },
    paper_bgcolor: theme.ground,
    plot_bgcolor: theme.ground,
    font: { family: theme.font, size: theme.fontSize, color: theme.text },
    separators: '.\u202f',
    showlegend: false,
    hovermode: 'x',
    dragmode: 'zoom',
    bargap: 0,
    // Labels with a power of ten are wide; too many would turn or run together.
    xaxis: {
      ...axisOf(figure.x, inPlace(x, figure.x), theme, true),
      nticks: Math.max(3, Math.floor(width / 100)),
    },
    yaxis: { ...axisOf(figure.y, inPlace(y, figure.y), theme, valueTitle), showspikes: false },
    shapes: figure.marks.map((m) => shapeOf(m, theme)),
    images: figure.traces.flatMap((t) => (t.type === 'image' ? [pictureIn(t, figure, theme)] : [])),
  };
}

function axisOf(axis: Axis, range: Range, theme: Theme, titled: boolean): Record<string, unknown> {
  return {
    type: axis.scale,
    range: [...range],
    ...(titled ? { title: { text: axisTitle(axis), standoff: 8, font: { size: theme.fontSize } } } : {}),
    autorange: false,
    gridcolor: theme.grid,
    linecolor: theme.muted,
    tickcolor: theme.muted,
    ticks: 'outside',
    ticklen: 4,
    showline: true,
    mirror: true,
    zeroline: false,
    exponentformat: 'power',
    minexponent: 4,
    separatethousands: false,
    showspikes: true,
    spikemode: 'across',
    spikethickness: 1,
    spikecolor: theme.muted,
    spikedash: 'dot',
    spikesnap: 'hovered data',
    ...(axis.scale === 'log' ? logTicks(range[1] - range[0], theme) : {}),
  };
}

/** Labels at whole decades where there are enough of them, else at 1, 2 and 5, with unlabelled ticks between. */
function logTicks(decades: number, theme: Theme): Record<string, unknown> {
  const minor = { minor: { dtick: 'D1', ticks: 'outside', ticklen: 2, tickcolor: theme.muted } };
  if (decades > 1.6)
    return {
      dtick: Math.ceil(decades / 8),
      // The library writes powers of ten a quarter larger than other labels.
      tickfont: { size: theme.fontSize / 1.25 },
      ...(decades > 8 ? {} : minor),
    };
  return decades > 0.4 ? { dtick: 'D2', ...minor } : {};
}

/** "Frequency [Hz]": label and unit. */
export function axisTitle(axis: Axis): string {
  return axis.unit === '' ? axis.label : `${axis.label} [${axis.unit}]`;
}

function shapeOf(mark: Mark, theme: Theme): Record<string, unknown> {
  const { colour, width, dash, fill } = markStyle(mark.role, theme.kind);
  const thin = mark.from === mark.to;
  return {
    type: thin ? 'line' : 'rect',
    layer: 'below',
    xref: 'x',
    yref: 'paper',
    x0: mark.from,
    x1: mark.to,
    y0: 0,
    y1: 1,
    line: { color: colour, width, dash },
    ...(thin ? {} : { fillcolor: fill }),
  };
}
