import type { Spectrum } from '../data/kinds';
import { densityAt } from '../noise/inverse-spectrum';
import { binaryOf, iscoFrequency, type Binary } from '../waveforms/binary';
import { imr2008 } from '../waveforms/imr-2008';
import { inspiralAmplitude } from '../waveforms/inspiral';
import { luminosityDistance, redshiftWhere, type Universe } from './cosmology';

/** Horizon over the distance averaged over sky, inclination and polarisation (Finn & Chernoff, PRD 47, 2198, 1993): COMPUTED 2.26478. */
export const AVERAGE = 2.26478;

export interface ReachRequest {
  readonly spectrum: Spectrum;
  /** Hz */
  readonly low: number;
  readonly high: number;
  readonly threshold: number;
  /** Larger over smaller mass. */
  readonly ratio: number;
  readonly model: 'inspiral' | 'inspiral-merger-ringdown';
  /** Absent: redshift neglected. */
  readonly universe?: Universe;
}

export interface Reach {
  /** M☉, in the frame of the source. */
  readonly total: number;
  /** Luminosity distance in Mpc. */
  readonly horizon: number;
  readonly redshift: number;
}

/** Even steps in the logarithm are fine enough for any curve without lines; bins of an estimate are taken as they are. */
const POINTS = 4000;

/** Frequencies with 4 df/S, made once for all masses. */
export function noiseWeights({ spectrum, low, high }: ReachRequest): {
  f: Float64Array;
  weight: Float64Array;
} {
  const { frequency, df } = spectrum;
  const top = Math.min(high, frequency[frequency.length - 1]);
  const grid =
    df > 0
      ? frequency.filter((v) => v >= low && v <= top)
      : Float64Array.from({ length: POINTS }, (_, i) => low * (top / low) ** ((i + 0.5) / POINTS));
  const step = (f: number): number => (df > 0 ? df : (f * Math.log(top / low)) / POINTS);
  const weight = grid.map((f) => {
    const s = densityAt(spectrum, f);
    return s > 0 && s < Infinity ? (4 * step(f)) / s : 0;
  });
  return { f: grid, weight };
}

/** SNR at 1 Mpc, optimally placed, of a binary of detector-frame masses. */
function snrAtOne(
  b: Binary,
  model: ReachRequest['model'],
  { f, weight }: ReturnType<typeof noiseWeights>,
): number {
  const imr = model === 'inspiral' ? undefined : imr2008(b);
  const amplitude = imr ? (v: number) => imr.amplitude(v) : inspiralAmplitude(b, 1);
  const end = imr ? imr.cut : iscoFrequency(b);
  let sum = 0;
  for (let k = 0; k < f.length; k++) {
    const width = k + 1 < f.length ? f[k + 1] - f[k] : f[k] - f[k - 1];
    // The part of the bin below the end of the wave, so that the reach does not jump from bin to bin.
    const part = Math.min(1, (end - f[k]) / width + 0.5);
    if (part <= 0) break;
    sum += part * weight[k] * amplitude(Math.min(f[k], end)) ** 2;
  }
  return Math.sqrt(sum);
}

/** How far a binary of a total mass could be seen at the threshold, optimally placed. */
export function reachOf(
  total: number,
  request: ReachRequest,
  weights: ReturnType<typeof noiseWeights>,
): Reach {
  const { ratio, threshold, model, universe } = request;
  const masses = (z: number): Binary =>
    binaryOf({ mass: (total * ratio) / (1 + ratio) }, { mass: total / (1 + ratio) }, z);
  const distance = (z: number): number => snrAtOne(masses(z), model, weights) / threshold;
  if (!universe) return { total, horizon: distance(0), redshift: 0 };
  const redshift = redshiftWhere(distance, universe);
  return { total, horizon: luminosityDistance(redshift, universe), redshift };
}
