import {
  appendFileSync,
  chmodSync,
  closeSync,
  ftruncateSync,
  mkdirSync,
  openSync,
  readFileSync,
  statSync,
  utimesSync,
  writeFileSync,
  writeSync,
} from 'node:fs';
import { join } from 'node:path';
import * as h5 from 'h5wasm/node';
import { beforeAll, describe, expect, it } from 'vitest';
import { FORMATS, recogniseFormat } from '../../src/core/formats/index';
import { fileAccess } from '../../src/host/file-access';
import { initReaders, openDataFile } from '../../src/host/open-file';
import { f64, fixture, npy, samplesOf, scratch, span, userErrorOf, wave } from './make-files';

const { folder, put } = scratch();
beforeAll(initReaders);

/** Runs in milliseconds. */
function timed(run: () => void): number {
  const began = performance.now();
  run();
  return performance.now() - began;
}

describe('what cannot be opened says so in one sentence, and the next file opens', () => {
  const cases: readonly (readonly [string, () => string, RegExp])[] = [
    [
      'a folder',
      () => (mkdirSync(join(folder, 'data.h5'), { recursive: true }), join(folder, 'data.h5')),
      /is a folder\. Open a data file in it/,
    ],
    ['an empty file', () => put('empty.csv', ''), /^empty\.csv is empty \(0 bytes\)/],
    ['a missing file', () => join(folder, 'nowhere.h5'), /There is no file .*nowhere\.h5/],
    [
      'an unknown format',
      () => put('picture.png', Uint8Array.of(0x89, 0x50, 0x4e, 0x47, 0, 1)),
      /^picture\.png is in no format that can be opened\. Supported are HDF5 \(\.h5/,
    ],
  ];
  it.each(cases)('%s', (_, make, message) => {
    const e = userErrorOf(make());
    expect(e.message).toMatch(message);
    expect(e.message.split('\n')).toHaveLength(1);
    expect(e.where).toBeDefined();
    const next = openDataFile(
      put('next.npy', npy('<f8', [20], f64(Array.from({ length: 20 }, (_v, i) => i)))),
    );
    expect(span(next, 'next', 18, 20)).toEqual([18, 19]);
    next.close();
  });

  it('a file that may not be read', () => {
    const path = put('secret.csv', '1,2\n');
    // Root may read all: as root the test is another user for this one call, who may go where the file is.
    const isRoot = process.getuid?.() === 0;
    chmodSync(folder, 0o755);
    chmodSync(path, 0);
    if (isRoot) process.seteuid?.(65_534);
    try {
      expect(userErrorOf(path).code).toBe('file-not-readable');
    } finally {
      if (isRoot) process.seteuid?.(0);
    }
  });
});

describe('a file that changes while it is open', () => {
  it.each([
    ['grows', (path: string) => appendFileSync(path, 'x'), /went from \d+ to \d+ bytes while it was open/],
    [
      'is written to',
      (path: string) => utimesSync(path, new Date(), new Date(Date.now() + 5000)),
      /was written to while it was open/,
    ],
  ])('%s', (_, change, message) => {
    const path = put('moving.npy', npy('<f8', [20], f64(Array.from({ length: 20 }, () => 1))));
    const f = openDataFile(path);
    change(path);
    expect(() => samplesOf(f)).toThrow(message);
    f.close();
  });

  it('is never written by us', () => {
    const path = put('kept.npy', npy('<f8', [20], f64(Array.from({ length: 20 }, () => 1))));
    const before = statSync(path);
    const f = openDataFile(path);
    samplesOf(f);
    f.close();
    expect(statSync(path).mtimeMs).toBe(before.mtimeMs);
  });
});

describe('recognising', () => {
  it('goes by content before name', () => {
    const bytes = wave(new Uint8Array(8), { code: 1, bits: 16, rate: 8, tracks: 1 });
    expect(recogniseFormat(bytes, 'misnamed.h5').id).toBe('wav');
    expect(recogniseFormat(Buffer.from('1 2\n3 4\n5 6\n'), 'table.dat').id).toBe('text');
    expect(recogniseFormat(Uint8Array.of(0, 1, 2, 0), 'noise.dat').id).toBe('raw');
    expect(recogniseFormat(npy('<f8', [1], f64([1])), 'x').id).toBe('npy');
  });

  it('has one entry per format with its own id and endings', () => {
    expect(new Set(FORMATS.map((f) => f.id)).size).toBe(FORMATS.length);
    for (const f of FORMATS) for (const e of f.extensions) expect(e).toMatch(/^[a-z0-9.]+$/);
  });

  it('reads the head only', () => {
    const access = fileAccess(put('head.csv', '1,2\n'.repeat(10_000)));
    expect(access.head(10)).toHaveLength(10);
  });
});

describe('files over 2 GiB (sparse)', () => {
  const GIB = 2 ** 30;

  it('reads the end of a 6 GiB array at once', () => {
    const path = join(folder, 'huge.npy');
    const n = (6 * GIB) / 8;
    const head = npy('<f8', [n], new Uint8Array(0));
    const fd = openSync(path, 'w');
    writeSync(fd, head);
    writeSync(fd, f64([1.5, -2.5, 3.5]), 0, 24, head.length + (n - 3) * 8);
    closeSync(fd);
    let f!: ReturnType<typeof openDataFile>;
    const ms = timed(() => {
      f = openDataFile(path);
      expect(span(f, 'huge', n - 4, n)).toEqual([0, 1.5, -2.5, 3.5]);
      expect(span(f, 'huge', 0, 2)).toEqual([0, 0]);
    });
    expect(ms).toBeLessThan(2000);
    f.close();
  });

  it('reads the end of 5 GiB of raw samples with four interleaved channels', () => {
    const path = join(folder, 'huge.bin');
    writeFileSync(join(folder, 'huge.json'), '{ "type": "int16", "channels": 4, "rate": 16384 }');
    const fd = openSync(path, 'w');
    ftruncateSync(fd, 5 * GIB);
    writeSync(fd, new Uint8Array(Int16Array.of(1, 2, 3, 4).buffer), 0, 8, 5 * GIB - 8);
    closeSync(fd);
    const f = openDataFile(path);
    const n = (5 * GIB) / 8;
    expect(f.channels[3].length).toBe(n);
    expect(span(f, 'channel 3', n - 2, n)).toEqual([0, 3]);
    f.close();
  });

  it('reads HDF5 whose every byte lies beyond 4 GiB', () => {
    // HDF5 may begin at any power of two from 512 on; here it begins after a hole of 4 GiB.
    const path = join(folder, 'far.h5');
    const fd = openSync(path, 'w');
    const bytes = readFileSync(fixture('layouts.h5'));
    writeSync(fd, bytes, 0, bytes.length, 4 * GIB);
    closeSync(fd);
    const f = openDataFile(path);
    const ms = timed(() => {
      expect(span(f, '/alder/h', 510, 512)).toEqual([510 * 1e-21, 511 * 1e-21]);
      expect(span(f, '/rows[2]', 198, 200)).toEqual([598, 599]);
    });
    expect(ms).toBeLessThan(2000);
    f.close();
  });

  it('reads the end of an HDF5 dataset of 3 GiB, most of it never written', () => {
    const path = join(folder, 'huge.h5');
    const n = (3 * GIB) / 8;
    const file = new h5.File(path, 'w');
    file.create_dataset({
      name: 'strain',
      data: new Float64Array(0),
      shape: [0],
      maxshape: [null],
      chunks: [1 << 20],
      dtype: '<d',
    });
    const dataset = file.get('strain') as h5.Dataset;
    dataset.resize([n]);
    dataset.write_slice([[n - 3, n]], Float64Array.of(1.5, -2.5, 3.5));
    dataset.write_slice([[0, 2]], Float64Array.of(7, 8));
    file.close();
    const f = openDataFile(path);
    expect(f.channels[0].length).toBe(n);
    const ms = timed(() => {
      expect(span(f, '/strain', n - 4, n)).toEqual([0, 1.5, -2.5, 3.5]);
    });
    expect(span(f, '/strain', 0, 3)).toEqual([7, 8, 0]);
    expect(ms).toBeLessThan(2000);
    f.close();
  });
});
