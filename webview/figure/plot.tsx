import { useEffect, useRef, useState } from 'preact/hooks';
import type { JSX } from 'preact';
import type { Figure } from '../../src/core/figures/figure';
import { figureLibrary } from './library';
import { keyAction } from './keys';
import type { PlotlyElement } from './plotly-types';
import { isWhole, zoomed, type View } from './ranges';
import { readoutAt, type Readout } from './readout';
import { onThemeChange, readTheme } from './theme';
import { PLOT_CONFIG, toPlotly } from './to-plotly';
import { viewAfter } from './view-after';

interface Props {
  readonly figure: Figure;
  readonly view: View;
  readonly onView: (view: View) => void;
  readonly onRead: (readout: Readout | undefined) => void;
  readonly describedBy: string;
  readonly onLeave: () => void;
}

/** One plot: drawn by the library, moved by pointer or keys. Its place is kept free before it is there. */
export function Plot({ figure, view, onView, onRead, describedBy, onLeave }: Props): JSX.Element {
  const at = useRef<HTMLDivElement>(null);
  const wired = useRef(false);
  const [theme, setTheme] = useState(() => readTheme());
  const [failed, setFailed] = useState<string>();
  const [width, setWidth] = useState(0);
  // Handlers are given to the library once; what they need is read through this.
  const now = useRef({ figure, view, onView, onRead });
  now.current = { figure, view, onView, onRead };

  useEffect(() => onThemeChange(() => setTheme(readTheme())), []);
  useEffect(() => {
    const watch = new ResizeObserver((entries) =>
      setWidth(Math.round(entries.at(-1)?.contentRect.width ?? 0)),
    );
    if (at.current) watch.observe(at.current);
    return () => watch.disconnect();
  }, []);

  useEffect(() => {
    const element = at.current;
    if (!element || width === 0) return;
    let dropped = false;
    figureLibrary()
      .then(async (library) => {
        if (dropped) return;
        const { data, layout } = toPlotly(figure, view, theme, { titles: 'x', width });
        const size = { width, height: element.clientHeight };
        const plot = await library.react(element, data, { ...layout, ...size, autosize: false }, PLOT_CONFIG);
        if (!wired.current) wire(plot);
        wired.current = true;
        element.dataset['drawn'] = 'true';
      })
      .catch((e: unknown) => setFailed(e instanceof Error ? e.message : String(e)));
    return () => {
      dropped = true;
    };
  }, [figure, view, theme, width]);

  useEffect(
    () => () => {
      if (at.current && wired.current) window.Plotly?.purge(at.current);
    },
    [],
  );

  const wire = (plot: PlotlyElement): void => {
    plot.on('plotly_relayout', (change) => {
      const next = viewAfter(now.current.figure, now.current.view, change);
      if (next) now.current.onView(next);
    });
    plot.on('plotly_doubleclick', () => now.current.onView({}));
    plot.on('plotly_hover', (hit) => {
      const x = hit.points.at(0)?.x ?? hit.xvals?.at(0);
      if (x !== undefined) now.current.onRead(readoutAt(now.current.figure, x));
    });
    plot.on('plotly_unhover', () => now.current.onRead(undefined));
  };

  const onKeyDown = (e: KeyboardEvent): void => {
    if (e.key === 'Escape') {
      onLeave();
      return;
    }
    const next = e.ctrlKey || e.metaKey || e.altKey ? undefined : keyAction(e.key, figure, view);
    if (!next) return;
    e.preventDefault();
    e.stopPropagation();
    onView(next);
  };

  // Only with Ctrl, so that a wheel over a plot still scrolls the page.
  const onWheel = (e: WheelEvent): void => {
    if (!e.ctrlKey && !e.metaKey) return;
    e.preventDefault();
    const plot = at.current as
      (HTMLElement & { _fullLayout?: { xaxis?: { p2d(px: number): number; _offset: number } } }) | null;
    const axis = plot?._fullLayout?.xaxis;
    const centre = axis ? axis.p2d(e.clientX - plot.getBoundingClientRect().left - axis._offset) : undefined;
    const x = zoomed(view.x ?? figure.x.extent, e.deltaY < 0 ? 0.7 : 1 / 0.7, figure.x, centre);
    onView(isWhole(x, figure.x) ? withoutX(view) : { ...view, x });
  };

  return (
    <div
      class="plot-frame"
      role="group"
      tabIndex={0}
      aria-label={`Figure: ${figure.title}. Arrow keys move, plus and minus zoom, 0 shows all, Escape leaves.`}
      aria-describedby={describedBy}
      onKeyDown={onKeyDown}
      onWheel={onWheel}
    >
      {failed === undefined ? (
        <div class="plot" ref={at} aria-hidden="true" />
      ) : (
        <p class="plot failure">
          The figure could not be drawn: {failed}. Its numbers are under "Show as text".
        </p>
      )}
    </div>
  );
}

function withoutX(view: View): View {
  return view.y ? { y: view.y } : {};
}
