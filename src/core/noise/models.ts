import type { Source } from '../steps/define';

/**
 * A published analytic model of a detector's noise, under a neutral name. `density(f)` is the one-sided power spectral
 * density of strain in 1/Hz at `f` in Hz; the model says nothing below `from` Hz.
 */
export interface NoiseModel {
  readonly id: string;
  readonly from: number;
  readonly density: (f: number) => number;
  readonly formula: string;
  readonly source: Source;
}

const EARLY: Source = {
  text: 'Damour, Iyer, Sathyaprakash, Phys. Rev. D 63, 044023 (2001); Sathyaprakash & Schutz, Living Rev. Relativity 12, 2 (2009)',
  flag: 'memory',
};
const REVIEW: Source = {
  text: 'Sathyaprakash & Schutz, Living Rev. Relativity 12, 2 (2009)',
  flag: 'memory',
};

/** The middle part two of the fits share: 1 at x = 0, rising as x² for large x. */
const bowl = (x: number): number => (1 - x ** 2 + x ** 4 / 2) / (1 + x ** 2 / 2);

/**
 * Fits to design sensitivities. The published fits for the second generation differ among themselves by 1.13 to 1.25 in
 * amplitude below 500 Hz and by 1.7 at 1 kHz, so none of them is a measurement.
 */
export const NOISE_MODELS = [
  {
    id: 'first-generation-4km',
    from: 40,
    density: (f) => {
      const x = f / 150;
      return 9e-46 * ((4.49 * x) ** -56 + 0.16 * x ** -4.52 + 0.52 + 0.32 * x ** 2);
    },
    formula: 'S = 9e-46 [(4.49 x)^-56 + 0.16 x^-4.52 + 0.52 + 0.32 x²] / Hz, x = f / 150 Hz',
    source: EARLY,
  },
  {
    id: 'first-generation-3km',
    from: 20,
    density: (f) => {
      const x = f / 500;
      return 3.2e-46 * ((7.8 * x) ** -5 + 2 / x + 0.63 + x ** 2);
    },
    formula: 'S = 3.2e-46 [(7.8 x)^-5 + 2 / x + 0.63 + x²] / Hz, x = f / 500 Hz',
    source: EARLY,
  },
  {
    id: 'first-generation-600m',
    from: 40,
    density: (f) => {
      const x = f / 150;
      return 1e-46 * ((3.4 * x) ** -30 + 34 / x + 20 * bowl(x));
    },
    formula: 'S = 1e-46 [(3.4 x)^-30 + 34 / x + 20 (1 − x² + x⁴/2) / (1 + x²/2)] / Hz, x = f / 150 Hz',
    source: EARLY,
  },
  {
    id: 'second-generation-4km-2009',
    from: 20,
    density: (f) => {
      const x = f / 215;
      return 1e-49 * (x ** -4.14 - 5 * x ** -2 + 111 * bowl(x));
    },
    formula: 'S = 1e-49 [x^-4.14 − 5 x^-2 + 111 (1 − x² + x⁴/2) / (1 + x²/2)] / Hz, x = f / 215 Hz',
    source: REVIEW,
  },
  {
    id: 'third-generation-underground',
    from: 10,
    density: (f) => {
      const x = f / 100;
      return (
        1e-50 * (2.39e-27 * x ** -15.64 + 0.349 * x ** -2.145 + 1.76 * x ** -0.12 + 0.409 * x ** 1.1) ** 2
      );
    },
    formula:
      'S = 1e-50 [2.39e-27 x^-15.64 + 0.349 x^-2.145 + 1.76 x^-0.12 + 0.409 x^1.1]² / Hz, x = f / 100 Hz',
    source: REVIEW,
  },
] as const satisfies readonly NoiseModel[];

export type NoiseModelId = (typeof NOISE_MODELS)[number]['id'];

/** One-sided density of a model at each frequency, in strain²/Hz; NaN below the model's range, never extrapolated. */
export function modelDensity(model: NoiseModel, frequency: Float64Array): Float64Array {
  return frequency.map((f) => (f >= model.from ? model.density(f) : NaN));
}
