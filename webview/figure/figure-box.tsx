import { useEffect, useId, useState } from 'preact/hooks';
import type { JSX } from 'preact';
import type { Figure, Viewport } from '../../src/core/figures/figure';
import { Legend } from './legend';
import { pictureOf } from './picture';
import { Plot } from './plot';
import { keyAction } from './keys';
import type { Range } from './ranges';
import type { Readout } from './readout';
import { DataTable } from './table';
import { tablesOf } from './table-of';
import { onThemeChange, readTheme } from './theme';
import { PLOT_MARGIN } from './to-plotly';
import type { Views } from './views';

interface Props {
  /** The whole figure. */
  readonly figure: Figure;
  /** The figure thinned to a zoomed view, if one was asked for and has come. */
  readonly redrawn: Figure | undefined;
  readonly viewKey: string;
  readonly views: Views;
  /** Asks for the figure thinned to another view; the answer comes as `redrawn`. */
  readonly onViewport: (viewport: Viewport) => void;
  readonly onCopy: (text: string, what: string) => void;
  readonly onPicture: (svg: string) => void;
  readonly onLeave: () => void;
  /** Shown as text from the start, and told when that changes, so it survives a rebuilt page. */
  readonly asText: boolean;
  readonly onAsText: (asText: boolean) => void;
  /** What is offered for the stretch of the x axis that a zoomed figure shows. */
  readonly underPlot?: (x: Range) => JSX.Element;
  /** The result the figure belongs to; a new one must be asked for the view again. */
  readonly result: string;
}

const REDRAW_MS = 120;

/** A figure with its legend, buttons, caption, and its table when shown as text; both fill the same reserved place. */
export function FigureBox(p: Props): JSX.Element {
  const { viewKey, views, asText } = p;
  const [readout, setReadout] = useState<Readout>();
  const [, again] = useState(0);
  const [theme, setTheme] = useState(() => readTheme().kind);
  const caption = useId();
  useEffect(() => views.onChange(() => again((n) => n + 1)), [views]);
  useEffect(() => onThemeChange(() => setTheme(readTheme().kind)), []);
  useEffect(() => views.register(viewKey, p.figure), [views, viewKey, p.figure]);
  const view = views.of(viewKey);
  const figure = view.x && p.redrawn ? p.redrawn : p.figure;
  const [from, to] = view.x ?? [];

  useEffect(() => {
    if (from === undefined || to === undefined) return undefined;
    const timer = setTimeout(() => p.onViewport({ width: plotWidth(), x: [from, to] }), REDRAW_MS);
    return () => clearTimeout(timer);
  }, [from, to, viewKey, p.result]);

  const press = (key: string): void => {
    const next = keyAction(key, figure, view);
    if (next) views.set(viewKey, next);
  };
  const isZoomed = view.x !== undefined || view.y !== undefined;
  return (
    <figure class="figure" data-figure={figure.id}>
      <div class="figure-head">
        <span class="figure-title">{figure.title}</span>
        <span class="figure-buttons">
          <button
            type="button"
            class="text-button"
            disabled={asText}
            onClick={() => press('-')}
            aria-label="Zoom out"
          >
            −
          </button>
          <button
            type="button"
            class="text-button"
            disabled={asText}
            onClick={() => press('+')}
            aria-label="Zoom in"
          >
            +
          </button>
          <button
            type="button"
            class="text-button"
            data-action="reset-zoom"
            disabled={!isZoomed}
            onClick={() => views.set(viewKey, {})}
          >
            Reset zoom
          </button>
          <button
            type="button"
            class="text-button"
            data-action="save-picture"
            onClick={() => void pictureOf(figure, view).then(p.onPicture)}
          >
            Save picture
          </button>
          <button
            type="button"
            class="text-button"
            data-action="as-text"
            aria-pressed={asText}
            onClick={() => p.onAsText(!asText)}
          >
            Show as text
          </button>
        </span>
      </div>
      <Legend figure={figure} theme={theme} readout={readout} />
      {asText ? (
        <div class="figure-text">
          {tablesOf(figure).map((t) => (
            <DataTable key={t.id} table={t} onCopy={p.onCopy} first={40} />
          ))}
        </div>
      ) : (
        <Plot
          figure={figure}
          view={view}
          onView={(next) => views.set(viewKey, next)}
          onRead={setReadout}
          describedBy={caption}
          onLeave={p.onLeave}
        />
      )}
      {view.x && p.underPlot?.(view.x)}
      <figcaption id={caption}>{figure.caption}</figcaption>
    </figure>
  );
}

/** Pixels the plotting area has: what figures are thinned to. */
export function plotWidth(): number {
  const plot = document.querySelector('.plot-frame');
  const width = plot ? plot.clientWidth : Math.min(document.documentElement.clientWidth, 1100);
  return Math.max(200, Math.round(width - PLOT_MARGIN.l - PLOT_MARGIN.r));
}
