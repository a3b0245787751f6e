import type { Split } from './complex-arrays';
import { fft, ifft, irfft, rfft, type Real } from './fft-convenience';
import type { Backend } from './kernels-backend';
import { plainBackend } from './plain/backend';
import { createSectionsFilter, type SectionRows, type SectionsFilter } from './sections-filter';
import { filterSections, zeroPhase, type FilterOptions } from './sections-run';
import { wasmBackend } from './wasm-backend';
import type { WasmModule } from './wasm-module';
import { createWelch, type Welch, type WelchOptions } from './welch';
import { createCrossSpectrum, type CrossOptions, type CrossSpectrum } from './welch-cross';
import { createMagnitudes, type Magnitudes, type MagnitudesOptions } from './welch-magnitudes';
import { createSegmentTransform, type SegmentOptions, type SegmentTransform } from './welch-segments';

export type { ComplexArray, KernelArray, Precision, Samples, Split } from './complex-arrays';
export type { FftPlan, RfftPlan } from './kernels-backend';
export type { SectionRows, SectionsFilter } from './sections-filter';
export type { Welch, WelchOptions, WelchResult } from './welch';
export type { WelchAverage } from './welch-stores';

/**
 * All numeric kernels on ordinary arrays, and ({@link Backend}) plans and operations on arrays in kernel memory, for
 * work that would suffer from copying. One set per thread.
 *
 * Matched filter without a copy:
 * @example
 * const plan = kernels.fftPlan(n, 'f32');
 * const product = kernels.complex(n, 'f32');   // stays zero above the one-sided spectrum
 * const series = kernels.complex(n, 'f32');
 * kernels.multiplyConj(data, template, product); // both n/2 + 1 long
 * plan.backward(product, series);
 * const { index, value } = kernels.peak(series); // |z|² and where
 */
export interface Kernels extends Backend {
  /** Forward transform of any length: y[k] = Σ x[j] e^(−2πi jk/n). New arrays of the type of the input. */
  fft<A extends Real>(re: A, im: A): Split<A>;
  /** Inverse transform, divided by n. */
  ifft<A extends Real>(re: A, im: A): Split<A>;
  /** One-sided spectrum of n real samples: floor(n/2) + 1 bins. */
  rfft<A extends Real>(x: A): Split<A>;
  /** n real samples from their one-sided spectrum, divided by n. */
  irfft<A extends Real>(re: A, im: A, n: number): A;

  /** Spectra of windowed segments, to share between the accumulators below. */
  createSegmentTransform(options: SegmentOptions): SegmentTransform;
  /** Averaged power per bin by mean, median or median-mean; see {@link Welch}. */
  createWelch(options: WelchOptions): Welch;
  /** Averaged cross-spectrum of two channels. */
  createCrossSpectrum(options: CrossOptions): CrossSpectrum;
  /** Mean and variance of |X| per bin. */
  createMagnitudes(options: MagnitudesOptions): Magnitudes;

  /** Causal filtering by second-order sections; see {@link filterSections}. */
  filterSections(
    rows: SectionRows,
    x: Float64Array,
    options?: FilterOptions,
  ): { y: Float64Array; zf: Float64Array };
  /** Forward and backward filtering; see {@link zeroPhase}. */
  zeroPhase(rows: SectionRows, x: Float64Array, out?: Float64Array): Float64Array;
  /** Causal filter that carries its states from block to block. */
  createSectionsFilter(rows: SectionRows): SectionsFilter;
}

/** Kernels on the compiled module of {@link compileKernels}, or in plain TypeScript when there is none. */
export function createKernels(module: WasmModule | undefined): Kernels {
  const backend = module ? wasmBackend(module) : plainBackend();
  return {
    ...backend,
    fft: (re, im) => fft(backend, re, im),
    ifft: (re, im) => ifft(backend, re, im),
    rfft: (x) => rfft(backend, x),
    irfft: (re, im, n) => irfft(backend, re, im, n),
    createSegmentTransform: (options) => createSegmentTransform(backend, options),
    createWelch: (options) => createWelch(backend, options),
    createCrossSpectrum: (options) => createCrossSpectrum(backend, options),
    createMagnitudes: (options) => createMagnitudes(backend, options),
    filterSections: (rows, x, options) => filterSections(backend, rows, x, options),
    zeroPhase: (rows, x, out) => zeroPhase(backend, rows, x, out),
    createSectionsFilter: (rows) => createSectionsFilter(backend, rows),
  };
}
