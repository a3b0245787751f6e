import type { Figure } from '../../src/core/figures/figure';
import { figureLibrary } from './library';
import type { View } from './ranges';
import type { Theme } from './theme';
import { toPlotly } from './to-plotly';

const PAPER: Theme = {
  kind: 'light',
  text: '#1a1a1a',
  muted: '#5a5a5a',
  grid: '#dddddd',
  ground: '#ffffff',
  font: 'sans-serif',
  fontSize: 13,
};
const SIZE = { width: 900, height: 480 } as const;

/** The figure as SVG text on white, whatever the editor's theme is, so that it can be printed. */
export async function pictureOf(figure: Figure, view: View): Promise<string> {
  const library = await figureLibrary();
  const { data, layout } = toPlotly(figure, view, PAPER, { width: SIZE.width });
  const url = await library.toImage(
    {
      data: data.map((t) => ({ ...t, showlegend: true })),
      layout: {
        ...layout,
        ...SIZE,
        autosize: false,
        showlegend: data.length > 1,
        legend: { orientation: 'h', y: 1.02, yanchor: 'bottom', x: 0, bgcolor: 'rgba(0, 0, 0, 0)' },
        margin: { l: 84, r: 20, t: 64, b: 52 },
        title: { text: figure.title, x: 0.02, font: { size: 15 } },
      },
    },
    { format: 'svg', ...SIZE },
  );
  return decodeURIComponent(url.slice(url.indexOf(',') + 1));
}
