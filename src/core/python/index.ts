// Written by `npm run sync`: the Python files of this folder as text.
import stepBandPass from './band-pass.py';
import stepCoherence from './coherence.py';
import stepCompareNoise from './compare-noise.py';
import stepConsistency from './consistency.py';
import stepConstantQMap from './constant-q-map.py';
import stepExpectedSnr from './expected-snr.py';
import stepGate from './gate.py';
import stepGaussianity from './gaussianity.py';
import stepHighPass from './high-pass.py';
import stepLines from './lines.py';
import stepMatchedFilter from './matched-filter.py';
import stepNoiseSpectrum from './noise-spectrum.py';
import stepNotch from './notch.py';
import stepOverview from './overview.py';
import stepReach from './reach.py';
import stepReferenceNoise from './reference-noise.py';
import stepResample from './resample.py';
import stepSignalOverNoise from './signal-over-noise.py';
import stepSpectrogram from './spectrogram.py';
import stepStationarity from './stationarity.py';
import stepWaveform from './waveform.py';
import stepWhiten from './whiten.py';
import sharedDetrendedBins from './shared/detrended_bins.py';
import sharedFilterValidRuns from './shared/filter_valid_runs.py';
import sharedGroupRanges from './shared/group_ranges.py';
import sharedHalfPowerHz from './shared/half_power_hz.py';
import sharedLinePeaks from './shared/line_peaks.py';
import sharedLineShape from './shared/line_shape.py';
import sharedMakeWindow from './shared/make_window.py';
import sharedMeanVariance from './shared/mean_variance.py';
import sharedMedianBias from './shared/median_bias.py';
import sharedMedianSpectrum from './shared/median_spectrum.py';
import sharedMedianVariance from './shared/median_variance.py';
import sharedOverlapCorrelations from './shared/overlap_correlations.py';
import sharedPassSections from './shared/pass_sections.py';
import sharedPassesGain from './shared/passes_gain.py';
import sharedRingingS from './shared/ringing_s.py';
import sharedRobustWidth from './shared/robust_width.py';
import sharedSegmentStarts from './shared/segment_starts.py';
import sharedSegmentTransforms from './shared/segment_transforms.py';
import sharedSmoothLength from './shared/smooth_length.py';
import sharedSnrParts from './shared/snr_parts.py';
import sharedTruncatedInverse from './shared/truncated_inverse.py';
import sharedValidRuns from './shared/valid_runs.py';
import sharedWhiteningFilter from './shared/whitening_filter.py';
import readersHdf5 from './readers/hdf5.py';
import readersNpy from './readers/npy.py';
import readersNpz from './readers/npz.py';
import readersRaw from './readers/raw.py';
import readersText from './readers/text.py';
import readersWav from './readers/wav.py';
import frameAgreement from './frame/agreement.py';
import frameInputs from './frame/inputs.py';

/** Source of each step's equivalent, by the step's id. */
export const stepSources: Readonly<Record<string, string>> = {
  'band-pass': stepBandPass,
  coherence: stepCoherence,
  'compare-noise': stepCompareNoise,
  consistency: stepConsistency,
  'constant-q-map': stepConstantQMap,
  'expected-snr': stepExpectedSnr,
  gate: stepGate,
  gaussianity: stepGaussianity,
  'high-pass': stepHighPass,
  lines: stepLines,
  'matched-filter': stepMatchedFilter,
  'noise-spectrum': stepNoiseSpectrum,
  notch: stepNotch,
  overview: stepOverview,
  reach: stepReach,
  'reference-noise': stepReferenceNoise,
  resample: stepResample,
  'signal-over-noise': stepSignalOverNoise,
  spectrogram: stepSpectrogram,
  stationarity: stepStationarity,
  waveform: stepWaveform,
  whiten: stepWhiten,
};

/** Functions that several equivalents call, by their name. */
export const shared: Readonly<Record<string, string>> = {
  detrended_bins: sharedDetrendedBins,
  filter_valid_runs: sharedFilterValidRuns,
  group_ranges: sharedGroupRanges,
  half_power_hz: sharedHalfPowerHz,
  line_peaks: sharedLinePeaks,
  line_shape: sharedLineShape,
  make_window: sharedMakeWindow,
  mean_variance: sharedMeanVariance,
  median_bias: sharedMedianBias,
  median_spectrum: sharedMedianSpectrum,
  median_variance: sharedMedianVariance,
  overlap_correlations: sharedOverlapCorrelations,
  pass_sections: sharedPassSections,
  passes_gain: sharedPassesGain,
  ringing_s: sharedRingingS,
  robust_width: sharedRobustWidth,
  segment_starts: sharedSegmentStarts,
  segment_transforms: sharedSegmentTransforms,
  smooth_length: sharedSmoothLength,
  snr_parts: sharedSnrParts,
  truncated_inverse: sharedTruncatedInverse,
  valid_runs: sharedValidRuns,
  whitening_filter: sharedWhiteningFilter,
};

/** Readers of data files, by format. */
export const readers: Readonly<Record<string, string>> = {
  hdf5: readersHdf5,
  npy: readersNpy,
  npz: readersNpz,
  raw: readersRaw,
  text: readersText,
  wav: readersWav,
};

/** What every script has: reading and checking inputs, comparing numbers. */
export const frame: Readonly<Record<string, string>> = {
  agreement: frameAgreement,
  inputs: frameInputs,
};
