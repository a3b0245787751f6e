import { symmetricRatio, totalSeconds, type Binary } from './binary';
import { MPC_SECONDS } from './constants';

export const IMR_SOURCE =
  'Ajith et al., Phys. Rev. D 77, 104017 (2008); Class. Quantum Grav. 24, S689 (2007), table from MEMORY; second derivative of the phase agrees with post-Newtonian to 1 % at 20 M☉ (COMPUTED)';

type Row = readonly [eta2: number, eta1: number, one: number];

/** Frequencies times πGM/c³, as polynomials in η. */
const FREQUENCIES = {
  merger: [0.2974, 0.04481, 0.09556],
  ring: [0.59411, 0.089794, 0.19111],
  width: [0.50801, 0.077515, 0.022369],
  cut: [0.84845, 0.12848, 0.27299],
} as const satisfies Record<string, Row>;

/** Coefficients of (πGMf/c³)^{(k−5)/3}, times η. */
const PHASE: readonly (readonly [k: number, row: Row])[] = [
  [0, [0.17516, 0.079483, -0.07239]],
  [2, [-51.571, -17.595, 13.253]],
  [3, [658.66, 178.03, -159.72]],
  [4, [-3903.1, -774.93, 881.95]],
  [6, [-24874, -1489.2, 4458.8]],
  [7, [25196, 339.7, -3957.3]],
];

const polynomial = ([a, b, c]: Row, eta: number): number => (a * eta + b) * eta + c;

/** The model of one binary; its time origin is where the published phase puts it. */
export interface Imr2008 {
  /** Where inspiral, merger and ring-down meet, and where the model ends, in Hz. */
  readonly merger: number;
  readonly ring: number;
  readonly cut: number;
  /** Width of the ring-down's Lorentzian, Hz. */
  readonly width: number;
  /** |h̃| in strain/Hz at 1 Mpc, face on and straight above; 0 beyond the cut. */
  amplitude(f: number): number;
  /** Ψ in radians; the transform is A e^{+iΨ}. */
  phase(f: number): number;
  /** dΨ/df in rad/Hz. */
  slope(f: number): number;
}

/**
 * Inspiral, merger and ring-down of two black holes without spin as fitted by Ajith et al. (2008): amplitude f^{−7/6}, then
 * f^{−2/3}, then a Lorentzian; phase a polynomial in (πMf)^{1/3}. All coefficients MEMORY. Made for mass ratios up to 4.
 */
export function imr2008(b: Binary): Imr2008 {
  const eta = symmetricRatio(b);
  const seconds = Math.PI * totalSeconds(b);
  const at = (row: Row): number => polynomial(row, eta) / seconds;
  const merger = at(FREQUENCIES.merger);
  const ring = at(FREQUENCIES.ring);
  const width = at(FREQUENCIES.width);
  const cut = at(FREQUENCIES.cut);
  const scale =
    (Math.sqrt((5 * eta) / 24) * totalSeconds(b) ** (5 / 6) * merger ** (-7 / 6)) /
    (MPC_SECONDS * Math.PI ** (2 / 3));
  const peak = (ring / merger) ** (-2 / 3);
  const terms = PHASE.map(([k, row]) => ({ power: (k - 5) / 3, factor: polynomial(row, eta) / eta }));
  return {
    merger,
    ring,
    cut,
    width,
    amplitude: (f) => {
      if (f > cut) return 0;
      if (f < merger) return scale * (f / merger) ** (-7 / 6);
      if (f < ring) return scale * (f / merger) ** (-2 / 3);
      return (scale * peak) / (1 + ((2 * (f - ring)) / width) ** 2);
    },
    phase: (f) => terms.reduce((sum, t) => sum + t.factor * (seconds * f) ** t.power, 0),
    slope: (f) => terms.reduce((sum, t) => sum + t.power * t.factor * (seconds * f) ** t.power, 0) / f,
  };
}
