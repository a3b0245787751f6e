import type { Table } from '../data/table';
import { columnsOf, frequencyAxis } from '../figures/axis';
import type { Figure, Viewport } from '../figures/figure';
import { numberText, repeated, withUnit } from '../figures/number-text';
import { thinLine } from '../figures/thin';
import { optimalSnr, shareFrequency, type SnrByFrequency } from '../signal/optimal-snr';
import { defineStep } from './define';

interface SnrTable extends Table {
  readonly byFrequency: SnrByFrequency;
}

export default defineStep({
  id: 'expected-snr',
  title: 'Expected SNR',
  version: 1,
  group: 'signal',
  summary:
    'Optimal SNR of a signal in a noise curve, where in frequency it comes from, and how far away it would reach a threshold.',
  takes: [
    { kind: 'waveform', count: 'one', help: 'the signal' },
    { kind: 'spectrum', count: 'one', help: 'the noise: an estimate, a model or a file' },
  ],
  gives: 'table',
  params: {
    low: {
      kind: 'number',
      label: 'From',
      unit: 'Hz',
      default: 20,
      min: 0,
      slider: 'log',
      help: 'Lowest frequency counted.',
    },
    high: {
      kind: 'number',
      label: 'To',
      unit: 'Hz',
      default: null,
      min: 0,
      exclusiveMin: true,
      help: 'Highest frequency counted. Left empty: as far as signal and noise curve reach.',
    },
    threshold: {
      kind: 'number',
      label: 'Threshold',
      unit: '',
      default: 8,
      min: 0,
      exclusiveMin: true,
      help: 'SNR at which the distance is stated: 8 by common practice for one detector.',
    },
  },
  sources: [{ text: 'ρ² = 4 ∫ |h̃|²/S df: Finn & Chernoff, Phys. Rev. D 47, 2198 (1993)', flag: 'memory' }],
  async run(inputs, params, context) {
    await context.block(0);
    const waveform = inputs.one('waveform');
    const spectrum = inputs.one('spectrum');
    const found = optimalSnr(waveform, spectrum, params.low, params.high ?? Infinity);
    const [low, high] = found.band;
    const { distance } = waveform;
    const data: SnrTable = { ...octaves(found), byFrequency: found };
    const reach = distance === undefined ? undefined : (distance * found.snr) / params.threshold;
    return {
      data,
      sentence:
        `${waveform.label} in ${spectrum.label}: optimal SNR ${numberText(found.snr)} from ${numberText(low)} to ${withUnit(high, 'Hz')}, ${waveform.reference}` +
        (reach === undefined ? '.' : `; SNR ${numberText(params.threshold)} at ${withUnit(reach, 'Mpc')}.`) +
        repeated(waveform.notes),
      numbers: [
        {
          id: 'snr',
          label: 'Optimal SNR',
          value: found.snr,
          unit: '',
          convention: waveform.reference,
          explain: {
            formula: '√(4 ∫ |h̃|²/S df), S one-sided',
            source: 'Finn & Chernoff, Phys. Rev. D 47, 2198 (1993)',
          },
        },
        ...(reach === undefined
          ? []
          : [
              {
                id: 'distance',
                label: `Distance at SNR ${numberText(params.threshold)}`,
                value: reach,
                unit: 'Mpc',
                convention: 'luminosity distance at fixed detector-frame masses, optimally placed',
              },
            ]),
        { id: 'quarter', label: 'A quarter of SNR² below', value: shareFrequency(found, 0.25), unit: 'Hz' },
        { id: 'half', label: 'Half of SNR² below', value: shareFrequency(found, 0.5), unit: 'Hz' },
        { id: 'most', label: 'Nine tenths of SNR² below', value: shareFrequency(found, 0.9), unit: 'Hz' },
        { id: 'from', label: 'Counted from', value: low, unit: 'Hz' },
        { id: 'to', label: 'Counted to', value: high, unit: 'Hz' },
      ],
      warnings: [],
      tables: [octaves(found)],
    };
  },
  figures: (data, _params, _inputs, viewport) =>
    'byFrequency' in data ? [figure(data as SnrTable, viewport)] : [],
});

/** SNR and share of SNR² by octave. */
function octaves({ frequency, parts, band, snr }: SnrByFrequency): Table {
  const rows: (number | string)[][] = [];
  for (let from = band[0]; from < band[1] * (1 - 1e-12); from *= 2) {
    const to = Math.min(2 * from, band[1]);
    let sum = 0;
    frequency.forEach((f, k) => {
      if (f >= from && f < to) sum += parts[k];
    });
    rows.push([from, to, Math.sqrt(sum), sum / snr ** 2]);
  }
  return {
    kind: 'table',
    id: 'octaves',
    title: 'SNR by octave',
    columns: [
      { id: 'from', label: 'From', unit: 'Hz' },
      { id: 'to', label: 'To', unit: 'Hz' },
      { id: 'snr', label: 'SNR', unit: '' },
      { id: 'share', label: 'Share of SNR²', unit: '' },
    ],
    rows,
  };
}

function figure({ byFrequency: b }: SnrTable, viewport: Viewport): Figure {
  let sum = 0;
  const share = b.parts.map((p) => (sum += p) / b.snr ** 2);
  const x = frequencyAxis([b.frequency[0], b.frequency[b.frequency.length - 1]], viewport);
  return {
    id: 'share',
    title: 'Where the SNR comes from',
    caption: `Part of SNR² from below each frequency; half of it below ${numberText(shareFrequency(b, 0.5))} Hz.`,
    x,
    y: { label: 'Share of SNR² below', unit: '', scale: 'linear', extent: [0, 1], range: [0, 1.02] },
    traces: [
      {
        type: 'line',
        name: 'share of SNR²',
        role: 'data',
        ...thinLine(b.frequency, share, columnsOf(x, viewport)),
      },
    ],
    marks: [],
  };
}
