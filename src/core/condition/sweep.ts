import type { Series } from '../data/kinds';
import { intersectSpans } from '../data/spans';
import { emptyEnvelope, foldEnvelope, keepEnvelope } from '../figures/envelope';
import { BLOCK } from './block-series';

/**
 * Reads a series once from end to end, block by block, and keeps its envelope for the pictures.
 *
 * @param report called before each block with the fraction done; a throw ends the sweep
 * @param visit valid samples in order; `at` is the index of the first of them
 */
export async function sweep(
  series: Series,
  report: (fraction: number) => Promise<void>,
  visit: (samples: Float64Array, at: number) => void = () => undefined,
): Promise<void> {
  const envelope = emptyEnvelope(series.length);
  const buffer = new Float64Array(Math.min(BLOCK, series.length));
  for (let from = 0; from < series.length; from += BLOCK) {
    await report(from / series.length);
    const to = Math.min(series.length, from + BLOCK);
    series.read(from, to, buffer.subarray(0, to - from));
    foldEnvelope(envelope, buffer, to - from, from);
    for (const run of intersectSpans(series.valid, [{ from, to }]))
      visit(buffer.subarray(run.from - from, run.to - from), run.from);
  }
  keepEnvelope(series, envelope);
}
