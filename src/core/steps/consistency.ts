import { secondsBetween } from '../data/gps-time';
import type { Consistency, ConsistentPeak } from '../data/kinds';
import { counted, numberText, repeated } from '../figures/number-text';
import { bandFigure, shapeFigure } from '../figures/snr-consistency';
import { checkPeak, planConsistency } from '../search/consistency-peak';
import { consistencyNumbers, consistencyTable, consistencyWarnings } from '../search/consistency-report';
import { defineStep } from './define';

export default defineStep({
  id: 'consistency',
  title: 'Consistency with the template',
  version: 1,
  group: 'search',
  summary:
    'Disturbance tests: χ² over frequency bands, re-weighted SNR and shape of the peaks of a matched filter.',
  takes: [{ kind: 'snr', count: 'one', help: 'the matched filter whose peaks are checked' }],
  gives: 'consistency',
  params: {
    bands: {
      kind: 'number',
      label: 'Bands',
      unit: '',
      default: 16,
      min: 2,
      max: 1000,
      integer: true,
      help: 'Frequency bands of equal expected loudness. More bands see finer deviations but spread a broad one over more degrees of freedom.',
    },
    time: {
      kind: 'time',
      label: 'Time',
      default: null,
      help: 'GPS time at which to check, that of the template’s t = 0. Left out: the loudest peaks.',
    },
    count: {
      kind: 'number',
      label: 'Peaks',
      unit: '',
      default: 5,
      min: 1,
      max: 1000,
      integer: true,
      help: 'Without a time: how many of the loudest peaks are checked.',
    },
    around: {
      kind: 'number',
      label: 'Shape within',
      unit: 's',
      default: 0.05,
      min: 0,
      exclusiveMin: true,
      help: 'Seconds to either side of a peak over which its shape is compared with the template’s autocorrelation.',
    },
  },
  sources: [
    { text: 'χ² over frequency bands: Allen, Phys. Rev. D 71, 062001 (2005)', flag: 'memory' },
    { text: 'Re-weighted SNR: Babak et al., Phys. Rev. D 87, 024033 (2013)', flag: 'memory' },
    {
      text: 'Distribution of a sum of squares by its mean and variance: Satterthwaite, Biometrics Bull. 2, 110 (1946)',
      flag: 'memory',
    },
  ],
  async run(inputs, params, context) {
    const snr = inputs.one('snr');
    await context.block(0);
    const plan = planConsistency(context.kernels, snr, params.bands, params.around);
    const times =
      params.time === null
        ? snr.peaks.slice(0, params.count).map((p) => p.at)
        : [secondsBetween(params.time, snr.start) * snr.rate];
    const peaks: ConsistentPeak[] = [];
    for (const [i, at] of times.entries()) {
      await context.block(i / times.length);
      peaks.push(checkPeak(context.kernels, plan, at));
    }
    const data: Consistency = {
      kind: 'consistency',
      label: `consistency of ${snr.label}`,
      ...(snr.notes ? { notes: snr.notes } : {}),
      peaks,
    };
    const first = peaks[0];
    return {
      data,
      sentence:
        `${params.time === null ? `The ${counted(peaks.length, 'loudest peak', 'loudest peaks')}` : 'The asked time'} of ${snr.label} checked with ${params.bands} bands of equal expected loudness ` +
        `and against the template's autocorrelation within ${numberText(params.around)} s; first: χ² ${numberText(first.chiSquared)} ` +
        `with ${first.freedom} degrees of freedom, |SNR| ${numberText(first.snr)}, re-weighted ${numberText(first.reweighted)}.` +
        repeated(snr.notes),
      numbers: consistencyNumbers(first),
      warnings: consistencyWarnings(data),
      tables: [consistencyTable(peaks, snr.startUnknown === true)],
    };
  },
  figures(data) {
    const notes = repeated(data.notes);
    return [bandFigure(data.peaks[0], notes), shapeFigure(data.peaks[0], notes)];
  },
});
