import { Module as lib, type File, type Filter, type Metadata } from 'h5wasm/node';
import { UserError } from '../core/data/errors';
import { decodeSamples } from '../core/formats/samples';
import { captureMessages, reasonOf } from './hdf5-messages';
import { numericType } from './hdf5-types';

/** Bytes of the transfer buffer in the library's memory; kept, and grown only for a dataset with larger chunks. */
const BUFFER_BYTES = 1 << 22;
/** A chunk is unpacked whole; up to this many samples of it are kept for the next read. */
const CACHED_SAMPLES = 1 << 22;

let buffer = 0;
let bufferBytes = 0;

function transferBuffer(bytes: number): number {
  const memory = lib as unknown as { _malloc(n: number): number; _free(at: number): void };
  if (bytes > bufferBytes) {
    if (buffer !== 0) memory._free(buffer);
    buffer = memory._malloc(bytes);
    bufferBytes = buffer === 0 ? 0 : bytes;
    if (buffer === 0) throw new Error(`no memory for ${bytes} bytes of HDF5 data`);
  }
  return buffer;
}

interface Context {
  readonly file: File;
  readonly name: string;
  readonly check: () => void;
}

type Read = (at: readonly number[], axis: number, from: number, to: number, into: Float64Array) => void;

/**
 * Reads hyperslabs straight into one reused buffer: `Dataset.slice` allocates and converts on every call and is many
 * times slower. The library forgets its chunk cache between calls, so compressed data is read by whole chunks and
 * the last block is kept; without that, neighbouring short reads would unpack the same chunk again and again.
 */
export function datasetReader(
  context: Context,
  path: string,
  meta: Metadata,
  filters: readonly Filter[],
): Read {
  const type = numericType(meta);
  let cached: { key: string; from: number; samples: Float64Array } | undefined;

  const direct: Read = (at, axis, from, to, into) => {
    if (type === undefined) throw new Error(`${path} is not numeric`);
    // A chunk must go through in one piece, or it would be unpacked once per piece.
    const chunk = filters.length > 0 ? Math.min(CACHED_SAMPLES, meta.chunks?.[axis] ?? 0) : 0;
    const most = Math.max(chunk, Math.floor(BUFFER_BYTES / meta.size));
    const target = transferBuffer(most * meta.size);
    const stride = at.map(() => 1n);
    for (let n = from; n < to; n += most) {
      const count = Math.min(most, to - n);
      const counts = at.map((_, k) => (k === axis ? BigInt(count) : 1n));
      const offsets = at.map((i, k) => BigInt(k === axis ? n : i));
      const stop = captureMessages();
      const status = lib.get_dataset_data(
        context.file.file_id,
        path,
        counts,
        offsets,
        stride,
        BigInt(target),
      );
      const messages = stop();
      if (status < 0) throw readError(context.name, path, n, n + count, filters, messages);
      const bytes = lib.HEAPU8.subarray(target, target + count * meta.size);
      decodeSamples(bytes, count, { type, littleEndian: true, stride: meta.size }, into, n - from);
    }
  };

  return (at, axis, from, to, into) => {
    context.check();
    const chunk = meta.chunks?.[axis] ?? 0;
    const length = meta.shape?.[axis] ?? 0;
    if (filters.length === 0 || chunk < 1 || chunk > CACHED_SAMPLES) {
      direct(at, axis, from, to, into);
      return;
    }
    const key = `${axis}/${at.join(',')}`;
    const step = chunk * Math.max(1, Math.floor(65536 / chunk));
    for (let n = from; n < to;) {
      if (cached?.key !== key || n < cached.from || n >= cached.from + cached.samples.length) {
        const start = n - (n % step);
        const samples = new Float64Array(Math.min(step, length - start));
        direct(at, axis, start, start + samples.length, samples);
        cached = { key, from: start, samples };
      }
      const part = cached.samples.subarray(
        n - cached.from,
        Math.min(cached.samples.length, to - cached.from),
      );
      into.set(part, n - from);
      n += part.length;
    }
  };
}

function readError(
  name: string,
  path: string,
  from: number,
  to: number,
  filters: readonly Filter[],
  messages: string,
): UserError {
  const where = `${name} ${path}`;
  const missing = filters.find((f) => new RegExp(`filter '?${f.id}\\b|${f.id}`).test(messages) && f.id > 255);
  if (/required filter|not registered|can't find|plugin/i.test(messages) && (missing ?? filters.length > 0)) {
    const f = missing ?? filters[0];
    return new UserError(
      'filter-missing',
      `${name}: ${path} is compressed with the filter "${f.name || 'unnamed'}" (id ${f.id}), which is not available here. Rewrite the dataset with gzip (h5repack -f GZIP=4 ${name} new.h5).`,
      where,
    );
  }
  return new UserError(
    'file-damaged',
    `${name}: samples ${from} to ${to} of ${path} cannot be read: ${reasonOf(messages)}. Copy or write the file again.`,
    where,
  );
}
