import type { Warning } from '../data/quantity';
import { spanLength } from '../data/spans';
import { counted, numberText, withUnit } from '../figures/number-text';
import { densityUnit } from '../noise/units';
import { independent, type WhitenFacts } from './whiten-report';
import { WIDTH } from './truncation-window';

/** Segments below which a spectrum is too rough to whiten with. */
const FEW = 8;
/** Relative departure of a variance worth a word. */
const OFF = 0.1;
/** Probability below which samples do not count as Gaussian. */
const UNLIKELY = 1e-3;
/** Share of the valid samples lost at edges. */
const LOST = 0.5;

export function whitenWarnings(f: WhitenFacts): Warning[] {
  return [
    ...unit(f),
    ...few(f),
    ...narrowed(f),
    ...coarse(f),
    ...lines(f),
    ...notWhite(f),
    ...gated(f),
    ...lost(f),
  ];
}

function unit({ from, spectrum }: WhitenFacts): Warning[] {
  const wanted = densityUnit(from.unit);
  if (wanted === spectrum.unit) return [];
  return [
    {
      code: 'unit-mismatch',
      severity: 'problem',
      found: `the data have the unit "${from.unit}", which makes a density in ${wanted}, but the spectrum is in ${spectrum.unit}`,
      consequence: 'The result does not have unit variance unless both mean the same.',
      remedy: 'Give the unit of the input, or use a spectrum of these data.',
    },
  ];
}

function few({ spectrum, own }: WhitenFacts): Warning[] {
  const e = spectrum.estimate;
  if (!e || e.segments >= FEW) return [];
  return [
    {
      code: 'few-averages',
      severity: 'caution',
      found: `the spectrum is the ${e.average} of ${counted(e.segments, 'segment')}${own ? ' of these same data' : ''}: each bin is uncertain by ${numberText(100 * e.relativeError, 2)} %`,
      value: e.segments,
      consequence: own
        ? 'The data are divided by their own chance pattern: they look whiter than they are, and a signal in them is whitened away with the noise.'
        : 'The chance pattern of the spectrum is printed on the whitened data.',
      remedy: 'Use a spectrum of a longer span, or shorter segments.',
    },
  ];
}

function narrowed({ spectrum, asked, design }: WhitenFacts): Warning[] {
  const { band, rate } = design;
  const wanted = [asked[0], Math.min(asked[1] ?? Infinity, rate / 2)] as const;
  if (band[0] <= wanted[0] + (spectrum.df || 0) && band[1] >= wanted[1] - 1.01 * spectrum.df) return [];
  return [
    {
      code: 'band-narrowed',
      severity: 'caution',
      found: `the spectrum covers ${numberText(spectrum.frequency[0])} to ${withUnit(spectrum.frequency.at(-1)!, 'Hz')}, so the band kept is ${numberText(band[0])} to ${withUnit(band[1], 'Hz')} of the ${numberText(wanted[0])} to ${withUnit(wanted[1], 'Hz')} wanted`,
      value: band[1],
      consequence: 'What the data have outside of it is gone, and the variance is below 1 by as much.',
      remedy: 'Use a spectrum that covers the band, or resample the data first.',
    },
  ];
}

function coarse({ spectrum, design, reach }: WhitenFacts): Warning[] {
  const detail = Math.max(spectrum.df, spectrum.estimate?.enbw ?? 0);
  if (!(detail > design.resolution)) return [];
  const enough = Number((WIDTH / 2 / detail).toPrecision(2));
  return [
    {
      code: 'spectrum-coarse',
      severity: 'note',
      found: `the spectrum resolves ${withUnit(detail, 'Hz')}, the filter with its reach of ${numberText(reach)} s ${withUnit(design.resolution, 'Hz')}`,
      value: detail,
      consequence:
        'Narrow lines are not whitened, and the filter drops more at every edge than the spectrum has detail for.',
      remedy: `Use a spectrum with longer segments, or set "reach" to ${numberText(enough)} s.`,
      fix: { kind: 'set', label: `Reach ${numberText(enough)} s`, params: { reach: enough } },
    },
  ];
}

/** A spectrum makes lines narrower than its bins look wider than they are, so what it leads to must be seen in the data as well. */
function lines({ design, reach, statistics }: WhitenFacts): Warning[] {
  const factor = Math.min(design.variance, statistics.variance) / design.ideal;
  if (!(factor > 1 + OFF)) return [];
  const longer = 2 * reach;
  return [
    {
      code: 'lines-not-resolved',
      severity: 'caution',
      found: `lines narrower than ${withUnit(design.resolution, 'Hz')} or steep slopes pass the filter: the variance is ${numberText(statistics.variance / design.ideal, 3)} times that of a white band, up to ${numberText(design.variance / design.ideal, 3)} by the spectrum`,
      value: factor,
      consequence:
        'The result is not white: lines stand above the rest, and neighbouring samples depend on each other.',
      remedy: `Raise "reach" to ${numberText(longer)} s, raise "low", or take the lines out first.`,
      fix: { kind: 'set', label: `Reach ${numberText(longer)} s`, params: { reach: longer } },
    },
  ];
}

function notWhite(f: WhitenFacts): Warning[] {
  const { design, statistics: s } = f;
  const [least, most] = [Math.min(design.ideal, design.variance), Math.max(design.ideal, design.variance)];
  const slack = OFF + 3 * Math.sqrt(2 / independent(f));
  const off = s.variance > most ? s.variance / most - 1 : s.variance < least ? s.variance / least - 1 : 0;
  if (Math.abs(off) > slack)
    return [
      {
        code: 'variance-off',
        severity: 'caution',
        found: `the variance is ${numberText(s.variance)}, ${numberText(100 * Math.abs(off), 2)} % ${off > 0 ? 'above' : 'below'} the ${numberText(off > 0 ? most : least)} that the spectrum leads to (excess kurtosis ${numberText(s.kurtosis, 3)})`,
        value: s.variance,
        consequence:
          'The spectrum does not describe these data: a transient, a change of the noise, or a spectrum of another time.',
        remedy:
          'Look at the whitened series for loud samples and gate them, or use a spectrum of the same span.',
      },
    ];
  if (!(s.pValue < UNLIKELY)) return [];
  return [
    {
      code: 'not-gaussian',
      severity: 'note',
      found: `the samples do not look Gaussian: Kolmogorov–Smirnov p = ${numberText(s.pValue, 2)} (distance ${numberText(s.distance, 2)}, ${s.tested} samples), excess kurtosis ${numberText(s.kurtosis, 3)}`,
      value: s.pValue,
      consequence:
        'Loud samples are more or less frequent than a Gaussian says, or the level of the noise changes.',
      remedy: 'See at which frequencies by the step gaussianity, or look for loud samples and gate them.',
    },
  ];
}

function gated({ to, own, from }: WhitenFacts): Warning[] {
  const share = spanLength(from.gates ?? []) / spanLength(from.valid);
  if (!own || !(share > 0.02)) return [];
  return [
    {
      code: 'gates-in-spectrum',
      severity: 'note',
      found: `${numberText(100 * share, 2)} % of the data are gated, and the spectrum was made of them`,
      value: share,
      consequence: 'The spectrum may be too low, and the rest then too large after whitening.',
      remedy: `Give a spectrum made without the gated spans (${counted(to.gates?.length ?? 0, 'span')}) in "of".`,
    },
  ];
}

function lost({ from, to, design }: WhitenFacts): Warning[] {
  const share = 1 - spanLength(to.valid) / spanLength(from.valid);
  if (!(share > LOST)) return [];
  return [
    {
      code: 'mostly-edges',
      severity: 'caution',
      found: `${numberText(100 * share, 3)} % of the valid data are edges: ${withUnit((design.taps.length - 1) / design.rate, 's')} on either side of each gap`,
      value: share,
      consequence: 'They are not used by later steps.',
      remedy: 'Take a longer span, or lower "reach".',
    },
  ];
}
