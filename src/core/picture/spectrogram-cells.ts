import type { MapRow, Series } from '../data/kinds';
import type { Span } from '../data/spans';
import type { Kernels } from '../kernels/kernels';

export interface SpectrogramPlan {
  /** First sample of the map, and samples of a segment and between two starts. */
  readonly from: number;
  readonly size: number;
  readonly step: number;
  readonly count: number;
  /** Bins kept. */
  readonly low: number;
  readonly high: number;
  readonly window: Float64Array;
}

/**
 * One-sided amplitude densities √S of windowed, mean-free segments, a row per bin and a cell per segment. A segment that
 * touches an invalid sample has none. Kept in float32, in which √S of strain is far from the smallest number.
 */
export async function spectrogramRows(
  series: Series,
  plan: SpectrogramPlan,
  kernels: Kernels,
  report: (fraction: number) => Promise<void>,
): Promise<MapRow[]> {
  const { from, size, step, count, low, high, window } = plan;
  const { rate } = series;
  const df = rate / size;
  const scale = Math.sqrt(2 / (rate * window.reduce((s, w) => s + w * w, 0)));
  const cell = step / rate;
  // Cells are centred on the middles of their segments.
  const offset = size / 2 / rate - cell / 2;
  const rows = Array.from({ length: high - low + 1 }, (_, k): MapRow => {
    const f = (low + k) * df;
    return {
      frequency: f,
      low: f - df / 2,
      high: f + df / 2,
      offset,
      cell,
      values: new Float32Array(count).fill(NaN),
    };
  });
  const x = new Float64Array(size);
  for (let i = 0; i < count; i++) {
    if (i % 32 === 0) await report(i / count);
    const at = from + i * step;
    if (!inside(series.valid, at, at + size)) continue;
    series.read(at, at + size, x);
    const mean = x.reduce((s, v) => s + v, 0) / size;
    for (let n = 0; n < size; n++) x[n] = (x[n] - mean) * window[n];
    const { re, im } = kernels.rfft(x);
    for (let k = low; k <= high; k++) {
      const single = k === 0 || 2 * k === size;
      rows[k - low].values[i] = Math.hypot(re[k], im[k]) * scale * (single ? Math.SQRT1_2 : 1);
    }
  }
  return rows;
}

const inside = (spans: readonly Span[], from: number, to: number): boolean =>
  spans.some((s) => s.from <= from && s.to >= to);

/** Rows divided by their own medians, squared: power over the median power of the frequency. */
export function overMedian(rows: readonly MapRow[]): MapRow[] {
  return rows.map((row) => {
    const sorted = row.values.filter(Number.isFinite).sort();
    const n = sorted.length;
    const median = n === 0 ? NaN : (sorted[(n - 1) >> 1] + sorted[n >> 1]) / 2;
    return { ...row, values: row.values.map((v) => (v / median) ** 2) };
  });
}
