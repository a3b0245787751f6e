import type { Figure, Trace } from '../src/core/figures/figure';
import type { ThemeKind } from '../src/core/figures/colours';
import type { PlotlyLibrary } from './figure/plotly-types';
import { toPlotly } from './figure/to-plotly';

declare const Plotly: PlotlyLibrary;

/** JSON has lists where the figures had typed arrays, and null for NaN. */
function revive(trace: Trace): Trace {
  const entries = Object.entries(trace).map(([k, v]) => [
    k,
    k === 'labels' || (trace.type === 'image' && (k === 'x' || k === 'y'))
      ? (v as unknown)
      : Array.isArray(v)
        ? Float64Array.from(v as (number | null)[], (x) => x ?? NaN)
        : (v as unknown),
  ]);
  return Object.fromEntries(entries) as Trace;
}

const dark = matchMedia('(prefers-color-scheme: dark)');
const contrast = matchMedia('(prefers-contrast: more)');
const printing = matchMedia('print');

function themeKind(): ThemeKind {
  const isDark = dark.matches && !printing.matches;
  if (contrast.matches) return isDark ? 'contrast-dark' : 'contrast-light';
  return isDark ? 'dark' : 'light';
}

async function draw(): Promise<void> {
  const source = document.getElementById('figures')?.textContent ?? '[]';
  const figures = (JSON.parse(source) as Figure[]).map((f) => ({ ...f, traces: f.traces.map(revive) }));
  const style = getComputedStyle(document.body);
  const value = (name: string): string => style.getPropertyValue(name).trim();
  const theme = {
    kind: themeKind(),
    text: value('--text'),
    muted: value('--muted'),
    grid: value('--grid'),
    ground: value('--ground'),
    font: style.fontFamily,
    fontSize: 12,
    still: true,
  };
  for (const box of document.querySelectorAll<HTMLElement>('[data-figure]')) {
    const figure = figures.at(Number(box.dataset['figure']));
    const plot = box.querySelector<HTMLElement>('.plot');
    if (!figure || !plot) continue;
    const { data, layout } = toPlotly(figure, {}, theme);
    const named = data.map((t) => ({ ...t, showlegend: true, hoverinfo: 'x+y' }));
    await Plotly.react(
      plot,
      named,
      {
        ...layout,
        showlegend: data.length > 1,
        legend: { orientation: 'h', y: 1.08 },
        margin: { l: 72, r: 14, t: 28, b: 44 },
      },
      { displaylogo: false, responsive: true, modeBarButtonsToRemove: ['select2d', 'lasso2d'] },
    );
  }
  document.body.dataset['drawn'] = String(figures.length);
}

void draw();
for (const query of [dark, contrast, printing]) query.addEventListener('change', () => void draw());
