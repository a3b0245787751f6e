import type { Quantity, Warning } from '../data/quantity';
import { UserError } from '../data/errors';
import { numberText } from '../figures/number-text';
import { chirpMass, iscoFrequency, massRatio, totalMass, type Binary } from './binary';
import { binaryFacts, binaryLabel } from './binary-words';
import { binaryNumbers, durationNumbers } from './binary-numbers';
import { MPC_SECONDS, SUN_SECONDS } from './constants';
import { inspiralPhase, PN_ORDERS, type PnOrder } from './inspiral-phase';
import { fromAmplitudeAndPhase, OPTIMAL, quarterTurn, type SignalModel } from './signal-model';
import { bandWeight } from './taper';

export const INSPIRAL_SOURCE =
  'Buonanno, Iyer, Ochsner, Pan, Sathyaprakash, Phys. Rev. D 80, 084043 (2009); spins: Arun et al., Phys. Rev. D 79, 104023 (2009), Bohé, Marsat, Blanchet, Class. Quantum Grav. 30, 135009 (2013), Mishra et al., Phys. Rev. D 93, 084054 (2016)';

/** Below this frequency of the last stable orbit what follows it weighs in a ground-based detector's band. */
const MERGER_IN_BAND = 800;
/** Mass ratio and spin up to which the series is not known to mislead badly. */
const EASY_RATIO = 10;
const EASY_SPIN = 0.9;

export interface BinaryOptions {
  readonly binary: Binary;
  /** Luminosity distance in Mpc. */
  readonly distance: number;
  /** Hz */
  readonly low: number;
  /** Hz; null: where the model ends. */
  readonly high: number | null;
  /** Fraction of each band edge's frequency over which half a cosine fades the wave. */
  readonly taper: number;
  /** φ_c in radians. */
  readonly phase: number;
  readonly redshift: number;
}

export interface InspiralOptions extends BinaryOptions {
  readonly order: PnOrder;
}

/**
 * |h̃(f)| in strain/Hz of an inspiral straight above and face on at lowest order: √(5/24) π^{−2/3} (c/D) (GM_c/c³)^{5/6} f^{−7/6}.
 * Finn & Chernoff, PRD 47, 2198 (1993).
 *
 * @param distance Mpc
 */
export function inspiralAmplitude(b: Binary, distance: number): (f: number) => number {
  const scale =
    (Math.sqrt(5 / 24) * Math.PI ** (-2 / 3) * (chirpMass(b) * SUN_SECONDS) ** (5 / 6)) /
    (distance * MPC_SECONDS);
  return (f) => scale * f ** (-7 / 6);
}

/**
 * Stationary-phase post-Newtonian inspiral with spins along the orbit's axis: A e^{−i(ψ − φ_c − π/4)}, coalescence at t = 0,
 * between `low` and the last stable orbit unless `high` says otherwise. Valid for two bodies without tides while v/c is small.
 *
 * @throws UserError when the band is empty
 */
export function inspiral(o: InspiralOptions): SignalModel {
  const { binary: b, low, taper } = o;
  const isco = iscoFrequency(b);
  const high = o.high ?? isco;
  if (high <= low)
    throw new UserError(
      'band-empty',
      o.high === null
        ? `the inspiral ends at ${numberText(isco)} Hz (last stable orbit of ${numberText(totalMass(b))} M☉), below "low" ${numberText(low)} Hz: lower "low", or take the model that holds the merger`
        : `"high" ${numberText(high)} Hz must be above "low" ${numberText(low)} Hz`,
    );
  const phase = inspiralPhase(b, o.order);
  const amplitude = inspiralAmplitude(b, o.distance);
  const offset = o.phase + Math.PI / 4;
  const plus = (frequency: Float64Array) =>
    fromAmplitudeAndPhase(
      frequency,
      (f) => {
        const w = bandWeight(f, low, high, taper);
        return w === 0 ? 0 : w * amplitude(f);
      },
      (f) => offset - phase.at(f),
    );
  const duration = phase.time(high) - phase.time(low);
  // A series that turns back near its end would give times after coalescence; the wave then is where the band's top puts it.
  const before = Math.max(-phase.time(low), duration, 1 / low);
  return {
    id: 'inspiral',
    label: binaryLabel('inspiral', b, o.distance),
    facts: [...binaryFacts(o), { id: 'order', label: 'Order of the phase', value: o.order, unit: '' }],
    distance: o.distance,
    reference: OPTIMAL,
    polarisation: 'circular',
    quadrupole: true,
    low,
    high,
    top: high,
    before,
    after: Math.max(phase.time(high), 0) + 10 / high,
    origin: 'coalescence (post-Newtonian)',
    numbers: [
      ...binaryNumbers(b, low, o.redshift),
      ...durationNumbers(
        duration,
        phase.cycles(low, high),
        `from ${numberText(low)} to ${numberText(high)} Hz, ${o.order}`,
      ),
      lastTerm(o, high),
    ],
    warnings: warnings(o, isco, high),
    at: (frequency, which) => (which === 'cross' ? quarterTurn(plus(frequency)) : plus(frequency)),
  };
}

/** By how many cycles the last term taken changes the count: what a next one may change. */
function lastTerm({ binary, low, order }: InspiralOptions, high: number): Quantity {
  const before = PN_ORDERS.at(PN_ORDERS.indexOf(order) + 1) ?? order;
  const cycles = (p: PnOrder): number => inspiralPhase(binary, p).cycles(low, high);
  return {
    id: 'last-term-cycles',
    label: `Cycles from the last term (${order})`,
    value: order === '0PN' ? cycles(order) : cycles(order) - cycles(before),
    unit: '',
    convention: 'in the same band; what is left out may change as much',
  };
}

function warnings(o: InspiralOptions, isco: number, high: number): Warning[] {
  const out: Warning[] = [];
  const { binary: b } = o;
  if (isco < MERGER_IN_BAND && o.low < isco)
    out.push({
      code: 'merger-left-out',
      severity: 'caution',
      found: `the last stable orbit of ${numberText(totalMass(b))} M☉ is at ${numberText(isco)} Hz`,
      value: isco,
      consequence:
        'What follows it, merger and ring-down, lies in a detector’s band and is not in this model: SNR and reach come out too small.',
      remedy: 'Take the inspiral–merger–ringdown model where it is valid, or a waveform file.',
      fix: {
        kind: 'set',
        label: 'Take inspiral–merger–ringdown',
        params: { model: 'inspiral-merger-ringdown' },
      },
    });
  if (high > isco * (1 + 1e-12))
    out.push({
      code: 'beyond-last-orbit',
      severity: 'caution',
      found: `"high" ${numberText(high)} Hz is above the last stable orbit at ${numberText(isco)} Hz`,
      value: high / isco,
      consequence: 'The post-Newtonian series says nothing there: amplitude and phase are extrapolated.',
      remedy: 'Leave "high" empty to end at the last stable orbit.',
      fix: { kind: 'set', label: 'End at the last stable orbit', params: { high: null } },
    });
  const spin = Math.max(Math.abs(b.spin1), Math.abs(b.spin2));
  if (massRatio(b) > EASY_RATIO || spin > EASY_SPIN)
    out.push({
      code: 'slow-series',
      severity: 'caution',
      found: `mass ratio ${numberText(massRatio(b), 3)}, largest spin ${numberText(spin, 3)}`,
      value: massRatio(b) > EASY_RATIO ? massRatio(b) : spin,
      consequence: `The series converges slowly for ratios above ${EASY_RATIO} and spins above ${EASY_SPIN} (limits of our own): see how many cycles its last term adds.`,
      remedy: 'Compare orders, or take a waveform file made by a method for such sources.',
    });
  return out;
}
