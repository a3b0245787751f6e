import { beforeAll, describe, expect, it } from 'vitest';
import { formatGps } from '../../src/core/data/gps-time';
import { initReaders, openDataFile } from '../../src/host/open-file';
import { f64, samplesOf, scratch, span, userErrorOf, wave } from './make-files';

const { put } = scratch();
beforeAll(initReaders);

describe('WAVE', () => {
  const i16 = (...v: number[]): Uint8Array => new Uint8Array(Int16Array.from(v).buffer);

  it('makes a channel of each track and divides integers by full scale', () => {
    const f = openDataFile(
      put('two.wav', wave(i16(-32768, 1, 16384, 2, 32767, 3), { code: 1, bits: 16, rate: 4096, tracks: 2 })),
    );
    expect(f.channels.map((c) => c.name)).toEqual(['track 1', 'track 2']);
    expect(f.channels[0]).toMatchObject({ length: 3, type: 'int16', rate: { value: 4096 } });
    expect(f.channels[0].notes[0]).toBe('Integer counts (16 bits) are divided by 32768: full scale is 1.');
    expect(samplesOf(f, 'track 1')).toEqual([-1, 0.5, 32767 / 32768]);
    expect(samplesOf(f, 'track 2')).toEqual([1 / 32768, 2 / 32768, 3 / 32768]);
    expect(span(f, 'track 2', 1, 2)).toEqual([2 / 32768]);
    f.close();
  });

  it.each([
    ['8 bits', Uint8Array.of(0, 128, 255), { code: 1, bits: 8 }, [-1, 0, 127 / 128]],
    [
      '24 bits',
      Uint8Array.of(0, 0, 0x80, 0, 0, 0x40, 0xff, 0xff, 0xff),
      { code: 1, bits: 24 },
      [-1, 0.5, -(2 ** -23)],
    ],
    [
      '32 bits',
      new Uint8Array(Int32Array.of(-2147483648, 1 << 30, 0).buffer),
      { code: 1, bits: 32 },
      [-1, 0.5, 0],
    ],
    ['float32', new Uint8Array(Float32Array.of(0.25, -2, 0).buffer), { code: 3, bits: 32 }, [0.25, -2, 0]],
    ['float64', f64([1e-21, -2, Math.PI]), { code: 3, bits: 64 }, [1e-21, -2, Math.PI]],
  ] as const)('%s, plain, extensible, RF64 and BW64', (_, data, form, values) => {
    for (const more of [{}, { extensible: true }, { wide: 'RF64' as const }, { wide: 'BW64' as const }]) {
      const f = openDataFile(put('one.wav', wave(data, { ...form, rate: 16384, tracks: 1, ...more })));
      expect(samplesOf(f)).toEqual(values);
      f.close();
    }
  });

  it.each([
    [
      'a rate of 0 Hz',
      wave(i16(1, 2), { code: 1, bits: 16, rate: 0, tracks: 1 }),
      /odd\.wav is a damaged WAVE file: the "fmt " chunk says a rate of 0 Hz/,
    ],
    ['no tracks', wave(i16(1, 2), { code: 1, bits: 16, rate: 10, tracks: 0 }), /0 tracks/],
    [
      'compressed samples',
      wave(i16(1, 2), { code: 85, bits: 16, rate: 10, tracks: 1 }),
      /samples of code 85/,
    ],
    [
      'a cut data chunk',
      wave(i16(1, 2, 3, 4), { code: 1, bits: 16, rate: 10, tracks: 1 }).subarray(0, -4),
      /odd\.wav is cut short: the "data" chunk/,
    ],
    ['no data', wave(i16(), { code: 1, bits: 16, rate: 10, tracks: 1 }).subarray(0, -8), /no "data" chunk/],
  ])('refuses %s', (_, bytes, message) => {
    expect(userErrorOf(put('odd.wav', bytes)).message).toMatch(message);
  });
});

describe('raw samples', () => {
  const sidecar = {
    type: 'float64',
    byteOrder: 'big',
    rate: 512,
    start: '1400000000.5',
    unit: 'V',
    channels: ['alder', 'birch'],
    offset: 3,
  };

  it('follows its sidecar', () => {
    put('run.json', JSON.stringify(sidecar));
    const f = openDataFile(put('run.bin', Buffer.concat([Buffer.from('abc'), f64([1, 2, 3, 4], false)])));
    const [c] = f.channels;
    expect(c).toMatchObject({ name: 'alder', length: 2, rate: { value: 512, where: '"rate" in run.json' } });
    expect(formatGps(c.start!.value)).toBe('1400000000.5');
    expect(c.unit?.value).toBe('V');
    expect(samplesOf(f, 'birch')).toEqual([2, 4]);
    f.close();
  });

  it('prefers the sidecar that carries the whole name, and may leave facts open', () => {
    put('other.json', '{ "type": "float64" }');
    put('other.f32.json', '{ "type": "float32" }');
    const f = openDataFile(put('other.f32', new Uint8Array(Float32Array.of(1, 2).buffer)));
    expect(samplesOf(f)).toEqual([1, 2]);
    expect(f.channels[0].rate).toBeUndefined();
    f.close();
  });

  it('notes bytes that are no whole sample', () => {
    put('rest.json', '{ "type": "int24" }');
    const f = openDataFile(put('rest.raw', Uint8Array.of(1, 0, 0, 255, 255, 255, 7)));
    expect(samplesOf(f)).toEqual([1, -1]);
    expect(f.channels[0].notes.join(' ')).toContain('The last 1 bytes are no whole sample of 3 bytes');
    f.close();
  });

  it('shows an example when the sidecar is missing', () => {
    const e = userErrorOf(put('alone.dat', Uint8Array.of(0, 1, 2, 3)));
    expect(e.code).toBe('sidecar-missing');
    expect(e.message).toContain('no alone.json beside it');
    expect(e.message).toContain('"byteOrder": "little"');
  });

  it.each([
    ['{ "type": "float64", "rat": 5 }', /no key "rat"\. Did you mean "rate"/],
    ['{ "type": "double" }', /"type" must be one of float64, float32/],
    ['{ "type": "float64", "byteOrder": "middle" }', /"byteOrder" must be "little" or "big"/],
    ['{ "type": "float64", "rate": 0 }', /"rate" must be a positive number of Hz/],
    ['{ "type": "float64", "start": "soon" }', /"start" must be GPS seconds/],
    [
      '{ "type": "float64", "channels": ["a", "a"] }',
      /"channels" must be a number or a list of different names/,
    ],
    ['{ "type": "float64", "offset": 400 }', /"offset" 400 is past the end of bad\.raw/],
    ['{ type: float64 }', /it is not JSON/],
    ['[]', /it is not an object/],
  ])('refuses the sidecar %s', (json, message) => {
    put('bad.json', json);
    const e = userErrorOf(put('bad.raw', f64([1, 2])));
    expect(e.message).toMatch(message);
    expect(e.message).toContain('bad.json');
  });
});
