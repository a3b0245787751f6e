/** A damped resonance shaken by noise: a narrow line of Lorentzian shape. */
export interface Resonance {
  /** Hz */
  readonly frequency: number;
  /** Frequency over full width at half power. */
  readonly q: number;
  /** Amplitude density at the top, strain/√Hz. */
  readonly peak: number;
}

/** A smooth noise floor with resonances on it; all amplitude densities one-sided in strain/√Hz. */
export interface NoiseCurve {
  /** Flat below `knee` (Hz), falling as f⁻¹⁰ above it: the low-frequency wall. */
  readonly wall: { readonly level: number; readonly knee: number };
  /** ∝ f^−1.5, equal to `level` at `at` Hz; flat below the wall's knee, where it is hidden. */
  readonly slope: { readonly level: number; readonly at: number };
  /** Flat below `corner` (Hz), rising ∝ f above it. */
  readonly floor: { readonly level: number; readonly corner: number };
  readonly resonances: readonly Resonance[];
}

/**
 * One-sided power spectral density in strain²/Hz at `f` > 0 Hz. The parts are independent and their powers add. Invented, in
 * the general shape such instruments share (common practice, no source). Only + − × ÷, so the same to the bit everywhere.
 */
export function noiseDensity(curve: NoiseCurve, f: number): number {
  const { wall, slope, floor } = curve;
  const w2 = (f / wall.knee) * (f / wall.knee);
  const w4 = w2 * w2;
  const w20 = w4 * w4 * w4 * w4 * w4;
  const s = slope.at / (f < wall.knee ? wall.knee : f);
  const c = f / floor.corner;
  let density =
    (wall.level * wall.level) / (1 + w20) +
    slope.level * slope.level * s * s * s +
    floor.level * floor.level * (1 + c * c);
  for (const { frequency, q, peak } of curve.resonances) {
    const u = f / frequency;
    const detuned = (1 - u * u) * q;
    density += (peak * peak) / (detuned * detuned + u * u);
  }
  return density;
}
