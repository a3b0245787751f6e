import type { MapPlane, MapRow } from '../data/kinds';
import type { Span } from '../data/spans';
import type { Kernels } from '../kernels/kernels';
import { HALF_WIDTH, qWindow, tileReach, type QPlane, type QRow } from './q-tiling';

export interface WhiteStretch {
  /** White samples of unit one-sided density 2/rate; 0 where not valid. */
  readonly samples: Float32Array;
  readonly rate: number;
  /** Stretches without valid samples, in samples; what touches them has no energy. */
  readonly holes: readonly Span[];
  /** Power of the white noise at a frequency in Hz: 1 where whitening was complete. */
  readonly power: (frequency: number) => number;
}

/** Bytes of energies that a second of a map takes, for planes tiled for one second. */
export const bytesPerSecond = (planes: readonly QPlane[]): number =>
  planes.reduce(
    (sum, p) =>
      sum + p.rows.reduce((s, r) => s + 4 * 1.2 * Math.max(r.tiles, (2 * HALF_WIDTH * r.frequency) / p.q), 0),
    0,
  );

/** Length of the transform: room behind the data for the longest tile, so that its end does not meet the beginning. */
export const transformLength = (samples: number, planes: readonly QPlane[], rate: number): number => {
  const longest = Math.max(0, ...planes.flatMap((p) => p.rows.map((r) => tileReach(r.frequency, p.q))));
  return 2 ** Math.ceil(Math.log2(samples + Math.ceil(2 * longest * rate)));
};

/**
 * Tile energies of all planes: |Σ W(f) Y(f) e^{2πifτ}|² over its expectation in Gaussian noise, so that the energy of noise is
 * exponential with mean 1. Computed in float32 from white samples, whose size is about 1.
 *
 * @param report called before each row with the part done
 */
export async function qTransform(
  kernels: Kernels,
  white: WhiteStretch,
  planes: readonly QPlane[],
  report: (fraction: number) => Promise<void>,
): Promise<MapPlane[]> {
  const { samples, rate, holes } = white;
  const n = transformLength(samples.length, planes, rate);
  const x = kernels.array(n, 'f32');
  const plan = kernels.rfftPlan(n, 'f32');
  const spectrum = kernels.complex(plan.bins, 'f32');
  const total = planes.reduce((sum, p) => sum + p.rows.length, 0);
  let done = 0;
  try {
    const padded = new Float32Array(n);
    padded.set(samples);
    x.set(padded);
    plan.forward(x, spectrum);
    const out: MapPlane[] = [];
    for (const plane of planes) {
      const rows: MapRow[] = [];
      for (const row of plane.rows) {
        await report(done++ / total);
        const band = bandOf(row, plane.q, n, rate);
        const length = Math.min(n, smooth(Math.max(16, band.count, (row.tiles * n) / samples.length)));
        // E|Σ W Y|² of white noise of variance 1 is n Σ W².
        let expected = 0;
        for (let k = 0; k < band.count; k++) {
          const f = ((band.first + k) * rate) / n;
          expected += band.weights[k] ** 2 * white.power(f);
        }
        const energies = rowEnergies(
          kernels,
          spectrum.sub(band.first, band.first + band.count),
          band.weights,
          length,
          n * expected,
        );
        const cell = n / length / rate;
        const cells = Math.min(length, Math.ceil(samples.length / rate / cell + 0.5));
        const values = energies.slice(0, cells);
        blank(values, cell, holes, rate, tileReach(row.frequency, plane.q), samples.length);
        rows.push({
          frequency: row.frequency,
          low: row.low,
          high: row.high,
          offset: -cell / 2,
          cell,
          values,
        });
      }
      out.push({ q: plane.q, rows });
    }
    return out;
  } finally {
    x.free();
    spectrum.free();
  }
}

/** Smallest number of at least `n` that has no prime factor above 5: fast to transform. */
export function smooth(n: number): number {
  let best = 2 ** Math.ceil(Math.log2(n));
  for (let five = 1; five < best; five *= 5)
    for (let three = five; three < best; three *= 3) {
      const candidate = three * 2 ** Math.max(0, Math.ceil(Math.log2(n / three)));
      if (candidate >= n && candidate < best) best = candidate;
    }
  return best;
}

interface Band {
  readonly first: number;
  readonly count: number;
  readonly weights: Float32Array;
}

/** Bins under a row's window, without the one at zero. */
function bandOf(row: QRow, q: number, n: number, rate: number): Band {
  const half = (row.frequency * HALF_WIDTH) / q;
  const first = Math.max(1, Math.ceil(((row.frequency - half) * n) / rate));
  const last = Math.min(n / 2 - 1, Math.floor(((row.frequency + half) * n) / rate));
  const count = Math.max(1, last - first + 1);
  const weights = Float32Array.from({ length: count }, (_, k) => qWindow(row, q, ((first + k) * rate) / n));
  return { first, count, weights };
}

function rowEnergies(
  kernels: Kernels,
  part: ReturnType<ReturnType<Kernels['complex']>['sub']>,
  weights: Float32Array,
  length: number,
  expected: number,
): Float32Array {
  const w = kernels.array(weights.length, 'f32');
  const [band, series] = [kernels.complex(length, 'f32'), kernels.complex(length, 'f32')];
  const energies = kernels.array(length, 'f32');
  try {
    w.set(weights);
    kernels.windowed(part, w, 1 / Math.sqrt(expected), band);
    kernels.fftPlan(length, 'f32').backward(band, series);
    kernels.energy(series, energies);
    return energies.view().slice();
  } finally {
    w.free();
    band.free();
    series.free();
    energies.free();
  }
}

/** Takes the energy away from cells whose tile touches a hole or an end of the data. */
function blank(
  values: Float32Array,
  cell: number,
  holes: readonly Span[],
  rate: number,
  reach: number,
  length: number,
): void {
  const ends: Span[] = [
    { from: -Infinity, to: 0 },
    { from: length, to: Infinity },
  ];
  for (const { from, to } of [...ends, ...holes]) {
    const first = Math.max(0, Math.floor((from / rate - reach) / cell));
    const last = Math.min(values.length, Math.ceil((to / rate + reach) / cell) + 1);
    values.fill(NaN, first, last);
  }
}
