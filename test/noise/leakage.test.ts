import { describe, expect, test } from 'vitest';
import { createKernels } from '../../src/core/kernels/kernels';
import { makeWindow } from '../../src/core/kernels/windows';
import { leakedShare } from '../../src/core/noise/leakage';

const kernels = createKernels(undefined);
const n = 4096;
const flat = (height = 1): Float64Array => new Float64Array(n / 2 + 1).fill(height);

describe('leakedShare', () => {
  test('a boxcar carries ½ [N sin(π d/N)]⁻² of a line d bins away into each bin', () => {
    const density = flat();
    density[300] = 1e9;
    const share = leakedShare(kernels, makeWindow('boxcar', n), density, [700, 701]);
    // The image of the line at negative frequency lies 1000 bins away.
    const kernel = (d: number): number => 0.5 / (n * Math.sin((Math.PI * d) / n)) ** 2;
    const expected = 1e9 * (kernel(400) + kernel(1000));
    expect(share / expected).toBeCloseTo(1, 2);
  });

  test('a Hann window carries far less: its sidelobes fall as d⁻⁶ in power', () => {
    const density = flat();
    density[300] = 1e9;
    const near = leakedShare(kernels, makeWindow('hann', n), density, [350, 351]);
    const far = leakedShare(kernels, makeWindow('hann', n), density, [400, 401]);
    expect(Math.log2(near / far)).toBeCloseTo(6, 0);
  });

  test('white noise leaks a few per cent through a boxcar, nothing through Hann', () => {
    // Two sums of ½ (π d)⁻² from 9 on, one for each side: about 1/(8.5 π²).
    expect(leakedShare(kernels, makeWindow('boxcar', n), flat(), [500, 1500])).toBeCloseTo(
      1 / (8.5 * Math.PI ** 2),
      2,
    );
    expect(leakedShare(kernels, makeWindow('hann', n), flat(), [500, 1500])).toBeLessThan(1e-4);
  });

  test('no density, no leakage', () => {
    expect(leakedShare(kernels, makeWindow('hann', n), flat(0), [500, 600])).toBe(0);
  });
});
