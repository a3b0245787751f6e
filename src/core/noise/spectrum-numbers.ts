import type { Spectrum, SpectrumEstimate } from '../data/kinds';
import type { Quantity } from '../data/quantity';
import { numberText } from '../figures/number-text';
import type { BinError } from './bin-error';
import type { SpectrumFacts } from './spectrum-facts';
import { amplitudeUnit, sampleUnit } from './units';

const WELCH = 'Welch, IEEE Trans. Audio Electroacoust. AU-15, 70 (1967)';
const REPORT = 'Heinzel, Rüdiger, Schilling, report of 15 Feb 2002';

const PARSEVAL = {
  mean: 'near 1 when scaling and window are right; smaller where the data drift more slowly than a segment',
  median:
    'near 1 in Gaussian noise; a median counts steady lines up to 1/√(ln 2) = 1.2 times and leaves bursts out',
};

/** The numbers of a noise-spectrum card. */
export function spectrumNumbers(
  spectrum: Spectrum,
  estimate: SpectrumEstimate,
  facts: SpectrumFacts,
  error: BinError,
  deviation: number,
): Quantity[] {
  const amplitude = amplitudeUnit(spectrum.unit);
  const unit = sampleUnit(spectrum.unit);
  const bandText = `${numberText(facts.band[0])} to ${numberText(facts.band[1])} Hz`;
  return [
    {
      id: 'floor',
      label: `Floor, ${bandText}`,
      value: facts.floor,
      unit: amplitude,
      convention: 'one-sided, median of the bins',
      explain: { formula: 'median √S(f) in the band', source: 'common practice, no source' },
    },
    {
      id: 'lowest',
      label: `Lowest bin, ${bandText}`,
      value: facts.lowest,
      unit: amplitude,
      convention: 'one-sided',
    },
    { id: 'lowest-at', label: 'Frequency of the lowest bin', value: facts.lowestAt, unit: 'Hz' },
    {
      id: 'segments',
      label: 'Segments',
      value: estimate.segments,
      unit: '',
      convention: `of ${numberText(estimate.segmentSeconds, 9)} s`,
    },
    {
      id: 'averages',
      label: 'Effective averages',
      value: error.effectiveAverages,
      unit: '',
      convention: 'independent segments whose mean has the same error',
      explain: { formula: '1 / (relative error)²', source: WELCH },
    },
    {
      id: 'relative-error',
      label: 'Relative error of one bin',
      value: error.relative,
      unit: '',
      convention: 'standard deviation of the density over its mean',
      explain: {
        formula:
          estimate.average === 'mean'
            ? '√{(1/K)[1 + 2 Σ (1 − j/K) ρ_j]}, ρ_j = [Σ w(n) w(n + jD) / Σ w²]²'
            : 'standard deviation of the median of K exponential variables, times the overlap sum of Welch 1967',
        source: WELCH,
      },
    },
    {
      id: 'bin-interval',
      label: 'Interval of one bin',
      value: 1,
      unit: '',
      low: error.band[0],
      high: error.band[1],
      convention: 'factors on the power density',
      intervalMeaning: '90 % confidence for the true density over the estimated one',
      explain: { formula: 'ν / χ²(0.95; ν) to ν / χ²(0.05; ν), ν = 2 / (relative error)²', source: WELCH },
    },
    {
      id: 'resolution',
      label: 'Resolution',
      value: estimate.enbw,
      unit: 'Hz',
      convention: `equivalent noise bandwidth of the ${estimate.window} window`,
      explain: { formula: 'rate Σ w² / (Σ w)²', source: REPORT },
    },
    {
      id: 'spacing',
      label: 'Spacing of the bins',
      value: spectrum.df,
      unit: 'Hz',
      convention: 'not the resolution',
    },
    {
      id: 'parseval',
      label: 'Sum of the spectrum',
      value: facts.parseval,
      unit,
      convention: '√ of the one-sided density summed over all bins',
      explain: { formula: '√(Σ S Δf)', source: WELCH },
    },
    { id: 'rms', label: 'Rms of the data used', value: deviation, unit, convention: 'about their mean' },
    ...(deviation > 0
      ? [
          {
            id: 'parseval-ratio',
            label: 'Sum over rms',
            value: facts.parseval / deviation,
            unit: '',
            convention: PARSEVAL[estimate.average === 'mean' ? 'mean' : 'median'],
          },
        ]
      : []),
    {
      id: 'decades',
      label: 'Dynamic range',
      value: facts.decades,
      unit: '',
      convention: 'decades of power density, largest to smallest bin',
    },
    { id: 'zero-bins', label: 'Bins of density zero', value: facts.zeroBins, unit: '' },
  ];
}
