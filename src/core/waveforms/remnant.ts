import { symmetricRatio, totalMass, type Binary } from './binary';

export const REMNANT_SOURCE =
  'Husa et al., Phys. Rev. D 93, 044006 (2016), MEMORY; equal masses agree with Scheel et al., Phys. Rev. D 79, 024003 (2009), READ, to 1e-5';

/** What two black holes leave behind. */
export interface Remnant {
  /** Detector frame, M☉. */
  readonly mass: number;
  /** χ along the orbit's axis. */
  readonly spin: number;
}

/**
 * Mass and spin of the remnant of two black holes with spins along the orbit's axis. Fits of Husa et al., PRD 93, 044006
 * (2016) (MEMORY): for equal masses without spin 0.951612 M and 0.68643 against 0.95162 ± 0.00002 and 0.68646 ± 0.00004 of
 * Scheel et al., PRD 79, 024003 (2009) (READ).
 */
export function remnantOf(b: Binary): Remnant {
  const eta = symmetricRatio(b);
  const total = totalMass(b);
  const s = (b.mass1 / total) ** 2 * b.spin1 + (b.mass2 / total) ** 2 * b.spin2;
  const spin =
    2 * Math.sqrt(3) * eta -
    4.399 * eta ** 2 +
    9.397 * eta ** 3 -
    13.181 * eta ** 4 +
    s +
    (-0.085 * s + 0.102 * s ** 2 - 1.355 * s ** 3 - 0.868 * s ** 4) * eta +
    (-5.837 * s - 2.097 * s ** 2 + 4.109 * s ** 3 + 2.064 * s ** 4) * eta ** 2;
  const hat = s / (1 - 2 * eta);
  const radiated =
    ((0.0559745 * eta + 0.580951 * eta ** 2 - 0.960673 * eta ** 3 + 3.35241 * eta ** 4) *
      (1 + hat * (-0.00303023 - 2.00661 * eta + 7.70506 * eta ** 2))) /
    (1 + hat * (-0.67144 - 1.47569 * eta + 7.30468 * eta ** 2));
  return { mass: total * (1 - radiated), spin };
}
