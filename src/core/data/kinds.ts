import type { GpsTime } from './gps-time';
import type { Span } from './spans';
import type { Table } from './table';

/**
 * Evenly sampled data, read by span so that a long file never has to be in memory at once.
 * Sample `n` was taken at `start + n / rate`.
 */
export interface Series {
  readonly kind: 'series';
  /** What it is, for captions: input name and channel. */
  readonly label: string;
  /** Input it derives from, so that sites and later injections can be traced. */
  readonly channel: string;
  readonly unit: string;
  /** Hz */
  readonly rate: number;
  readonly start: GpsTime;
  readonly length: number;
  /** Runs of samples that are finite and meant to be used; everything else must not enter a result. */
  readonly valid: readonly Span[];
  /** Copies samples `[from, to)` into `into` (or a new array) and returns it; invalid samples read as NaN. */
  read(from: number, to: number, into?: Float64Array): Float64Array;
}

export type AverageKind = 'mean' | 'median' | 'median-mean';

/** One-sided power spectral density. */
export interface Spectrum {
  readonly kind: 'spectrum';
  readonly label: string;
  /** Hz, rising, same length as `density`. */
  readonly frequency: Float64Array;
  /** One-sided density in `unit`. */
  readonly density: Float64Array;
  /** Spacing in Hz, or 0 when the frequencies are not evenly spaced. */
  readonly df: number;
  /** For example "strain²/Hz". */
  readonly unit: string;
  /** How it was estimated; absent for models and for curves read from a file. */
  readonly estimate?: SpectrumEstimate;
}

export interface SpectrumEstimate {
  readonly average: AverageKind;
  readonly segments: number;
  readonly segmentSeconds: number;
  readonly overlap: number;
  readonly window: string;
  /** Equivalent noise bandwidth of the window in Hz. */
  readonly enbw: number;
  /** Standard deviation of one bin divided by its mean, from the window and the overlap (Welch 1967). */
  readonly relativeError: number;
  /** Factors on the density that bound the central 90 % of one bin. */
  readonly band: readonly [low: number, high: number];
  /** GPS span used. */
  readonly start: GpsTime;
  readonly duration: number;
  readonly rate: number;
}

/** A first inspection of a series. */
export interface Overview {
  readonly kind: 'overview';
  readonly series: Series;
  readonly stats: SampleStats;
  /** Smallest and largest sample per cell of `cell` samples; NaN where a cell has no valid sample. */
  readonly envelope: Envelope;
  readonly histogram: { readonly edges: Float64Array; readonly counts: Float64Array };
}

export interface Envelope {
  readonly cell: number;
  readonly low: Float64Array;
  readonly high: Float64Array;
}

export interface SampleStats {
  readonly count: number;
  readonly notFinite: number;
  readonly saturated: number;
  readonly min: number;
  readonly max: number;
  readonly mean: number;
  /** Root mean square about zero. */
  readonly rms: number;
}

/** Every kind of data a step can give or take; steps that come later add theirs here. */
export interface DataKinds {
  series: Series;
  spectrum: Spectrum;
  overview: Overview;
  table: Table;
}

export type DataKind = keyof DataKinds;
export type AnyData = DataKinds[DataKind];
