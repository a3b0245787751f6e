import type { Series } from '../data/kinds';
import type { Quantity, Warning } from '../data/quantity';
import { spanLength } from '../data/spans';
import { numberText, withUnit } from '../figures/number-text';
import type { Ratio } from '../kernels/resample-poly-ratio';

export interface ResampleFacts {
  readonly from: Series;
  readonly to: Series;
  readonly ratio: Ratio;
  /** Taps of the filter on the common grid of both rates; 1 when nothing is done. */
  readonly taps: number;
  /** Seconds dropped at each end of a valid span. */
  readonly edge: number;
  /** Hz: gain ½; gain within 1 % below; stop band from. */
  readonly cutoff: number;
  readonly clean: number;
  readonly stop: number;
  /** Attenuation in the stop band, at least. */
  readonly decibel: number;
  readonly rms: number;
}

export function resampleNumbers(f: ResampleFacts): Quantity[] {
  return [
    { id: 'rate', label: 'Sample rate', value: f.to.rate, unit: 'Hz' },
    { id: 'up', label: 'Up', value: f.ratio.up, unit: '', convention: 'new rate = old rate · up/down' },
    { id: 'down', label: 'Down', value: f.ratio.down, unit: '', convention: 'new rate = old rate · up/down' },
    {
      id: 'taps',
      label: 'Filter',
      value: f.taps,
      unit: 'taps',
      convention: 'on the common grid of both rates',
    },
    { id: 'cutoff', label: 'Cut-off', value: f.cutoff, unit: 'Hz', convention: 'gain ½ (−6 dB)' },
    { id: 'clean', label: 'Clean to', value: f.clean, unit: 'Hz', convention: 'gain within 1 % of 1 below' },
    {
      id: 'stop',
      label: 'Stop band from',
      value: f.stop,
      unit: 'Hz',
      convention: `at least ${f.decibel} dB down above`,
    },
    { id: 'edge', label: 'Dropped', value: f.edge, unit: 's', convention: 'at each end of a valid span' },
    {
      id: 'kept',
      label: 'Valid',
      value: spanLength(f.to.valid) / f.to.rate,
      unit: 's',
      convention: 'samples over rate',
    },
    {
      id: 'rms',
      label: 'RMS',
      value: f.rms,
      unit: f.to.unit,
      convention: 'about zero, of the valid samples',
    },
  ];
}

/** Share of the valid time lost from which on it is worth a word. */
const LOST = 0.2;

export function resampleWarnings(f: ResampleFacts): Warning[] {
  return [...same(f), ...upsampled(f), ...lost(f)];
}

function same({ taps, to }: ResampleFacts): Warning[] {
  if (taps !== 1) return [];
  return [
    {
      code: 'same-rate',
      severity: 'note',
      found: `the data already have ${withUnit(to.rate, 'Hz', 9)}`,
      value: to.rate,
      consequence: 'The step changes nothing.',
      remedy: 'Set another "rate", or take the step out.',
    },
  ];
}

function upsampled({ from, to, cutoff }: ResampleFacts): Warning[] {
  if (!(to.rate > from.rate)) return [];
  return [
    {
      code: 'upsampled',
      severity: 'caution',
      found: `the new rate of ${withUnit(to.rate, 'Hz', 9)} is above the data's own ${withUnit(from.rate, 'Hz', 9)}`,
      value: to.rate / from.rate,
      consequence: `Nothing new appears: above ${withUnit(cutoff, 'Hz', 9)} there is only what the filter lets through, and neighbouring samples are no longer independent. A spectrum is empty there; whitening must end below.`,
      remedy: `Bring the other data down to ${withUnit(from.rate, 'Hz', 9)} instead, or keep every band below ${withUnit(cutoff, 'Hz', 9)}.`,
    },
  ];
}

function lost({ from, to, edge }: ResampleFacts): Warning[] {
  const share = 1 - spanLength(to.valid) / to.rate / (spanLength(from.valid) / from.rate);
  if (!(share > LOST)) return [];
  return [
    {
      code: 'mostly-edges',
      severity: 'caution',
      found: `${numberText(100 * share, 3)} % of the valid data are edges: ${withUnit(edge, 's')} on either side of each gap`,
      value: share,
      consequence: 'They are not used by later steps.',
      remedy: 'Take a longer span, or one with fewer gaps.',
    },
  ];
}
