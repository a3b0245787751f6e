import { UserError } from '../data/errors';
import type { SectionRows } from './sections-filter';

/** Largest modulus of the two poles of a section. */
function poleModulus(row: ArrayLike<number>): number {
  const [a1, a2] = [row[4] / row[3], row[5] / row[3]];
  const quarter = (a1 * a1) / 4 - a2;
  return quarter < 0 ? Math.sqrt(a2) : Math.abs(a1 / 2) + Math.sqrt(quarter);
}

/** Largest modulus of all poles; 0 for a filter without feedback. */
export const slowestPole = (rows: SectionRows): number => Math.max(0, ...rows.map((r) => poleModulus(r)));

/** Samples of impulse response that are computed at most, 128 MB; longer ones are judged by the slowest pole alone. */
const MOST = 2 ** 24;

export interface Ringing {
  /** Seconds until the slowest pole's amplitude has decayed to √fraction: what a line or step leaves at an edge. */
  readonly decay: number;
  /** Seconds after the impulse beyond which less than `fraction` of the energy of the impulse response lies. */
  readonly impulse: number;
  /** The larger of both: mark this much at an edge (at both edges for a zero-phase filter). */
  readonly length: number;
}

/**
 * How long a filter rings.
 *
 * @param rows Rows b0, b1, b2, a0, a1, a2.
 * @param rate Samples per second.
 * @param fraction Energy left, 1e-4 by default: amplitude 1 %.
 * @throws UserError if a pole lies on or outside the unit circle: the filter never settles.
 *
 * Amplitude of a pole at radius r decays as r^n; the impulse response is computed and summed as a check, since several
 * close poles decay later than one. A notch shows why both count: its impulse response is nearly all in the first
 * sample, but a line that starts or ends makes it ring with the full height of the line. The response is computed for at
 * most 2^24 samples; beyond, `impulse` is `decay`.
 *
 * @example ringing([notch(60, 30, 4096)], 4096).length // 0.7328
 */
export function ringing(rows: SectionRows, rate: number, fraction = 1e-4): Ringing {
  if (!(fraction > 0 && fraction < 1))
    throw new UserError('ringing-fraction', `energy fraction ${fraction}: it must lie between 0 and 1`);
  const r = slowestPole(rows);
  if (!(r < 1))
    throw new UserError(
      'filter-unstable',
      `a pole of the filter lies at radius ${r}: below 1 it would settle`,
    );
  const samples = r === 0 ? 0 : Math.log(fraction) / 2 / Math.log(r);
  const decay = samples / rate;
  const impulse = impulseLength(rows, samples, fraction) / rate;
  const length = Number.isNaN(impulse) ? decay : Math.max(decay, impulse);
  return { decay, impulse: Number.isNaN(impulse) ? decay : impulse, length };
}

/** Samples after which less than `fraction` of the energy follows; NaN if that takes more than MOST samples. */
function impulseLength(rows: SectionRows, decaySamples: number, fraction: number): number {
  for (let n = 16 + Math.ceil(4 * decaySamples); n <= MOST; n *= 2) {
    const h = impulseResponse(rows, n);
    const energy = (from: number): number => h.subarray(from).reduce((sum, v) => sum + v * v, 0);
    const total = energy(0);
    // Trust the sum only when its second half is negligible.
    if (energy(n >> 1) > 1e-3 * fraction * total) continue;
    let after = 0;
    let i = n - 1;
    while (i > 0 && after + h[i] * h[i] < fraction * total) after += h[i] * h[i--];
    return i;
  }
  return NaN;
}

/** First n samples of the response to a unit impulse (transposed direct form II). */
export function impulseResponse(rows: SectionRows, n: number): Float64Array {
  const h = new Float64Array(n);
  h[0] = 1;
  for (const row of rows) {
    const a0 = row[3];
    const [b0, b1, b2, a1, a2] = [row[0] / a0, row[1] / a0, row[2] / a0, row[4] / a0, row[5] / a0];
    let z0 = 0;
    let z1 = 0;
    for (let i = 0; i < n; i++) {
      const x = h[i];
      const y = b0 * x + z0;
      z0 = b1 * x - a1 * y + z1;
      z1 = b2 * x - a2 * y;
      h[i] = y;
    }
  }
  return h;
}
