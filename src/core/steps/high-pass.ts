import { passesText, passSections, shapeText } from '../condition/filter-edges';
import { SHAPE_PARAMS } from '../condition/filter-params';
import { effectiveGain, halfPowerBetween, responseFigure } from '../condition/filter-response';
import { runFilter } from '../condition/filter-run';
import { FILTER_SOURCES } from '../condition/filter-sources';
import { withUnit } from '../figures/number-text';
import { seriesFigure } from '../figures/series';
import { defineStep } from './define';

export default defineStep({
  id: 'high-pass',
  title: 'High-pass',
  version: 1,
  group: 'condition',
  summary: 'Keeps what lies above a corner frequency, without delay or causal.',
  takes: [{ kind: 'series', count: 'one', help: 'the data to be filtered' }],
  gives: 'series',
  params: {
    frequency: {
      kind: 'number',
      label: 'Corner',
      unit: 'Hz',
      default: 20,
      min: 0,
      exclusiveMin: true,
      slider: 'log',
      ask: true,
      help: 'Edge of the pass band. Take it below the lowest frequency of interest: zero-phase, a Butterworth edge lies at −6 dB.',
    },
    ...SHAPE_PARAMS,
  },
  sources: FILTER_SOURCES,
  async run(inputs, params, context) {
    const series = inputs.one('series');
    const { frequency, direction } = params;
    const rows = passSections(series, 'highpass', [frequency], params);
    const corner = halfPowerBetween(rows, direction, series.rate, frequency / 1000, 0.499 * series.rate);
    const request = { rows, direction, crop: params.crop, word: 'high-passed', lowest: frequency };
    const { data, numbers, warnings, ending } = await runFilter(series, request, context);
    const gain = effectiveGain(rows, direction, Float64Array.of(frequency, frequency / 2), series.rate);
    return {
      data,
      sentence: `${series.label} high-passed at ${withUnit(frequency, 'Hz')}, ${shapeText(params)}, ${passesText(direction)}; gain ½ in power at ${withUnit(corner, 'Hz', 5)}; ${ending}`,
      numbers: [
        {
          id: 'corner',
          label: 'Corner',
          value: corner,
          unit: 'Hz',
          convention: 'half power (−3 dB) of all passes',
        },
        {
          id: 'gain-at-edge',
          label: 'Gain at the edge',
          value: 20 * Math.log10(gain[0]),
          unit: 'dB',
          convention: 'all passes',
        },
        {
          id: 'gain-below',
          label: 'Gain an octave below',
          value: 20 * Math.log10(gain[1]),
          unit: 'dB',
          convention: 'all passes',
        },
        ...numbers,
      ],
      warnings,
    };
  },
  figures: (data, params, _inputs, viewport) => [
    seriesFigure(data, viewport, { title: 'High-passed' }),
    responseFigure(
      {
        rows: passSections(data, 'highpass', [params.frequency], params),
        direction: params.direction,
        rate: data.rate,
        marks: [{ at: params.frequency, label: 'edge' }],
      },
      viewport,
    ),
  ],
});
