import type { Waveform } from '../data/kinds';
import type { Kernels } from '../kernels/kernels';
import type { SignalModel } from './signal-model';

/** Bins and samples kept for the pictures at most; the model itself is exact at any frequency. */
const MOST_BINS = 2 ** 20;
const MOST_SAMPLES = 2 ** 17;

/** A waveform with its picture in time. */
export interface PicturedWaveform extends Waveform {
  readonly picture: {
    /** Hz */
    readonly rate: number;
    /** Seconds of the first sample relative to t = 0. */
    readonly first: number;
    readonly samples: Float64Array;
  };
}

/** A model on a grid fine enough for its length, and as strain against time around t = 0. */
export function waveformData(model: SignalModel, kernels: Kernels): PicturedWaveform {
  const duration = model.before + model.after;
  const wanted = 2 ** Math.ceil(Math.log2(Math.max(8 * duration, 64 / model.top)));
  const df = Math.max(1 / wanted, model.top / MOST_BINS);
  const bins = Math.floor(model.top / df) + 1;
  const { re, im } = model.at(Float64Array.from({ length: bins }, (_, k) => k * df));
  return {
    kind: 'waveform',
    label: model.label,
    model: model.id,
    facts: model.facts,
    ...(model.distance === undefined ? {} : { distance: model.distance }),
    reference: model.reference,
    polarisation: model.polarisation,
    quadrupole: model.quadrupole,
    df,
    re,
    im,
    low: model.low,
    high: model.high,
    before: model.before,
    after: model.after,
    duration,
    origin: model.origin,
    ...(model.notes ? { notes: model.notes } : {}),
    at: (frequency, which) => model.at(frequency, which),
    picture: pictureOf(model, kernels),
  };
}

/** Strain against time: the end of a wave that is too long for the samples kept. */
function pictureOf(model: SignalModel, kernels: Kernels): PicturedWaveform['picture'] {
  const rate = 2 ** Math.ceil(Math.log2(4 * model.top));
  const longest = MOST_SAMPLES / rate;
  const before = Math.min(model.before * 1.1 + 4 / model.top, 0.7 * longest);
  const after = Math.min(model.after * 1.1 + 4 / model.top, 0.25 * longest);
  // Room for what comes earlier than is shown, so that it does not fold into the picture.
  const size = Math.min(2 ** 22, 2 ** Math.ceil(Math.log2(2 * (model.before + model.after) * rate + 16)));
  const frequency = Float64Array.from({ length: size / 2 + 1 }, (_, k) => (k * rate) / size);
  const { re, im } = model.at(frequency);
  const x = kernels.irfft(re, im, size);
  const first = -Math.round(before * rate);
  const count = Math.min(size, Math.round((before + after) * rate));
  const samples = Float64Array.from({ length: count }, (_, i) => x[(first + i + size) % size] * rate);
  return { rate, first: first / rate, samples };
}
