import { addSeconds, gpsTime } from '../data/gps-time';
import { antennaFactors, arrivalDelay } from '../sites/antenna';
import { addBurst, optimalSnr } from './burst';
import { projectedChirp } from './chirp';
import { colouredNoise } from './coloured-noise';
import { addMains } from './mains';
import { DEMO_DURATION, DEMO_RATE, DEMO_SEED, DEMO_START, GRID, SIGNAL, type DemoSite } from './scenario';
import { realFromHalf } from './transform';

export interface SiteData {
  readonly samples: Float64Array;
  /** What the signal is at this site; SNR over the noise curve, which has no mains lines in it. */
  readonly signal: {
    readonly plus: number;
    readonly cross: number;
    /** Seconds after the Earth's centre. */
    readonly delay: number;
    readonly snr: number;
  };
  /** Amplitude of each burst, strain. */
  readonly burstAmplitudes: readonly number[];
}

/** Seconds of the signal's own transform, and where in it the coalescence lies. */
const WINDOW = 64;
const LEAD = 56;
const ONSET = [9, 11] as const;

/**
 * Antenna factors and delay come from `Math.sin`, whose last digit is not the same everywhere. Rounded to nine decimals (of
 * a second: nanoseconds) they are, and the truth file states exactly what is in the data. `disturb` is added before rounding;
 * the tests use it to show that no rounding stands on the edge.
 */
export function roundedGeometry(
  { site }: DemoSite,
  disturb = 0,
): { plus: number; cross: number; delay: number } {
  const degree = Math.PI / 180;
  const source = {
    rightAscension: SIGNAL.rightAscension * degree,
    declination: SIGNAL.declination * degree,
    polarisation: SIGNAL.polarisation * degree,
  };
  const at = addSeconds(gpsTime(DEMO_START), SIGNAL.time);
  const round = (x: number): number => Math.round((x + disturb) * 1e9) / 1e9;
  const { plus, cross } = antennaFactors(site, source, at);
  return { plus: round(plus), cross: round(cross), delay: round(arrivalDelay(site, source, at)) };
}

/** The demo's samples at one site: noise, mains, bursts, signal, gaps, in that order. The same to the bit everywhere. */
export function synthesise(demo: DemoSite): SiteData {
  const samples = colouredNoise(demo.noise, DEMO_RATE, DEMO_RATE * DEMO_DURATION, DEMO_SEED, demo.stream);
  addMains(samples, DEMO_RATE, GRID, demo.mains);
  const burstAmplitudes = demo.bursts.map((burst) => addBurst(samples, DEMO_RATE, demo.noise, burst));

  const geometry = roundedGeometry(demo);
  const n = WINDOW * DEMO_RATE;
  const firstSecond = Math.floor(SIGNAL.time) - LEAD;
  const arrival = SIGNAL.time + geometry.delay - firstSecond;
  const chirp = projectedChirp(SIGNAL, geometry, arrival, ONSET, 1 / WINDOW, n / 2 + 1);
  const snr = optimalSnr(chirp, 1 / WINDOW, demo.noise);
  const wave = realFromHalf(
    chirp.re.map((v) => v * DEMO_RATE),
    chirp.im.map((v) => v * DEMO_RATE),
  );
  const offset = firstSecond * DEMO_RATE;
  for (let i = 0; i < n; i++) samples[offset + i] = samples[offset + i] + wave[i];

  for (const gap of demo.gaps)
    samples.fill(NaN, gap.start * DEMO_RATE, (gap.start + gap.duration) * DEMO_RATE);
  return { samples, signal: { ...geometry, snr }, burstAmplitudes };
}
