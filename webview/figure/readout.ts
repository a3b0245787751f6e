import type { Figure, Trace } from '../../src/core/figures/figure';
import { loudestInColumn } from '../../src/core/figures/image';
import { instantAfter } from '../words/instants';
import { numberText } from '../../src/core/figures/shown-number';

/** What is under the pointer, as words: where, and the value of every trace there. */
export interface Readout {
  readonly at: string;
  /** By the trace's place in the figure; absent where a trace has no value. */
  readonly values: readonly (string | undefined)[];
}

/** Values of all traces nearest to `x`. */
export function readoutAt(figure: Figure, x: number): Readout {
  const unit = figure.x.unit === '' ? '' : ` ${figure.x.unit}`;
  const name = figure.x.epoch === undefined ? `${figure.x.label} ` : '';
  const when = figure.x.epoch === undefined ? '' : instantWords(figure.x.epoch, x);
  return {
    at: `${name}${numberText(x, 7)}${unit}${when}`,
    values: figure.traces.map((t) => valueAt(t, x, figure.y.unit)),
  };
}

function instantWords(epoch: string, x: number): string {
  const { gps, utc } = instantAfter(epoch, x);
  return ` · GPS ${gps} · ${utc}`;
}

function valueAt(trace: Trace, x: number, unit: string): string | undefined {
  const ending = unit === '' ? '' : ` ${unit}`;
  if (trace.type === 'bars') {
    const i = trace.edges.findLastIndex((e) => e <= x);
    return i < 0 || i >= trace.counts.length ? undefined : `${numberText(trace.counts[i])}${ending}`;
  }
  if (trace.type === 'points') return undefined;
  if (trace.type === 'image') {
    const best = loudestInColumn(
      trace,
      Math.floor(((x - trace.x[0]) / (trace.x[1] - trace.x[0])) * trace.columns),
    );
    return best && `at most ${numberText(best.value)}${trace.unit === '' ? '' : ` ${trace.unit}`}`;
  }
  const i = nearest(trace.x, x);
  if (i === undefined) return undefined;
  if (trace.type === 'line') {
    const y = trace.y[i];
    return Number.isNaN(y) ? undefined : `${numberText(y)}${ending}`;
  }
  const low = trace.low[i];
  return Number.isNaN(low) ? undefined : `${numberText(low)} to ${numberText(trace.high[i])}${ending}`;
}

/** Index of the entry of rising `x` nearest to `at`. */
export function nearest(x: Float64Array, at: number): number | undefined {
  if (x.length === 0) return undefined;
  let lo = 0;
  let hi = x.length - 1;
  while (hi - lo > 1) {
    const mid = (lo + hi) >> 1;
    if (x[mid] <= at) lo = mid;
    else hi = mid;
  }
  return Math.abs(x[lo] - at) <= Math.abs(x[hi] - at) ? lo : hi;
}
