import { complex, divide, product, scale, type Complex } from './iir-design-complex';

/** H(s) = gain Π(s − zeros) / Π(s − poles); non-real zeros and poles come in exactly conjugate pairs. */
export interface ZerosPoles {
  readonly zeros: readonly Complex[];
  readonly poles: readonly Complex[];
  readonly gain: number;
}

/** Angles of n points on a circle, symmetric about zero: π m/2n with m = 1 − n, 3 − n, … n − 1. */
export const prototypeAngles = (order: number): number[] =>
  Array.from({ length: order }, (_, i) => (Math.PI * (2 * i + 1 - order)) / (2 * order));

/** Gain that makes H(0) = level: Π(−poles)/Π(−zeros) × level. */
export function gainAtZero(zeros: readonly Complex[], poles: readonly Complex[], level: number): number {
  const minus = (list: readonly Complex[]): Complex => product(list.map((v) => scale(v, -1)));
  return level * divide(minus(poles), minus(zeros)).re;
}

/** ε² of a ripple or attenuation in dB: 10^(dB/10) − 1, exact for small values. */
export const excess = (decibel: number): number => Math.expm1((decibel * Math.LN10) / 10);

/**
 * Analog Butterworth lowpass with edge 1 rad/s at half power: |H(iω)|² = 1/(1 + ω^{2n}).
 * Source: Butterworth, Experimental Wireless 7, 536 (1930) (MEMORY).
 */
export function butterworthPrototype(order: number): ZerosPoles {
  const poles = prototypeAngles(order).map((a) => complex(-Math.cos(a), -Math.sin(a)));
  return { zeros: [], poles, gain: 1 };
}
