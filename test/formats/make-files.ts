import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { zipSync } from 'fflate';
import { afterAll } from 'vitest';
import { UserError } from '../../src/core/data/errors';
import type { OpenFile } from '../../src/core/formats/format';
import { openDataFile } from '../../src/host/open-file';

/** A folder of the running test file, removed at its end, and a function that writes a file into it. */
export function scratch(): { folder: string; put: (name: string, content: string | Uint8Array) => string } {
  const folder = mkdtempSync(join(tmpdir(), 'fringeside-'));
  afterAll(() => {
    rmSync(folder, { recursive: true, force: true });
  });
  return {
    folder,
    put(name, content) {
      const path = join(folder, name);
      writeFileSync(path, content);
      return path;
    },
  };
}

export const fixture = (name: string): string =>
  new URL(`../fixtures/formats/${name}`, import.meta.url).pathname;

/** All samples of a channel, by default of the first. */
export function samplesOf(file: OpenFile, channel = file.channels[0].name): number[] {
  const { length } = file.channels.find((c) => c.name === channel)!;
  const into = new Float64Array(length);
  file.read(channel, 0, length, into);
  return [...into];
}

export function span(file: OpenFile, channel: string, from: number, to: number): number[] {
  const into = new Float64Array(to - from);
  file.read(channel, from, to, into);
  return [...into];
}

/** The UserError that opening a file and reading all its channels ends with; fails when there is none. */
export function userErrorOf(path: string): UserError {
  try {
    const file = openDataFile(path);
    try {
      for (const c of file.channels) samplesOf(file, c.name);
    } finally {
      file.close();
    }
  } catch (e) {
    if (e instanceof UserError) return e;
    throw e;
  }
  throw new Error(`${path} was read without an error`);
}

/** Array file as NEP 1 of NumPy describes it, written here from the specification and not by NumPy. */
export function npy(
  descr: string,
  shape: readonly number[],
  data: Uint8Array,
  more: { version?: number; fortran?: boolean } = {},
): Uint8Array {
  const version = more.version ?? 1;
  const tuple = `(${shape.join(', ')}${shape.length === 1 ? ',' : ''})`;
  const start = version === 1 ? 10 : 12;
  let text = `{'descr': '${descr}', 'fortran_order': ${more.fortran ? 'True' : 'False'}, 'shape': ${tuple}, }`;
  text = text.padEnd(Math.ceil((start + text.length + 1) / 64) * 64 - start - 1) + '\n';
  const head = Buffer.alloc(start);
  head.write('\x93NUMPY', 'latin1');
  head[6] = version;
  if (version === 1) head.writeUInt16LE(text.length, 8);
  else head.writeUInt32LE(text.length, 8);
  return Buffer.concat([head, Buffer.from(text), data]);
}

export function f64(values: readonly number[], little = true): Uint8Array {
  const out = Buffer.alloc(8 * values.length);
  values.forEach((v, i) => (little ? out.writeDoubleLE(v, 8 * i) : out.writeDoubleBE(v, 8 * i)));
  return out;
}

/** Archive of arrays, `level` 0 stored. */
export function npz(members: Record<string, Uint8Array>, level: 0 | 6 = 0): Uint8Array {
  return zipSync(Object.fromEntries(Object.entries(members).map(([name, bytes]) => [`${name}.npy`, bytes])), {
    level,
  });
}

export interface WaveOptions {
  readonly code: number;
  readonly bits: number;
  readonly rate: number;
  readonly tracks: number;
  readonly extensible?: boolean;
  /** Form "RF64" or "BW64" with the sizes in a "ds64" chunk. */
  readonly wide?: 'RF64' | 'BW64';
}

/** WAVE file around the given sample bytes. */
export function wave(data: Uint8Array, o: WaveOptions): Uint8Array {
  const chunk = (id: string, body: Uint8Array, size = body.length): Buffer => {
    const head = Buffer.alloc(8);
    head.write(id, 'latin1');
    head.writeUInt32LE(size, 4);
    return Buffer.concat([head, body, Buffer.alloc(body.length % 2)]);
  };
  const form = Buffer.alloc(o.extensible ? 40 : 16);
  const align = (o.tracks * o.bits) / 8;
  form.writeUInt16LE(o.extensible ? 0xfffe : o.code, 0);
  form.writeUInt16LE(o.tracks, 2);
  form.writeUInt32LE(o.rate, 4);
  form.writeUInt32LE(o.rate * align, 8);
  form.writeUInt16LE(align, 12);
  form.writeUInt16LE(o.bits, 14);
  if (o.extensible) {
    form.writeUInt16LE(22, 16);
    form.writeUInt16LE(o.bits, 18);
    form.writeUInt16LE(o.code, 24);
  }
  const wide = Buffer.alloc(28);
  wide.writeBigUInt64LE(BigInt(data.length), 8);
  const body = Buffer.concat([
    Buffer.from('WAVE'),
    ...(o.wide ? [chunk('ds64', wide)] : []),
    chunk('LIST', Buffer.from('odd')),
    chunk('fmt ', form),
    chunk('data', data, o.wide ? 0xffffffff : data.length),
  ]);
  const head = Buffer.alloc(8);
  head.write(o.wide ?? 'RIFF', 'latin1');
  head.writeUInt32LE(o.wide ? 0xffffffff : body.length, 4);
  return Buffer.concat([head, body]);
}
