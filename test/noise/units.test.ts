import { expect, test } from 'vitest';
import { amplitudeUnit, densityUnit, sampleUnit } from '../../src/core/noise/units';

test.each([
  ['strain', 'strain²/Hz', 'strain/√Hz'],
  ['V', 'V²/Hz', 'V/√Hz'],
  ['m/s', '(m/s)²/Hz', '(m/s)/√Hz'],
  ['', '1/Hz', '1/√Hz'],
])('%j', (unit, density, amplitude) => {
  expect(densityUnit(unit)).toBe(density);
  expect(amplitudeUnit(density)).toBe(amplitude);
  expect(sampleUnit(density)).toBe(unit);
});
