import { gpsTime } from '../../src/core/data/gps-time';
import type { Series } from '../../src/core/data/kinds';
import type { Span } from '../../src/core/data/spans';

/** Uniform numbers in (0, 1) by xorshift32: the same on every machine, so that bounds in tests are bounds once and for all. */
export function uniform(seed: number): () => number {
  let s = seed >>> 0 || 1;
  return () => {
    s ^= s << 13;
    s >>>= 0;
    s ^= s >>> 17;
    s ^= s << 5;
    s >>>= 0;
    return (s + 0.5) / 4294967296;
  };
}

/** Gaussian samples of standard deviation `sigma` (Box & Muller 1958). */
export function gaussianNoise(n: number, sigma: number, seed = 1): Float64Array {
  const next = uniform(seed);
  for (let i = 0; i < 20; i++) next();
  const out = new Float64Array(n);
  for (let i = 0; i < n; i += 2) {
    const r = sigma * Math.sqrt(-2 * Math.log(next()));
    const a = 2 * Math.PI * next();
    out[i] = r * Math.cos(a);
    if (i + 1 < n) out[i + 1] = r * Math.sin(a);
  }
  return out;
}

/** Runs of finite samples. */
function finiteSpans(samples: Float64Array): Span[] {
  const out: Span[] = [];
  let from = 0;
  for (let i = 0; i <= samples.length; i++) {
    if (i < samples.length && Number.isFinite(samples[i])) continue;
    if (i > from) out.push({ from, to: i });
    from = i + 1;
  }
  return out;
}

/** A series over an array; samples that are not finite read as NaN and end a valid span. */
export function seriesOf(samples: Float64Array, rate: number, over: Partial<Series> = {}): Series {
  return {
    kind: 'series',
    label: 'alder /strain',
    channel: 'alder',
    unit: 'strain',
    rate,
    start: gpsTime(1_400_000_000),
    length: samples.length,
    valid: finiteSpans(samples),
    read(from, to, into = new Float64Array(to - from)) {
      for (let i = from; i < to; i++) into[i - from] = Number.isFinite(samples[i]) ? samples[i] : NaN;
      return into;
    },
    ...over,
  };
}
