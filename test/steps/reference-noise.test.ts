import { describe, expect, test } from 'vitest';
import { UserError } from '../../src/core/data/errors';
import { NOISE_MODELS } from '../../src/core/noise/models';
import noiseSpectrum from '../../src/core/steps/noise-spectrum';
import referenceNoise from '../../src/core/steps/reference-noise';
import { runStep } from './run-step';
import { gaussianNoise, seriesOf } from './synthetic';

/**
 * √S in 1/√Hz of the published models at some frequencies, evaluated with NumPy from the formulas (COMPUTED). The formulas
 * themselves: Damour, Iyer, Sathyaprakash, PRD 63, 044023 (2001); Sathyaprakash & Schutz, Living Rev. Relativity 12, 2
 * (2009), both MEMORY.
 */
const VALUES: Record<string, Record<number, number>> = {
  'first-generation-4km': {
    50: 1.4543538300668826e-22,
    100: 3.8679565005053946e-23,
    200: 3.1925411595167175e-23,
    1000: 1.151869227944286e-22,
    2000: 2.273059638126211e-22,
  },
  'first-generation-3km': {
    20: 3.5275972909385123e-22,
    50: 8.782454155972897e-23,
    100: 5.87284934306212e-23,
    200: 4.305673435299876e-23,
    1000: 4.244526294369498e-23,
    2000: 7.403782824221501e-23,
  },
  'first-generation-600m': {
    50: 1.090790847284296e-22,
    100: 7.855384822342728e-23,
    200: 5.830671661665043e-23,
    1000: 2.8605857948759076e-22,
    2000: 5.898489671182261e-22,
  },
  'second-generation-4km-2009': {
    20: 4.2607463479398836e-23,
    50: 6.5518977645803e-24,
    100: 2.8550355233173333e-24,
    200: 1.871161009543049e-24,
    1000: 1.415639852762266e-23,
    2000: 3.028807021414284e-23,
  },
  'third-generation-underground': {
    10: 5.108587568552214e-24,
    20: 1.322293417785103e-24,
    50: 3.6470585968502346e-25,
    100: 2.5179999999999998e-25,
    200: 2.575148058146673e-25,
    1000: 6.486600806791151e-25,
    2000: 1.226623812315731e-24,
  },
};
const FROM: Record<string, number> = {
  'first-generation-4km': 40,
  'first-generation-3km': 20,
  'first-generation-600m': 40,
  'second-generation-4km-2009': 20,
  'third-generation-underground': 10,
};

describe('published models', () => {
  test('each has check values', () =>
    expect(NOISE_MODELS.map((m) => m.id).sort()).toEqual(Object.keys(VALUES).sort()));

  test.each(NOISE_MODELS)('$id', async (model) => {
    for (const [f, asd] of Object.entries(VALUES[model.id]))
      expect(Math.sqrt(model.density(Number(f))) / asd, `${f} Hz`).toBeCloseTo(1, 12);
    const run = await runStep(referenceNoise, [], { curve: model.id });
    expect(run.number('at-100') / VALUES[model.id][100]).toBeCloseTo(1, 12);
    expect(run.number('at-1000') / VALUES[model.id][1000]).toBeCloseTo(1, 12);
    expect(run.number('range-from')).toBe(FROM[model.id]);
    const { frequency, density, unit, estimate } = run.outcome.data;
    expect(frequency[0]).toBe(FROM[model.id]);
    expect(density.every((s) => s > 0)).toBe(true);
    expect(unit).toBe('strain²/Hz');
    expect(estimate).toBeUndefined();
  });

  test('says that fits of the second generation differ, and only of that', async () => {
    expect((await runStep(referenceNoise, [])).codes).toEqual(['fits-differ']);
    expect((await runStep(referenceNoise, [], { curve: 'third-generation-underground' })).codes).toEqual([]);
  });
});

describe('over an estimate', () => {
  const fs = 4096;
  /** White noise of one-sided density S: σ² = S rate / 2. */
  const white = async (asd: number, unit = 'strain') =>
    (
      await runStep(
        noiseSpectrum,
        [seriesOf(gaussianNoise(64 * fs, asd * Math.sqrt(fs / 2)), fs, { unit })],
        { segment: 1, average: 'mean' },
      )
    ).outcome.data;
  const curve = 'first-generation-3km';

  test('is on the bins of the estimate, without extrapolation, and gives the ratio', async () => {
    const over = await white(1e-22);
    const run = await runStep(referenceNoise, [over], { curve, low: 100, high: 102 });
    const { frequency, density } = run.outcome.data;
    expect(frequency).toBe(over.frequency);
    expect(density.slice(0, 20).every(Number.isNaN)).toBe(true);
    expect(density.slice(20).every((s) => s > 0)).toBe(true);
    // Median of three bins against √S at 101 Hz; one bin is good to 9 %.
    const expected = 1e-22 / Math.sqrt(NOISE_MODELS[1].density(101));
    expect(Math.abs(run.number('ratio') / expected - 1)).toBeLessThan(0.15);
    expect(run.codes).toEqual([]);
    expect(run.outcome.sentence).toContain('times it (median)');
  });

  test('draws both', async () => {
    const over = await white(1e-22);
    const [figure] = (await runStep(referenceNoise, [over], { curve })).figures();
    expect(figure.traces.map((t) => t.role)).toEqual(['interval', 'data', 'reference']);
    expect(figure.y.label).toContain('one-sided');
    expect(figure.y.unit).toBe('strain/√Hz');
    expect(figure.caption).toContain(curve);
  });

  test('warns of another unit, of a ratio no detector has, and of a band it does not cover', async () => {
    expect((await runStep(referenceNoise, [await white(1, 'V')], { curve })).codes).toEqual(['unit-differs']);
    const far = await runStep(referenceNoise, [await white(1)], { curve });
    expect(far.codes).toEqual(['far-from-reference']);
    const part = await runStep(referenceNoise, [await white(1e-22)], { curve, low: 15, high: 24 });
    expect(part.outcome.warnings).toMatchObject([{ code: 'band-not-covered', value: 0.5 }]);
    const none = await runStep(referenceNoise, [await white(1e-22)], { curve, low: 2, high: 5 });
    expect(none.outcome.warnings).toMatchObject([{ code: 'band-not-covered', value: 0 }]);
    expect(none.outcome.numbers.some((n) => n.id === 'ratio')).toBe(false);
  });
});

describe('a file', () => {
  const text = '# made by hand\nfrequency, value\n0, 1e-20\n10, 1e-22\n100, 1e-23\n\n1000, 1e-22\n';
  const file = (holds: string, content = text) =>
    runStep(
      referenceNoise,
      [],
      { curve: 'file', file: 'curve.csv', holds },
      { files: { 'curve.csv': content } },
    );

  test('holds amplitude or power density', async () => {
    const amplitude = await file('amplitude density');
    expect(amplitude.number('at-100')).toBe(1e-23);
    expect(amplitude.outcome.warnings).toMatchObject([
      { code: 'zero-frequency-row', severity: 'note', value: 1 },
    ]);
    expect((await file('power density')).number('at-100') / Math.sqrt(1e-23)).toBeCloseTo(1, 12);
  });

  test('does not reach beyond its points', async () => {
    const run = await file('amplitude density', '10 1e-22\n500 1e-23\n');
    expect(run.outcome.numbers.map((n) => n.id)).toEqual(['at-100', 'range-from', 'range-to']);
    expect(run.number('range-to')).toBe(500);
    expect(run.codes).toEqual([]);
  });

  test.each([
    [{ curve: 'file' }, 'file-missing'],
    [{ file: 'curve.csv' }, 'file-not-used'],
    [{ low: 300, high: 200 }, 'empty-band'],
  ])('refuses %j', async (params, code) => {
    const run = runStep(referenceNoise, [], params);
    await expect(run).rejects.toThrow(UserError);
    await expect(run).rejects.toMatchObject({ code });
  });
});
