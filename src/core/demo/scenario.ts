import type { Site } from '../sites/sites';
import type { Burst } from './burst';
import type { Binary } from './chirp';
import type { Grid, Mains } from './mains';
import type { NoiseCurve } from './noise-curve';

/** Everything one site's data are made of. Sites, instruments and events are invented. */
export interface DemoSite {
  readonly site: Site;
  /** Stream of the random numbers. */
  readonly stream: number;
  readonly noise: NoiseCurve;
  readonly mains: Mains;
  readonly bursts: readonly Burst[];
  /** Spans without data, seconds after the start. */
  readonly gaps: readonly { readonly start: number; readonly duration: number }[];
}

export const DEMO_SEED = 20_240_519;
/** GPS seconds of the first sample. */
export const DEMO_START = 1_400_000_000;
/** Hz */
export const DEMO_RATE = 4096;
/** Seconds. */
export const DEMO_DURATION = 256;

export const GRID: Grid = { frequency: 50, swing: 0.02, period: 97 };

/** The signal's coalescence as it would be seen at the Earth's centre, seconds after the start, and where it comes from (degrees). */
export const SIGNAL: Binary & {
  readonly time: number;
  readonly rightAscension: number;
  readonly declination: number;
  readonly polarisation: number;
} = {
  mass1: 14.6,
  mass2: 10.9,
  distance: 485,
  inclination: 0.09,
  phase: 0.3,
  time: 168.4,
  rightAscension: 14.5,
  declination: -27,
  polarisation: 21,
};

const ALDER: DemoSite = {
  site: {
    name: 'alder',
    title: 'Alder',
    latitude: 61.4,
    longitude: 98.7,
    height: 112,
    arms: { x: { azimuth: 37, tilt: 0 }, y: { azimuth: 127, tilt: 0 } },
  },
  stream: 1,
  noise: {
    wall: { level: 1.5e-18, knee: 4.5 },
    slope: { level: 1e-23, at: 40 },
    floor: { level: 8e-24, corner: 300 },
    resonances: [
      { frequency: 34.6, q: 90, peak: 1.2e-22 },
      { frequency: 331.7, q: 1100, peak: 9e-22 },
      { frequency: 502.4, q: 4000, peak: 1.6e-21 },
      { frequency: 1003.1, q: 9000, peak: 2.5e-21 },
    ],
  },
  mains: {
    harmonics: [
      { order: 1, amplitude: 2.4e-22, phase: 0.11 },
      { order: 2, amplitude: 3e-23, phase: 0.63 },
      { order: 3, amplitude: 8e-23, phase: 0.87 },
      { order: 5, amplitude: 4e-23, phase: 0.28 },
      { order: 7, amplitude: 3e-23, phase: 0.49 },
    ],
    wander: { depth: 0.06, period: 61, phase: 0.2 },
  },
  bursts: [],
  gaps: [{ start: 41, duration: 3 }],
};

const BIRCH: DemoSite = {
  site: {
    name: 'birch',
    title: 'Birch',
    latitude: 42.6,
    longitude: 69.2,
    height: 305,
    arms: { x: { azimuth: 64, tilt: 0 }, y: { azimuth: 154, tilt: 0 } },
  },
  stream: 2,
  noise: {
    wall: { level: 2.2e-18, knee: 4.6 },
    slope: { level: 1.2e-23, at: 44 },
    floor: { level: 1e-23, corner: 260 },
    resonances: [
      { frequency: 29.3, q: 60, peak: 2.5e-22 },
      { frequency: 318.9, q: 900, peak: 1.1e-21 },
      { frequency: 507.2, q: 3500, peak: 1.4e-21 },
      { frequency: 1012.8, q: 8000, peak: 2.2e-21 },
    ],
  },
  mains: {
    harmonics: [
      { order: 1, amplitude: 3.5e-22, phase: 0.71 },
      { order: 3, amplitude: 1.1e-22, phase: 0.05 },
      { order: 4, amplitude: 2.5e-23, phase: 0.94 },
      { order: 5, amplitude: 6e-23, phase: 0.33 },
    ],
    wander: { depth: 0.08, period: 83, phase: 0.6 },
  },
  bursts: [{ time: 97.3, frequency: 140, q: 4, phase: 0.15, snr: 25 }],
  gaps: [],
};

export const DEMO_SITES: readonly DemoSite[] = [ALDER, BIRCH];
