import { expect, test } from 'vitest';
import expectedSnr from '../../src/core/steps/expected-snr';
import overNoise from '../../src/core/steps/signal-over-noise';
import waveform from '../../src/core/steps/waveform';
import { modelSpectrum } from './model-spectrum';
import { runStep } from './run-step';

const signal = async (mass: number, distance: number) =>
  (await runStep(waveform, [], { 'mass-1': mass, 'mass-2': mass, distance })).outcome.data;

test('every signal over every noise, each as the optimal SNR of the other step', async () => {
  const [a, b] = [await signal(1.4, 50), await signal(10, 200)];
  const [near, far] = [modelSpectrum('first-generation-4km'), modelSpectrum('second-generation-4km-2009')];
  const run = await runStep(overNoise, [a, b, near, far]);
  for (const [i, w] of [a, b].entries())
    for (const [k, s] of [near, far].entries())
      expect(run.number(`snr-${i + 1}-${k + 1}`)).toBe((await runStep(expectedSnr, [w, s])).number('snr'));
  expect(run.outcome.tables![0].rows).toHaveLength(4);
});

test('the area between the drawn curves in log frequency is SNR²', async () => {
  const w = await signal(10, 200);
  const noise = modelSpectrum('first-generation-4km');
  const run = await runStep(overNoise, [w, noise], { low: 40 });
  const [figure] = run.figures({ width: 4000 });
  const [n, s] = figure.traces;
  if (n.type !== 'line' || s.type !== 'line') throw new Error('lines');
  let area = 0;
  for (let i = 1; i < s.x.length; i++) {
    const f = (s.x[i] + s.x[i - 1]) / 2;
    if (f < 40) continue;
    const density = noise.density[Math.round(f / noise.df) - 1];
    const ratio = ((s.y[i] + s.y[i - 1]) / 2) ** 2 / (f * density);
    area += ratio * Math.log(s.x[i] / s.x[i - 1]);
  }
  expect(Math.sqrt(area) / run.number('snr-1-1')).toBeCloseTo(1, 2);
});
