import type { Series } from '../data/kinds';
import { spanLength } from '../data/spans';

/** Centre and width that a few wild samples cannot move. */
export interface RobustWidth {
  readonly median: number;
  /** 1.4826 times the median absolute deviation: the standard deviation of a Gaussian with the same middle half. */
  readonly width: number;
  /** Samples it was taken from: all of a short series, else blocks spread evenly over a long one. */
  readonly from: number;
  /** Whether each of these samples was a whole number. */
  readonly whole: boolean;
}

const MOST = 1 << 18;
const BLOCK = 1 << 12;

/** 1 / Φ⁻¹(3/4) */
const GAUSSIAN = 1.482602218505602;

/** Robust centre and width of the valid samples; NaN when there are none. */
export function robustWidth(series: Series): RobustWidth {
  const values = spreadSamples(series);
  if (values.length === 0) return { median: NaN, width: NaN, from: 0, whole: false };
  const whole = values.every(Number.isInteger);
  const median = middle(values);
  const deviations = values.map((v) => Math.abs(v - median));
  return { median, width: GAUSSIAN * middle(deviations), from: values.length, whole };
}

function middle(values: Float64Array): number {
  values.sort();
  const half = values.length >> 1;
  return values.length % 2 === 1 ? values[half] : values[half - 1] / 2 + values[half] / 2;
}

/** All valid samples when they are few, else evenly spread blocks of them. */
function spreadSamples(series: Series): Float64Array {
  const total = spanLength(series.valid);
  const blocks = total <= MOST ? 1 : MOST / BLOCK;
  const each = total <= MOST ? total : BLOCK;
  const out = new Float64Array(blocks * each);
  let filled = 0;
  for (let k = 0; k < blocks; k++) {
    let skip = blocks === 1 ? 0 : Math.floor((k * (total - each)) / (blocks - 1));
    let want = each;
    for (const span of series.valid) {
      const size = span.to - span.from;
      if (skip >= size) {
        skip -= size;
        continue;
      }
      const from = span.from + skip;
      const to = Math.min(span.to, from + want);
      skip = 0;
      series.read(from, to, out.subarray(filled, filled + to - from));
      filled += to - from;
      want -= to - from;
      if (want === 0) break;
    }
  }
  return out.subarray(0, filled).filter(Number.isFinite);
}
