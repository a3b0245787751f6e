import type { Quantity, Warning } from '../data/quantity';
import { UserError } from '../data/errors';
import { numberText } from '../figures/number-text';
import { modeNumbers } from './binary-numbers';
import { CONSTANTS_SOURCE, MPC_SECONDS, SUN_SECONDS } from './constants';
import { MODE_SPINS, ringdownMode } from './ringdown-mode';
import { OPTIMAL, type ComplexValues, type SignalModel } from './signal-model';

/** The transform is followed up to this multiple of the frequency; beyond lies 1/(50 π Q) of the energy at most. */
const REACH = 50;
/** Amplitude decays after which nothing of note is left (e^−14 = 8e-7). */
const DECAYS = 14;

export interface DampedSinusoidOptions {
  /** The black hole that rings, detector frame; absent when frequency and quality factor are given outright. */
  readonly hole?: { readonly mass: number; readonly spin: number };
  /** Hz; null: that of the hole. */
  readonly frequency: number | null;
  readonly quality: number | null;
  /** Strain at t = 0 face on and straight above; null: from `energy` at `distance`. */
  readonly amplitude: number | null;
  /** Fraction of the hole's mass radiated in this oscillation. */
  readonly energy: number;
  /** Mpc */
  readonly distance: number;
  /** Radians at t = 0; 0 starts at the crest. */
  readonly phase: number;
  readonly low: number;
  /** Hz; null: 50 times the frequency. */
  readonly high: number | null;
}

/**
 * Amplitude at the start of a quadrupole oscillation that radiates `energy` (in seconds, GE/c⁵) in all directions, averaged
 * over phase: h₀² = 20 E / [D² τ (ω² + 1/τ²)], from the energy flux c³⟨ḣ₊² + ḣ×²⟩/(16πG) integrated over the sphere with
 * h₊ ∝ (1 + cos²ι)/2, h× ∝ cos ι (textbook flux of a plane wave; integral COMPUTED).
 *
 * @param distance in seconds
 */
export function ringAmplitude(energy: number, distance: number, frequency: number, decay: number): number {
  const rate = (2 * Math.PI * frequency) ** 2 + decay ** -2;
  return Math.sqrt((20 * energy) / (distance ** 2 * decay * rate));
}

/**
 * h₊ = h₀ e^{−t/τ} cos(2πft + φ), h× = h₀ e^{−t/τ} sin(2πft + φ) from t = 0 on, nothing before: the ring-down of a black hole
 * of given mass and spin (quality factor by {@link ringdownMode}), or of frequency and quality factor given outright.
 *
 * @throws UserError when neither a hole nor frequency and quality factor are given, or a spin outside 0 … 1
 */
export function dampedSinusoid(o: DampedSinusoidOptions): SignalModel {
  const spin = o.hole?.spin ?? 0;
  if (o.hole && (spin < 0 || spin >= 1))
    throw new UserError(
      'spin-outside',
      `the ring-down fit needs a spin from 0 to below 1 along the orbit’s axis, not ${numberText(spin)}: give "remnant-spin", or "frequency" and "quality"`,
    );
  const mode = o.hole && ringdownMode(o.hole.mass, spin);
  const frequency = o.frequency ?? mode?.frequency;
  const quality = o.quality ?? mode?.quality;
  if (frequency === undefined || quality === undefined)
    throw new UserError('mode-missing', 'give the hole’s mass and spin, or "frequency" and "quality"');
  const decay = quality / (Math.PI * frequency);
  const own = o.amplitude !== null;
  const mass = o.hole?.mass;
  if (!own && mass === undefined)
    throw new UserError('mode-missing', 'without a hole give "amplitude": the strain at the start');
  const h0 =
    o.amplitude ??
    ringAmplitude(o.energy * (mass ?? 0) * SUN_SECONDS, o.distance * MPC_SECONDS, frequency, decay);
  const high = o.high ?? REACH * frequency;
  if (high <= o.low)
    throw new UserError(
      'band-empty',
      `"high" ${numberText(high)} Hz must be above "low" ${numberText(o.low)} Hz`,
    );
  return {
    id: 'damped-sinusoid',
    label: `damped sinusoid of ${numberText(frequency)} Hz, τ = ${numberText(decay)} s${own ? '' : `, at ${numberText(o.distance)} Mpc`}`,
    facts: [
      ...(o.hole
        ? [
            { id: 'remnant-mass', label: 'Mass of the hole, detector frame', value: o.hole.mass, unit: 'M☉' },
            { id: 'remnant-spin', label: 'Spin of the hole', value: spin, unit: '' },
          ]
        : []),
      { id: 'frequency', label: 'Frequency', value: frequency, unit: 'Hz' },
      { id: 'quality', label: 'Quality factor', value: quality, unit: '' },
      { id: 'amplitude', label: 'Strain at t = 0', value: h0, unit: '' },
      { id: 'phase', label: 'Phase at t = 0', value: (o.phase * 180) / Math.PI, unit: '°' },
    ],
    ...(own ? {} : { distance: o.distance }),
    reference: OPTIMAL,
    polarisation: 'both',
    quadrupole: true,
    low: o.low,
    high,
    top: Math.max(8 * frequency, Math.min(o.low * 2, high)),
    before: 0,
    after: DECAYS * decay,
    origin: 'start of the oscillation',
    numbers: [
      ...numbers(frequency, quality, h0, decay, o),
      ...(o.hole ? holeNumbers(o, mode !== undefined) : []),
    ],
    warnings: warnings(o, frequency),
    at: (f, which = 'plus') => transform(f, which, h0, frequency, decay, o.phase, o.low, high),
  };
}

function transform(
  frequency: Float64Array,
  which: 'plus' | 'cross',
  h0: number,
  f0: number,
  decay: number,
  phase: number,
  low: number,
  high: number,
): ComplexValues {
  const re = new Float64Array(frequency.length);
  const im = new Float64Array(frequency.length);
  const c = Math.cos(phase);
  const s = Math.sin(phase);
  const rate = 1 / decay;
  frequency.forEach((f, k) => {
    if (f < low || f > high) return;
    // e^{±iφ} / (1/τ + 2πi(f ∓ f0)); their sum halved is h₊, their difference over 2i is h×.
    const below = 2 * Math.PI * (f - f0);
    const above = 2 * Math.PI * (f + f0);
    const nb = rate * rate + below * below;
    const na = rate * rate + above * above;
    const [br, bi] = [(c * rate + s * below) / nb, (s * rate - c * below) / nb];
    const [ar, ai] = [(c * rate - s * above) / na, (-s * rate - c * above) / na];
    if (which === 'plus') {
      re[k] = (h0 * (br + ar)) / 2;
      im[k] = (h0 * (bi + ai)) / 2;
    } else {
      re[k] = (h0 * (bi - ai)) / 2;
      im[k] = (-h0 * (br - ar)) / 2;
    }
  });
  return { re, im };
}

/** Root-sum-square √∫h₊²dt of the damped sinusoid, closed form. */
export function ringRootSumSquare(h0: number, frequency: number, decay: number, phase: number): number {
  // ½ h₀² [τ/2 + Re e^{2iφ}/(2/τ − 4πif)]
  const a = 2 / decay;
  const w = 4 * Math.PI * frequency;
  const swing = (a * Math.cos(2 * phase) - w * Math.sin(2 * phase)) / (a * a + w * w);
  return h0 * Math.sqrt((decay / 2 + swing) / 2);
}

function numbers(f: number, q: number, h0: number, decay: number, o: DampedSinusoidOptions): Quantity[] {
  return [
    { id: 'frequency', label: 'Frequency', value: f, unit: 'Hz' },
    { id: 'quality', label: 'Quality factor', value: q, unit: '' },
    {
      id: 'decay',
      label: 'Decay time',
      value: decay,
      unit: 's',
      convention: 'amplitude falls by e',
      explain: { formula: 'Q/(π f)', source: 'definition' },
    },
    {
      id: 'amplitude',
      label: 'Strain at t = 0',
      value: h0,
      unit: '',
      convention: 'amplitude of h₊, face on, straight above',
      ...(o.amplitude === null
        ? {
            explain: {
              formula: 'h₀² = 20 GE / [c³ D² τ (ω² + 1/τ²)], E the energy radiated',
              source: `energy flux of a plane wave (textbook), integral COMPUTED; ${CONSTANTS_SOURCE}`,
            },
          }
        : {}),
    },
    {
      id: 'root-sum-square',
      label: 'Root-sum-square of h₊',
      value: ringRootSumSquare(h0, f, decay, o.phase),
      unit: '1/√Hz',
      convention: '√∫h₊² dt, whole oscillation',
      explain: { formula: 'h₀ √{½ [τ/2 + Re e^(2iφ)/(2/τ − 4πif)]}', source: 'integral, COMPUTED' },
    },
  ];
}

/** Mode of the hole, when frequency or quality factor given outright differ from it. */
const holeNumbers = (o: DampedSinusoidOptions, mode: boolean): Quantity[] =>
  mode && o.hole && (o.frequency !== null || o.quality !== null) ? modeNumbers(o.hole.mass, o.hole.spin) : [];

function warnings(o: DampedSinusoidOptions, frequency: number): Warning[] {
  const out: Warning[] = [];
  if (o.hole && o.hole.spin > MODE_SPINS[1] && (o.frequency === null || o.quality === null))
    out.push({
      code: 'outside-fit',
      severity: 'caution',
      found: `spin ${numberText(o.hole.spin, 6)}`,
      value: o.hole.spin,
      consequence: `The fit of frequency and quality factor was made for spins up to ${MODE_SPINS[1]}.`,
      remedy: 'Give "frequency" and "quality" from a table.',
    });
  if (o.amplitude === null && o.energy > 0.1)
    out.push({
      code: 'much-energy',
      severity: 'caution',
      found: `${numberText(100 * o.energy)} % of the mass radiated in one oscillation`,
      value: o.energy,
      consequence:
        'Mergers of two black holes radiate about 5 % (up to about 10 % with spin) in all, the ring-down a part of it.',
      remedy: 'Take 0.01 to 0.03.',
      fix: { kind: 'set', label: 'Take 0.01', params: { energy: 0.01 } },
    });
  if (o.low > frequency)
    out.push({
      code: 'starts-above-peak',
      severity: 'caution',
      found: `"low" ${numberText(o.low)} Hz is above the frequency ${numberText(frequency)} Hz`,
      value: o.low,
      consequence: 'Most of the signal is cut away.',
      remedy: 'Leave "low" empty.',
      fix: { kind: 'set', label: 'Leave "low" empty', params: { low: null } },
    });
  return out;
}
