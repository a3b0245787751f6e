import type { Spectrum, Waveform } from '../data/kinds';
import type { Quantity } from '../data/quantity';
import type { Table } from '../data/table';
import { columnsOf, extentOf, frequencyAxis } from '../figures/axis';
import type { Figure, Trace, TraceRole, Viewport } from '../figures/figure';
import { counted, numberText, repeated } from '../figures/number-text';
import { lowerBound, thinLine } from '../figures/thin';
import { bandGrid, characteristicStrain } from '../figures/waveform';
import { optimalSnr } from '../signal/optimal-snr';
import { defineStep } from './define';

interface Pair {
  readonly signal: string;
  readonly noise: string;
  readonly snr: number;
  readonly id: string;
}

interface OverNoise extends Table {
  readonly waveforms: readonly Waveform[];
  readonly spectra: readonly Spectrum[];
}

const SIGNAL_ROLES: readonly TraceRole[] = ['second', 'third', 'model'];
const NOISE_ROLES: readonly TraceRole[] = ['data', 'reference'];

export default defineStep({
  id: 'signal-over-noise',
  title: 'Signal over noise',
  version: 1,
  group: 'signal',
  summary:
    'Characteristic strain of signals over that of the noise: the area between them in log frequency is SNR².',
  takes: [
    { kind: 'waveform', count: 'many', help: 'one or more signals' },
    { kind: 'spectrum', count: 'many', help: 'one or more noise curves' },
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
      help: 'Lowest frequency counted in the SNR.',
    },
  },
  sources: [
    {
      text: 'h_c = 2f|h̃|, h_n = √(f S), SNR² = ∫ (h_c/h_n)² d ln f: Moore, Cole, Berry, Class. Quantum Grav. 32, 015014 (2015)',
      flag: 'memory',
    },
  ],
  async run(inputs, params, context) {
    await context.block(0);
    const waveforms = inputs.many('waveform');
    const spectra = inputs.many('spectrum');
    const pairs = waveforms.flatMap((w, i) =>
      spectra.map((s, k): Pair => ({
        signal: w.label,
        noise: s.label,
        snr: optimalSnr(w, s, params.low, Infinity).snr,
        id: `snr-${i + 1}-${k + 1}`,
      })),
    );
    const table = tableOf(pairs);
    const data: OverNoise = { ...table, waveforms, spectra };
    const best = pairs.reduce((a, b) => (b.snr > a.snr ? b : a));
    return {
      data,
      sentence:
        `${counted(waveforms.length, 'signal')} over ${counted(spectra.length, 'noise curve')}, each as characteristic strain; the loudest is ${best.signal} in ${best.noise} with optimal SNR ${numberText(best.snr)}.` +
        [...new Set(waveforms.flatMap((w) => w.notes ?? []))].map((n) => repeated([n])).join(''),
      numbers: pairs.map((p): Quantity => ({
        id: p.id,
        label: `SNR of ${p.signal}`,
        value: p.snr,
        unit: '',
        convention: `optimal, in ${p.noise}`,
      })),
      warnings: [],
      tables: [table],
    };
  },
  figures: (data, _params, _inputs, viewport) =>
    'waveforms' in data ? [figure(data as OverNoise, viewport)] : [],
});

const tableOf = (pairs: readonly Pair[]): Table => ({
  kind: 'table',
  id: 'pairs',
  title: 'Signals and noise curves',
  columns: [
    { id: 'signal', label: 'Signal', unit: '' },
    { id: 'noise', label: 'Noise', unit: '' },
    { id: 'snr', label: 'Optimal SNR', unit: '' },
  ],
  rows: pairs.map((p) => [p.signal, p.noise, p.snr]),
});

function figure({ waveforms, spectra }: OverNoise, viewport: Viewport): Figure {
  const noises = spectra.map((s) => {
    const first = lowerBound(s.frequency, Number.MIN_VALUE);
    const f = s.frequency.slice(first);
    return {
      f,
      h: f.map((v, k) => (s.density[first + k] > 0 ? Math.sqrt(v * s.density[first + k]) : NaN)),
      name: s.label,
    };
  });
  const signals = waveforms.map((w) => {
    const f = bandGrid(w, w.df * (w.re.length - 1));
    return { f, h: characteristicStrain(w, f).map((v) => (v > 0 ? v : NaN)), name: w.label };
  });
  const low = Math.min(...signals.map((s) => s.f[0])) / 2;
  const high = Math.max(...noises.map((n) => n.f[n.f.length - 1]));
  const x = frequencyAxis([low, high], viewport);
  const columns = columnsOf(x, viewport);
  const line = (
    c: { readonly f: Float64Array; readonly h: Float64Array; readonly name: string },
    role: TraceRole,
  ): Trace => ({
    type: 'line',
    name: c.name,
    role,
    ...thinLine(c.f, c.h, columns),
  });
  const shown = noises.map((n) => n.h.filter((_, k) => n.f[k] >= low));
  const [bottom, top] = extentOf([...shown, ...signals.map((s) => s.h)], 'log');
  return {
    id: 'over-noise',
    title: 'Signal over noise',
    caption: `Characteristic strain against frequency: ${noises.map((n) => `√(f S) of ${n.name}`).join(', ')}; ${signals.map((s) => `2f|h̃| of ${s.name}`).join(', ')}. A signal stands out as far as it lies above the noise: the area between the two, squared ratio in the logarithm of frequency, is SNR².`,
    x,
    y: {
      label: 'Characteristic strain',
      unit: '',
      scale: 'log',
      extent: [Math.max(bottom, top * 1e-7), top],
    },
    traces: [
      ...noises.map((n, i) => line(n, NOISE_ROLES[Math.min(i, NOISE_ROLES.length - 1)])),
      ...signals.map((s, i) => line(s, SIGNAL_ROLES[i % SIGNAL_ROLES.length])),
    ],
    marks: [],
  };
}
