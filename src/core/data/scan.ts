import { FLAT_SAMPLES, FlatRuns, type FlatSpans } from './flat-runs';
import type { Envelope, SampleStats } from './kinds';
import { cropSpans, intersectSpans, spanLength, type Span } from './spans';

/** SHA-256 or the like, given by the host. */
export interface Hasher {
  update(bytes: Uint8Array): void;
  digest(): string;
}

export interface ScanOptions {
  /** Hz; decides how many zeros are a drop-out. */
  readonly rate?: number;
  /** Runs of samples that exist. */
  readonly runs?: readonly Span[];
  readonly hasher?: Hasher;
  /** Called after each block with the fraction done; may wait, and ends the scan by throwing. */
  readonly block?: (fraction: number) => void | Promise<void>;
}

/** Copies samples `[from, to)` into the start of `into`, which is longer only when reused. */
export type SampleReader = (from: number, to: number, into: Float64Array<ArrayBuffer>) => unknown;

export interface SampleScan {
  /** Extremes, mean and rms over the finite samples, NaN where there is none; `count` is the whole span. */
  readonly stats: SampleStats;
  /** Finite samples inside the runs. Saturated samples and zeros stay valid: they are reported, and cutting them is the user's choice. */
  readonly valid: readonly Span[];
  /** NaN and infinities inside the runs. */
  readonly notFinite: FlatSpans;
  /** Samples outside the runs. */
  readonly missing: number;
  readonly saturated: FlatSpans;
  readonly zeros: FlatSpans;
  /** Extremes per cell, at most 32768 cells. */
  readonly envelope: Envelope;
  /** Of the samples as little-endian float64, every NaN as 7ff8000000000000; "" without a hasher. */
  readonly sha256: string;
}

const BLOCK = 1 << 16;
export const MOST_CELLS = 1 << 15;

/** Samples per envelope cell: the power of two that gives at most 2^15 cells. */
export function envelopeCell(length: number): number {
  let cell = 1;
  while (Math.ceil(length / cell) > MOST_CELLS) cell *= 2;
  return cell;
}

/**
 * Everything that must be known of a span of samples before it is used, in one pass, so that a file is read once:
 * counts of NaN and infinities, valid spans, clipping and digital zeros (see flat-runs.ts), extremes, mean, root mean
 * square about zero, an envelope for drawing and the fingerprint. Memory does not grow with the span except for lists of
 * spans. Errors of `read` and `poll` pass through.
 */
export async function scanSamples(
  read: SampleReader,
  length: number,
  options: ScanOptions = {},
): Promise<SampleScan> {
  const { hasher } = options;
  const cell = envelopeCell(length);
  const cells = Math.ceil(length / cell);
  const scanner = new Scanner(new FlatRuns(options.rate), {
    cell,
    low: new Float64Array(cells).fill(NaN),
    high: new Float64Array(cells).fill(NaN),
  });
  const buffer = new Float64Array(Math.min(BLOCK, length));
  for (let at = 0; at < length; at += buffer.length) {
    const n = Math.min(buffer.length, length - at);
    const samples = n === buffer.length ? buffer : buffer.subarray(0, n);
    read(at, at + n, samples);
    scanner.block(samples, at);
    hasher?.update(littleEndianBytes(samples));
    await options.block?.((at + n) / length);
  }
  const done = scanner.finish(length);
  const sha256 = hasher?.digest() ?? '';
  if (!options.runs) return { ...done, missing: 0, sha256 };
  const runs = cropSpans(options.runs, 0, length);
  const bad = intersectSpans(done.notFinite.spans, runs);
  const notFinite = { spans: bad, samples: spanLength(bad) };
  return {
    ...done,
    stats: { ...done.stats, notFinite: notFinite.samples },
    valid: intersectSpans(done.valid, runs),
    notFinite,
    missing: length - spanLength(runs),
    sha256,
  };
}

/** State of a pass; blocks come in order without holes. */
class Scanner {
  readonly #flat: FlatRuns;
  readonly #envelope: Envelope;
  readonly #bad: Span[] = [];
  #badSamples = 0;
  #sum = 0;
  #lost = 0;
  #squares = 0;
  #min = Infinity;
  #max = -Infinity;
  #previous = NaN;
  #runFrom = 0;

  constructor(flat: FlatRuns, envelope: Envelope) {
    this.#flat = flat;
    this.#envelope = envelope;
  }

  block(x: Float64Array, at: number): void {
    const { cell, low, high } = this.#envelope;
    for (let i = 0; i < x.length;) {
      const c = Math.floor((at + i) / cell);
      const end = Math.min(x.length, (c + 1) * cell - at);
      const [lo, hi] = this.#piece(x, i, end, at);
      if (lo <= hi) {
        low[c] = low[c] < lo ? low[c] : lo;
        high[c] = high[c] > hi ? high[c] : hi;
      }
      i = end;
    }
  }

  /** Samples `[i, end)` of one cell; returns their extremes (Infinity, -Infinity when none is finite). */
  #piece(x: Float64Array, i: number, end: number, at: number): readonly [number, number] {
    let lo = Infinity;
    let hi = -Infinity;
    let sum = 0;
    let squares = 0;
    let previous = this.#previous;
    let runFrom = this.#runFrom;
    for (let k = i; k < end; k++) {
      const v = x[k];
      if (v !== previous) {
        if (at + k - runFrom >= FLAT_SAMPLES && !Number.isNaN(previous))
          this.#run(previous, runFrom, at + k, lo, hi);
        previous = v;
        runFrom = at + k;
      }
      if (v - v === 0) {
        if (v < lo) lo = v;
        if (v > hi) hi = v;
        sum += v;
        squares += v * v;
      } else this.#notFinite(x, k, at + k);
    }
    this.#previous = previous;
    this.#runFrom = runFrom;
    this.#squares += squares;
    // Sum of sums with the lost part carried (Neumaier 1974), so that the mean of a long span keeps its digits.
    const total = this.#sum + sum;
    this.#lost += Math.abs(this.#sum) >= Math.abs(sum) ? this.#sum - total + sum : sum - total + this.#sum;
    this.#sum = total;
    if (lo < this.#min) this.#min = lo;
    if (hi > this.#max) this.#max = hi;
    return [lo, hi];
  }

  #run(value: number, from: number, to: number, lo: number, hi: number): void {
    if (value - value === 0)
      this.#flat.run(value, from, to, Math.min(lo, this.#min), Math.max(hi, this.#max));
  }

  #notFinite(x: Float64Array, k: number, index: number): void {
    this.#badSamples++;
    const last = this.#bad.at(-1);
    if (last?.to === index) this.#bad[this.#bad.length - 1] = { from: last.from, to: index + 1 };
    else this.#bad.push({ from: index, to: index + 1 });
    if (Number.isNaN(x[k])) canonicalNaN(x, k);
  }

  finish(length: number): Omit<SampleScan, 'sha256' | 'missing'> {
    if (length - this.#runFrom >= FLAT_SAMPLES)
      this.#run(this.#previous, this.#runFrom, length, Infinity, -Infinity);
    const count = length - this.#badSamples;
    const { saturated, zeros } = this.#flat.finish(this.#min, this.#max, count);
    const none = count === 0;
    return {
      stats: {
        count: length,
        notFinite: this.#badSamples,
        saturated: saturated.samples,
        min: none ? NaN : this.#min,
        max: none ? NaN : this.#max,
        mean: none ? NaN : (this.#sum + this.#lost) / count,
        rms: none ? NaN : Math.sqrt(this.#squares / count),
      },
      valid: complement(this.#bad, length),
      notFinite: { spans: this.#bad, samples: this.#badSamples },
      saturated,
      zeros,
      envelope: this.#envelope,
    };
  }
}

function complement(sorted: readonly Span[], length: number): Span[] {
  const out: Span[] = [];
  let at = 0;
  for (const s of sorted) {
    if (s.from > at) out.push({ from: at, to: s.from });
    at = s.to;
  }
  if (at < length) out.push({ from: at, to: length });
  return out;
}

/** Writes the one bit pattern that stands for NaN in fingerprints; an engine may keep others otherwise. */
function canonicalNaN(x: Float64Array, k: number): void {
  const words = new Uint32Array(x.buffer, x.byteOffset + 8 * k, 2);
  words[LITTLE_ENDIAN ? 0 : 1] = 0;
  words[LITTLE_ENDIAN ? 1 : 0] = 0x7ff80000;
}

const LITTLE_ENDIAN = new Uint8Array(new Uint16Array([1]).buffer)[0] === 1;

function littleEndianBytes(x: Float64Array): Uint8Array {
  const bytes = new Uint8Array(x.buffer, x.byteOffset, x.byteLength);
  if (LITTLE_ENDIAN) return bytes;
  const swapped = bytes.slice();
  for (let i = 0; i < swapped.length; i += 8) swapped.subarray(i, i + 8).reverse();
  return swapped;
}
