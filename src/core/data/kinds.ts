import type { GpsTime } from './gps-time';
import type { SampleScan } from './scan';
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
  /** The file does not say when it was taken: `start` counts from GPS 0 and means nothing. */
  readonly startUnknown?: boolean;
  readonly length: number;
  /** Runs of samples that are finite and meant to be used; everything else must not enter a result. */
  readonly valid: readonly Span[];
  /** Samples that exist but that a filter's edge has spoilt: hatched in pictures, never in `valid`. */
  readonly spoilt?: readonly Span[];
  /** Valid samples that a gate has turned down or to zero: a spectrum or a candidate there is not that of the detector. */
  readonly gates?: readonly Span[];
  /** Things every later card must repeat: "contains an injection". */
  readonly notes?: readonly string[];
  /** What the one pass over an input found; absent on series that a step made. */
  readonly scan?: SampleScan;
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

/** A narrow feature standing above the noise floor. */
export interface NoiseLine {
  /** Hz, with its standard error. */
  readonly frequency: number;
  readonly frequencyError: number;
  /** Full width at half height in Hz, corrected for the window where it is resolved. */
  readonly width: number;
  /** True when the width is not wider than the window's own, so that only an upper limit is known. */
  readonly unresolved: boolean;
  /** Peak density over the local floor. */
  readonly height: number;
  /** Power in the line: `strain²` for strain data. */
  readonly power: number;
  /** frequency / width; a lower limit when unresolved. */
  readonly q: number;
  readonly family?: { readonly fundamental: number; readonly harmonic: number };
  readonly stability: 'stable' | 'drifting' | 'not tested';
}

export interface LineList {
  readonly kind: 'lines';
  readonly label: string;
  readonly lines: readonly NoiseLine[];
  /** The spectrum they were found in and the floor they stand above. */
  readonly spectrum: Spectrum;
  readonly floor: Float64Array;
}

/**
 * Energy over time and frequency. Rows may have cells of their own length (a constant-Q map) or share one (a
 * spectrogram). Cells are half-open and drawn on their edges.
 */
export interface TimeFrequencyMap {
  readonly kind: 'map';
  readonly label: string;
  readonly start: GpsTime;
  readonly duration: number;
  /** What a value is: "energy, mean 1 in Gaussian noise" or a density with its unit. */
  readonly quantity: string;
  readonly unit: string;
  readonly planes: readonly MapPlane[];
  /** Stretches without valid data, in seconds after `start`. */
  readonly holes: readonly { readonly from: number; readonly to: number }[];
  /** Input it derives from. */
  readonly channel: string;
  readonly notes?: readonly string[];
  /** Of a constant-Q map: the loudest tiles, loudest first, and how many tiles were tried. */
  readonly loud?: readonly LoudTile[];
  readonly trials?: number;
}

/** A tile of a constant-Q map that stands out. */
export interface LoudTile {
  /** Seconds after the start of the map. */
  readonly time: number;
  /** Hz */
  readonly frequency: number;
  /** Frequency over the standard deviation of the squared window in frequency. */
  readonly q: number;
  /** Mean 1 and exponential in Gaussian noise. */
  readonly energy: number;
}

export interface MapPlane {
  /** Quality factor of a constant-Q plane; absent for a spectrogram. */
  readonly q?: number;
  readonly rows: readonly MapRow[];
}

export interface MapRow {
  /** Centre and edges in Hz. */
  readonly frequency: number;
  readonly low: number;
  readonly high: number;
  /** Seconds after `start` of the left edge of cell 0, and length of a cell. */
  readonly offset: number;
  readonly cell: number;
  /** NaN where there is no valid data. */
  readonly values: Float32Array;
}

/** Values against time at a slow rate: drift of band power, of reach. */
export interface Trend {
  readonly kind: 'trend';
  readonly label: string;
  readonly start: GpsTime;
  /** Seconds after start of the centre of each value. */
  readonly time: Float64Array;
  readonly curves: readonly TrendCurve[];
}

export interface TrendCurve {
  readonly id: string;
  readonly label: string;
  readonly unit: string;
  readonly values: Float64Array;
  /** Standard deviation expected from the estimate alone, if noise were stationary. */
  readonly expected: number;
}

/** A dimensionless statistic against frequency with what is expected of it: coherence, ratio of spectra, Gaussianity. */
export interface FrequencyStatistic {
  readonly kind: 'statistic';
  readonly label: string;
  readonly quantity: string;
  readonly frequency: Float64Array;
  readonly values: Float64Array;
  readonly expected: number;
  /** Central band expected by chance, and with what probability. */
  readonly low: number;
  readonly high: number;
  readonly probability: number;
}

/**
 * A signal as its Fourier transform (kernel e^(−2πift), strain/Hz), detector-frame masses, as a detector straight below a
 * source seen face on would record it: h = h₊. The time t = 0 is at `origin`.
 */
export interface Waveform {
  readonly kind: 'waveform';
  readonly label: string;
  /** "inspiral", "file" and the like. */
  readonly model: string;
  readonly facts: readonly WaveformFact[];
  /** Mpc (luminosity distance) at which `re`, `im` and `at` are stated; strain goes with 1/distance. Absent when the amplitude is its own. */
  readonly distance?: number;
  /** What orientation the amplitude is for: "face on, straight above (optimal)". */
  readonly reference: string;
  /** Circular: h̃× = −i h̃₊ for f > 0. Linear: h× = 0. Both: each is its own. */
  readonly polarisation: 'circular' | 'linear' | 'both';
  /** Quadrupole radiation: seen at inclination ι, h₊ goes with (1 + cos²ι)/2 and h× with cos ι. */
  readonly quadrupole: boolean;
  /** h̃₊ on bins k · df from 0 Hz. */
  readonly df: number;
  readonly re: Float64Array;
  readonly im: Float64Array;
  /** Hz; h̃ is zero outside. */
  readonly low: number;
  readonly high: number;
  /** Seconds before and after t = 0 that hold the signal but for a negligible part, and their sum. */
  readonly before: number;
  readonly after: number;
  readonly duration: number;
  /** What happens at t = 0: "coalescence", "amplitude peak". */
  readonly origin: string;
  readonly notes?: readonly string[];
  /** h̃ at any frequencies ≥ 0 Hz in strain/Hz, from the model itself, not from the bins. */
  at(
    frequency: Float64Array,
    which?: 'plus' | 'cross',
  ): { readonly re: Float64Array; readonly im: Float64Array };
}

/** A parameter a waveform was made with. */
export interface WaveformFact {
  readonly id: string;
  readonly label: string;
  readonly value: number | string;
  readonly unit: string;
}

/** Complex signal-to-noise ratio against time for one template, one value per sample of the series it came from. */
export interface SnrSeries {
  readonly kind: 'snr';
  readonly label: string;
  readonly channel: string;
  /** Hz */
  readonly rate: number;
  readonly start: GpsTime;
  readonly startUnknown?: boolean;
  readonly length: number;
  /** (s|h)/σ for both phases of the template: in Gaussian noise each part has mean 0 and variance 1. NaN outside `valid`. */
  readonly re: Float64Array;
  readonly im: Float64Array;
  readonly valid: readonly Span[];
  /** Samples whose value would rest on data beyond an edge. */
  readonly spoilt: readonly Span[];
  readonly notes?: readonly string[];
  /** The loudest maxima, loudest first. */
  readonly peaks: readonly SnrPeak[];
  readonly template: SnrTemplate;
  readonly filter: SnrFilter;
}

/** A local maximum of |SNR|. */
export interface SnrPeak {
  /** Sample index, fractional. */
  readonly at: number;
  readonly snr: number;
  /** Radians in (−π, π]. */
  readonly phase: number;
}

/** The template of an `SnrSeries`; the time of a value is that of the template's t = 0. */
export interface SnrTemplate {
  readonly label: string;
  /** What happens at its t = 0: "coalescence". */
  readonly origin: string;
  /** σ = √(h|h) at `distance`. */
  readonly sigma: number;
  /** Mpc; absent when the template has an amplitude of its own. */
  readonly distance?: number;
}

/** All that is needed to take the filter apart again: χ² bands, expected shape of the peak. */
export interface SnrFilter {
  readonly series: Series;
  /** Samples per block; bins every rate / size Hz, size / 2 + 1 of them. */
  readonly size: number;
  /** h̃(f) in strain/Hz, t = 0 at the first sample. */
  readonly re: Float64Array;
  readonly im: Float64Array;
  /** 1/S(f) as used: truncated in time, zero outside the band. */
  readonly inverse: Float64Array;
  /** Hz */
  readonly low: number;
  readonly high: number;
  /** Independent values per second: (Σw)²/Σw² Δf with w = |h̃|²/S; and root mean square of f about its mean under w, Hz. */
  readonly bandwidth: number;
  readonly spread: number;
  /** Samples before and after a value that enter it, and over which a block's ends are faded. */
  readonly lead: number;
  readonly tail: number;
  readonly fade: number;
}

/** Whether peaks of an `SnrSeries` look like the template in noise. */
export interface Consistency {
  readonly kind: 'consistency';
  readonly label: string;
  readonly notes?: readonly string[];
  readonly peaks: readonly ConsistentPeak[];
}

export interface ConsistentPeak {
  readonly time: GpsTime;
  readonly snr: number;
  readonly chiSquared: number;
  /** Degrees of freedom, two per band less two. */
  readonly freedom: number;
  /** Probability of a χ² at least as large in Gaussian noise with this signal. */
  readonly pValue: number;
  readonly reweighted: number;
  /** Edges of the bands in Hz and what each adds to χ²; its mean is 2 (1 − share). */
  readonly edges: Float64Array;
  readonly parts: Float64Array;
  /** Seconds from the peak, |SNR| there, and what the template alone would give. */
  readonly lag: Float64Array;
  readonly around: Float64Array;
  readonly expected: Float64Array;
  /** Mean square of SNR less expected shape over its mean in Gaussian noise: 1 expected. */
  readonly shape: number;
  readonly shapePValue: number;
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

/** Templates placed so that any signal of a mass region loses little to the nearest one. */
export interface TemplateBank {
  readonly kind: 'bank';
  readonly label: string;
  /** Band the metric was taken over and the frequency f₀ chirp times are stated at, in Hz. */
  readonly low: number;
  readonly high: number;
  readonly referenceFrequency: number;
  /** Least overlap wanted between a signal of the region and its best template. */
  readonly minimalMatch: number;
  /** g_ij in (τ₀, τ₃), 1/s²: mismatch = g_ij Δτ^i Δτ^j. Owen & Sathyaprakash 1999. */
  readonly metric: readonly [g00: number, g03: number, g33: number];
  /** One value per template: masses in M☉ (mass1 ≥ mass2, detector frame) and chirp times in s. */
  readonly mass1: Float64Array;
  readonly mass2: Float64Array;
  readonly tau0: Float64Array;
  readonly tau3: Float64Array;
  /** Outline of the region in chirp times, closed. */
  readonly outline: { readonly tau0: Float64Array; readonly tau3: Float64Array };
}

/** A place where some template of a bank stands out, one per cluster. */
export interface Trigger {
  readonly time: GpsTime;
  readonly snr: number;
  /** Radians, as of the matched filter at that time. */
  readonly phase: number;
  /** Index into the bank, and what it stands for: M☉ and seconds. */
  readonly template: number;
  readonly mass1: number;
  readonly mass2: number;
  readonly tau0: number;
  readonly tau3: number;
  /** SNR of the template at 1 Mpc, optimally placed, and the distance in Mpc that gives `snr`. */
  readonly sigma: number;
  readonly effectiveDistance: number;
  readonly chiSquared: number;
  /** Degrees of freedom of `chiSquared`. */
  readonly freedom: number;
  readonly reweighted: number;
}

/** What a bank finds in the data of one site, in order of time. */
export interface TriggerList {
  readonly kind: 'triggers';
  readonly label: string;
  readonly channel: string;
  readonly rate: number;
  readonly start: GpsTime;
  readonly startUnknown?: boolean;
  readonly length: number;
  /** Samples searched: the time in which a trigger could have been found. */
  readonly valid: readonly Span[];
  /** Seconds in `valid`. */
  readonly livetime: number;
  readonly threshold: number;
  /** Seconds: no two triggers are closer. */
  readonly window: number;
  readonly templates: number;
  readonly triggers: readonly Trigger[];
  readonly notes?: readonly string[];
}

/** Every kind of data a step can give or take; steps that come later add theirs here. */
export interface DataKinds {
  series: Series;
  spectrum: Spectrum;
  overview: Overview;
  table: Table;
  lines: LineList;
  map: TimeFrequencyMap;
  trend: Trend;
  statistic: FrequencyStatistic;
  snr: SnrSeries;
  consistency: Consistency;
  waveform: Waveform;
  bank: TemplateBank;
  triggers: TriggerList;
}

export type DataKind = keyof DataKinds;
export type AnyData = DataKinds[DataKind];
