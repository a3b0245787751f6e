import { UserError } from '../data/errors';
import type { Spectrum } from '../data/kinds';
import { numberText, withUnit } from '../figures/number-text';
import type { Kernels } from '../kernels/kernels';
import { coveredBand, densityAt } from '../noise/inverse-spectrum';
import { inverseSpectrum } from './matched-filter-inverse';
import type { BlockShape } from './overlap-save';
import type { Template } from './template';

/** Share of the filter's energy that may lie beyond the samples said to enter a value. */
const BEYOND = 1e-6;
/** Samples of a block unless the template needs more, the data have fewer, or the user says otherwise. */
const BLOCK = 2 ** 19;

export interface DesignOptions {
  readonly low: number;
  /** Hz; null means as far as template and samples reach. */
  readonly high: number | null;
  /** Seconds the inverse spectrum reaches to either side. */
  readonly reach: number;
  /** Seconds over which a block's ends are faded. */
  readonly fade: number;
  /** Seconds of a block, or null. */
  readonly block: number | null;
}

/** A matched filter on the grid of its blocks. */
export interface FilterDesign extends BlockShape {
  readonly rate: number;
  readonly band: readonly [low: number, high: number];
  /** h̃ in strain/Hz on bins 0 … size / 2. */
  readonly re: Float64Array;
  readonly im: Float64Array;
  readonly inverse: Float64Array;
  /** √(h|h) with (a|b) = 4 Re ∫ ã b̃* / S df over the band. */
  readonly sigma: number;
  /** Q of {@link correlate}: values are (s|h)/σ for both phases. */
  readonly filter: { readonly re: Float64Array; readonly im: Float64Array };
  /** Independent values per second: (Σw)²/Σw² Δf with w = |h̃|²/S. */
  readonly bandwidth: number;
  /** Root mean square of the frequency about its mean under w, Hz. */
  readonly spread: number;
  /** Variance of each part in noise of exactly this spectrum; 1 but for the truncation of 1/S. */
  readonly variance: number;
}

const nextPowerOfTwo = (n: number): number => 2 ** Math.ceil(Math.log2(Math.max(2, n)));

/**
 * Makes the filter h̃/S on a grid fine enough for it, and finds out how far it reaches in time.
 *
 * @param longest samples of the longest valid span
 * @throws UserError when band, template and data do not fit together
 */
export function designFilter(
  kernels: Kernels,
  template: Template,
  spectrum: Spectrum,
  rate: number,
  longest: number,
  options: DesignOptions,
): FilterDesign {
  const wanted = [
    Math.max(options.low, template.low),
    Math.min(options.high ?? Infinity, template.high, rate / 2),
  ] as const;
  if (!(wanted[1] > wanted[0]))
    throw new UserError(
      'band-empty',
      `no band is left: "low" is ${withUnit(options.low, 'Hz')}, ${template.label} spans ${numberText(template.low)} to ${withUnit(template.high, 'Hz')}, half the sample rate is ${withUnit(rate / 2, 'Hz')}${options.high === null ? '' : `, "high" is ${withUnit(options.high, 'Hz')}`}`,
    );
  const band = coveredBand(spectrum, wanted);
  const largest = nextPowerOfTwo(longest);
  let size =
    options.block === null ? Math.min(BLOCK, largest) : nextPowerOfTwo(Math.round(options.block * rate));
  for (;;) {
    const design = designAt(kernels, template, spectrum, rate, size, band, options);
    const margin = design.lead + design.tail + 2 * design.fade;
    if (margin <= size / 2 || (size >= largest && margin < longest)) return design;
    if (size >= 2 * largest)
      throw new UserError(
        'template-long',
        `${template.label} with its noise filter reaches over ${numberText(margin / rate)} s, more than the longest valid span of ${numberText(longest / rate)} s: take a longer span, raise "low", or lower "reach" (${numberText(options.reach)} s)`,
      );
    size *= 2;
  }
}

function designAt(
  kernels: Kernels,
  template: Template,
  spectrum: Spectrum,
  rate: number,
  size: number,
  band: readonly [number, number],
  options: DesignOptions,
): FilterDesign {
  const inverse = inverseSpectrum(kernels, spectrum, size, rate, band, options.reach);
  const { re, im } = template.bins(size, rate);
  const df = rate / size;
  let sum = 0;
  let squares = 0;
  let noise = 0;
  let first = 0;
  let second = 0;
  for (let k = 0; k < inverse.length; k++) {
    if (inverse[k] === 0) continue;
    const w = (re[k] * re[k] + im[k] * im[k]) * inverse[k];
    sum += w;
    squares += w * w;
    first += w * k;
    second += w * k * k;
    noise += w * inverse[k] * densityAt(spectrum, k * df);
  }
  if (!(sum > 0))
    throw new UserError(
      'template-empty',
      `${template.label} has nothing between ${numberText(band[0])} and ${numberText(band[1])} Hz: widen "low" and "high"`,
    );
  const sigma = Math.sqrt(4 * sum * df);
  const scale = 4 / (size * sigma);
  const filter = {
    re: re.map((v, k) => v * inverse[k] * scale),
    im: im.map((v, k) => v * inverse[k] * scale),
  };
  return {
    size,
    rate,
    band,
    re,
    im,
    inverse,
    sigma,
    filter,
    ...support(kernels, filter, size),
    fade: Math.round(options.fade * rate),
    bandwidth: ((sum * sum) / squares) * df,
    spread: Math.sqrt(Math.max(0, second / sum - (first / sum) ** 2)) * df,
    variance: noise / sum,
  };
}

/** Samples before and after t = 0 outside of which the filter has at most a share `BEYOND` of its energy. */
function support(
  kernels: Kernels,
  filter: { readonly re: Float64Array; readonly im: Float64Array },
  size: number,
): { lead: number; tail: number } {
  const work = kernels.complex(size, 'f64');
  try {
    work.re.set(filter.re);
    work.im.set(filter.im);
    kernels.fftPlan(size, 'f64').backward(work, work);
    const re = work.re.view();
    const im = work.im.view();
    const energy = (i: number): number => re[i] * re[i] + im[i] * im[i];
    let total = 0;
    for (let i = 0; i < size; i++) total += energy(i);
    const limit = (BEYOND / 2) * total;
    const half = size / 2;
    let tail = half - 1;
    for (let beyond = energy(tail); tail > 0 && beyond <= limit; beyond += energy(tail)) tail--;
    let lead = half;
    for (let beyond = energy(size - lead); lead > 0 && beyond <= limit;) {
      lead--;
      if (lead > 0) beyond += energy(size - lead);
    }
    return { lead, tail };
  } finally {
    work.free();
  }
}
