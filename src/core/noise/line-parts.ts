import type { AverageKind, Series } from '../data/kinds';
import type { Kernels } from '../kernels/kernels';
import { binError } from './bin-error';
import type { SegmentPlan } from './segments';
import { welchEstimate } from './welch-estimate';

/** Parts of the time that are compared, and fewest segments in one. */
const PARTS = 4;
const LEAST = 6;

export interface SpectrumPart {
  readonly density: Float64Array;
  readonly relativeError: number;
}

/** Spectra of consecutive parts of the segments of a plan, four or fewer; none when there would not be two. */
export async function partSpectra(
  series: Series,
  plan: SegmentPlan,
  window: Float64Array,
  average: AverageKind,
  kernels: Kernels,
  memoryLimit: number,
  block: (fraction: number) => Promise<void>,
): Promise<SpectrumPart[]> {
  const parts = Math.min(PARTS, Math.floor(plan.starts.length / LEAST));
  if (parts < 2) return [];
  const out: SpectrumPart[] = [];
  for (let p = 0; p < parts; p++) {
    const edge = (q: number): number => Math.floor((q * plan.starts.length) / parts);
    const starts = plan.starts.slice(edge(p), edge(p + 1));
    const [first, last] = [starts[0], starts.at(-1)! + plan.size];
    const used = plan.used
      .map((s) => ({ from: Math.max(s.from, first), to: Math.min(s.to, last) }))
      .filter((s) => s.to - s.from >= plan.size);
    const { density } = await welchEstimate(series, { ...plan, starts, used }, kernels, {
      average,
      window,
      detrend: 'constant',
      watch: [],
      memoryLimit,
      block: (f) => block((p + f) / parts),
    });
    out.push({ density, relativeError: binError(average, starts.length, window, plan.step).relative });
  }
  return out;
}
