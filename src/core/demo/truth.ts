import { addSeconds, formatGps, gpsTime } from '../data/gps-time';
import { lastStableFrequency } from './chirp';
import { power } from './elementary';
import {
  DEMO_DURATION,
  DEMO_RATE,
  DEMO_SEED,
  DEMO_SITES,
  DEMO_START,
  GRID,
  SIGNAL,
  type DemoSite,
} from './scenario';
import type { SiteData } from './synthesise';

/** GPS time of a moment in seconds after the start of the data, as text. */
const at = (seconds: number): string => formatGps(addSeconds(gpsTime(DEMO_START), seconds));

/**
 * What the demo's data are made of, for checking results against: the content of `demo.truth.json`. Keys carry their unit.
 * `data` in the order of `DEMO_SITES`.
 */
export function demoTruth(data: readonly SiteData[]): Record<string, unknown> {
  const { mass1, mass2 } = SIGNAL;
  const total = mass1 + mass2;
  const symmetric = (mass1 * mass2) / (total * total);
  return {
    about:
      'Everything here is invented: sites, instruments, noise and signal. SNRs are optimal ones, √(4∫|h̃|²/S df), over the noise curve without mains lines.',
    seed: DEMO_SEED,
    startGps: at(0),
    durationSeconds: DEMO_DURATION,
    rateHz: DEMO_RATE,
    signal: {
      model:
        'inspiral of two compact bodies without spin, stationary phase, 3.5PN phase, lowest-order amplitude, half a cosine from 0.95 to 1.05 of endHz',
      mass1Sun: mass1,
      mass2Sun: mass2,
      massesAre: 'detector-frame',
      chirpMassSun: total * power(symmetric, 0.6),
      distanceMpc: SIGNAL.distance,
      inclinationDegrees: SIGNAL.inclination * 360,
      coalescencePhaseTurns: SIGNAL.phase,
      rightAscensionDegrees: SIGNAL.rightAscension,
      declinationDegrees: SIGNAL.declination,
      polarisationDegrees: SIGNAL.polarisation,
      coalescenceAtEarthCentreGps: at(SIGNAL.time),
      endHz: lastStableFrequency(SIGNAL),
      networkSnr: Math.sqrt(data.reduce((sum, d) => sum + d.signal.snr * d.signal.snr, 0)),
    },
    sites: Object.fromEntries(DEMO_SITES.map((demo, i) => [demo.site.name, siteTruth(demo, data[i])])),
  };
}

function siteTruth(demo: DemoSite, data: SiteData): Record<string, unknown> {
  const mains = demo.mains.harmonics.map((h) => ({
    frequencyHz: h.order * GRID.frequency,
    kind: 'mains',
    amplitudeStrain: h.amplitude,
  }));
  const resonances = demo.noise.resonances.map((r) => ({
    frequencyHz: r.frequency,
    kind: 'resonance',
    q: r.q,
    peakStrainPerRootHz: r.peak,
  }));
  return {
    noise: demo.noise,
    lines: [...mains, ...resonances].sort((a, b) => a.frequencyHz - b.frequencyHz),
    mainsAmplitudeWander: demo.mains.wander.depth,
    gaps: demo.gaps.map((g) => ({ startGps: at(g.start), durationSeconds: g.duration })),
    glitches: demo.bursts.map((b, i) => ({
      timeGps: at(b.time),
      frequencyHz: b.frequency,
      q: b.q,
      amplitudeStrain: data.burstAmplitudes[i],
      snr: b.snr,
    })),
    signal: {
      coalescenceGps: at(SIGNAL.time + data.signal.delay),
      delayFromEarthCentreSeconds: data.signal.delay,
      antennaPlus: data.signal.plus,
      antennaCross: data.signal.cross,
      snr: data.signal.snr,
    },
  };
}
