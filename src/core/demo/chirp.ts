import { cosTurns, exp, log, power, sinTurns } from './elementary';

/** GM☉/c³ in s and a megaparsec in light-seconds (IAU 2015 resolutions B2 and B3; c exact). */
const SUN_SECONDS = 4.9254909476412675e-6;
const MPC_SECONDS = 3.085677581491367e22 / 299_792_458;
const EULER = 0.5772156649015329;
const PI = 3.141592653589793;

export interface Binary {
  /** Detector-frame masses in solar masses. */
  readonly mass1: number;
  readonly mass2: number;
  /** Luminosity distance in Mpc. */
  readonly distance: number;
  /** Angle between orbit's axis and line of sight, turns. */
  readonly inclination: number;
  /** Orbital phase φ_c at coalescence, turns. */
  readonly phase: number;
}

/** Frequency of the last stable circular orbit of the total mass, c³/(6^{3/2} π G M), in Hz. */
export function lastStableFrequency(b: Binary): number {
  return 1 / (6 * Math.sqrt(6) * PI * (b.mass1 + b.mass2) * SUN_SECONDS);
}

/** Coefficients of v^k in the post-Newtonian sum; those of v⁵ and v⁶ carry logarithms and are finished in `phaseTurns`. */
function series(eta: number): number[] {
  const e2 = eta * eta;
  return [
    1,
    0,
    3715 / 756 + (55 * eta) / 9,
    -16 * PI,
    15293365 / 508032 + (27145 * eta) / 504 + (3085 * e2) / 72,
    PI * (38645 / 756 - (65 * eta) / 9),
    11583231236531 / 4694215680 -
      (640 * PI * PI) / 3 -
      (6848 * EULER) / 21 +
      (-15737765635 / 3048192 + (2255 * PI * PI) / 12) * eta +
      (76055 * e2) / 1728 -
      (127825 * e2 * eta) / 1296,
    PI * (77096675 / 254016 + (378515 * eta) / 1512 - (74045 * e2) / 756),
  ];
}

/**
 * Phase ψ(f) − 2πf t_c of the stationary-phase inspiral to 3.5PN without spin, in turns; the transform is A e^{−iψ}.
 * Buonanno, Iyer, Ochsner, Pan, Sathyaprakash, PRD 80, 084043 (2009) (MEMORY; coefficients COMPUTED from energy and flux as
 * given by Blanchet, Living Rev. Relativity 17, 2, 2014).
 */
export function phaseTurns(b: Binary, f: number): number {
  const total = b.mass1 + b.mass2;
  const eta = (b.mass1 * b.mass2) / (total * total);
  const psi = series(eta);
  const v3 = PI * total * SUN_SECONDS * f;
  const logV = log(v3) / 3;
  const v = exp(logV);
  psi[5] *= 1 + 3 * logV;
  psi[6] -= (6848 / 21) * (log(4) + logV);
  let sum = 0;
  for (let k = 7; k >= 0; k--) sum = sum * v + psi[k];
  const radians = (3 / (128 * eta * v3 * v * v)) * sum - PI / 4;
  return radians / (2 * PI) - b.phase;
}

/** |h̃(f)| in strain/Hz for a source straight above, face on: √(5/24) π^{−2/3} (c/D) (GM_c/c³)^{5/6} f^{−7/6}. */
export function chirpAmplitude(b: Binary, f: number): number {
  const total = b.mass1 + b.mass2;
  const eta = (b.mass1 * b.mass2) / (total * total);
  const chirpSeconds = total * SUN_SECONDS * power(eta, 0.6);
  return (
    ((Math.sqrt(5 / 24) * power(PI, -2 / 3)) / (b.distance * MPC_SECONDS)) *
    power(chirpSeconds, 5 / 6) *
    power(f, -7 / 6)
  );
}

/** Rises smoothly from 0 at `low` to 1 at `high`: half a cosine. */
function ramp(f: number, low: number, high: number): number {
  if (f <= low) return 0;
  return f >= high ? 1 : 0.5 - 0.5 * cosTurns((f - low) / (high - low) / 2);
}

/**
 * Positive half of the transform (strain/Hz, kernel e^{−2πift}) of F₊h₊ + F×h× on bins of `df` Hz, coalescing at
 * `coalescence` seconds: A (F₊(1+cos²ι)/2 − iF× cos ι) e^{−iψ}. It sets in between `onset[0]` and `onset[1]` Hz and is cut by
 * half a cosine from 0.95 to 1.05 of the last stable orbit's frequency, where it is at one half.
 */
export function projectedChirp(
  b: Binary,
  factors: { readonly plus: number; readonly cross: number },
  coalescence: number,
  onset: readonly [number, number],
  df: number,
  bins: number,
): { re: Float64Array; im: Float64Array } {
  const re = new Float64Array(bins);
  const im = new Float64Array(bins);
  const cosI = cosTurns(b.inclination);
  const plus = (factors.plus * (1 + cosI * cosI)) / 2;
  const cross = factors.cross * cosI;
  const end = lastStableFrequency(b);
  for (let k = 1; k < bins; k++) {
    const f = k * df;
    const shape = ramp(f, onset[0], onset[1]) * (1 - ramp(f, 0.95 * end, 1.05 * end));
    if (shape === 0) continue;
    const a = shape * chirpAmplitude(b, f);
    const turns = phaseTurns(b, f) + f * coalescence;
    const c = cosTurns(turns);
    const s = sinTurns(turns);
    re[k] = a * (plus * c - cross * s);
    im[k] = -a * (plus * s + cross * c);
  }
  return { re, im };
}
