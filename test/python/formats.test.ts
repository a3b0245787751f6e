import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { gzipSync } from 'node:zlib';
import { zipSync } from 'fflate';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { Engine } from '../../src/core/recipe/engine';
import { nodeHost } from '../../src/host/node-host';
import { npyBytes } from '../cases/data';
import { gaussianNoise } from '../steps/synthetic';
import { python, runScripts, type Ran } from './python';

// Every kind of file that a recipe can name is read again in Python; the script itself compares the SHA-256 of the samples.
const found = python();
const x = Float64Array.from(gaussianNoise(2000, 1, 11));
const lines = (text: (v: number, i: number) => string, head = ''): Buffer =>
  Buffer.from(`${head}${Array.from(x, text).join('\n')}\n`);

/** A 2-D NPY file of big-endian int16, 2000 rows of 3. */
function table(): Buffer {
  const head = `{'descr': '>i2', 'fortran_order': False, 'shape': (2000, 3), }`.padEnd(117) + '\n';
  const data = Buffer.alloc(2000 * 6);
  for (let i = 0; i < 6000; i++) data.writeInt16BE(Math.round(1000 * x[Math.floor(i / 3)]) + (i % 3), 2 * i);
  const magic = Buffer.from('\x93NUMPY\x01\x00\x00\x00', 'latin1');
  magic.writeUInt16LE(head.length, 8);
  return Buffer.concat([magic, Buffer.from(head), data]);
}

/** WAVE with two tracks of integers of so many bytes. */
function wave(bytes: 1 | 2 | 3 | 4): Buffer {
  const data = Buffer.alloc(2000 * 2 * bytes);
  for (let i = 0; i < 4000; i++) {
    const v = Math.round(Math.max(-0.99, Math.min(0.99, 0.2 * x[i >> 1])) * 2 ** (8 * bytes - 1)) + (i % 2);
    if (bytes === 1) data.writeUInt8(128 + v, i);
    else data.writeIntLE(v, i * bytes, bytes);
  }
  const head = Buffer.alloc(44);
  head.write('RIFF', 0);
  head.writeUInt32LE(36 + data.length, 4);
  head.write('WAVEfmt ', 8);
  head.writeUInt32LE(16, 16);
  head.writeUInt16LE(1, 20);
  head.writeUInt16LE(2, 22);
  head.writeUInt32LE(1000, 24);
  head.writeUInt32LE(2000 * bytes, 28);
  head.writeUInt16LE(2 * bytes, 32);
  head.writeUInt16LE(8 * bytes, 34);
  head.write('data', 36);
  head.writeUInt32LE(data.length, 40);
  return Buffer.concat([head, data]);
}

/** Raw frames of one big-endian 24-bit and one other sample. */
function raw24(): Buffer {
  const data = Buffer.alloc(7 + 2000 * 6);
  for (let i = 0; i < 4000; i++) data.writeIntBE(Math.round(1e5 * x[i >> 1]) - (i % 2), 7 + 3 * i, 3);
  return data;
}

const stamps = (i: number): string => (1400000000 + (i < 900 ? i : i + 250) / 1000).toFixed(3);
type Files = Record<string, Uint8Array | string>;
const kinds: readonly (readonly [string, Files, Record<string, unknown>])[] = [
  ['NPY', { 'a.npy': npyBytes(x) }, { rate: 1000 }],
  ['NPY, a column', { 'a.npy': table() }, { rate: 1000, channel: 'a[:,1]', scale: 0.125 }],
  ['NPY, a span', { 'a.npy': npyBytes(x) }, { rate: 1000, epoch: '100', start: '100.25', duration: 1.5 }],
  [
    'NPZ',
    { 'a.npz': zipSync({ "it's h.npy": npyBytes(x), 'y.npy': npyBytes(x) }) },
    { rate: 1000, channel: "it's h" },
  ],
  ['WAV, 8 bits', { 'a.wav': wave(1) }, { channel: 'track 2' }],
  ['WAV, 16 bits', { 'a.wav': wave(2) }, { channel: 'track 2' }],
  ['WAV, 24 bits', { 'a.wav': wave(3) }, { channel: 'track 1' }],
  ['WAV, 32 bits', { 'a.wav': wave(4) }, { channel: 'track 2' }],
  [
    'raw, 24 bits',
    {
      'a.bin': raw24(),
      'a.json': JSON.stringify({
        type: 'int24',
        byteOrder: 'big',
        offset: 7,
        rate: 1000,
        channels: ['p', 'q'],
      }),
    },
    { channel: 'q' },
  ],
  [
    'raw, float32',
    { 'a.f32': new Uint8Array(Float32Array.from(x).buffer), 'a.json': '{"type": "float32", "rate": 1000}' },
    {},
  ],
  ['text, one column', { 'a.txt': lines((v) => v.toExponential(6), '# a comment\n') }, { rate: 1000 }],
  [
    'text, decimal comma, missing cells',
    {
      'a.csv': lines(
        (v, i) => `${i};${i === 7 ? 'n/a' : i === 9 ? '' : String(v).replace('.', ',')}`,
        'n;strain\n',
      ),
    },
    { rate: 1000, channel: 'strain' },
  ],
  [
    'text, gzip, blanks, letter D',
    { 'a.txt.gz': gzipSync(lines((v, i) => `  ${i}   ${v.toExponential(12).replace('e', 'D')}`)) },
    { rate: 1000, channel: 'column 2' },
  ],
  [
    'text, time column with a gap',
    { 'a.csv': lines((v, i) => `${stamps(i)},${v}`, 'GPS time,strain\n') },
    { channel: 'strain' },
  ],
];

let work = '';
let engine: Engine;
beforeAll(async () => {
  work = mkdtempSync(join(tmpdir(), 'fringeside-python-'));
  engine = new Engine(await nodeHost(join(process.cwd(), 'dist')));
});
afterAll(() => rmSync(work, { recursive: true, force: true }));

describe('files are read again in Python', () => {
  if ('absent' in found) test.skip(`not run: ${found.absent}`, () => undefined);
  else {
    const results: { problems: unknown; ran?: Ran }[] = [];
    beforeAll(async () => {
      const scripts: string[] = [];
      for (const [name, files, input] of kinds) {
        const folder = join(work, name);
        mkdirSync(folder);
        for (const [file, bytes] of Object.entries(files)) writeFileSync(join(folder, file), bytes);
        const text = JSON.stringify({
          fringe: 1,
          inputs: { data: { file: Object.keys(files)[0], ...input } },
          steps: [{ id: 'look', do: 'overview', of: ['data'] }],
        });
        const made = await engine.exportPython(
          { text, folder, dataFolder: '.' },
          { event: () => undefined, cancelled: () => false },
        );
        results.push({ problems: [...made.diagnostics, ...made.leftOut] });
        scripts.push(join(folder, 'look.py'));
        writeFileSync(join(folder, 'look.py'), made.script ?? 'raise SystemExit("no script")');
      }
      runScripts(found.python, scripts).forEach((ran, k) => (results[k].ran = ran));
    }, 240_000);

    test.each(kinds.map(([name], k) => [name, k] as const))('%s', (_name, k) => {
      const { problems, ran } = results[k];
      expect(problems).toEqual([]);
      expect([ran?.code, ran?.err]).toEqual([0, '']);
    });
  }
});
