import { copyFileSync, existsSync, readFileSync, utimesSync } from 'node:fs';
import { join } from 'node:path';
import * as h5 from 'h5wasm/node';
import { beforeAll, describe, expect, it } from 'vitest';
import { formatGps } from '../../src/core/data/gps-time';
import type { FileNode } from '../../src/core/formats/format';
import { initReaders, openDataFile } from '../../src/host/open-file';
import { fixture, samplesOf, scratch, span, userErrorOf } from './make-files';

const { folder, put } = scratch();
beforeAll(initReaders);

function find(node: FileNode, path: string): FileNode | undefined {
  return node.path === path ? node : node.children.map((c) => find(c, path)).find((n) => n !== undefined);
}

describe('HDF5 written by another library (fixtures of make-hdf5.py)', () => {
  it('takes rate and start from the group, unit from the dataset, and says where', () => {
    const f = openDataFile(fixture('layouts.h5'));
    const [c] = f.channels;
    expect(c.name).toBe('/alder/h');
    expect(c.rate).toEqual({ value: 256, where: 'attribute Sampling Rate (Hz) of /alder' });
    expect(formatGps(c.start!.value)).toBe('1400000000.25');
    expect(c.start!.where).toContain('attribute start_gps_nanoseconds of /alder');
    expect(c.unit).toEqual({ value: 'strain', where: 'attribute units of /alder/h' });
    f.close();
  });

  it('reads compressed chunks at any span, exactly', () => {
    const f = openDataFile(fixture('layouts.h5'));
    const all = samplesOf(f, '/alder/h');
    expect(all).toEqual(Array.from({ length: 512 }, (_, i) => i * 1e-21));
    expect(span(f, '/alder/h', 95, 305)).toEqual(all.slice(95, 305));
    expect(span(f, '/alder/h', 511, 512)).toEqual([511 * 1e-21]);
    expect(span(f, '/alder/h', 7, 7)).toEqual([]);
    f.close();
  });

  it('makes a channel of each row, column or pair of indices beside the longest axis', () => {
    const f = openDataFile(fixture('layouts.h5'));
    const names = f.channels.map((c) => c.name);
    expect(names).toEqual(expect.arrayContaining(['/rows[2]', '/columns[:,1]', '/cube[1,:,0]']));
    expect(names).not.toEqual(expect.arrayContaining(['/picture[0]']));
    expect(span(f, '/rows[2]', 198, 200)).toEqual([598, 599]);
    expect(span(f, '/columns[:,1]', 0, 3)).toEqual([1, 4, 7]); // big-endian int16
    expect(span(f, '/cube[1,:,0]', 38, 40)).toEqual([156, 158]); // float16
    f.close();
  });

  it('shows in the tree what is no channel, and follows no link twice', () => {
    const f = openDataFile(fixture('layouts.h5'));
    expect(find(f.tree, '/complex')?.detail).toBe('64 compound (r, i)');
    expect(find(f.tree, '/complex')?.channel).toBeUndefined();
    expect(find(f.tree, '/again')?.detail).toBe('link to /alder/h');
    expect(find(f.tree, '/broken')?.detail).toBe('link to /nowhere');
    expect(find(f.tree, '/elsewhere')?.detail).toContain('other.h5');
    expect(find(f.tree, '/alder/loop')?.detail).toBe('the same object as /alder');
    expect(find(f.tree, '/alder/h')?.channel).toBe('/alder/h');
    expect(f.channels.filter((c) => c.name.endsWith('/h'))).toHaveLength(1);
    f.close();
  });

  it('fits a time dataset over its whole span and never fills its gap', () => {
    const f = openDataFile(fixture('time-gap.h5'));
    const [c] = f.channels;
    expect(c.rate?.value).toBe(128);
    expect(c.rate?.where).toContain('whole-span fit of dataset /gps_time');
    expect(formatGps(c.start!.value)).toBe('1400000000');
    expect(c.length).toBe(600);
    expect(c.runs).toEqual([
      { from: 0, to: 300 },
      { from: 364, to: 600 },
    ]);
    expect(span(f, '/strain', 298, 302)).toEqual([298, 299, NaN, NaN]);
    expect(span(f, '/strain', 310, 350).every(Number.isNaN)).toBe(true);
    expect(span(f, '/strain', 363, 366)).toEqual([NaN, 364, 365]);
    f.close();
  });

  it('takes no rate from float32 GPS stamps, whose steps are 128 s', () => {
    const f = openDataFile(fixture('single-time.h5'));
    const [c] = f.channels;
    expect(c.name).toBe('/strain');
    expect(c.rate).toBeUndefined();
    expect(c.start).toBeUndefined();
    expect(c.notes.join(' ')).toContain('resolution of 128 s');
    f.close();
  });

  it('notes every contradiction and uses the first', () => {
    const f = openDataFile(fixture('contradiction.h5'));
    const [c] = f.channels;
    expect(c.rate?.value).toBe(4);
    expect(c.notes.some((n) => n.startsWith('Sample rates disagree: 4 Hz') && n.includes('8 Hz'))).toBe(true);
    expect(c.notes.some((n) => n.includes('/duration says 100 s') && n.includes('25 s'))).toBe(true);
    // 18 May 2024 16:53:02.25 UTC is GPS 1400086400.25: 18 leap seconds (IERS Bulletin C; COMPUTED).
    expect(formatGps(c.start!.value)).toBe('1400086400.25');
    f.close();
  });

  it('names filter and dataset when the filter is missing, and reads the rest', () => {
    const f = openDataFile(fixture('lzf.h5'));
    expect(() => samplesOf(f, '/strain')).toThrow(
      /lzf\.h5: \/strain is compressed with the filter "lzf" \(id 32000\)/,
    );
    expect(samplesOf(f, '/plain')).toEqual(Array.from({ length: 32 }, (_, i) => i));
    f.close();
  });

  it('opens a file behind a user block and keeps nanoseconds of a start given as text', () => {
    const f = openDataFile(fixture('userblock.h5'));
    expect(f.channels[0].rate?.value).toBe(64);
    expect(formatGps(f.channels[0].start!.value)).toBe('1400000000.123456789');
    f.close();
  });

  it('says that a virtual dataset may have missing parts', () => {
    const f = openDataFile(fixture('virtual.h5'));
    expect(f.channels[0].notes.join(' ')).toContain('absent.h5');
    expect(span(f, '/strain', 98, 102)).toEqual([98 * 1e-21, 99 * 1e-21, NaN, NaN]);
    f.close();
  });
});

describe('HDF5 of every number type', () => {
  it.each([
    ['<b', [-128, -1, 0, 127]],
    ['<B', [0, 1, 128, 255]],
    ['<h', [-32768, -1, 0, 32767]],
    ['<H', [0, 1, 32768, 65535]],
    ['<i', [-2147483648, -1, 0, 2147483647]],
    ['<I', [0, 1, 2147483648, 4294967295]],
    ['<q', [-9007199254740991, -1, 0, 9007199254740991]],
    ['<Q', [0, 1, 4294967296, 9007199254740991]],
    ['<f', [-1.5, 0, 0.25, 2 ** 100]],
    ['<d', [-1e-21, 0, Math.PI, 1e300]],
  ] as const)('%s', (dtype, four) => {
    const path = join(folder, `type${dtype.slice(1)}${dtype.charCodeAt(1)}.h5`);
    const values = Array.from({ length: 20 }, (_, i) => four[i % 4]);
    const file = new h5.File(path, 'w');
    file.create_dataset({
      name: 'x',
      data: /[qQ]/.test(dtype) ? (values.map(BigInt) as unknown as number[]) : values,
      dtype,
    });
    file.close();
    const f = openDataFile(path);
    expect(samplesOf(f)).toEqual(values);
    f.close();
  });
});

describe('broken HDF5', () => {
  it('says that a file is cut short, and the next file opens', () => {
    const whole = readFileSync(fixture('layouts.h5'));
    const path = put('cut.h5', whole.subarray(0, 9000));
    const e = userErrorOf(path);
    expect(e.message).toMatch(/^cut\.h5 cannot be opened as HDF5: truncated file/);
    expect(e.message.split('\n')).toHaveLength(1);
    const next = openDataFile(fixture('layouts.h5'));
    expect(span(next, '/alder/h', 0, 2)).toEqual([0, 1e-21]);
    next.close();
  });

  it('says that a file has no HDF5 in it', () => {
    expect(userErrorOf(put('words.h5', new Uint8Array(100).fill(200))).message).toContain(
      'words.h5 cannot be opened as HDF5',
    );
  });

  it('names dataset and samples when a chunk is damaged', () => {
    const bytes = Buffer.from(readFileSync(fixture('layouts.h5')));
    const clean = openDataFile(fixture('layouts.h5'));
    // Damage each kilobyte in turn until a chunk of /alder/h is hit; the check sum filter finds it.
    const messages: string[] = [];
    for (let at = 2048; at < bytes.length; at += 1024) {
      const damaged = Buffer.from(bytes);
      damaged.fill(0x55, at, at + 64);
      const path = put('damaged.h5', damaged);
      try {
        const f = openDataFile(path);
        try {
          span(f, '/alder/h', 0, 512);
        } finally {
          f.close();
        }
      } catch (e) {
        messages.push(String(e));
      }
    }
    expect(
      messages.some((m) => /UserError: damaged\.h5: samples \d+ to \d+ of \/alder\/h cannot be read/.test(m)),
    ).toBe(true);
    expect(messages.filter((m) => !m.startsWith('UserError'))).toEqual([]);
    expect(span(clean, '/alder/h', 0, 2)).toEqual([0, 1e-21]);
    clean.close();
  });

  it('refuses to read a file that was changed meanwhile', () => {
    const path = join(folder, 'changing.h5');
    copyFileSync(fixture('userblock.h5'), path);
    const f = openDataFile(path);
    utimesSync(path, new Date(), new Date(Date.now() + 10_000));
    expect(() => samplesOf(f)).toThrow(/changing\.h5 was written to while it was open/);
    f.close();
  });

  it('offers the nearest channel name', () => {
    const f = openDataFile(fixture('layouts.h5'));
    expect(() => f.read('/alder/H', 0, 1, new Float64Array(1))).toThrow(
      /no channel "\/alder\/H"\. Did you mean "\/alder\/h"/,
    );
    f.close();
  });
});

const real = process.env['FRINGESIDE_REAL_DATA'] ?? new URL('../../../shared/real', import.meta.url).pathname;
const present = existsSync(real);

describe(`published strain data${present ? '' : ` (skipped: no folder ${real})`}`, () => {
  it.skipIf(!present).each(['site-h-2017-01-04.hdf5', 'site-l-2017-01-04.hdf5'])(
    '%s opens without a question',
    (name) => {
      const f = openDataFile(join(real, name));
      const [c] = f.channels;
      // Rate, start and length as the data's README states them.
      expect(c).toMatchObject({ name: '/strain/Strain', type: 'float64', length: 32 * 4096 });
      expect(c.rate?.value).toBe(4096);
      expect(c.rate?.where).toContain('attribute Xspacing of /strain/Strain');
      expect(formatGps(c.start!.value)).toBe('1167559920');
      expect(c.start?.where).toContain('attribute Xstart of /strain/Strain');
      expect(c.unit?.value).toBe('strain');
      const samples = samplesOf(f);
      expect(samples.every(Number.isFinite)).toBe(true);
      expect(samples.every((v) => Math.abs(v) < 1e-17)).toBe(true);
      expect(f.channels.slice(1).every((m) => m.rate?.value === 1)).toBe(true);
      f.close();
    },
  );
});
