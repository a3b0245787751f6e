import type { Warning } from '../data/quantity';
import { UserError } from '../data/errors';
import { numberText } from '../figures/number-text';
import { massRatio, totalMass } from './binary';
import { binaryFacts, binaryLabel } from './binary-words';
import { binaryNumbers, durationNumbers } from './binary-numbers';
import { imr2008, IMR_SOURCE, type Imr2008 } from './imr-2008';
import type { BinaryOptions } from './inspiral';
import { fromAmplitudeAndPhase, OPTIMAL, quarterTurn, type SignalModel } from './signal-model';
import { bandWeight } from './taper';

/** Largest mass ratio of the simulations behind the model. */
export const IMR_RATIO = 4;
/** Total mass in M☉ below which the printed digits of the phase no longer do. */
export const IMR_MASS = 20;
/** Amplitudes e^{−x} of a Lorentzian's decay after which nothing of note is left. */
const DECAYS = 10;

/**
 * Two black holes without spin from `low` through merger and ring-down. The published phase puts its time origin 0.3 to 0.6 s
 * away (at 58 M☉); here it is shifted by the stationary-phase time of the ring-down frequency, so that t = 0 is the amplitude
 * peak, and the phase there is `phase`.
 *
 * @throws UserError when the band is empty
 */
export function inspiralMergerRingdown(o: BinaryOptions): SignalModel {
  const { binary: b, low, taper } = o;
  const model = imr2008(b);
  const high = Math.min(o.high ?? model.cut, model.cut);
  if (high <= low)
    throw new UserError(
      'band-empty',
      o.high === null || o.high > model.cut
        ? `the model ends at ${numberText(model.cut)} Hz for ${numberText(totalMass(b))} M☉, below "low" ${numberText(low)} Hz: lower "low"`
        : `"high" ${numberText(high)} Hz must be above "low" ${numberText(low)} Hz`,
    );
  const { ring } = model;
  const slope = model.slope(ring);
  const offset = o.phase + Math.PI / 4 - model.phase(ring) + slope * ring;
  const plus = (frequency: Float64Array) =>
    fromAmplitudeAndPhase(
      frequency,
      (f) => {
        const w = bandWeight(f, low, high, taper);
        return w === 0 ? 0 : (w * model.amplitude(f)) / o.distance;
      },
      (f) => model.phase(f) - slope * f + offset,
    );
  /** When the wave has frequency f, seconds relative to the peak. */
  const time = (f: number): number => (slope - model.slope(f)) / (2 * Math.PI);
  const turns = (f: number): number => (model.phase(f) - f * model.slope(f)) / (2 * Math.PI);
  const end = Math.min(high, ring);
  const span = time(end) - time(Math.min(low, end));
  return {
    id: 'inspiral-merger-ringdown',
    label: binaryLabel('inspiral–merger–ringdown', b, o.distance),
    facts: binaryFacts(o),
    distance: o.distance,
    reference: OPTIMAL,
    polarisation: 'circular',
    quadrupole: true,
    low,
    high,
    top: high,
    before: Math.max(span, 1 / low),
    after: DECAYS / (Math.PI * model.width) + 4 / high,
    origin: 'amplitude peak',
    numbers: [
      ...binaryNumbers(b, low, o.redshift),
      ...durationNumbers(
        span,
        turns(end) - turns(Math.min(low, end)),
        `from ${numberText(low)} Hz to ${high < ring ? `${numberText(high)} Hz` : `the ring-down frequency ${numberText(ring)} Hz`}`,
      ),
      ...modelNumbers(model),
    ],
    warnings: warnings(o, model),
    at: (frequency, which) => (which === 'cross' ? quarterTurn(plus(frequency)) : plus(frequency)),
  };
}

const modelNumbers = (m: Imr2008) =>
  (
    [
      ['merger-frequency', 'Merger sets in', m.merger, 'amplitude f^(−7/6) below, f^(−2/3) above'],
      ['ring-frequency', 'Ring-down sets in', m.ring, 'centre of the Lorentzian'],
      ['ring-width', 'Width of the Lorentzian', m.width, 'full width at half height'],
      ['cut-frequency', 'Model ends', m.cut, 'nothing above'],
    ] as const
  ).map(([id, label, value, convention]) => ({
    id,
    label,
    value,
    unit: 'Hz',
    convention,
    explain: { formula: '(a η² + b η + c) c³/(πGM)', source: IMR_SOURCE },
  }));

function warnings(o: BinaryOptions, model: Imr2008): Warning[] {
  const out: Warning[] = [];
  const { binary: b } = o;
  const total = totalMass(b);
  const ratio = massRatio(b);
  if (ratio > IMR_RATIO)
    out.push({
      code: 'outside-model',
      severity: 'problem',
      found: `mass ratio ${numberText(ratio, 3)}`,
      value: ratio,
      consequence: `The model was fitted to simulations with mass ratios up to ${IMR_RATIO}; beyond, amplitude and phase are extrapolated.`,
      remedy: 'Take masses closer to each other, or a waveform file.',
    });
  if (total < IMR_MASS)
    out.push({
      code: 'low-mass-model',
      severity: 'caution',
      found: `total mass ${numberText(total)} M☉`,
      value: total,
      consequence: `The printed digits of the phase cost a mismatch of up to 0.004 at ${IMR_MASS} M☉ and 0.03 at 10 M☉: templates lose SNR, arrival times move.`,
      remedy: 'Take the inspiral model below that mass.',
      fix: { kind: 'set', label: 'Take the inspiral', params: { model: 'inspiral' } },
    });
  if (b.spin1 !== 0 || b.spin2 !== 0)
    out.push({
      code: 'spin-left-out',
      severity: 'problem',
      found: `spins ${numberText(b.spin1)} and ${numberText(b.spin2)}`,
      value: Math.max(Math.abs(b.spin1), Math.abs(b.spin2)),
      consequence:
        'This model has no spin: the wave is that of bodies that do not spin; only the remnant’s numbers take spin into account.',
      remedy: 'Set both spins to 0, take the inspiral model, or a waveform file.',
    });
  if (o.high !== null && o.high > model.cut)
    out.push({
      code: 'beyond-model',
      severity: 'note',
      found: `"high" ${numberText(o.high)} Hz is above the model’s end at ${numberText(model.cut)} Hz`,
      value: model.cut,
      consequence: 'The wave ends where the model does.',
      remedy: 'Leave "high" empty.',
      fix: { kind: 'set', label: 'Leave "high" empty', params: { high: null } },
    });
  return out;
}
