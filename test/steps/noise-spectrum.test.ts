import { expect, test } from 'vitest';
import noiseSpectrum from '../../src/core/steps/noise-spectrum';
import overview from '../../src/core/steps/overview';
import referenceNoise from '../../src/core/steps/reference-noise';
import { runStep } from './run-step';
import { gaussianNoise, seriesOf } from './synthetic';

test('smoke', async () => {
  const s = seriesOf(gaussianNoise(4096 * 64, 1e-21), 4096);
  const o = await runStep(overview, [s]);
  console.log(o.outcome.sentence, o.outcome.numbers, o.outcome.warnings, o.figures().map((f) => f.caption));
  const n = await runStep(noiseSpectrum, [s]);
  console.log(n.outcome.sentence, n.outcome.numbers, n.outcome.warnings, n.figures().map((f) => f.caption));
  const r = await runStep(referenceNoise, [n.outcome.data]);
  console.log(r.outcome.sentence, r.outcome.numbers, r.outcome.warnings, r.figures().map((f) => f.caption));
  expect(n.number('segments')).toBe(31);
});
