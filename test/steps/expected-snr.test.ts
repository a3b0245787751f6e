import { expect, test } from 'vitest';
import { addSeconds, gpsTime } from '../../src/core/data/gps-time';
import type { Spectrum } from '../../src/core/data/kinds';
import { DEMO_SITES, DEMO_START, SIGNAL } from '../../src/core/demo/scenario';
import { noiseDensity } from '../../src/core/demo/noise-curve';
import { antennaFactors } from '../../src/core/sites/antenna';
import expectedSnr from '../../src/core/steps/expected-snr';
import waveform from '../../src/core/steps/waveform';
import { runStep } from './run-step';

const white = (density: number, df = 0.5): Spectrum => {
  const frequency = Float64Array.from({ length: 4096 }, (_, k) => k * df);
  return {
    kind: 'spectrum',
    label: 'white',
    frequency,
    density: frequency.map(() => density),
    df,
    unit: 'strain²/Hz',
  };
};

test('a burst in white noise: ρ² = 2 ∫h² dt / S (Parseval), half of it below its frequency', async () => {
  const burst = (
    await runStep(waveform, [], {
      model: 'sine-gaussian',
      frequency: 400,
      quality: 20,
      amplitude: 1e-21,
      low: 0,
    })
  ).outcome.data;
  const run = await runStep(expectedSnr, [burst, white(1e-46)], { low: 20 });
  const square = 1e-42 * (20 / (4 * Math.sqrt(Math.PI) * 400));
  expect(run.number('snr') / Math.sqrt((2 * square) / 1e-46)).toBeCloseTo(1, 4);
  expect(Math.abs(run.number('half') - 400)).toBeLessThan(1);
  expect(run.outcome.tables![0].rows.reduce((s, r) => s + (r[3] as number), 0)).toBeCloseTo(1, 6);
});

test('an inspiral: SNR goes with 1/distance, and the distance at the threshold follows', async () => {
  const at = async (distance: number) => {
    const h = (await runStep(waveform, [], { 'mass-1': 10, 'mass-2': 10, distance })).outcome.data;
    return runStep(expectedSnr, [h, white(1e-46)]);
  };
  const [near, far] = [await at(100), await at(250)];
  expect(near.number('snr') / far.number('snr')).toBeCloseTo(2.5, 10);
  expect(near.number('distance')).toBeCloseTo(far.number('distance'), 6);
  expect(near.number('distance')).toBeCloseTo((100 * near.number('snr')) / 8, 6);
});

test.each([
  [0, 13.207],
  [1, 12.211],
])(
  'the demo signal at site %d has the SNR of its truth, with antenna factors and inclination',
  async (i, truth) => {
    const { site, noise } = DEMO_SITES[i];
    const frequency = Float64Array.from({ length: 2048 * 16 }, (_, k) => k / 16);
    const spectrum: Spectrum = {
      kind: 'spectrum',
      label: site.title,
      frequency,
      density: frequency.map((f) => noiseDensity(noise, Math.max(f, 1))),
      df: 1 / 16,
      unit: 'strain²/Hz',
    };
    const h = (
      await runStep(waveform, [], {
        'mass-1': SIGNAL.mass1,
        'mass-2': SIGNAL.mass2,
        distance: SIGNAL.distance,
        low: 10,
      })
    ).outcome.data;
    const run = await runStep(expectedSnr, [h, spectrum], { low: 10 });
    const turns = 2 * Math.PI;
    const radians = (degrees: number): number => (degrees * Math.PI) / 180;
    const { plus, cross } = antennaFactors(
      site,
      {
        rightAscension: radians(SIGNAL.rightAscension),
        declination: radians(SIGNAL.declination),
        polarisation: radians(SIGNAL.polarisation),
      },
      addSeconds(gpsTime(DEMO_START), SIGNAL.time),
    );
    const c = Math.cos(SIGNAL.inclination * turns);
    const factor = Math.hypot((plus * (1 + c * c)) / 2, cross * c);
    // The demo fades its end between 0.95 and 1.05 of the last stable orbit; this one is cut off there.
    expect(Math.abs((factor * run.number('snr')) / truth - 1)).toBeLessThan(0.01);
  },
);

test('no band in common is said', async () => {
  const h = (await runStep(waveform, [], { 'mass-1': 10, 'mass-2': 10 })).outcome.data;
  await expect(runStep(expectedSnr, [h, white(1e-46)], { low: 500 })).rejects.toMatchObject({
    code: 'band-empty',
  });
});
