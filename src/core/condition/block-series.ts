import type { Series } from '../data/kinds';

/** Everything of a series but its samples. */
export type SeriesFacts = Omit<Series, 'kind' | 'read' | 'scan'>;

/** Samples of a block; large enough that a filter's overlap costs little. */
export const BLOCK = 1 << 17;

/**
 * A series whose samples are computed when they are read, in blocks of a fixed grid, so that a value does not depend on how
 * it is asked for. Blocks are kept while they fit; the one not used for longest is dropped and computed again when needed.
 *
 * @param compute fills `out` with samples `[from, to)`; called for whole blocks of the grid only, the last may be shorter.
 * Samples it does not set are NaN
 * @param keep bytes of samples kept; at least two blocks are
 */
export function blockSeries(
  facts: SeriesFacts,
  compute: (from: number, to: number, out: Float64Array) => void,
  keep: number,
  size = BLOCK,
): Series {
  const most = Math.max(2, Math.floor(keep / (8 * size)));
  const kept = new Map<number, Float64Array>();
  const blockAt = (k: number): Float64Array => {
    let block = kept.get(k);
    if (block) kept.delete(k);
    else {
      const from = k * size;
      const to = Math.min(facts.length, from + size);
      block = new Float64Array(to - from).fill(NaN);
      compute(from, to, block);
      if (kept.size >= most) kept.delete(kept.keys().next().value!);
    }
    kept.set(k, block);
    return block;
  };
  return {
    ...facts,
    kind: 'series',
    read(from, to, into = new Float64Array(to - from)) {
      for (let at = from; at < to;) {
        const k = Math.floor(at / size);
        const end = Math.min(to, (k + 1) * size);
        into.set(blockAt(k).subarray(at - k * size, end - k * size), at - from);
        at = end;
      }
      return into;
    },
  };
}

/** What a series made from another has in common with it, whatever the step. */
export function inherited(
  series: Series,
): Pick<Series, 'channel' | 'start'> & Partial<Pick<Series, 'startUnknown' | 'notes'>> {
  return {
    channel: series.channel,
    start: series.start,
    ...(series.startUnknown === true ? { startUnknown: true } : {}),
    ...(series.notes ? { notes: series.notes } : {}),
  };
}
