import { UserError } from '../data/errors';
import type { Series } from '../data/kinds';
import { complementSpans, intersectSpans, normaliseSpans } from '../data/spans';
import { numberText } from '../figures/number-text';
import type { Kernels, SectionRows } from '../kernels/kernels';
import { slowestPole } from '../kernels/sections-response-ringing';
import { steadyState, zeroPhasePadding } from '../kernels/sections-run';
import { BLOCK, blockSeries, inherited } from './block-series';

export type Direction = 'zero-phase' | 'causal';

/** Amplitude to which the slowest pole must have decayed before a block's samples count: below rounding. */
const SETTLED = 1e-16;

export interface FilterPass {
  readonly rows: SectionRows;
  readonly direction: Direction;
  /** Samples given up at each edge of a valid span that the filter's ringing reaches. */
  readonly crop: number;
  readonly label: string;
}

/**
 * A series filtered by second-order sections, each valid span on its own, computed block by block as it is read. A block
 * is filtered with so much data around it that what the cut leaves has decayed below rounding; at the true ends of a span
 * odd padding is used, as scipy.signal.sosfiltfilt does. A causal filter starts in the steady state of the first sample.
 *
 * @throws UserError when the filter settles so slowly that a block would not fit into `memory` bytes
 */
export function filteredSeries(series: Series, pass: FilterPass, kernels: Kernels, memory: number): Series {
  const { rows, direction, crop, label } = pass;
  const both = direction === 'zero-phase';
  const pole = slowestPole(rows);
  const lead =
    pole === 0 ? 0 : Math.ceil((1.25 * Math.log(SETTLED)) / Math.log(pole)) + zeroPhasePadding(rows);
  const spans = normaliseSpans(series.valid);
  // A block much shorter than its lead would be mostly lead; one that holds the whole series needs none.
  const size = Math.min(Math.max(BLOCK, 2 * lead), Math.max(1, series.length));
  const longest = Math.min(size + 2 * lead, Math.max(0, ...spans.map((s) => s.to - s.from)));
  if (16 * longest > memory)
    throw new UserError(
      'filter-slow',
      `the filter settles over ${numberText(lead / series.rate)} s, so that a block of ${numberText(longest, 9)} samples would be needed; resample ${series.label} to a lower rate first, or set a higher corner or lower Q`,
    );
  const valid = spans.flatMap((s) => {
    const from = s.from + crop;
    const to = both ? s.to - crop : s.to;
    return to > from && s.to - s.from > zeroPhasePadding(rows) ? [{ from, to }] : [];
  });
  const start = both ? undefined : steadyState(rows);
  return blockSeries(
    {
      ...inherited(series),
      label,
      unit: series.unit,
      rate: series.rate,
      length: series.length,
      valid,
      spoilt: intersectSpans([...spans, ...(series.spoilt ?? [])], complementSpans(valid, series.length)),
      ...(series.gates ? { gates: intersectSpans(series.gates, valid) } : {}),
    },
    (from, to, out) => {
      for (const span of spans) {
        for (const part of intersectSpans(valid, [
          { from: Math.max(from, span.from), to: Math.min(to, span.to) },
        ])) {
          const first = Math.max(span.from, part.from - lead);
          const last = both ? Math.min(span.to, part.to + lead) : part.to;
          const x = series.read(first, last);
          if (start) kernels.filterSections(rows, x, { zi: start.map((z) => z * x[0]), out: x });
          else kernels.zeroPhase(rows, x, x);
          out.set(x.subarray(part.from - first, part.to - first), part.from - from);
        }
      }
    },
    memory / 4,
    size,
  );
}
