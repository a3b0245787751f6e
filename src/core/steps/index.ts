// Written by `npm run sync`: one line per file of this folder.
import type { AnyStep } from './define';
import bandPass from './band-pass';
import coherence from './coherence';
import compareNoise from './compare-noise';
import consistency from './consistency';
import constantQMap from './constant-q-map';
import expectedSnr from './expected-snr';
import gate from './gate';
import gaussianity from './gaussianity';
import highPass from './high-pass';
import lines from './lines';
import matchedFilter from './matched-filter';
import noiseSpectrum from './noise-spectrum';
import notch from './notch';
import overview from './overview';
import reach from './reach';
import referenceNoise from './reference-noise';
import resample from './resample';
import signalOverNoise from './signal-over-noise';
import spectrogram from './spectrogram';
import stationarity from './stationarity';
import waveform from './waveform';
import whiten from './whiten';

/** Every step, by id. */
export const steps: Readonly<Record<string, AnyStep>> = {
  'band-pass': bandPass,
  coherence: coherence,
  'compare-noise': compareNoise,
  consistency: consistency,
  'constant-q-map': constantQMap,
  'expected-snr': expectedSnr,
  gate: gate,
  gaussianity: gaussianity,
  'high-pass': highPass,
  lines: lines,
  'matched-filter': matchedFilter,
  'noise-spectrum': noiseSpectrum,
  notch: notch,
  overview: overview,
  reach: reach,
  'reference-noise': referenceNoise,
  resample: resample,
  'signal-over-noise': signalOverNoise,
  spectrogram: spectrogram,
  stationarity: stationarity,
  waveform: waveform,
  whiten: whiten,
};
