import type { AverageKind, Series } from '../data/kinds';
import type { Warning } from '../data/quantity';
import { spanLength } from '../data/spans';
import { counted, numberText, withUnit } from '../figures/number-text';
import type { BinError } from './bin-error';
import type { SegmentPlan } from './segments';
import type { SpectrumFacts } from './spectrum-facts';
import type { Loudest } from './steadiness';
import { amplitudeUnit, densityUnit } from './units';
import type { WelchEstimate } from './welch-estimate';

const FEW = 8;
const LEAKED = 0.1;
const DROPPED = 0.05;
/** Share of the density at the floor from which rounding to float32 matters. */
const ROUNDING = 0.01;

export interface WarningFacts {
  readonly series: Series;
  readonly plan: SegmentPlan;
  readonly estimate: WelchEstimate;
  readonly facts: SpectrumFacts;
  readonly error: BinError;
  readonly average: AverageKind;
  readonly window: string;
  readonly segmentSeconds: number;
  readonly exclude: readonly number[];
  readonly detrended: number;
  /** The octave in which mean and median power of the segments differ most; undefined with too few segments. */
  readonly loudest: Loudest | undefined;
  /** Share of the density in the band that leaked there from afar. */
  readonly leaked: number;
}

/** What the user should know about an estimated spectrum. */
export function spectrumWarnings(w: WarningFacts): Warning[] {
  return [...zero(w), ...few(w), ...leakage(w), ...unsteady(w), ...dropped(w), ...outside(w), ...rounding(w)];
}

function zero({ facts, estimate, detrended }: WarningFacts): Warning[] {
  if (facts.zeroBins === 0) return [];
  const bins = estimate.density.length - detrended;
  return [
    {
      code: 'zero-bins',
      severity: facts.zeroBins === bins ? 'problem' : 'caution',
      found: `${counted(facts.zeroBins, 'bin')} of ${bins} have density exactly zero`,
      value: facts.zeroBins,
      consequence:
        'Dividing by them (whitening, signal-to-noise ratios) is not possible, and they are not drawn. The data are constant, or were squared in single precision somewhere.',
      remedy: 'Check the channel; keep float64, or scale strain before it is stored as float32.',
    },
  ];
}

function few({ plan, error, average, segmentSeconds }: WarningFacts): Warning[] {
  const n = plan.starts.length;
  if (n >= FEW) return [];
  const shorter = segmentSeconds / 2 ** Math.ceil(Math.log2((FEW + 1) / (n + 1)));
  return [
    {
      code: 'few-averages',
      severity: n === 1 ? 'problem' : 'caution',
      found: `only ${counted(n, 'segment')} averaged (${average})`,
      value: n,
      consequence:
        (n === 1
          ? 'One segment is no average: each bin scatters by its own size'
          : `One bin is known to ${numberText(100 * error.relative, 2)} %`) +
        `, and the true density lies between ${numberText(error.band[0], 2)} and ${numberText(error.band[1], 2)} times the estimate with 90 % confidence.`,
      remedy: `Use a longer span, or shorter segments (coarser resolution): "segment" ${numberText(shorter)} s.`,
      fix: { kind: 'set', label: `Use segments of ${numberText(shorter)} s`, params: { segment: shorter } },
    },
  ];
}

function leakage({ leaked, window, facts }: WarningFacts): Warning[] {
  if (!(leaked > LEAKED)) return [];
  const better = window === 'hann' ? 'blackman-harris' : 'hann';
  return [
    {
      code: 'window-leakage',
      severity: 'caution',
      found: `the ${window} window over ${numberText(facts.decades, 3)} decades of density: about ${numberText(100 * Math.min(1, leaked), 2)} % of the density from ${numberText(facts.band[0])} to ${numberText(facts.band[1])} Hz is carried there by its sidelobes from more than 8 bins away`,
      value: leaked,
      consequence: 'The floor shown is too high; the true one is hidden under leakage.',
      remedy: `Use a window with lower sidelobes, such as ${better}.`,
      fix: { kind: 'set', label: `Use the ${better} window`, params: { window: better } },
    },
  ];
}

function unsteady({ loudest, plan, series, average, exclude, segmentSeconds }: WarningFacts): Warning[] {
  if (loudest === undefined || !(loudest.meanOverMedian > loudest.limit)) return [];
  const from = plan.starts[loudest.segment] / series.rate;
  const to = from + segmentSeconds;
  const excess = loudest.meanOverMedian - 1;
  return [
    {
      code: 'mean-median-differ',
      severity: 'caution',
      found:
        `mean and median of the segments' power differ by ${numberText(100 * excess, 2)} % from ${numberText(loudest.band[0])} to ${numberText(loudest.band[1])} Hz: ` +
        `a loud transient or noise that changes; the loudest segment begins at ${numberText(from, 9)} s with ${numberText(loudest.overMedian, 3)} times the median power`,
      value: excess,
      consequence:
        average === 'mean'
          ? 'The mean takes a transient for noise: the density shown is too high, and a signal is counted as noise against itself.'
          : 'The median follows the quieter part of the time: louder stretches are noisier than shown.',
      remedy:
        average === 'mean'
          ? 'Use the median, or leave the loud time out with "exclude".'
          : 'If it is one loud time, leave it out with "exclude"; if the noise drifts, look at shorter spans.',
      fix:
        average === 'mean'
          ? { kind: 'set', label: 'Use the median', params: { average: 'median' } }
          : {
              kind: 'set',
              label: `Leave out ${numberText(from, 9)} to ${numberText(to, 9)} s`,
              params: { exclude: [...exclude, from, to] },
            },
    },
  ];
}

function dropped({ plan, series }: WarningFacts): Warning[] {
  const invalid = series.length - spanLength(series.valid);
  if (invalid === 0) return [];
  const lost = plan.left;
  const valid = spanLength(series.valid) - spanLength(plan.excluded);
  const share = lost / Math.max(1, valid);
  if (share <= DROPPED) return [];
  return [
    {
      code: 'data-left-out',
      severity: 'caution',
      found: `${numberText(100 * share, 3)} % of the valid data (${numberText(lost / series.rate)} s) lie in stretches between gaps that no further segment fits into`,
      value: share,
      consequence: 'The estimate rests on less data than the span suggests.',
      remedy: 'Shorter segments use more of the data, at coarser resolution.',
    },
  ];
}

function outside({ plan, exclude, series }: WarningFacts): Warning[] {
  const asked = exclude.length / 2;
  if (plan.excluded.length >= asked) return [];
  return [
    {
      code: 'exclude-outside',
      severity: 'caution',
      found: `${counted(asked - plan.excluded.length, 'excluded span')} of ${asked} not inside the ${numberText(series.length / series.rate)} s of the series`,
      value: asked - plan.excluded.length,
      consequence: 'Nothing is left out for them; a signal that should be may be in the estimate.',
      remedy: 'Times in "exclude" count in seconds from the start of the input, not in GPS time.',
    },
  ];
}

function rounding({ estimate, facts, series }: WarningFacts): Warning[] {
  if (!estimate.float32 || !(estimate.moments.rms > 0) || facts.lowest === 0) return [];
  // Rounding error of a value v is uniform in ±2^-24 |v| / m with m in [1, 2); for m spread evenly in log, ⟨1/m²⟩ = 3/(8 ln 2).
  const variance = (estimate.moments.rms ** 2 * 2 ** -46 * (3 / (8 * Math.LN2))) / 12;
  const density = (2 * variance) / series.rate;
  const share = density / facts.lowest ** 2;
  if (!(share > ROUNDING)) return [];
  return [
    {
      code: 'float32-rounding',
      severity: 'note',
      found: `all samples are float32 values of rms ${withUnit(estimate.moments.rms, series.unit)}; rounding alone makes a floor of ${withUnit(Math.sqrt(density), amplitudeUnit(densityUnit(series.unit)))}, ${numberText(100 * Math.sqrt(share), 2)} % of the lowest bin in amplitude`,
      value: Math.sqrt(density),
      consequence: 'The floor may be that of the number format, not of the instrument.',
      remedy: 'Store such data as float64, or take off offset and slow drift before storing as float32.',
    },
  ];
}
