import type { Warning } from '../data/quantity';
import { counted, numberText } from '../figures/number-text';
import type { Reference } from './reference';

/** Ratio of amplitude densities from which on, or below its inverse, units are more likely wrong than detectors different. */
const FAR = 300;

export interface ReferenceWarningFacts {
  readonly reference: Reference;
  readonly band: readonly [number, number];
  /** Unit of the spectrum drawn with it, when there is one. */
  readonly unit?: string;
  /** Median ratio of amplitude densities in the band; NaN when they have no bin in common. */
  readonly ratio?: number;
  /** Share of the spectrum's bins in the band that the reference covers. */
  readonly covered?: number;
}

export function referenceWarnings(w: ReferenceWarningFacts): Warning[] {
  return [...unit(w), ...far(w), ...uncovered(w), ...fits(w), ...zero(w)];
}

function unit({ unit: given }: ReferenceWarningFacts): Warning[] {
  if (given === undefined || given === 'strain²/Hz' || given === '1/Hz') return [];
  return [
    {
      code: 'unit-differs',
      severity: 'caution',
      found: `the spectrum is in ${given}, the reference in strain²/Hz`,
      consequence: 'Their ratio has no meaning and the two lines do not belong on one axis.',
      remedy: 'Set "unit" of the input to "strain" if it is, with "scale" if it needs one.',
    },
  ];
}

function far({ ratio, unit: given }: ReferenceWarningFacts): Warning[] {
  if (ratio === undefined || !(ratio > 0) || (ratio < FAR && ratio > 1 / FAR)) return [];
  if (given !== 'strain²/Hz' && given !== '1/Hz') return [];
  return [
    {
      code: 'far-from-reference',
      severity: 'caution',
      found: `the estimate is ${numberText(ratio, 3)} times the reference`,
      value: ratio,
      consequence: 'A difference of this size is more often a missing scale than a different detector.',
      remedy: 'Check "scale" of the input, and for a file whether it holds amplitude or power density.',
    },
  ];
}

function uncovered({ covered, band, reference }: ReferenceWarningFacts): Warning[] {
  if (covered === undefined || covered === 1) return [];
  const to = Number.isFinite(reference.range[1]) ? ` to ${numberText(reference.range[1])}` : ' upwards';
  return [
    {
      code: 'band-not-covered',
      severity: 'caution',
      found: `the reference covers ${numberText(100 * covered, 3)} % of the bins from ${numberText(band[0])} to ${numberText(band[1])} Hz: it runs from ${numberText(reference.range[0])} Hz${to}`,
      value: covered,
      consequence:
        covered === 0
          ? 'There is no ratio: a reference is not extrapolated.'
          : 'The ratio is that of the covered part; a reference is not extrapolated.',
      remedy: 'Choose "low" and "high" inside the range of the reference.',
    },
  ];
}

function fits({ reference }: ReferenceWarningFacts): Warning[] {
  if (reference.model?.id.startsWith('second-generation') !== true) return [];
  return [
    {
      code: 'fits-differ',
      severity: 'note',
      found:
        'published fits for the second generation differ by factors of 1.13 to 1.25 in amplitude below 500 Hz and 1.7 at 1 kHz',
      value: 1.25,
      consequence: 'A ratio to this curve is no more certain than that.',
      remedy: 'For a comparison that counts take a measured curve of the detector from a file.',
    },
  ];
}

function zero({ reference }: ReferenceWarningFacts): Warning[] {
  if (reference.skippedZero === 0) return [];
  return [
    {
      code: 'zero-frequency-row',
      severity: 'note',
      found: `${counted(reference.skippedZero, 'row')} at zero frequency passed over`,
      value: reference.skippedZero,
      consequence: 'None for other frequencies: interpolation is in the logarithm of the frequency.',
      remedy: 'Nothing needs to be done.',
    },
  ];
}
