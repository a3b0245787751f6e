/** Weights of the 4-term Blackman–Harris window about its middle: side lobes below −92 dB (Harris, Proc. IEEE 66, 51, 1978; MEMORY). */
const WEIGHTS = [0.35875, 0.48829, 0.14128, 0.01168] as const;

/** Full width at half height of its transform, and half the width of its main lobe, in units of 1/length. */
export const WIDTH = 2.72;
export const MAIN_LOBE = 4;

/** Weight at distance u from the middle, in units of half the length. */
export const blackmanHarris = (u: number): number =>
  WEIGHTS.reduce((sum, a, k) => sum + a * Math.cos(k * Math.PI * u), 0);
