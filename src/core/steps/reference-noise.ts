import { UserError } from '../data/errors';
import type { Spectrum } from '../data/kinds';
import type { Quantity } from '../data/quantity';
import { numberText, withUnit } from '../figures/number-text';
import { spectrumFigure } from '../figures/spectrum';
import { NOISE_MODELS } from '../noise/models';
import { reference, REFERENCE_CHOICES, type Reference } from '../noise/reference';
import { referenceWarnings } from '../noise/reference-warnings';
import { bandBins, median } from '../noise/spectrum-facts';
import { defineStep } from './define';

const UNIT = 'strain²/Hz';
const AMPLITUDE = 'strain/√Hz';

export default defineStep({
  id: 'reference-noise',
  title: 'Reference noise',
  version: 1,
  group: 'noise',
  summary: 'A published noise model or a curve from a file, alone or drawn over an estimate.',
  takes: [{ kind: 'spectrum', count: 'optional', help: 'an estimate it is drawn over and compared with' }],
  gives: 'spectrum',
  params: {
    curve: {
      kind: 'choice',
      label: 'Curve',
      choices: REFERENCE_CHOICES,
      default: 'second-generation-4km-2009',
      help: 'A published analytic fit to a design sensitivity, or "file" for a curve of your own. Published fits of one design differ by 10 to 70 % among themselves, so take a file when the ratio itself matters.',
    },
    file: {
      kind: 'file',
      label: 'File',
      default: '',
      help: 'Two columns of text: frequency in Hz, rising, and one-sided density. Read only when the curve is "file". Between its points log density runs straight against log frequency; outside there is no value.',
    },
    holds: {
      kind: 'choice',
      label: 'The file holds',
      choices: ['amplitude density', 'power density'],
      default: 'amplitude density',
      help: 'Whether the second column is √S in strain/√Hz (about 1e-23) or S in 1/Hz (about 1e-46). Taking one for the other puts the curve more than twenty decades off.',
    },
    low: {
      kind: 'number',
      label: 'Compare from',
      unit: 'Hz',
      default: 100,
      min: 0,
      help: 'Lower edge of the band in which the ratio to the estimate is read off. Choose it above the steep low-frequency wall.',
    },
    high: {
      kind: 'number',
      label: 'Compare to',
      unit: 'Hz',
      default: 1000,
      min: 0,
      exclusiveMin: true,
      help: 'Upper edge of the band in which the ratio is read off. Choose it below the roll-off near half the sample rate.',
    },
  },
  sources: [
    ...NOISE_MODELS.map((m) => ({ text: `${m.id}: ${m.formula}; ${m.source.text}`, flag: m.source.flag })),
  ],
  async run(inputs, params, context) {
    await context.block(0);
    if (params.high <= params.low)
      throw new UserError(
        'empty-band',
        `"high" ${numberText(params.high)} Hz must be above "low" ${numberText(params.low)} Hz`,
      );
    const ref = reference(params.curve, params.file, params.holds, (path) => context.readText(path));
    const over = inputs.optional('spectrum');
    const frequency = over ? over.frequency : ref.ownGrid;
    const density = ref.at(frequency);
    const data: Spectrum = {
      kind: 'spectrum',
      label: `reference ${ref.label}`,
      frequency,
      density,
      df: over?.df ?? 0,
      unit: UNIT,
    };
    const band = [params.low, params.high] as const;
    const comparison = over && compare(over, density, band);
    return {
      data,
      sentence: sentence(ref, comparison?.ratio, band, over?.label),
      numbers: numbers(ref, frequency, comparison?.ratio, band),
      warnings: referenceWarnings({
        reference: ref,
        band,
        ...(over && comparison ? { unit: over.unit, ...comparison } : {}),
      }),
    };
  },
  figures(data, _params, inputs, viewport) {
    const over = inputs.optional('spectrum');
    return [
      spectrumFigure(
        [
          ...(over ? [{ spectrum: over, role: 'data', band: true } as const] : []),
          { spectrum: data, role: 'reference' },
        ],
        viewport,
        { title: over ? 'Noise spectrum and reference' : 'Reference noise' },
      ),
    ];
  },
});

/** Median ratio of the amplitude densities in a band, and the share of the band's bins that have one. */
function compare(
  estimate: Spectrum,
  density: Float64Array,
  band: readonly [number, number],
): { ratio: number; covered: number } {
  const [from, to] = bandBins(estimate.frequency, band);
  const ratios = estimate.density.slice(from, to).map((s, k) => Math.sqrt(s / density[from + k]));
  const usable = ratios.filter(Number.isFinite);
  return { ratio: median(usable), covered: to > from ? usable.length / (to - from) : 0 };
}

function numbers(
  ref: Reference,
  frequency: Float64Array,
  ratio: number | undefined,
  band: readonly [number, number],
): Quantity[] {
  const formula = ref.model && {
    explain: {
      formula: ref.model.formula,
      source: `${ref.model.source.text}, ${ref.model.source.flag.toUpperCase()}`,
    },
  };
  const at = [100, 1000].flatMap((f): Quantity[] => {
    const value = Math.sqrt(ref.at(new Float64Array([f]))[0]);
    if (!Number.isFinite(value)) return [];
    const id = `at-${f}`;
    return [{ id, label: `√S at ${f} Hz`, value, unit: AMPLITUDE, convention: 'one-sided', ...formula }];
  });
  const top = Math.min(ref.range[1], frequency.at(-1)!);
  return [
    ...at,
    ...(ratio === undefined || !Number.isFinite(ratio)
      ? []
      : [
          {
            id: 'ratio',
            label: 'Estimate over reference',
            value: ratio,
            unit: '',
            convention: `amplitude densities, median of the bins from ${numberText(band[0])} to ${numberText(band[1])} Hz`,
          },
        ]),
    { id: 'range-from', label: 'Reference from', value: ref.range[0], unit: 'Hz' },
    { id: 'range-to', label: 'Reference to', value: top, unit: 'Hz', convention: 'as tabulated here' },
  ];
}

function sentence(
  ref: Reference,
  ratio: number | undefined,
  band: readonly [number, number],
  over: string | undefined,
): string {
  const what = ref.model
    ? `Published noise model ${ref.label}, valid from ${withUnit(ref.model.from, 'Hz')}`
    : `Noise curve of ${ref.label}, ${numberText(ref.range[0])} to ${numberText(ref.range[1])} Hz`;
  if (over === undefined) return `${what}: one-sided density in ${UNIT}.`;
  const result =
    ratio === undefined || !Number.isFinite(ratio)
      ? 'which have no bin in common there'
      : `whose amplitude density is ${numberText(ratio, 3)} times it (median)`;
  return `${what}, compared from ${numberText(band[0])} to ${numberText(band[1])} Hz with ${over}, ${result}.`;
}
