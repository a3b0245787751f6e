import { beforeAll, describe, expect, it } from 'vitest';
import { formatGps } from '../../src/core/data/gps-time';
import { initReaders, openDataFile } from '../../src/host/open-file';
import { f64, npy, npz, samplesOf, scratch, span, userErrorOf } from './make-files';

const { put } = scratch();
beforeAll(initReaders);

const ramp = Array.from({ length: 40 }, (_, i) => i - 3.5);

function bytesOf(array: { buffer: ArrayBufferLike }): Uint8Array {
  return new Uint8Array(array.buffer);
}

function swapped(bytes: Uint8Array, size: number): Uint8Array {
  const out = bytes.slice();
  for (let i = 0; i < out.length; i += size) out.subarray(i, i + size).reverse();
  return out;
}

describe('NumPy array', () => {
  it.each([1, 2, 3])('header version %i', (version) => {
    const f = openDataFile(put(`v${version}.npy`, npy('<f8', [40], f64(ramp), { version })));
    expect(f.format).toBe('NumPy array');
    expect(f.channels[0]).toMatchObject({ name: `v${version}`, type: 'float64', shape: [40], length: 40 });
    expect(f.channels[0].rate).toBeUndefined();
    expect(samplesOf(f)).toEqual(ramp);
    expect(span(f, `v${version}`, 38, 40)).toEqual([34.5, 35.5]);
    f.close();
  });

  const four = (values: readonly number[]): number[] =>
    Array.from({ length: 16 }, (_, i) => values[i % values.length]);
  it.each([
    ['i1', 1, bytesOf(Int8Array.from(four([-128, 127]))), [-128, 127]],
    ['u1', 1, bytesOf(Uint8Array.from(four([0, 255]))), [0, 255]],
    ['b1', 1, bytesOf(Uint8Array.from(four([0, 1]))), [0, 1]],
    ['i2', 2, bytesOf(Int16Array.from(four([-32768, 32767]))), [-32768, 32767]],
    ['u2', 2, bytesOf(Uint16Array.from(four([1, 65535]))), [1, 65535]],
    ['i4', 4, bytesOf(Int32Array.from(four([-2147483648, 5]))), [-2147483648, 5]],
    ['u4', 4, bytesOf(Uint32Array.from(four([1, 4294967295]))), [1, 4294967295]],
    [
      'i8',
      8,
      bytesOf(BigInt64Array.from(four([-9007199254740991, -1]).map(BigInt))),
      [-9007199254740991, -1],
    ],
    [
      'u8',
      8,
      bytesOf(BigUint64Array.from(four([9007199254740991, 4294967296]).map(BigInt))),
      [9007199254740991, 4294967296],
    ],
    ['f4', 4, bytesOf(Float32Array.from(four([0.5, -3]))), [0.5, -3]],
    // Halves: 3C00 is 1, 8001 the smallest negative subnormal −2^-24, 7BFF is 65504, FC00 −Infinity (IEEE 754).
    [
      'f2',
      2,
      bytesOf(Uint16Array.from(four([0x3c00, 0x8001, 0x7bff, 0xfc00]))),
      [1, -(2 ** -24), 65504, -Infinity],
    ],
  ] as const)('type %s in both byte orders', (code, size, bytes, values) => {
    for (const order of size === 1 ? ['|'] : ['<', '>']) {
      const data = order === '>' ? swapped(bytes, size) : bytes;
      const f = openDataFile(put('typed.npy', npy(order + code, [16], data)));
      expect(samplesOf(f).slice(0, values.length)).toEqual(values);
      f.close();
    }
  });

  it('reads rows and columns in C and in Fortran order', () => {
    const at = (i: number, j: number): number => 100 * i + j;
    const c = Array.from({ length: 3 * 20 }, (_, k) => at(Math.floor(k / 20), k % 20));
    const fortran = Array.from({ length: 3 * 20 }, (_, k) => at(k % 3, Math.floor(k / 3)));
    for (const file of [
      put('c.npy', npy('<f8', [3, 20], f64(c))),
      put('f.npy', npy('<f8', [3, 20], f64(fortran), { fortran: true })),
    ]) {
      const f = openDataFile(file);
      expect(f.channels).toHaveLength(3);
      expect(span(f, f.channels[2].name, 5, 8)).toEqual([205, 206, 207]);
      f.close();
    }
    const tall = openDataFile(put('tall.npy', npy('>f8', [20, 3], f64(c, false))));
    expect(tall.channels.map((x) => x.name)).toEqual(['tall[:,0]', 'tall[:,1]', 'tall[:,2]']);
    expect(span(tall, 'tall[:,1]', 0, 2)).toEqual([c[1], c[4]]);
    tall.close();
  });

  it('says when the header promises more than the file holds', () => {
    const e = userErrorOf(put('lying.npy', npy('<f8', [4000], f64(ramp))));
    expect(e.code).toBe('file-truncated');
    expect(e.message).toMatch(
      /^lying\.npy is cut short: the array \(shape \(4000,\), type <f8\) should reach byte 32128/,
    );
  });

  it.each([
    [
      'no dictionary',
      Buffer.from('\x93NUMPY\x01\x00\x04\x00abc\n', 'latin1'),
      /damaged array header: it has no "descr"/,
    ],
    ['another version', Buffer.from('\x93NUMPY\x09\x00\x04\x00abc\n', 'latin1'), /version 9/],
    ['a huge header', Buffer.from('\x93NUMPY\x02\x00\xff\xff\xff\x7fabcd', 'latin1'), /length of 2147483647/],
    ['a cut header', Buffer.from('\x93NUMPY\x01\x00\x70\x00{', 'latin1'), /cut short/],
    ['complex numbers', npy('<c16', [16], new Uint8Array(256)), /elements of type <c16/],
    ['objects', npy('|O', [16], new Uint8Array(256)), /elements of type \|O/],
    ['a record', npy('XX', [16], new Uint8Array(256)), /elements of type XX/],
    [
      'a bad shape',
      Buffer.from(
        Buffer.from(npy('<f8', [40], f64(ramp)))
          .toString('latin1')
          .replace('(40,)', '(4x,)'),
        'latin1',
      ),
      /its shape/,
    ],
  ])('refuses %s in one sentence', (_, bytes, message) => {
    const e = userErrorOf(put('bad.npy', bytes));
    expect(e.message).toMatch(message);
    expect(e.message).toContain('bad.npy');
  });
});

describe('NumPy archive', () => {
  const strain = Array.from({ length: 5000 }, (_, i) => Math.sin(i / 7) * 1e-21);
  const scalar = (v: number): Uint8Array => npy('<f8', [], f64([v]));
  const text = (s: string): Uint8Array => {
    const out = Buffer.alloc(4 * s.length);
    Array.from(s).forEach((c, i) => out.writeUInt32LE(c.codePointAt(0)!, 4 * i));
    return npy(`<U${s.length}`, [], out);
  };
  const start = npy('<i8', [], bytesOf(BigInt64Array.of(1400000000n)));

  it.each([0, 6] as const)('takes scalars for facts (compression level %i)', (level) => {
    const bytes = npz(
      { fs: scalar(4096), strain: npy('<f8', [5000], f64(strain)), t0: start, units: text('strain') },
      level,
    );
    const f = openDataFile(put('facts.npz', bytes));
    const [c] = f.channels;
    expect(c).toMatchObject({ name: 'strain', length: 5000, rate: { value: 4096, where: 'array fs' } });
    expect(formatGps(c.start!.value)).toBe('1400000000');
    expect(c.unit).toEqual({ value: 'strain', where: 'array units' });
    expect(samplesOf(f)).toEqual(strain);
    expect(span(f, 'strain', 4990, 5000)).toEqual(strain.slice(4990));
    expect(span(f, 'strain', 10, 20)).toEqual(strain.slice(10, 20));
    expect(f.tree.children.map((n) => n.detail)).toEqual(['4096', '(5000,) float64', '1400000000', 'strain']);
    f.close();
  });

  it('fits a time array, with spacing in another array contradicting it', () => {
    const time = Array.from({ length: 5000 }, (_, i) => 1400000000 + i / 512);
    const f = openDataFile(
      put(
        'time.npz',
        npz(
          { time: npy('<f8', [5000], f64(time)), h: npy('<f8', [5000], f64(strain)), dt: scalar(1 / 256) },
          6,
        ),
      ),
    );
    const [c] = f.channels;
    expect(c.name).toBe('h');
    expect(c.rate?.value).toBe(256);
    expect(c.notes.join(' ')).toContain('512 Hz from whole-span fit of array time');
    f.close();
  });

  it('opens a compressed archive of 20 MB at any place without inflating it again', () => {
    const n = 2_500_000;
    const values = new Float64Array(n);
    for (let i = 0, s = 1; i < n; i++) {
      s = (s * 48271) % 2147483647;
      values[i] = s >> 20;
    }
    const f = openDataFile(put('long.npz', npz({ x: npy('<f8', [n], bytesOf(values)) }, 6)));
    const far = [2_499_990, 1_000_000, 2_000_000, 3, 1_500_000, 999_999];
    for (const at of far) expect(span(f, 'x', at, at + 10)).toEqual([...values.subarray(at, at + 10)]);
    const began = performance.now();
    for (let k = 0; k < 5; k++) span(f, 'x', 500_000 * k, 500_000 * k + 10);
    const again = performance.now() - began;
    expect(again).toBeLessThan(2000);
    f.close();
  });

  it('finds a damaged compressed member by its check sum', () => {
    const bytes = Buffer.from(npz({ x: npy('<f8', [5000], f64(strain)) }, 6));
    const at = bytes.indexOf('x.npy') + 3000;
    bytes[at] ^= 4;
    const e = userErrorOf(put('flipped.npz', bytes));
    expect(e.code).toBe('file-damaged');
    expect(e.message).toContain('flipped.npz: x.npy is damaged near byte');
  });

  it('says when the archive is cut short', () => {
    const bytes = npz({ x: npy('<f8', [5000], f64(strain)) });
    expect(userErrorOf(put('cut.npz', bytes.subarray(0, 20_000))).message).toMatch(
      /^cut\.npz is cut short: the directory that ends a ZIP archive is missing/,
    );
  });

  it('refuses a member that promises more than deflate can make', () => {
    const bytes = Buffer.from(npz({ x: npy('<f8', [5000], f64(strain)) }, 6));
    const entry = bytes.indexOf(Buffer.from('PK\x01\x02', 'latin1'));
    bytes.writeUInt32LE(0xf0000000, entry + 24);
    expect(userErrorOf(put('bomb.npz', bytes)).message).toMatch(
      /x\.npy promises 4026531840 bytes from \d+, more than deflate/,
    );
  });

  it('refuses an array header that promises more than its member holds', () => {
    const e = userErrorOf(put('lie.npz', npz({ x: npy('<f8', [1e12], f64(strain)) })));
    expect(e.message).toMatch(/^lie\.npz: x\.npy is cut short: the array/);
  });

  it('reads ZIP64 sizes', () => {
    // The sizes of the directory entry moved into a ZIP64 extra field (APPNOTE 4.5.3), as archives over 4 GiB have them.
    const bytes = Buffer.from(npz({ x: npy('<f8', [5000], f64(strain)) }));
    const entry = bytes.indexOf(Buffer.from('PK\x01\x02', 'latin1'));
    const end = bytes.indexOf(Buffer.from('PK\x05\x06', 'latin1'));
    const head = Buffer.from(bytes.subarray(entry, end));
    const extra = Buffer.alloc(28);
    extra.writeUInt16LE(1, 0);
    extra.writeUInt16LE(24, 2);
    extra.writeBigUInt64LE(BigInt(head.readUInt32LE(24)), 4);
    extra.writeBigUInt64LE(BigInt(head.readUInt32LE(20)), 12);
    extra.writeBigUInt64LE(BigInt(head.readUInt32LE(42)), 20);
    head.fill(0xff, 20, 28);
    head.fill(0xff, 42, 46);
    head.writeUInt16LE(28, 30);
    const end64 = Buffer.alloc(56);
    end64.write('PK\x06\x06', 'latin1');
    end64.writeBigUInt64LE(44n, 4);
    end64.writeBigUInt64LE(1n, 24);
    end64.writeBigUInt64LE(1n, 32);
    end64.writeBigUInt64LE(BigInt(head.length + 28), 40);
    end64.writeBigUInt64LE(BigInt(entry), 48);
    const locator = Buffer.alloc(20);
    locator.write('PK\x06\x07', 'latin1');
    locator.writeBigUInt64LE(BigInt(entry + head.length + 28), 8);
    locator.writeUInt32LE(1, 16);
    const last = Buffer.from(bytes.subarray(end));
    last.fill(0xff, 8, 20);
    const f = openDataFile(
      put('wide.npz', Buffer.concat([bytes.subarray(0, entry), head, extra, end64, locator, last])),
    );
    expect(samplesOf(f)).toEqual(strain);
    f.close();
  });
});
