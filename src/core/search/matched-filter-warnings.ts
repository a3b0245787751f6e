import { compareGps, addSeconds, formatGps } from '../data/gps-time';
import type { SnrSeries, Spectrum } from '../data/kinds';
import type { Warning } from '../data/quantity';
import { spanLength } from '../data/spans';
import { numberText } from '../figures/number-text';
import { densityUnit } from '../noise/units';
import { noiseLevel, timeOf } from './matched-filter-numbers';
import { RAYLEIGH_MEDIAN, type RayleighFacts } from './peaks';

/** Relative departures from what Gaussian noise gives that are worth a word. */
const MEDIAN_OFF = 0.1;
const VARIANCE_OFF = 0.1;
/** Share of the valid samples lost at edges. */
const LOST = 0.5;
/** Loudness over the level noise reaches from which a peak counts as a signal. */
const STANDS_OUT = 1.2;

export interface FilterWarningFacts {
  readonly snr: SnrSeries;
  readonly spectrum: Spectrum;
  readonly rayleigh: RayleighFacts;
  readonly variance: number;
  readonly asked: readonly [low: number, high: number | null];
  readonly reach: number;
}

export function filterWarnings(w: FilterWarningFacts): Warning[] {
  return [...ownSignal(w), ...unit(w), ...notRayleigh(w), ...lines(w), ...narrowed(w), ...lost(w)];
}

/** A signal inside the data its noise was estimated from counts as noise against itself, unless the average is robust. */
function ownSignal({ snr, spectrum }: FilterWarningFacts): Warning[] {
  const e = spectrum.estimate;
  const top = snr.peaks.at(0);
  if (e?.average !== 'mean' || !top || top.snr < STANDS_OUT * noiseLevel(snr)) return [];
  const at = timeOf(snr, top.at);
  if (compareGps(at, e.start) < 0 || compareGps(at, addSeconds(e.start, e.duration)) >= 0) return [];
  return [
    {
      code: 'own-signal-in-noise',
      severity: 'caution',
      found: `the peak of ${numberText(top.snr)} at GPS ${formatGps(at)} lies within the span its noise was estimated from, by the mean of ${e.segments} segments`,
      value: top.snr,
      consequence:
        'If it is a signal, it was counted as noise against itself: its ratio is too low, the more so the fewer the segments (a ratio of 25 in 8 s read 21.5).',
      remedy: 'Set "average" of the noise spectrum to "median", or leave the span of the peak out of it.',
    },
  ];
}

function unit({ snr, spectrum }: FilterWarningFacts): Warning[] {
  const wanted = densityUnit(snr.filter.series.unit);
  if (wanted === spectrum.unit) return [];
  return [
    {
      code: 'unit-mismatch',
      severity: 'problem',
      found: `the data have the unit "${snr.filter.series.unit}", which makes a density in ${wanted}, but the spectrum is in ${spectrum.unit}`,
      consequence: 'The ratio is scaled wrongly unless both mean the same.',
      remedy: 'Give the unit of the input, or use a spectrum of these data.',
    },
  ];
}

function notRayleigh({ rayleigh, variance }: FilterWarningFacts): Warning[] {
  const off = rayleigh.median / (RAYLEIGH_MEDIAN * Math.sqrt(variance)) - 1;
  if (!(Math.abs(off) > MEDIAN_OFF)) return [];
  return [
    {
      code: 'not-rayleigh',
      severity: 'caution',
      found: `the median of |SNR| is ${numberText(rayleigh.median)}, ${numberText(100 * Math.abs(off), 2)} % ${off > 0 ? 'above' : 'below'} that of Gaussian noise with the spectrum used`,
      value: rayleigh.median,
      consequence: `Every ratio is too ${off > 0 ? 'large' : 'small'} by about as much: the spectrum does not describe the noise of these data.`,
      remedy: 'Use a spectrum estimated from the same data, and check that its segments are long enough.',
    },
  ];
}

function lines({ variance, reach }: FilterWarningFacts): Warning[] {
  if (!(variance > 1 + VARIANCE_OFF)) return [];
  const longer = 2 * reach;
  return [
    {
      code: 'lines-not-resolved',
      severity: 'caution',
      found: `with an inverse spectrum that reaches ${numberText(reach)} s, narrow lines pass: each phase has ${numberText(variance, 3)} times the variance it should have`,
      value: variance,
      consequence:
        'Noise reaches higher ratios than it should, and loud peaks are not as improbable as stated.',
      remedy: `Raise "reach" to ${numberText(longer)} s, or take the lines out first.`,
      fix: { kind: 'set', label: `Reach ${numberText(longer)} s`, params: { reach: longer } },
    },
  ];
}

function narrowed({ snr, spectrum, asked }: FilterWarningFacts): Warning[] {
  const { low, high } = snr.filter;
  const first = spectrum.frequency[0];
  const last = spectrum.frequency.at(-1)!;
  const byLow = asked[0] < first && low >= first;
  const byHigh = asked[1] !== null && asked[1] > last && high <= last;
  if (!byLow && !byHigh) return [];
  return [
    {
      code: 'band-narrowed',
      severity: 'note',
      found: `the spectrum covers ${numberText(first)} to ${numberText(last)} Hz, so the band filtered is ${numberText(low)} to ${numberText(high)} Hz`,
      consequence: 'What the signal has outside of it does not count.',
      remedy: 'Use a spectrum that covers the band.',
    },
  ];
}

function lost({ snr }: FilterWarningFacts): Warning[] {
  const usable = spanLength(snr.filter.series.valid);
  const share = 1 - spanLength(snr.valid) / usable;
  if (!(share > LOST)) return [];
  const { lead, tail, fade } = snr.filter;
  return [
    {
      code: 'mostly-edges',
      severity: 'caution',
      found: `${numberText(100 * share, 3)} % of the valid data are edges: ${numberText((lead + fade) / snr.rate)} s before and ${numberText((tail + fade) / snr.rate)} s after each gap`,
      value: share,
      consequence: 'Signals there are not seen.',
      remedy: 'Take a longer span, raise "low", or lower "reach".',
    },
  ];
}
