import { Inflate } from 'fflate';
import { UserError } from '../data/errors';
import { truncated, viewOf } from './bytes';
import { crc32 } from './crc32';
import type { ByteSource } from './format';
import { gzipHeaderEnd } from './gzip-header';

/** Compressed bytes fed at once. Deflate grows at most 1032 times, so one step makes at most 68 MB. */
const FEED = 1 << 16;
/** Bytes of output between two points from which inflating can be taken up again. */
const BETWEEN_POINTS = 1 << 23;
/** Output kept for reads near the last one. */
const KEPT = 1 << 23;

/** Largest growth of the deflate format: 258 bytes from 2 bits (RFC 1951), that is 1032 to 1. */
export const MOST_GROWTH = 1032;

export interface CompressedRegion {
  readonly kind: 'deflate' | 'gzip';
  readonly offset: number;
  /** One past the last compressed byte. */
  readonly end: number;
  /** Known check sum of the whole output, for "deflate". */
  readonly crc?: number;
}

/**
 * The inflating state of the library (fflate keeps it in these fields; the version is pinned): block state `s`, the
 * last 32 KiB of output `o`, unread input `p`. Copies of them are points from which reading can go on.
 */
interface State {
  s: { i: number; b: number; p?: number; f?: number; l?: unknown };
  o: Uint8Array;
  p: Uint8Array;
}

interface Point {
  readonly input: number;
  readonly output: number;
  readonly state: State;
}

/**
 * Compressed bytes read at any offset of what they inflate to. It is inflated forwards once; every 8 MiB of output the
 * state is kept (about 40 kB), so that going back costs at most 8 MiB of inflating and never the whole. The check sums
 * are verified as the end is first reached. `size` is Infinity until then, unless it is given.
 */
export class Inflated implements ByteSource {
  readonly name: string;
  readonly #source: ByteSource;
  readonly #region: CompressedRegion;
  readonly #points: Point[] = [];
  #kept: { at: number; bytes: Uint8Array }[] = [];
  #inflate: Inflate;
  /** Next compressed byte to feed and next byte of output. */
  #input: number;
  #output = 0;
  /** Farthest output reached, with the check sum and length of the member there. */
  #frontier = { output: 0, crc: 0, member: 0 };
  #made: Uint8Array[] = [];
  #end: number | undefined;
  readonly #declared: number | undefined;

  constructor(source: ByteSource, name: string, region: CompressedRegion, declaredSize?: number) {
    this.name = name;
    this.#source = source;
    this.#region = region;
    this.#declared = declaredSize;
    this.#input = this.#memberStart(region.offset);
    this.#inflate = this.#fresh();
    this.#points.push(this.#point());
  }

  get size(): number {
    return this.#end ?? this.#declared ?? Infinity;
  }

  close(): void {
    this.#kept = [];
    this.#points.length = 0;
  }

  read(offset: number, length: number): Uint8Array {
    const out = new Uint8Array(Math.max(0, Math.min(length, this.size - offset)));
    let done = 0;
    while (done < out.length) {
      const at = offset + done;
      const part = this.#kept.find((k) => at >= k.at && at < k.at + k.bytes.length);
      if (part) {
        const bytes = part.bytes.subarray(at - part.at, at - part.at + out.length - done);
        out.set(bytes, done);
        done += bytes.length;
      } else if (!this.#seek(at)) return out.slice(0, done);
    }
    return out;
  }

  /** Inflates until output `at` is among the kept parts; false when the output ends before. */
  #seek(at: number): boolean {
    if (this.#end !== undefined && at >= this.#end) return false;
    const best = this.#points.findLast((p) => p.output <= at);
    if (best && (at < this.#output || best.output > this.#output)) this.#restore(best);
    while (this.#output <= at) if (!this.#step()) return at < this.#output;
    return true;
  }

  #fresh(): Inflate {
    return new Inflate((bytes) => {
      if (bytes.length > 0) this.#made.push(bytes);
    });
  }

  #point(): Point {
    const { s, o, p } = this.#inflate as unknown as State;
    return { input: this.#input, output: this.#output, state: { s: { ...s }, o: o.slice(), p: p.slice() } };
  }

  #restore(point: Point): void {
    this.#inflate = this.#fresh();
    const { s, o, p } = point.state;
    Object.assign(this.#inflate, { s: { ...s }, o: o.slice(), p: p.slice() });
    this.#input = point.input;
    this.#output = point.output;
    this.#kept = [];
  }

  /** Feeds one piece; false at the end of the output. */
  #step(): boolean {
    if (this.#output >= this.#points.at(-1)!.output + BETWEEN_POINTS) this.#points.push(this.#point());
    const piece = this.#source.read(this.#input, Math.min(FEED, this.#region.end - this.#input));
    if (piece.length === 0)
      throw truncated(
        this.#source.name,
        this.#region.end + 1,
        this.#input,
        `the compressed data of ${this.name}`,
      );
    this.#made = [];
    try {
      this.#inflate.push(piece);
    } catch (e) {
      throw this.#damaged(e instanceof Error ? e.message : String(e));
    }
    this.#input += piece.length;
    const atFrontier = this.#output === this.#frontier.output;
    for (const bytes of this.#made) {
      this.#kept.push({ at: this.#output, bytes });
      this.#output += bytes.length;
      if (!atFrontier) continue;
      const { crc, member } = this.#frontier;
      this.#frontier = { output: this.#output, crc: crc32(bytes, crc), member: member + bytes.length };
    }
    while (this.#kept.length > 1 && this.#output - this.#kept[1].at > KEPT) this.#kept.shift();
    const { s, p } = this.#inflate as unknown as State;
    if (s.f && !s.l) return this.#memberEnd(this.#input - p.length + ((s.p ?? 0) > 0 ? 1 : 0), atFrontier);
    return true;
  }

  /** A member has ended and its trailer begins at `at`. False when nothing follows. */
  #memberEnd(at: number, verify: boolean): boolean {
    const { crc, member } = this.#frontier;
    let next = at;
    if (this.#region.kind === 'gzip') {
      const trailer = this.#source.read(at, 8);
      if (trailer.length < 8)
        throw truncated(this.#source.name, at + 8, at + trailer.length, 'the gzip check sum');
      const view = viewOf(trailer);
      if (verify && (view.getUint32(0, true) !== crc || view.getUint32(4, true) !== member % 2 ** 32))
        throw this.#damaged('the check sum of the contents is wrong');
      next = this.#nextMember(at + 8);
    } else {
      if (verify && this.#region.crc !== undefined && this.#region.crc !== crc)
        throw this.#damaged('the check sum of the contents is wrong');
      next = this.#region.end;
    }
    if (verify) this.#frontier = { output: this.#output, crc: 0, member: 0 };
    if (next >= this.#region.end) {
      if (this.#declared !== undefined && this.#declared !== this.#output)
        throw this.#damaged(`it holds ${this.#output} bytes where ${this.#declared} are promised`);
      this.#end = this.#output;
      return false;
    }
    this.#input = this.#memberStart(next);
    this.#inflate = this.#fresh();
    return true;
  }

  /** Start of the next gzip member; the end when only padding follows. */
  #nextMember(at: number): number {
    const bytes = this.#source.read(at, 2);
    return bytes.length === 2 && bytes[0] === 0x1f && bytes[1] === 0x8b ? at : this.#region.end;
  }

  #memberStart(at: number): number {
    return this.#region.kind === 'gzip' ? gzipHeaderEnd(this.#source, at) : at;
  }

  #damaged(why: string): UserError {
    return new UserError(
      'file-damaged',
      `${this.name} is damaged near byte ${this.#input} of the compressed file: ${why}. Copy the file again.`,
      this.name,
    );
  }
}
