import { describe, expect, it } from 'vitest';
import { csvOf } from '../../webview/words/csv';
import { epochShift, instantAfter, utcOf } from '../../webview/words/instants';
import { bytesText, digitsFor, numberText, secondsText } from '../../src/core/figures/shown-number';
import { quantityText } from '../../src/core/figures/quantity-text';

describe('numbers', () => {
  it.each([
    [0, '0'],
    [1.23456e-23, '1.235 × 10⁻²³'],
    [-4.5e-7, '−4.5 × 10⁻⁷'],
    [0.001, '0.001'],
    [123.456, '123.5'],
    [999999.9, '1000000'],
    [2.5e9 + 0.5, '2.5 × 10⁹'],
    [4096, '4096'],
    [16384, '16\u202f384'],
    [-1234567, '−1\u202f234\u202f567'],
    [NaN, 'not a number'],
    [Infinity, '∞'],
    [-Infinity, '−∞'],
  ])('writes %d as %s', (value, text) => expect(numberText(value)).toBe(text));

  it('shows as many digits as the interval leaves meaningful', () => {
    expect(digitsFor(1.23456, 1.2, 1.27)).toBe(4);
    expect(digitsFor(1.23456e-23, 1.2344e-23, 1.2348e-23)).toBe(6);
    expect(digitsFor(1.23456, undefined, undefined)).toBe(4);
    expect(digitsFor(5, 5, 5)).toBe(4);
    expect(digitsFor(0.1, -3, 3)).toBe(2);
  });

  it('writes sizes and lengths of time', () => {
    expect(bytesText(512)).toBe('512 bytes');
    expect(bytesText(4_194_432)).toBe('4.19 MB');
    expect(secondsText(32)).toBe('32 s');
    expect(secondsText(4096)).toBe('4096 s (68.3 min)');
    expect(secondsText(86_400 * 3)).toBe('259\u202f200 s (3 d)');
  });
});

describe('quantities', () => {
  it('carry unit, interval with its meaning, and full precision when copied', () => {
    const text = quantityText({
      id: 'floor',
      label: 'Floor',
      value: 1.2345678e-23,
      unit: 'strain/√Hz',
      low: 1.1e-23,
      high: 1.4e-23,
      intervalMeaning: '90 % of one bin',
    });
    expect(text.value).toBe('1.23 × 10⁻²³');
    expect(text.interval).toBe('1.1 × 10⁻²³ to 1.4 × 10⁻²³ (90 % of one bin)');
    expect(text.copy).toBe('1.2345678e-23 strain/√Hz');
  });

  it('says an interval that is open at one end', () => {
    const base = { id: 'n', label: 'N', value: 1, unit: '' };
    expect(quantityText({ ...base, high: 3 }).interval).toBe('below 3');
    expect(quantityText({ ...base, low: 0.5 }).interval).toBe('above 0.5');
  });
});

describe('instants', () => {
  it('adds seconds to an epoch without losing its nanoseconds', () => {
    const { gps, utc } = instantAfter('1400000000.000000123', 2.5, 9);
    expect(gps).toBe('1400000002.500000123');
    expect(utc).toBe('2024-05-17T16:53:04.500000123Z');
    expect(utcOf('not a time')).toBe('–');
  });
  it('shifts between epochs', () => expect(epochShift('1400000010.25', '1400000000')).toBe(10.25));
});

describe('CSV', () => {
  it('puts units into heads, keeps full precision, leaves missing values empty and quotes what needs it', () => {
    const text = csvOf({
      columns: [
        { id: 'f', label: 'Frequency', unit: 'Hz' },
        { id: 'n', label: 'Name, if known', unit: '' },
      ],
      rows: [
        [0.1 + 0.2, 'a "line"'],
        [null, 'plain'],
      ],
    });
    expect(text).toBe('Frequency [Hz],"Name, if known"\n0.30000000000000004,"a ""line"""\n,plain\n');
  });
});
