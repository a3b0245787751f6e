import { gzipSync } from 'node:zlib';
import { beforeAll, describe, expect, it } from 'vitest';
import { formatGps } from '../../src/core/data/gps-time';
import { initReaders, openDataFile } from '../../src/host/open-file';
import { samplesOf, scratch, span, userErrorOf } from './make-files';

const { put } = scratch();
beforeAll(initReaders);

const lines = (...l: string[]): string => l.join('\n') + '\n';
const numbers = Array.from({ length: 20 }, (_, i) => i * 1.25e-21 - 3e-22);

describe('layouts of text', () => {
  it.each([
    ['comma', numbers.map((v, i) => `${i / 8},${v}`)],
    ['tab', numbers.map((v, i) => `${i / 8}\t${v}`)],
    ['semicolon', numbers.map((v, i) => `${i / 8}; ${v}`)],
    ['blanks', numbers.map((v, i) => `   ${i / 8}    ${v}  `)],
    ['decimal comma', numbers.map((v, i) => `${i / 8};${v}`.replaceAll('.', ','))],
    ['trailing comma', numbers.map((v, i) => `${i / 8},${v},`)],
    ['quotes', numbers.map((v, i) => `"${i / 8}","${v}"`)],
    ['Fortran exponents', numbers.map((v, i) => `${i / 8} ${v}`.replaceAll('e', 'D'))],
    [
      'comments and blank lines between',
      numbers.flatMap((v, i) => [`${i / 8},${v}`, '# a word', '', '% another']),
    ],
  ])('%s', (_, rows) => {
    for (const end of ['\n', '\r\n', '\r']) {
      const f = openDataFile(put('layout.csv', rows.join(end)));
      expect(f.channels).toHaveLength(1);
      expect(f.channels[0]).toMatchObject({ name: 'column 2', length: 20, type: 'text' });
      expect(f.channels[0].rate?.value).toBe(8);
      expect(f.channels[0].notes).toContain('Column 1 is taken for time because it rises in even steps.');
      expect(samplesOf(f)).toEqual(numbers);
      expect(span(f, 'column 2', 13, 15)).toEqual(numbers.slice(13, 15));
      f.close();
    }
  });

  it('one column has no rate, and a comment may say it', () => {
    const bare = openDataFile(put('one.txt', lines(...numbers.map(String))));
    expect(bare.channels[0]).toMatchObject({ name: 'column 1', length: 20 });
    expect(bare.channels[0].rate).toBeUndefined();
    bare.close();
    const said = openDataFile(
      put(
        'said.txt',
        lines('# sample rate: 4096 Hz', '# start: 1400000000.25, unit: strain', ...numbers.map(String)),
      ),
    );
    const [c] = said.channels;
    expect(c.rate).toEqual({ value: 4096, where: 'line 1 of said.txt' });
    expect(formatGps(c.start!.value)).toBe('1400000000.25');
    expect(c.unit?.value).toBe('strain');
    expect(samplesOf(said)).toEqual(numbers);
    said.close();
  });

  it.each([
    ['header line', ['time (s),strain (V),aux [m/s]']],
    ['commented header', ['# time (s), strain (V), aux [m/s]']],
    ['header and units lines', ['time,strain,aux', 's,V,m/s']],
  ])('%s names columns and units', (_, head) => {
    const f = openDataFile(put('named.csv', lines(...head, ...numbers.map((v, i) => `${i / 8},${v},${i}`))));
    expect(f.channels.map((c) => [c.name, c.unit?.value])).toEqual([
      ['strain', 'V'],
      ['aux', 'm/s'],
    ]);
    expect(f.channels[0].rate?.value).toBe(8);
    expect(samplesOf(f, 'aux')).toEqual(numbers.map((_v, i) => i));
    f.close();
  });

  it('reads empty cells and words for NaN as NaN, and infinities', () => {
    const f = openDataFile(put('holes.csv', lines('a,b', '1,2', '3,', ',nan', 'N/A,-inf', '5,null')));
    expect(samplesOf(f, 'a')).toEqual([1, 3, NaN, NaN, 5]);
    expect(samplesOf(f, 'b')).toEqual([2, NaN, NaN, -Infinity, NaN]);
    f.close();
  });

  it('keeps UTF-8 names and a byte order mark apart', () => {
    const f = openDataFile(put('utf8.csv', '\ufeffZeit,Wert (µm)\n1,2\n3,4\n'));
    expect(f.channels.map((c) => c.name)).toEqual(['Zeit', 'Wert']);
    expect(f.channels[1].unit?.value).toBe('µm');
    f.close();
  });
});

describe('time columns', () => {
  const stamped = (name: string, stamp: (i: number) => string, n = 20_000, header = 'time,strain'): string =>
    put(name, lines(header, ...Array.from({ length: n }, (_, i) => `${stamp(i)},${i}`)));

  it('fits 4096 Hz from stamps with 6 decimals, whose single step says 4098 or 4082', () => {
    const f = openDataFile(stamped('six.csv', (i) => (1400000000 + i / 4096).toFixed(6)));
    const [c] = f.channels;
    expect(c.rate?.value).toBe(4096);
    expect(c.rate?.where).toMatch(
      /^whole-span fit of column 1 \(time\) of six\.csv \(20000 stamps over 4\.88/,
    );
    expect(formatGps(c.start!.value)).toBe('1400000000');
    expect(c.start?.where).toContain('read as GPS seconds by its magnitude');
    expect(c.runs).toBeUndefined();
    f.close();
  });

  it('fits 16384 Hz from stamps with 4 decimals, coarser than a sample, and says so', () => {
    const f = openDataFile(stamped('four.csv', (i) => (i / 16384).toFixed(4), 60_000));
    expect(f.channels[0].rate?.value).toBe(16384);
    expect(f.channels[0].start).toBeUndefined();
    expect(f.channels[0].runs).toBeUndefined();
    f.close();
  });

  it('keeps nine decimals of GPS seconds', () => {
    const f = openDataFile(
      stamped(
        'nine.csv',
        (i) =>
          `${1400000000 + Math.floor(i / 3000)}.${String(Math.round((i % 3000) * (1e9 / 3000)) + 123).padStart(9, '0')}`,
      ),
    );
    expect(f.channels[0].rate?.value).toBe(3000);
    expect(formatGps(f.channels[0].start!.value)).toBe('1400000000.000000123');
    f.close();
  });

  it('keeps a rate that is no whole number', () => {
    const f = openDataFile(stamped('odd.csv', (i) => (i / 1000.25).toFixed(9)));
    expect(f.channels[0].rate!.value).toBeCloseTo(1000.25, 5);
    f.close();
  });

  it('takes nothing from float32 GPS stamps and says why', () => {
    const f = openDataFile(stamped('single.csv', (i) => Math.fround(1400000000 + i / 64).toExponential(18)));
    const [c] = f.channels;
    expect(c.rate).toBeUndefined();
    expect(c.start).toBeUndefined();
    expect(c.notes.join(' ')).toContain('resolution is 128 s');
    f.close();
  });

  it('puts rows after a jump on the grid and leaves the gap empty', () => {
    const index = (i: number): number => (i < 1500 ? i : i < 9000 ? i + 512 : i + 1536);
    const f = openDataFile(stamped('gaps.csv', (i) => (1400000000 + index(i) / 256).toFixed(6), 10_000));
    const [c] = f.channels;
    expect(c.rate?.value).toBe(256);
    expect(c.length).toBe(11_536);
    expect(c.runs).toEqual([
      { from: 0, to: 1500 },
      { from: 2012, to: 9512 },
      { from: 10_536, to: 11_536 },
    ]);
    expect(c.notes.join(' ')).toContain('2 gaps (1536 samples, 6 s): missing samples read as NaN');
    expect(span(f, 'strain', 1499, 1502)).toEqual([1499, NaN, NaN]);
    expect(span(f, 'strain', 2011, 2014)).toEqual([NaN, 1500, 1501]);
    expect(span(f, 'strain', 9510, 9514)).toEqual([8998, 8999, NaN, NaN]);
    expect(span(f, 'strain', 11_535, 11_536)).toEqual([9999]);
    f.close();
  });

  it('reads milliseconds, Unix seconds and dates by their words', () => {
    const ms = openDataFile(stamped('ms.csv', (i) => String(i / 2), 100, 'time [ms],strain'));
    expect(ms.channels[0].rate?.value).toBe(2000);
    ms.close();
    // 1716051182.25 Unix is 18 May 2024 16:53:02.25 UTC is GPS 1400086400.25 (18 leap seconds, IERS Bulletin C; COMPUTED).
    for (const [name, stamp, header] of [
      ['unix.csv', (i: number) => (1716051182.25 + i / 16).toFixed(4), 'unix time,strain'],
      ['magnitude.csv', (i: number) => (1716051182.25 + i / 16).toFixed(4), 'time,strain'],
      ['date.csv', (i: number) => new Date(1716051182250 + i * 62.5).toISOString(), 'time,strain'],
    ] as const) {
      const f = openDataFile(stamped(name, stamp, 17, header));
      expect(formatGps(f.channels[0].start!.value)).toBe('1400086400.25');
      f.close();
    }
    const date = openDataFile(
      stamped('second.csv', (i) => new Date(1716051182000 + i * 125).toISOString(), 100),
    );
    expect(date.channels[0].rate?.value).toBe(8);
    date.close();
  });

  it('names the line where time goes back', () => {
    const e = userErrorOf(stamped('back.csv', (i) => String(i < 50 ? i : i - 20), 100));
    expect(e.code).toBe('time-goes-back');
    expect(e.message).toMatch(/^back\.csv, line 52: time goes back/);
    const late = userErrorOf(stamped('late.csv', (i) => String(i < 5000 ? i : i - 20), 6000));
    expect(late.message).toMatch(/^late\.csv, line 5002: time goes back/);
  });

  it('gives no rate for stamps that are not even', () => {
    const f = openDataFile(stamped('uneven.csv', (i) => String(i * i), 12_000));
    expect(f.channels[0].rate).toBeUndefined();
    f.close();
  });
});

describe('long and compressed text', () => {
  const rows = 40_000;
  const text = lines(
    'time (s),strain',
    ...Array.from({ length: rows }, (_, i) => `${(i / 512).toFixed(9)},${i}.5`),
  );

  it('reads any span of a file with many blocks', () => {
    const f = openDataFile(put('long.csv', text + text.slice(text.indexOf('\n') + 1).slice(0, 0)));
    for (const [from, to] of [
      [0, 3],
      [1023, 1026],
      [rows - 3, rows],
      [12_345, 32_345],
    ])
      expect(span(f, 'strain', from, to)).toEqual(
        Array.from({ length: to - from }, (_, i) => from + i + 0.5),
      );
    f.close();
  });

  it('reads gzip, in one member and in several', () => {
    const half = text.indexOf('\n', text.length / 2) + 1;
    const one = gzipSync(text);
    const two = Buffer.concat([gzipSync(text.slice(0, half)), gzipSync(text.slice(half))]);
    for (const [name, bytes] of [
      ['one.csv.gz', one],
      ['two.csv.gz', two],
    ] as const) {
      const f = openDataFile(put(name, bytes));
      expect(f.format).toBe('Text columns, gzip');
      expect(f.channels[0]).toMatchObject({ name: 'strain', length: rows, rate: { value: 512 } });
      expect(span(f, 'strain', rows - 2, rows)).toEqual([rows - 1.5, rows - 0.5]);
      expect(span(f, 'strain', 5, 7)).toEqual([5.5, 6.5]);
      f.close();
    }
  });

  it('finds cut and damaged gzip', () => {
    const bytes = gzipSync(text);
    expect(userErrorOf(put('cut.csv.gz', bytes.subarray(0, bytes.length / 2))).message).toMatch(
      /^cut\.csv\.gz is cut short/,
    );
    const flipped = Buffer.from(bytes);
    flipped.writeUInt32LE(1, bytes.length - 8);
    expect(userErrorOf(put('sum.csv.gz', flipped)).message).toMatch(/sum\.csv\.gz is damaged .*check sum/);
    expect(userErrorOf(put('binary.gz', gzipSync(new Uint8Array(5000)))).message).toMatch(
      /binary\.gz holds binary data/,
    );
  });
});

describe('broken text', () => {
  it.each([
    [
      'text in a number column',
      lines('time,strain', '0,1', '1,2', '2,oops', '3,4'),
      /^bad\.csv, line 4: "oops" in column 2 \(strain\) is not a number/,
    ],
    ['a number in hex', lines('a,b', '0,1', '1,2', '2,0x10', '3,4'), /line 4: "0x10" in column 2/],
    [
      'a row too short',
      lines('a,b', '0,1', '1,2', '2', '3,4'),
      /^bad\.csv, line 4 has no column 2 \(b\), 2 columns are expected/,
    ],
    [
      'a time that is text',
      lines('time,strain', '0,1', '1,2', 'later,3', '3,4'),
      /^bad\.csv, line 4 has no time/,
    ],
    ['no numbers', lines('all', 'words', 'here'), /^bad\.csv has no line of numbers/],
    ['UTF-16', Buffer.from('\ufeff1,2\n3,4\n', 'utf16le'), /^bad\.csv is UTF-16 text/],
  ])('%s', (_, content, message) => {
    const e = userErrorOf(put('bad.csv', content));
    expect(e.message).toMatch(message);
    expect(e.message.split('\n')).toHaveLength(1);
  });
});
