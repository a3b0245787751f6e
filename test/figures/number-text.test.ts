import { expect, test } from 'vitest';
import { counted, numberText, repeated, withUnit } from '../../src/core/figures/number-text';

test.each([
  [0, '0'],
  [1, '1'],
  [-2.5, '−2.5'],
  [0.375, '0.375'],
  [16384, '16384'],
  [123456.7, '123457'],
  [3.14159265, '3.142'],
  [0.00012345, '1.234e-4'],
  [1e-21, '1e-21'],
  [1.1e-23, '1.1e-23'],
  [2.34e9, '2.34e9'],
  [1e100, '1e100'],
  [NaN, 'no value'],
  [Infinity, '∞'],
  [-Infinity, '−∞'],
])('%d is "%s"', (value, text) => {
  expect(numberText(value)).toBe(text);
});

test('digits, units, counts and notes', () => {
  expect(numberText(1234.56789, 9)).toBe('1234.56789');
  expect(withUnit(2, 'Hz')).toBe('2 Hz');
  expect(withUnit(2, '')).toBe('2');
  expect(counted(1, 'gap')).toBe('1 gap');
  expect(counted(2, 'stretch', 'stretches')).toBe('2 stretches');
  expect(repeated(['contains an injection'])).toBe(' Note: contains an injection.');
  expect(repeated(undefined)).toBe('');
});
