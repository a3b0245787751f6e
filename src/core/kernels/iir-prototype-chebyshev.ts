import { complex, divide, type Complex } from './iir-design-complex';
import { excess, gainAtZero, prototypeAngles, type ZerosPoles } from './iir-prototype';

/** −sinh(mu + i angle) for each angle: n points on an ellipse in the left half-plane. */
const ellipse = (order: number, mu: number): Complex[] =>
  prototypeAngles(order).map((a) => complex(-Math.sinh(mu) * Math.cos(a), -Math.cosh(mu) * Math.sin(a)));

/**
 * Analog Chebyshev lowpass, ripples in the pass band: |H(iω)|² = 1/(1 + ε² T_n²(ω)), ε² = 10^(ripple/10) − 1, so the
 * gain at the edge 1 rad/s is −ripple dB. Ripple in dB. Source: Parks & Burrus, Digital Filter Design (Wiley, 1987),
 * ch. 7 (MEMORY).
 */
export function chebyshev1Prototype(order: number, ripple: number): ZerosPoles {
  const square = excess(ripple);
  const poles = ellipse(order, Math.asinh(1 / Math.sqrt(square)) / order);
  return { zeros: [], poles, gain: gainAtZero([], poles, order % 2 === 0 ? 1 / Math.sqrt(1 + square) : 1) };
}

/**
 * Analog inverse Chebyshev lowpass, ripples in the stop band: |H(iω)|² = 1/(1 + 1/(ε² T_n²(1/ω))), so the gain at the
 * edge 1 rad/s, where the stop band begins, is −attenuation dB. Source: as above.
 */
export function chebyshev2Prototype(order: number, attenuation: number): ZerosPoles {
  const one = complex(1);
  const zeros = prototypeAngles(order)
    .filter((_, i) => 2 * i + 1 !== order)
    .map((a) => complex(0, 1 / Math.sin(a)));
  const mu = Math.asinh(Math.sqrt(excess(attenuation))) / order;
  const poles = ellipse(order, mu).map((p) => divide(one, p));
  return { zeros, poles, gain: gainAtZero(zeros, poles, 1) };
}
