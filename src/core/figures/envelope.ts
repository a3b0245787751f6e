import type { Envelope, Series } from '../data/kinds';

/** Cells an envelope has at most: fine enough that a zoom either has a cell per pixel column or is cheap to read anew. */
const CELLS = 1 << 17;

/** An envelope without samples yet, for a series of `length` samples. */
export function emptyEnvelope(length: number): Envelope {
  const cell = Math.max(1, Math.ceil(length / CELLS));
  const cells = Math.ceil(length / cell);
  return { cell, low: new Float64Array(cells).fill(NaN), high: new Float64Array(cells).fill(NaN) };
}

/** Takes up samples `block[0, count)`, which start at sample `from` of the series. Samples that are not finite are passed over. */
export function foldEnvelope(envelope: Envelope, block: Float64Array, count: number, from: number): void {
  const { cell, low, high } = envelope;
  let i = 0;
  while (i < count) {
    const k = Math.floor((from + i) / cell);
    const end = Math.min(count, (k + 1) * cell - from);
    let a = low[k];
    let b = high[k];
    for (; i < end; i++) {
      const v = block[i];
      if (!(Math.abs(v) < Infinity)) continue;
      if (!(v >= a)) a = v;
      if (!(v <= b)) b = v;
    }
    low[k] = a;
    high[k] = b;
  }
}

const BLOCK = 1 << 18;
const kept = new WeakMap<Series, Envelope>();

/** The envelope of a series; kept with the series, so that zooming out does not read everything again. */
export function envelopeOf(series: Series): Envelope {
  const known = kept.get(series);
  if (known) return known;
  const envelope = emptyEnvelope(series.length);
  const block = new Float64Array(Math.min(BLOCK, series.length));
  for (let from = 0; from < series.length; from += BLOCK) {
    const to = Math.min(series.length, from + BLOCK);
    foldEnvelope(envelope, series.read(from, to, block.subarray(0, to - from)), to - from, from);
  }
  kept.set(series, envelope);
  return envelope;
}

/** Lets `envelopeOf` find an envelope that was made while the series was scanned for something else. */
export function keepEnvelope(series: Series, envelope: Envelope): void {
  kept.set(series, envelope);
}
