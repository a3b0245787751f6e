import { numberText, repeated, withUnit } from '../figures/number-text';
import { strainFigure, waveformFigure } from '../figures/waveform';
import { INSPIRAL_SOURCE } from '../waveforms/inspiral';
import { IMR_SOURCE } from '../waveforms/imr-2008';
import { modelOf } from '../waveforms/model-of';
import { REMNANT_SOURCE } from '../waveforms/remnant';
import { MODE_SOURCE } from '../waveforms/ringdown-mode';
import { waveformData, type PicturedWaveform } from '../waveforms/waveform-data';
import { WAVEFORM_PARAMS } from '../waveforms/waveform-params';
import { defineStep } from './define';

export default defineStep({
  id: 'waveform',
  title: 'Waveform',
  version: 1,
  group: 'signal',
  summary:
    'A signal by model or from a file: its transform at a stated distance, with times, masses and cycles.',
  takes: [],
  gives: 'waveform',
  params: WAVEFORM_PARAMS,
  sources: [
    { text: INSPIRAL_SOURCE, flag: 'memory' },
    { text: IMR_SOURCE, flag: 'memory' },
    { text: REMNANT_SOURCE, flag: 'memory' },
    { text: MODE_SOURCE, flag: 'memory' },
  ],
  async run(_inputs, params, context) {
    await context.block(0);
    const model = modelOf(params, context);
    const data = waveformData(model, context.kernels);
    return {
      data,
      sentence: `${model.label}, from ${numberText(model.low)} to ${withUnit(model.high, 'Hz')}, t = 0 at its ${model.origin}; strain h₊ ${model.reference}.${repeated(model.notes)}`,
      numbers: model.numbers,
      warnings: model.warnings,
    };
  },
  figures: (data, _params, _inputs, viewport) => [
    waveformFigure(data, viewport),
    ...(hasPicture(data) ? [strainFigure(data, data.picture, viewport)] : []),
  ],
});

const hasPicture = (data: object): data is PicturedWaveform => 'picture' in data;
