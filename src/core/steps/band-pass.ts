import { UserError } from '../data/errors';
import { passesText, passSections, shapeText } from '../condition/filter-edges';
import { SHAPE_PARAMS } from '../condition/filter-params';
import { effectiveGain, halfPowerBetween, responseFigure } from '../condition/filter-response';
import { runFilter } from '../condition/filter-run';
import { FILTER_SOURCES } from '../condition/filter-sources';
import type { Warning } from '../data/quantity';
import { numberText, withUnit } from '../figures/number-text';
import { seriesFigure } from '../figures/series';
import { defineStep } from './define';

/** A band narrower than this part of its middle rings longer than most transients last. */
const NARROW = 0.05;

export default defineStep({
  id: 'band-pass',
  title: 'Band-pass',
  version: 1,
  group: 'condition',
  summary: 'Keeps a band of frequencies, without delay or causal.',
  takes: [{ kind: 'series', count: 'one', help: 'the data to be filtered' }],
  gives: 'series',
  params: {
    low: {
      kind: 'number',
      label: 'From',
      unit: 'Hz',
      default: 30,
      min: 0,
      exclusiveMin: true,
      slider: 'log',
      ask: true,
      help: 'Lower edge of the pass band. Zero-phase, a Butterworth edge lies at −6 dB.',
    },
    high: {
      kind: 'number',
      label: 'To',
      unit: 'Hz',
      default: 400,
      min: 0,
      exclusiveMin: true,
      slider: 'log',
      ask: true,
      help: 'Upper edge of the pass band, below half the sample rate.',
    },
    ...SHAPE_PARAMS,
  },
  sources: FILTER_SOURCES,
  async run(inputs, params, context) {
    const series = inputs.one('series');
    const { low, high, direction } = params;
    if (!(low < high))
      throw new UserError(
        'filter-edges',
        `the band runs from "low" ${numberText(low)} Hz to "high" ${numberText(high)} Hz: "low" must be the smaller one`,
      );
    const rows = passSections(series, 'bandpass', [low, high], params);
    const middle = Math.sqrt(low * high);
    const corners = [
      halfPowerBetween(rows, direction, series.rate, low / 1000, middle),
      halfPowerBetween(rows, direction, series.rate, high + 0.999 * (series.rate / 2 - high), middle),
    ] as const;
    const request = { rows, direction, crop: params.crop, word: 'band-passed', lowest: low };
    const { data, numbers, warnings, ending } = await runFilter(series, request, context);
    const gain = effectiveGain(rows, direction, Float64Array.of(low, middle, high), series.rate);
    const decibel = (v: number): number => 20 * Math.log10(v);
    return {
      data,
      sentence: `${series.label} band-passed from ${withUnit(low, 'Hz')} to ${withUnit(high, 'Hz')}, ${shapeText(params)}, ${passesText(direction)}; half power at ${withUnit(corners[0], 'Hz', 5)} and ${withUnit(corners[1], 'Hz', 5)}; ${ending}`,
      numbers: [
        {
          id: 'low-corner',
          label: 'Lower corner',
          value: corners[0],
          unit: 'Hz',
          convention: 'half power (−3 dB) of all passes',
        },
        {
          id: 'high-corner',
          label: 'Upper corner',
          value: corners[1],
          unit: 'Hz',
          convention: 'half power (−3 dB) of all passes',
        },
        {
          id: 'gain-low',
          label: 'Gain at the lower edge',
          value: decibel(gain[0]),
          unit: 'dB',
          convention: 'all passes',
        },
        {
          id: 'gain-middle',
          label: 'Gain in the middle',
          value: decibel(gain[1]),
          unit: 'dB',
          convention: 'all passes, at the geometric mean of the edges',
        },
        {
          id: 'gain-high',
          label: 'Gain at the upper edge',
          value: decibel(gain[2]),
          unit: 'dB',
          convention: 'all passes',
        },
        ...numbers,
      ],
      warnings: [...narrow(low, high), ...warnings],
    };
  },
  figures: (data, params, _inputs, viewport) => [
    seriesFigure(data, viewport, { title: 'Band-passed' }),
    responseFigure(
      {
        rows: passSections(data, 'bandpass', [params.low, params.high], params),
        direction: params.direction,
        rate: data.rate,
        marks: [
          { at: params.low, label: 'lower edge' },
          { at: params.high, label: 'upper edge' },
        ],
      },
      viewport,
    ),
  ],
});

function narrow(low: number, high: number): Warning[] {
  const share = (high - low) / Math.sqrt(low * high);
  if (share >= NARROW) return [];
  return [
    {
      code: 'narrow-band',
      severity: 'caution',
      found: `the band is ${withUnit(high - low, 'Hz')} wide, ${numberText(100 * share, 2)} % of its middle`,
      value: share,
      consequence:
        'Any noise comes out as a slowly swelling sine of the middle frequency: what looks like a signal may be the filter.',
      remedy: 'Widen the band, or compare with the same filter on data known to be noise.',
    },
  ];
}
