import { SUN_SECONDS } from './constants';

export const MODE_SOURCE =
  'Berti, Cardoso, Will, Phys. Rev. D 73, 064030 (2006), MEMORY; within 1.5 % (frequency) and 0.9 % (Q) of our own continued-fraction table (Leaver, Proc. R. Soc. A 402, 285, 1985)';

/** The slowest-decaying l = m = 2 oscillation of a black hole. */
export interface RingdownMode {
  /** Hz */
  readonly frequency: number;
  readonly quality: number;
  /** Time in s in which the amplitude falls by e: τ = Q/(π f). */
  readonly decay: number;
}

/** Spins the fit was made for. */
export const MODE_SPINS = [0, 0.99] as const;

/**
 * Frequency and quality factor by the fits Mω = 1.5251 − 1.1568 (1 − j)^{0.1292}, Q = 0.7 + 1.4187 (1 − j)^{−0.499} of Berti,
 * Cardoso, Will, PRD 73, 064030 (2006) (MEMORY): good to 1.44 % in frequency and 0.88 % in Q (COMPUTED).
 *
 * @param mass detector-frame mass of the hole in M☉
 * @param spin j = cJ/(GM²), 0 ≤ j < 1
 */
export function ringdownMode(mass: number, spin: number): RingdownMode {
  const omega = 1.5251 - 1.1568 * (1 - spin) ** 0.1292;
  const quality = 0.7 + 1.4187 * (1 - spin) ** -0.499;
  const frequency = omega / (2 * Math.PI * mass * SUN_SECONDS);
  return { frequency, quality, decay: quality / (Math.PI * frequency) };
}
