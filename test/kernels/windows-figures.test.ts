import { describe, expect, test } from 'vitest';
import { overlapCorrelation, windowFigures } from '../../src/core/kernels/window-figures';
import { makeWindow } from '../../src/core/kernels/windows';
import {
  WINDOW_NAMES,
  WINDOW_SIDELOBE_DB,
  type WindowName,
  type WindowShape,
} from '../../src/core/kernels/windows-names';

// coherent gain, noise bandwidth (bins), scallop, worst loss (dB), widths at 3 and 6 dB (bins), highest sidelobe (dB),
// overlap correlation at 75 and 50 %. COMPUTED with NumPy for periodic windows of 8192 samples; they agree with Harris,
// Proc. IEEE 66, 51 (1978), Table 1, to its digits (MEMORY). Kaiser: Harris' α is β/π.
const TABLE: readonly (readonly [WindowName, WindowShape, readonly number[]])[] = [
  ['boxcar', {}, [1, 1, 3.92239749, 3.92239749, 0.88589295, 1.20670914, -13.26367529, 0.75, 0.5]],
  [
    'bartlett',
    {},
    [0.5, 1.33333337, 1.82419506, 3.07358256, 1.27566684, 1.77178594, -26.52734795, 0.71874999, 0.24999998],
  ],
  [
    'hann',
    {},
    [0.5, 1.5, 1.42362281, 3.1845354, 1.44058259, 2.00000001, -31.47549232, 0.65915494, 0.16666667],
  ],
  [
    'hamming',
    {},
    [0.54, 1.36282579, 1.75143114, 3.09583457, 1.30298208, 1.81522495, -42.67524849, 0.70691893, 0.2337695],
  ],
  [
    'blackman',
    {},
    [0.42, 1.72675737, 1.09887883, 3.47119201, 1.64368169, 2.29879985, -58.12286735, 0.56666637, 0.08962574],
  ],
  [
    'blackman-harris',
    {},
    [
      0.35875, 2.00435294, 0.82557223, 3.8453142, 1.89944545, 2.66642935, -92.03316068, 0.45998519,
      0.03760187,
    ],
  ],
  [
    'nuttall',
    {},
    [
      0.3635819, 1.97610929, 0.85055651, 3.8086661, 1.87190622, 2.62868073, -98.16896699, 0.46998038,
      0.04176006,
    ],
  ],
  [
    'tukey',
    { alpha: 0.25 },
    [0.875, 1.10204082, 2.96281254, 3.38478933, 1.00741291, 1.37327055, -13.601279, 0.74074074, 0.44444444],
  ],
  [
    'tukey',
    { alpha: 0.75 },
    [0.625, 1.36, 1.72979692, 3.06518601, 1.30474502, 1.79578572, -19.39485785, 0.70476353, 0.25055941],
  ],
  [
    'kaiser',
    { beta: 2 * Math.PI },
    [
      0.48919357, 1.49634201, 1.45271279, 3.20302149, 1.42940835, 1.99348322, -45.86460778, 0.65664777,
      0.16904168,
    ],
  ],
  [
    'kaiser',
    { beta: 3 * Math.PI },
    [
      0.40254801, 1.79523508, 1.02264305, 3.5638563, 1.70532631, 2.38924518, -69.64689986, 0.5391952,
      0.07353453,
    ],
  ],
  [
    'gaussian',
    { std: 8192 / 6 },
    [
      0.41664349, 1.70170749, 1.16324761, 3.47209671, 1.6041509, 2.25927732, -56.07202685, 0.56896196,
      0.10182898,
    ],
  ],
  [
    'flat-top',
    {},
    [
      0.21557895, 3.77024645, 0.00977806, 5.77347545, 3.7247271, 4.58287304, -93.02642818, 0.0455033,
      -0.0152603,
    ],
  ],
  [
    'HFT70',
    {},
    [1, 3.41290625, 0.00650495, 5.33774854, 3.37540196, 4.13005448, -70.45417683, 0.1223869, -0.0381677],
  ],
  [
    'HFT95',
    {},
    [1, 3.81121301, 0.00386592, 5.81449814, 3.76290103, 4.62304334, -95.02626169, 0.03882401, -0.0141963],
  ],
];

describe('figures of merit equal the published table', () => {
  test.each(TABLE)('%s %o', (name, shape, [gain, enbw, scallop, worst, w3, w6, side, c75, c50]) => {
    const w = makeWindow(name, 8192, shape);
    const f = windowFigures(w);
    expect(f.coherentGain).toBeCloseTo(gain, 6);
    expect(f.enbw).toBeCloseTo(enbw, 6);
    expect(f.scallopLoss).toBeCloseTo(scallop, 6);
    expect(f.worstProcessingLoss).toBeCloseTo(worst, 6);
    expect(f.bandwidth3).toBeCloseTo(w3, 5);
    expect(f.bandwidth6).toBeCloseTo(w6, 5);
    // The table's sidelobes are read from a grid of frequencies, ours are the maximum between its points.
    expect(f.peakSidelobe - side).toBeGreaterThan(-0.001);
    expect(f.peakSidelobe - side).toBeLessThan(0.05);
    expect(overlapCorrelation(w, 2048)).toBeCloseTo(c75, 5);
    expect(overlapCorrelation(w, 4096)).toBeCloseTo(c50, 5);
  });
});

// Noise bandwidth and highest sidelobe printed in Heinzel, Rüdiger, Schilling, report of 15 February 2002
// (HFT144D READ in citing sources, others MEMORY).
test.each([
  ['HFT70', 3.4129, -70.4],
  ['HFT90D', 3.8832, -90.2],
  ['HFT95', 3.8112, -95.0],
  ['HFT116D', 4.2186, -116.8],
  ['HFT144D', 4.5386, -144.1],
  ['HFT196D', 5.1134, -196.2],
  ['HFT223D', 5.3888, -223.0],
  ['HFT248D', 5.6512, -248.4],
] as const)('%s has the noise bandwidth and sidelobes of the report', (name, enbw, sidelobe) => {
  const f = windowFigures(makeWindow(name, 4096));
  expect(Math.abs(f.enbw - enbw)).toBeLessThan(1e-4);

  expect(Math.abs(f.peakSidelobe - sidelobe)).toBeLessThan(0.1);
  expect(Math.abs(f.scallopLoss)).toBeLessThan(0.0066);
});

test.each(WINDOW_NAMES)('%s: the sidelobe level used in warnings is the computed one', (name) => {
  const { peakSidelobe } = windowFigures(makeWindow(name, 2048));
  expect(Math.abs(peakSidelobe - WINDOW_SIDELOBE_DB[name])).toBeLessThan(0.05);
});

test('long windows are thinned for their shape without a visible difference; sums are exact', () => {
  const short = windowFigures(makeWindow('hann', 4096));
  const long = windowFigures(makeWindow('hann', 100_003));
  expect(long.enbw).toBeCloseTo(1.5, 12);
  expect(long.bandwidth3).toBeCloseTo(short.bandwidth3, 4);
  expect(Math.abs(long.peakSidelobe - short.peakSidelobe)).toBeLessThan(0.01);
});

test('scale of the weights changes the coherent gain only', () => {
  const a = windowFigures(makeWindow('blackman', 512));
  const b = windowFigures(makeWindow('blackman', 512).map((v) => 7 * v));
  expect(b.coherentGain).toBeCloseTo(7 * a.coherentGain, 12);
  expect(b.enbw).toBeCloseTo(a.enbw, 12);
  expect(b.peakSidelobe).toBeCloseTo(a.peakSidelobe, 9);
});

test('a window too short for a main lobe has no widths; an empty sum is refused', () => {
  expect(windowFigures(new Float64Array([1])).bandwidth3).toBeNaN();
  expect(() => windowFigures(new Float64Array([1, -1]))).toThrow(/sums to 0/);
  expect(() => windowFigures(new Float64Array(0))).toThrow(/0 samples/);
});
