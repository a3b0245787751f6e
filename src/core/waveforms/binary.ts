import { SUN_SECONDS } from './constants';

/** Two bodies on a circular orbit: detector-frame masses in M☉, `mass1` the larger, spins χ = cJ/(Gm²) along the orbit's axis. */
export interface Binary {
  readonly mass1: number;
  readonly mass2: number;
  readonly spin1: number;
  readonly spin2: number;
}

/** A binary from two bodies in any order. Masses of the source's frame become those of the detector's by 1 + z. */
export function binaryOf(
  a: { readonly mass: number; readonly spin?: number },
  b: { readonly mass: number; readonly spin?: number },
  redshift = 0,
): Binary {
  const [big, small] = a.mass >= b.mass ? [a, b] : [b, a];
  return {
    mass1: big.mass * (1 + redshift),
    mass2: small.mass * (1 + redshift),
    spin1: big.spin ?? 0,
    spin2: small.spin ?? 0,
  };
}

export const totalMass = (b: Binary): number => b.mass1 + b.mass2;

/** Total mass as a time, GM/c³ in s. */
export const totalSeconds = (b: Binary): number => totalMass(b) * SUN_SECONDS;

/** Symmetric mass ratio η = m₁m₂/M², at most 1/4. */
export const symmetricRatio = (b: Binary): number => (b.mass1 / totalMass(b)) * (b.mass2 / totalMass(b));

/** Chirp mass M η^{3/5} in M☉. */
export const chirpMass = (b: Binary): number => totalMass(b) * symmetricRatio(b) ** 0.6;

/** q = m₁/m₂ ≥ 1. */
export const massRatio = (b: Binary): number => b.mass1 / b.mass2;

/** Frequency of the wave at the last stable circular orbit around a mass M without spin, c³/(6^{3/2} π G M), in Hz. */
export const iscoFrequency = (b: Binary): number => 1 / (6 ** 1.5 * Math.PI * totalSeconds(b));

/**
 * Chirp times in s at f₀ Hz: τ₀ = 5/(256 π f₀ η) (πMf₀)^{−5/3}, the time to coalescence at lowest order (Peters, Phys. Rev.
 * 136, B1224, 1964), and τ₃ = 1/(8 f₀ η) (πMf₀)^{−2/3} of the 1.5PN term, M in seconds (Owen & Sathyaprakash, PRD 60,
 * 022002, 1999).
 */
export function chirpTimes(b: Binary, f0: number): { tau0: number; tau3: number } {
  const eta = symmetricRatio(b);
  const v3 = Math.PI * totalSeconds(b) * f0;
  return {
    tau0: (5 / (256 * Math.PI * f0 * eta)) * v3 ** (-5 / 3),
    tau3: (1 / (8 * f0 * eta)) * v3 ** (-2 / 3),
  };
}
