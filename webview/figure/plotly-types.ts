/** The small part of the figure library that is used, since its package brings no types. */
export interface PlotlyLibrary {
  react(
    at: HTMLElement,
    data: readonly PlotlyTrace[],
    layout: PlotlyLayout,
    config: Readonly<Record<string, unknown>>,
  ): Promise<PlotlyElement>;
  purge(at: HTMLElement): void;
  toImage(
    figure: { data: readonly PlotlyTrace[]; layout: PlotlyLayout },
    options: { format: 'png' | 'svg'; width: number; height: number; scale?: number },
  ): Promise<string>;
}

export interface PlotlyElement extends HTMLElement {
  on(event: 'plotly_relayout', handler: (change: Readonly<Record<string, unknown>>) => void): void;
  on(event: 'plotly_hover', handler: (hit: PlotlyHover) => void): void;
  on(event: 'plotly_unhover' | 'plotly_doubleclick', handler: () => void): void;
}

export interface PlotlyHover {
  readonly xvals?: readonly number[];
  readonly points: readonly { readonly x: number }[];
}

export type PlotlyTrace = Readonly<Record<string, unknown>>;
export type PlotlyLayout = Readonly<Record<string, unknown>>;
