// Written by `npm run sync`: one line per file of this folder.
import type { AnyStep } from './define';
import coherence from './coherence';
import compareNoise from './compare-noise';
import consistency from './consistency';
import gaussianity from './gaussianity';
import matchedFilter from './matched-filter';
import noiseSpectrum from './noise-spectrum';
import overview from './overview';
import referenceNoise from './reference-noise';
import resample from './resample';
import whiten from './whiten';

/** Every step, by id. */
export const steps: Readonly<Record<string, AnyStep>> = {
  coherence: coherence,
  'compare-noise': compareNoise,
  consistency: consistency,
  gaussianity: gaussianity,
  'matched-filter': matchedFilter,
  'noise-spectrum': noiseSpectrum,
  overview: overview,
  'reference-noise': referenceNoise,
  resample: resample,
  whiten: whiten,
};
