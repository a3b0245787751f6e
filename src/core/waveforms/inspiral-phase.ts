import { symmetricRatio, totalSeconds, type Binary } from './binary';
import { EULER_GAMMA } from './constants';

/** Order in v/c of the last term of the phase: "3.5PN" is v⁷. */
export const PN_ORDERS = ['3.5PN', '3PN', '2.5PN', '2PN', '1.5PN', '1PN', '0PN'] as const;
export type PnOrder = (typeof PN_ORDERS)[number];

/** Highest power of v in an order. */
export const powerOf = (order: PnOrder): number => Math.round(2 * Number.parseFloat(order));

/** Coefficient of v^k without logarithm, and of v^k ln v. */
interface Term {
  readonly plain: number;
  readonly log: number;
}

/**
 * Coefficients ψ_k of the stationary-phase transform of a circular inspiral with spins along the orbit's axis, 3.5PN.
 * Left out: spin-spin at 3PN, spin-spin and cubic at 3.5PN. Spin-spin at 2PN is that of black holes.
 *
 * Buonanno, Iyer, Ochsner, Pan, Sathyaprakash, PRD 80, 084043 (2009); Arun et al., PRD 79, 104023 (2009); Bohé, Marsat,
 * Blanchet, CQG 30, 135009 (2013); Mishra et al., PRD 93, 084054 (2016) (all MEMORY; each term COMPUTED from energy and flux
 * as given by Blanchet, Living Rev. Relativity 17, 2, 2014).
 */
export function phaseTerms(b: Binary): readonly Term[] {
  const { PI } = Math;
  const eta = symmetricRatio(b);
  const delta = (b.mass1 - b.mass2) / (b.mass1 + b.mass2);
  const s = (b.spin1 + b.spin2) / 2;
  const a = (b.spin1 - b.spin2) / 2;
  const e2 = eta * eta;
  const e3 = e2 * eta;
  const plain = (value: number): Term => ({ plain: value, log: 0 });
  const five =
    PI * (38645 / 756 - (65 * eta) / 9) +
    delta * (-732985 / 2268 - (140 * eta) / 9) * a +
    (-732985 / 2268 + (24260 * eta) / 81 + (340 * e2) / 9) * s;
  return [
    plain(1),
    plain(0),
    plain(3715 / 756 + (55 * eta) / 9),
    plain(-16 * PI + (113 / 3) * delta * a + (113 / 3 - (76 * eta) / 3) * s),
    plain(
      15293365 / 508032 +
        (27145 * eta) / 504 +
        (3085 * e2) / 72 +
        (-405 / 8 + 200 * eta) * a * a -
        (405 / 4) * delta * a * s +
        (-405 / 8 + (5 * eta) / 2) * s * s,
    ),
    { plain: five, log: 3 * five },
    {
      plain:
        11583231236531 / 4694215680 -
        (640 * PI * PI) / 3 -
        (6848 / 21) * (EULER_GAMMA + Math.log(4)) +
        (-15737765635 / 3048192 + (2255 * PI * PI) / 12) * eta +
        (76055 * e2) / 1728 -
        (127825 * e3) / 1296 +
        PI * ((2270 / 3) * delta * a + (2270 / 3 - 520 * eta) * s),
      log: -6848 / 21,
    },
    plain(
      PI * (77096675 / 254016 + (378515 * eta) / 1512 - (74045 * e2) / 756) +
        delta * (-25150083775 / 3048192 + (26804935 * eta) / 6048 - (1985 * e2) / 48) * a +
        (-25150083775 / 3048192 + (10566655595 * eta) / 762048 - (1042165 * e2) / 3024 + (5345 * e3) / 36) *
          s,
    ),
  ];
}

/** The stationary phase of one binary, with t_c = 0 and φ_c = 0 and without the constant −π/4. */
export interface InspiralPhase {
  /** ψ(f) = 3/(128 η v⁵) Σ ψ_k v^k in radians; the transform is A e^{−iψ}. */
  at(f: number): number;
  /** dψ/df / 2π: when the wave has frequency f, in seconds relative to coalescence. */
  time(f: number): number;
  /** Cycles of the wave while its frequency rises from `low` to `high`: (f dψ/df − ψ)/2π between them. */
  cycles(low: number, high: number): number;
}

export function inspiralPhase(b: Binary, order: PnOrder = '3.5PN'): InspiralPhase {
  const terms = phaseTerms(b).slice(0, powerOf(order) + 1);
  const scale = 3 / (128 * symmetricRatio(b));
  const seconds = Math.PI * totalSeconds(b);
  /** Σ ψ_k v^{k−5}, or its derivative with respect to ln f. */
  const sum = (f: number, derivative: boolean): number => {
    const v = Math.cbrt(seconds * f);
    const logV = Math.log(v);
    let total = 0;
    for (let k = terms.length - 1; k >= 0; k--) {
      const { plain, log } = terms[k];
      const psi = plain + log * logV;
      total = total * v + (derivative ? ((k - 5) * psi + log) / 3 : psi);
    }
    return (scale * total) / v ** 5;
  };
  const turns = (f: number): number => (sum(f, true) - sum(f, false)) / (2 * Math.PI);
  return {
    at: (f) => sum(f, false),
    time: (f) => sum(f, true) / (2 * Math.PI * f),
    cycles: (low, high) => turns(high) - turns(low),
  };
}
