import { describe, expect, test } from 'vitest';
import { interpolateCurve, parseNoiseCurve } from '../../src/core/noise/curve-file';

const parse = (text: string) => parseNoiseCurve(text, 'curve.txt', 'power density');

describe('parseNoiseCurve', () => {
  test.each([
    ['10 1e-40\n20 2e-40\n', 'blanks'],
    ['10,1e-40\r\n20,2e-40', 'commas, CRLF, no newline at the end'],
    ['10;1e-40\n20 ; 2e-40\n', 'semicolons'],
    ['\uFEFF10\t1e-40\n20\t2E-40\n', 'tabs after a byte order mark'],
    ['# c\n% c\n! c\n// c\nFrequency Density\n  10 1e-40\n\n20 2e-40\n', 'comments, a header, indentation'],
  ])('reads %j (%s)', (text) => {
    const { frequency, density } = parse(text);
    expect([...frequency]).toEqual([10, 20]);
    expect([...density]).toEqual([1e-40, 2e-40]);
  });

  test.each([
    ['10 1e-40\n20 oops\n', 'curve.txt, line 2: "oops" is not a finite number'],
    ['10 1e-40\n\n# c\n20 nan\n', 'line 4: "nan" is not a finite number'],
    ['10 1e-40\n20 2e-40 3\n', 'line 2: two values are needed (frequency, power density), found 3'],
    ['10\n', 'line 1: two values are needed'],
    ['10 1e-40\n9 2e-40\n', 'line 2: the frequency 9 Hz does not rise above 10 Hz'],
    ['10 1e-40\n10 2e-40\n', 'line 2: the frequency 10 Hz does not rise'],
    ['-1 1e-40\n', 'line 1: the frequency -1 Hz is negative'],
    ['10 0\n', 'line 1: the power density 0 is not positive'],
    ['10 1e-40\nf s\n20 2e-40\n', 'line 2: "f" is not a finite number'],
    ['10,\n', 'line 1: "" is not a finite number'],
    ['10 1e-40\n', 'has 1 rows'],
    ['', 'has 0 rows'],
  ])('refuses %j', (text, message) => {
    expect(() => parse(text)).toThrow(message);
  });

  test('refuses amplitudes whose square float64 cannot hold', () => {
    expect(() => parseNoiseCurve('10 1e-170\n20 1e-23', 'c', 'amplitude density')).toThrow(
      'below the smallest float64',
    );
  });
});

describe('interpolateCurve', () => {
  const curve = parse('10 1e-40\n100 1e-44\n1000 1e-43\n');

  test('is straight in log density against log frequency and exact at the points', () => {
    const at = interpolateCurve(curve, new Float64Array([10, 10 ** 1.5, 100, 10 ** 2.5, 1000]));
    expect([at[0], at[2], at[4]]).toEqual([1e-40, 1e-44, 1e-43]);
    expect(at[1] / 1e-42).toBeCloseTo(1, 12);
    expect(at[3] / 10 ** -43.5).toBeCloseTo(1, 12);
  });

  test('has no value outside, in any order of frequencies', () => {
    const at = interpolateCurve(curve, new Float64Array([2000, 500, 9.99, 50, 0, NaN]));
    expect([0, 2, 4, 5].map((k) => at[k])).toEqual([NaN, NaN, NaN, NaN]);
    expect(at[3]).toBeGreaterThan(at[1]);
  });
});
