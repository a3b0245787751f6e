import { describe, expect, test } from 'vitest';
import { luminosityDistance } from '../../src/core/signal/cosmology';
import reach from '../../src/core/steps/reach';
import { modelSpectrum } from './model-spectrum';
import { runStep } from './run-step';

describe('horizon of 1.4 + 1.4 M☉ at SNR 8, redshift neglected', () => {
  // Integrals of the published models from their lowest frequency to the last stable orbit, by SciPy (COMPUTED).
  test.each([
    ['first-generation-4km', 40, 31.2078, 13.7796],
    ['first-generation-3km', 20, 29.8703, 13.1891],
    ['first-generation-600m', 40, 19.1757, 8.4669],
    ['second-generation-4km-2009', 20, 496.524, 219.237],
    ['third-generation-underground', 10, 6382.14, 2818.0],
  ])('%s from %d Hz', async (id, low, horizon, average) => {
    const run = await runStep(reach, [modelSpectrum(id, 1 / 16)], {
      low,
      redshift: 'neglected',
      masses: [2.8],
    });
    expect(Math.abs(run.number('horizon-1') / horizon - 1)).toBeLessThan(2e-3);
    expect(Math.abs(run.number('average-1') / average - 1)).toBeLessThan(2e-3);
  });
});

describe('redshift', () => {
  test('distance in an empty and in a flat universe of matter alone has a closed form', () => {
    for (const z of [0.01, 0.5, 3]) {
      // Einstein–de Sitter: (2c/H₀)(1 + z − √(1 + z)); constant alone: (c/H₀) z (1 + z).
      const unit = 299_792.458 / 70;
      expect(luminosityDistance(z, { hubble: 70, matter: 1 })).toBeCloseTo(
        2 * unit * (1 + z - Math.sqrt(1 + z)),
        6,
      );
      expect(luminosityDistance(z, { hubble: 70, matter: 0 })).toBeCloseTo(unit * z * (1 + z), 6);
    }
  });

  test('near, it makes no difference; a source at the horizon has the threshold SNR with its redshifted mass', async () => {
    const near = modelSpectrum('first-generation-4km');
    const at = async (redshift: string): Promise<number> =>
      (await runStep(reach, [near], { low: 40, redshift, masses: [2.8] })).number('horizon-1');
    // z = 0.007: masses larger by that much reach a little farther: (1 + z)^(5/6).
    const [with_, without] = [await at('flat-universe'), await at('neglected')];
    expect(with_ / without).toBeGreaterThan(1);
    expect(with_ / without).toBeLessThan(1.01);
    const far = modelSpectrum('third-generation-underground');
    const run = await runStep(reach, [far], { low: 10, masses: [20] });
    const z = run.outcome.tables![0].rows[0][3] as number;
    const heavier = await runStep(reach, [far], { low: 10, masses: [20 * (1 + z)], redshift: 'neglected' });
    expect(run.number('horizon-1') / heavier.number('horizon-1')).toBeCloseTo(1, 6);
  });
});

test('halving the threshold doubles the horizon; a louder noise shrinks it', async () => {
  const s = modelSpectrum('first-generation-4km');
  const at = async (params: object, spectrum = s): Promise<number> =>
    (await runStep(reach, [spectrum], { low: 40, redshift: 'neglected', ...params })).number('horizon-2');
  expect((await at({ threshold: 4 })) / (await at({}))).toBeCloseTo(2, 12);
  const loud = { ...s, density: s.density.map((v) => 4 * v) };
  expect((await at({}, loud)) / (await at({}))).toBeCloseTo(0.5, 12);
});

test('warnings, and the figure of both distances', async () => {
  const s = modelSpectrum('second-generation-4km-2009');
  const run = await runStep(reach, [s], { redshift: 'neglected' });
  expect(run.codes).toEqual(['merger-left-out', 'redshift-neglected']);
  expect((await runStep(reach, [s], { model: 'inspiral-merger-ringdown' })).codes).toContain('outside-model');
  const [figure] = run.figures();
  expect(figure.traces.map((t) => t.name)).toEqual(['horizon', 'average over sky and orientation']);
});
