// Written by `npm run sync`: one line per file of this folder.
import type { AnyStep } from './define';
import noiseSpectrum from './noise-spectrum';
import overview from './overview';
import referenceNoise from './reference-noise';

/** Every step, by id. */
export const steps: Readonly<Record<string, AnyStep>> = {
  'noise-spectrum': noiseSpectrum as unknown as AnyStep,
  overview: overview as unknown as AnyStep,
  'reference-noise': referenceNoise as unknown as AnyStep,
};
