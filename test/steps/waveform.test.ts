import { describe, expect, test } from 'vitest';
import waveform from '../../src/core/steps/waveform';
import { binaryOf, chirpTimes, iscoFrequency } from '../../src/core/waveforms/binary';
import { inspiral } from '../../src/core/waveforms/inspiral';
import { inspiralPhase, type PnOrder } from '../../src/core/waveforms/inspiral-phase';
import { inspiralMergerRingdown } from '../../src/core/waveforms/inspiral-merger-ringdown';
import { remnantOf } from '../../src/core/waveforms/remnant';
import { ringdownMode } from '../../src/core/waveforms/ringdown-mode';
import { runStep } from './run-step';

/** GM☉/c³ in s (IAU 2015 B3, READ). */
const SUN = 1.3271244e20 / 299_792_458 ** 3;
const MPC = 3.085677581491367e22 / 299_792_458;

const options = (m1: number, m2: number, spin1 = 0, spin2 = 0) => ({
  binary: binaryOf({ mass: m1, spin: spin1 }, { mass: m2, spin: spin2 }),
  distance: 100,
  low: 10,
  high: null,
  taper: 0,
  phase: 0,
  redshift: 0,
});

describe('the post-Newtonian phase', () => {
  // 3/(128 η v⁵) Σ ψ_k v^k with 40 digits by mpmath from the coefficients derived from energy and flux (COMPUTED).
  test.each([
    ['0PN', 11903.06763986092],
    ['1PN', 12600.000620907396],
    ['1.5PN', 12081.539515121623],
    ['2PN', 12127.0154783354],
    ['2.5PN', 12039.132903833724],
    ['3PN', 12036.114675521023],
    ['3.5PN', 12037.07832303169],
  ])('1.4 + 1.4 M☉ at 20 Hz, %s', (order, expected) => {
    const found = inspiralPhase(binaryOf({ mass: 1.4 }, { mass: 1.4 }), order as PnOrder).at(20);
    expect(Math.abs(found / expected - 1)).toBeLessThan(1e-12);
  });

  test('merger time of Peters (1964) in the Newtonian limit within 0.1 %, and the chirp time is the same', () => {
    const [m1, m2, f] = [1.4 * SUN, 1.2 * SUN, 20];
    const m = m1 + m2;
    // Kepler: the wave has twice the frequency of the orbit. T = (5/256) a⁴/(m₁ m₂ M), Phys. Rev. 136, B1224, READ.
    const a = (m / (Math.PI * f) ** 2) ** (1 / 3);
    const peters = (5 / 256) * (a ** 4 / (m1 * m2 * m));
    const b = binaryOf({ mass: 1.4 }, { mass: 1.2 });
    expect(Math.abs(-inspiralPhase(b, '0PN').time(f) / peters - 1)).toBeLessThan(1e-3);
    expect(Math.abs(chirpTimes(b, f).tau0 / peters - 1)).toBeLessThan(1e-12);
  });
});

describe('the transform', () => {
  test('twice the mass at f is the mass at 2f, up to the factor of the amplitude, to 1e-12', () => {
    const f = Float64Array.of(20, 33, 57.5, 80);
    for (const [make, most] of [
      [(m: number) => inspiral({ ...options(1.4 * m, 1.1 * m, 0.3, -0.1), order: '3.5PN' }), 1e-12],
      [(m: number) => inspiralMergerRingdown({ ...options(20 * m, 10 * m), low: 10 * (2 / m) }), 1e-9],
    ] as const) {
      const heavy = make(2).at(f);
      const light = make(1).at(f.map((v) => 2 * v));
      // h̃ has the dimension of time: M² in units of the mass, at one distance.
      f.forEach((_, k) => {
        const size = Math.hypot(4 * light.re[k], 4 * light.im[k]);
        expect(Math.hypot(heavy.re[k] - 4 * light.re[k], heavy.im[k] - 4 * light.im[k]) / size).toBeLessThan(
          most,
        );
      });
    }
  });

  test('amplitude √(5/24) π^(−2/3) (c/D)(GM_c/c³)^(5/6) f^(−7/6) of the optimal orientation', () => {
    const { re, im } = inspiral({ ...options(1.4, 1.4), order: '3.5PN' }).at(Float64Array.of(100));
    const chirp = 2.8 * 0.25 ** 0.6 * SUN;
    const expected =
      (Math.sqrt(5 / 24) * Math.PI ** (-2 / 3) * chirp ** (5 / 6) * 100 ** (-7 / 6)) / (100 * MPC);
    expect(Math.hypot(re[0], im[0]) / expected).toBeCloseTo(1, 12);
  });

  test('last stable orbit of one solar mass at 4397.17 Hz', () => {
    expect(iscoFrequency(binaryOf({ mass: 0.5 }, { mass: 0.5 }))).toBeCloseTo(4397.1748, 3);
  });
});

describe('what is left behind', () => {
  test('mode of a hole without spin against the table of Leaver (1985): 2Mω = 0.747343 − 0.177925 i', () => {
    const { frequency, quality } = ringdownMode(1, 0);
    // The fit is good to 1.44 % in frequency and 0.88 % in Q.
    expect(Math.abs(frequency / (0.747343 / 2 / (2 * Math.PI * SUN)) - 1)).toBeLessThan(0.0144);
    expect(Math.abs(quality / (0.747343 / (2 * 0.177925)) - 1)).toBeLessThan(0.00885);
  });

  test('equal masses without spin: 0.95162 M and 0.68646 (Scheel et al. 2009, READ)', () => {
    const { mass, spin } = remnantOf(binaryOf({ mass: 0.5 }, { mass: 0.5 }));
    expect(Math.abs(mass - 0.95162)).toBeLessThan(5e-5);
    expect(Math.abs(spin - 0.68646)).toBeLessThan(1e-4);
  });
});

describe('the step', () => {
  test('redshift makes masses of the detector’s frame', async () => {
    const at = async (params: object) => runStep(waveform, [], { 'mass-1': 10, 'mass-2': 8, ...params });
    const [near, far] = [await at({}), await at({ redshift: 0.25 })];
    expect(far.number('total-mass')).toBeCloseTo(22.5, 12);
    expect(far.number('chirp-mass') / near.number('chirp-mass')).toBeCloseTo(1.25, 12);
  });

  test('strain against time of a burst is its formula', async () => {
    const run = await runStep(waveform, [], {
      model: 'sine-gaussian',
      frequency: 100,
      quality: 9,
      amplitude: 1e-21,
      low: 0,
      phase: 30,
    });
    const { picture } = run.outcome.data as unknown as {
      picture: { rate: number; first: number; samples: Float64Array };
    };
    const tau = 9 / (Math.SQRT2 * Math.PI * 100);
    picture.samples.forEach((v, i) => {
      const t = picture.first + i / picture.rate;
      const h = 1e-21 * Math.exp(-((t / tau) ** 2)) * Math.cos(2 * Math.PI * 100 * t + Math.PI / 6);
      expect(Math.abs(v - h)).toBeLessThan(1e-25);
    });
    expect(run.number('root-sum-square')).toBeCloseTo(
      1e-21 * Math.sqrt(9 / (4 * Math.sqrt(Math.PI) * 100)),
      26,
    );
  });

  test('a file against time gives back the burst that it holds', async () => {
    const tau = 9 / (Math.SQRT2 * Math.PI * 100);
    const rows = Array.from({ length: 4097 }, (_, i) => {
      const t = (i - 2048) / 16384;
      return `${t} ${1e-21 * Math.exp(-((t / tau) ** 2)) * Math.cos(2 * Math.PI * 100 * t)}`;
    });
    const files = { 'burst.txt': rows.join('\n') };
    const file = await runStep(waveform, [], { model: 'file', file: 'burst.txt', low: 0 }, { files });
    const model = await runStep(waveform, [], {
      model: 'sine-gaussian',
      frequency: 100,
      quality: 9,
      amplitude: 1e-21,
      low: 0,
    });
    const f = Float64Array.of(80, 100, 130);
    const [a, b] = [file.outcome.data.at(f), model.outcome.data.at(f)];
    f.forEach((_, k) => {
      expect(Math.hypot(a.re[k] - b.re[k], a.im[k] - b.im[k])).toBeLessThan(
        1e-4 * Math.hypot(b.re[k], b.im[k]),
      );
    });
  });

  test('figures of every model, warnings outside of its range, errors with what to do', async () => {
    for (const params of [
      {},
      { model: 'inspiral-merger-ringdown', 'mass-1': 30, 'mass-2': 25 },
      { model: 'damped-sinusoid' },
      { model: 'sine-gaussian' },
    ]) {
      const run = await runStep(waveform, [], params);
      expect(run.codes, JSON.stringify(params)).toEqual([]);
      const [spectrum, strain] = run.figures();
      for (const { traces } of [spectrum, strain]) {
        const [trace] = traces;
        expect(trace.type === 'line' && trace.y.some((v) => v !== 0 && Number.isFinite(v))).toBe(true);
      }
      expect(run.outcome.sentence.length).toBeGreaterThan(40);
    }
    expect((await runStep(waveform, [], { 'mass-1': 30, 'mass-2': 25 })).codes).toContain('merger-left-out');
    const light = await runStep(waveform, [], {
      model: 'inspiral-merger-ringdown',
      'mass-1': 5,
      'mass-2': 1,
    });
    expect(light.codes.length).toBeGreaterThan(0);
    await expect(runStep(waveform, [], { low: 0 })).rejects.toMatchObject({ code: 'low-zero' });
    await expect(runStep(waveform, [], { model: 'file' })).rejects.toMatchObject({ code: 'file-missing' });
    await expect(runStep(waveform, [], { 'mass-1': 200, 'mass-2': 200 })).rejects.toMatchObject({
      code: 'band-empty',
    });
  });
});
