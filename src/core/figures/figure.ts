/** A picture as data: thinned to the viewport, with units and words, drawn by the panel, the report and exports alike. */
export interface Figure {
  readonly id: string;
  readonly title: string;
  /** One sentence that says what is to be seen, also the text alternative. */
  readonly caption: string;
  readonly x: Axis;
  readonly y: Axis;
  readonly traces: readonly Trace[];
  readonly marks: readonly Mark[];
}

export interface Axis {
  readonly label: string;
  readonly unit: string;
  readonly scale: 'linear' | 'log';
  /** Visible range in axis units; absent means all. */
  readonly range?: readonly [number, number];
  /** Axes of the same link group move together. A time axis counts seconds after `epoch` (GPS text). */
  readonly link?: 'time' | 'frequency';
  readonly epoch?: string;
  /** Full extent of the data, so that a zoomed figure can be zoomed out again. */
  readonly extent: readonly [number, number];
}

/** What a trace stands for; the theme picks colour and dash by role, never the step. */
export type TraceRole = 'data' | 'second' | 'third' | 'reference' | 'model' | 'interval';

export type Trace =
  | {
      readonly type: 'line';
      readonly name: string;
      readonly role: TraceRole;
      readonly x: Float64Array;
      readonly y: Float64Array;
    }
  /** Filled between `low` and `high`. */
  | {
      readonly type: 'range';
      readonly name: string;
      readonly role: TraceRole;
      readonly x: Float64Array;
      readonly low: Float64Array;
      readonly high: Float64Array;
    }
  /** Histogram: `edges` has one more entry than `counts`. */
  | {
      readonly type: 'bars';
      readonly name: string;
      readonly role: TraceRole;
      readonly edges: Float64Array;
      readonly counts: Float64Array;
    }
  /**
   * Values over the plane in cells that are even along both axes as they are drawn (on a logarithmic axis: even in its
   * logarithm). NaN where there is none.
   */
  | {
      readonly type: 'image';
      readonly name: string;
      readonly role: TraceRole;
      /** Edges of the picture in axis units. */
      readonly x: readonly [number, number];
      readonly y: readonly [number, number];
      readonly columns: number;
      readonly rows: number;
      /** Row by row, the lowest first. */
      readonly values: Float32Array;
      /** What a value is, its unit, and the values at the ends of the colour map. */
      readonly quantity: string;
      readonly unit: string;
      readonly low: number;
      readonly high: number;
      readonly scale: 'linear' | 'log';
    }
  /** Single places that mean something, drawn as open rings. */
  | {
      readonly type: 'points';
      readonly name: string;
      readonly role: TraceRole;
      readonly x: Float64Array;
      readonly y: Float64Array;
      /** What each is. */
      readonly labels: readonly string[];
    };

/** A stretch of the x axis that means something: a gap, a cropped edge, the span of a candidate. */
export interface Mark {
  readonly role: 'gap' | 'cropped' | 'saturated' | 'event';
  readonly from: number;
  readonly to: number;
  readonly label: string;
}

/** What part of a figure is visible and how wide it is drawn. */
export interface Viewport {
  /** Pixels available for the plotting area; figures keep at most two points per pixel column. */
  readonly width: number;
  readonly x?: readonly [number, number];
}

export const DEFAULT_VIEWPORT: Viewport = { width: 900 };
