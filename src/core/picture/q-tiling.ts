/** Half the width of the window in units of frequency/Q: √11 makes Q the frequency over the standard deviation of the squared window. */
export const HALF_WIDTH = Math.sqrt(11);

export interface QRow {
  /** Hz: centre of the window, and the edges of the row half-way (in the logarithm) to its neighbours. */
  readonly frequency: number;
  readonly low: number;
  readonly high: number;
  /** Tiles that the mismatch asks for in the whole duration. */
  readonly tiles: number;
}

export interface QPlane {
  readonly q: number;
  readonly rows: readonly QRow[];
}

export interface TilingRequest {
  readonly qLow: number;
  readonly qHigh: number;
  /** Hz: no centre lies outside. */
  readonly low: number;
  readonly high: number;
  /** Hz: no window reaches above. */
  readonly top: number;
  /** Seconds. */
  readonly duration: number;
  /** Largest part of the energy that a sine-Gaussian between tiles loses. */
  readonly mismatch: number;
}

/**
 * Planes of constant Q with rows of constant frequency, spaced so that no sine-Gaussian loses more than the mismatch:
 * δs² = (4π²φ²/Q²) δτ² + ((2 + Q²)/4φ²) δφ² + δQ²/(2Q²) − δφ δQ/(φQ), a step of 2√(μ/3) along each axis.
 *
 * Source: Chatterji et al., Class. Quantum Grav. 21, S1809 (2004) (MEMORY, the metric confirmed numerically in the tests).
 */
export function qTiling({ qLow, qHigh, low, high, top, duration, mismatch }: TilingRequest): QPlane[] {
  const step = 2 * Math.sqrt(mismatch / 3);
  const planes = Math.max(1, Math.ceil(Math.log(qHigh / qLow) / Math.SQRT2 / step));
  return Array.from({ length: planes }, (_, i) => {
    const q = qLow * (qHigh / qLow) ** ((i + 0.5) / planes);
    const last = Math.min(high, top / (1 + HALF_WIDTH / q));
    if (!(last > low)) return { q, rows: [] };
    const count = Math.max(1, Math.ceil((0.5 * Math.sqrt(2 + q * q) * Math.log(last / low)) / step));
    const at = (k: number): number => low * (last / low) ** (k / count);
    const rows = Array.from({ length: count }, (_, k): QRow => {
      const frequency = at(k + 0.5);
      const tiles = Math.ceil((2 * Math.PI * duration * frequency) / q / step);
      return { frequency, low: at(k), high: at(k + 1), tiles };
    });
    return { q, rows };
  }).filter((p) => p.rows.length > 0);
}

/** Bisquare window about a row's centre: (1 − u²)² with u = (f − φ) Q/(φ √11), 0 outside |u| < 1. */
export function qWindow(row: Pick<QRow, 'frequency'>, q: number, frequency: number): number {
  const u = ((frequency - row.frequency) * q) / (row.frequency * HALF_WIDTH);
  return Math.abs(u) < 1 ? (1 - u * u) ** 2 : 0;
}

/** Seconds to either side of a tile's middle that hold all of its window in time but for a part below 1e-5 of the energy. */
export const tileReach = (frequency: number, q: number): number => (0.5 * q) / frequency;
