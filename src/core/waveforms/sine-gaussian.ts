import type { Quantity, Warning } from '../data/quantity';
import { UserError } from '../data/errors';
import { numberText } from '../figures/number-text';
import type { SignalModel } from './signal-model';

/** Half width of the band in units of 1/(πτ): |h̃| has fallen by e^−36. */
const REACH = 6;
/** Half length in units of τ: the envelope has fallen by e^−16. */
const HALF = 4;
/** Quality factor below which it is rather a pulse than an oscillation. */
const SMALL_Q = 2;

export interface SineGaussianOptions {
  /** Hz */
  readonly frequency: number;
  readonly quality: number;
  /** Largest strain of the envelope. */
  readonly amplitude: number;
  /** Radians at t = 0: 0 a cosine, −π/2 a sine. */
  readonly phase: number;
  /** Hz; null: where the transform has fallen by e^36. */
  readonly low: number | null;
  readonly high: number | null;
}

/** τ of the envelope e^{−t²/τ²}: Q/(√2 π f). */
export const envelopeTime = (frequency: number, quality: number): number =>
  quality / (Math.SQRT2 * Math.PI * frequency);

/**
 * Root-sum-square √∫h² dt = h₀ √{Q/(4√π f) · [1 + cos 2φ e^{−Q²}]}; for Q of 3 and more h₀ √(Q/(4√π f)).
 * Integral of the square, COMPUTED.
 */
export function sineGaussianRootSumSquare(h0: number, f: number, q: number, phase: number): number {
  return h0 * Math.sqrt((q / (4 * Math.sqrt(Math.PI) * f)) * (1 + Math.cos(2 * phase) * Math.exp(-q * q)));
}

/**
 * h₊ = h₀ e^{−t²/τ²} cos(2πft + φ), τ = Q/(√2 π f): a burst of one frequency, linearly polarised, that belongs to no source
 * and has no distance. Its middle is at t = 0.
 */
export function sineGaussian(o: SineGaussianOptions): SignalModel {
  const { frequency: f0, quality: q, amplitude: h0, phase } = o;
  const tau = envelopeTime(f0, q);
  const half = REACH / (Math.PI * tau);
  const low = o.low ?? Math.max(0, f0 - half);
  const high = o.high ?? f0 + half;
  if (high <= low)
    throw new UserError(
      'band-empty',
      `the band from ${numberText(low)} to ${numberText(high)} Hz is empty: lower "low" or raise "high"`,
    );
  return {
    id: 'sine-gaussian',
    label: `sine-Gaussian of ${numberText(f0)} Hz, Q = ${numberText(q)}`,
    facts: [
      { id: 'frequency', label: 'Frequency', value: f0, unit: 'Hz' },
      { id: 'quality', label: 'Quality factor', value: q, unit: '' },
      { id: 'amplitude', label: 'Largest strain of the envelope', value: h0, unit: '' },
      { id: 'phase', label: 'Phase at t = 0', value: (phase * 180) / Math.PI, unit: '°' },
    ],
    reference: 'linearly polarised, straight above, along the arms',
    polarisation: 'linear',
    quadrupole: false,
    low,
    high,
    top: high,
    before: HALF * tau,
    after: HALF * tau,
    origin: 'middle of the burst',
    numbers: numbers(f0, q, h0, phase, tau),
    warnings: warnings(o, low, high),
    at: (frequency, which = 'plus') => {
      const re = new Float64Array(frequency.length);
      const im = new Float64Array(frequency.length);
      if (which === 'cross') return { re, im };
      const scale = (h0 * tau * Math.sqrt(Math.PI)) / 2;
      const [c, s] = [Math.cos(phase), Math.sin(phase)];
      frequency.forEach((f, k) => {
        if (f < low || f > high) return;
        const a = Math.exp(-((Math.PI * tau * (f - f0)) ** 2));
        const b = Math.exp(-((Math.PI * tau * (f + f0)) ** 2));
        re[k] = scale * c * (a + b);
        im[k] = scale * s * (a - b);
      });
      return { re, im };
    },
  };
}

function numbers(f: number, q: number, h0: number, phase: number, tau: number): Quantity[] {
  return [
    {
      id: 'root-sum-square',
      label: 'Root-sum-square',
      value: sineGaussianRootSumSquare(h0, f, q, phase),
      unit: '1/√Hz',
      convention: '√∫h₊² dt',
      explain: { formula: 'h₀ √{Q/(4√π f) [1 + cos 2φ e^(−Q²)]}', source: 'integral, COMPUTED' },
    },
    { id: 'amplitude', label: 'Largest strain of the envelope', value: h0, unit: '' },
    {
      id: 'envelope-time',
      label: 'Envelope time τ',
      value: tau,
      unit: 's',
      convention: 'envelope e^(−t²/τ²)',
      explain: { formula: 'Q/(√2 π f)', source: 'definition' },
    },
    {
      id: 'bandwidth',
      label: 'Bandwidth',
      value: f / q,
      unit: 'Hz',
      convention: 'standard deviation of the Gaussian |h̃|: f/Q',
    },
  ];
}

function warnings(o: SineGaussianOptions, low: number, high: number): Warning[] {
  const out: Warning[] = [];
  if (o.quality < SMALL_Q)
    out.push({
      code: 'small-quality',
      severity: 'note',
      found: `quality factor ${numberText(o.quality)}`,
      value: o.quality,
      consequence: 'The burst has less than about one swing: its transform reaches down to zero frequency.',
      remedy: `Take ${SMALL_Q} or more for an oscillation.`,
    });
  if (low > o.frequency || high < o.frequency)
    out.push({
      code: 'peak-cut',
      severity: 'caution',
      found: `the frequency ${numberText(o.frequency)} Hz is outside the band from ${numberText(low)} to ${numberText(high)} Hz`,
      value: o.frequency,
      consequence: 'Most of the signal is cut away.',
      remedy: 'Leave "low" and "high" empty.',
      fix: { kind: 'set', label: 'Leave both empty', params: { low: null, high: null } },
    });
  return out;
}
