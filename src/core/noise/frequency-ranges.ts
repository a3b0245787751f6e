/** A run of bins that all lie beyond a limit on the same side. */
export interface FrequencyRange {
  /** Hz, on the edges of the bins. */
  readonly from: number;
  readonly to: number;
  readonly side: 'low' | 'high';
  /** Bin that lies furthest out, its frequency and value. */
  readonly bin: number;
  readonly at: number;
  readonly value: number;
  readonly bins: number;
}

/**
 * Groups bins below `low` or above `high` into ranges. Bins of one side closer together than `reach` bins share a range:
 * a window spreads one feature over several bins, some of which may fall back below the limit.
 *
 * @param frequency Hz, evenly spaced
 * @param values NaN means no value
 */
export function frequencyRanges(
  frequency: Float64Array,
  values: Float64Array,
  low: number,
  high: number,
  reach: number,
): FrequencyRange[] {
  const groups: { side: 'low' | 'high'; first: number; last: number; bin: number }[] = [];
  const open: Partial<Record<'low' | 'high', (typeof groups)[number]>> = {};
  values.forEach((v, k) => {
    const side = v < low ? 'low' : v > high ? 'high' : undefined;
    if (side === undefined) return;
    const current = open[side];
    if (current && k - current.last <= reach) {
      current.last = k;
      if (side === 'low' ? v < values[current.bin] : v > values[current.bin]) current.bin = k;
    } else groups.push((open[side] = { side, first: k, last: k, bin: k }));
  });
  const half = frequency.length > 1 ? (frequency[1] - frequency[0]) / 2 : 0;
  return groups.map(({ side, first, last, bin }) => ({
    from: Math.max(0, frequency[first] - half),
    to: frequency[last] + half,
    side,
    bin,
    at: frequency[bin],
    value: values[bin],
    bins: last - first + 1,
  }));
}
