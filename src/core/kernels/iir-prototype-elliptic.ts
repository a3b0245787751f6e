import { complex, type Complex } from './iir-design-complex';
import { excess, gainAtZero, type ZerosPoles } from './iir-prototype';
import { ellipticF, ellipticK, jacobi } from './special-elliptic';

/** Parameter m and 1 − m of the elliptic functions with the given nome, by theta functions. */
function parameterOfNome(q: number): { m: number; complement: number } {
  let theta2 = 1;
  let theta3 = 1;
  let theta4 = 1;
  for (let n = 1; q ** (n * n) > 1e-18; n++) {
    theta2 += q ** (n * (n + 1));
    theta3 += 2 * q ** (n * n);
    theta4 += (n % 2 === 0 ? 2 : -2) * q ** (n * n);
  }
  return { m: 16 * q * (theta2 / theta3) ** 4, complement: (theta4 / theta3) ** 4 };
}

/**
 * Analog elliptic (Cauer) lowpass: ripples in both bands, the steepest edge for its order. Gain at the edge 1 rad/s is
 * −ripple dB, in the stop band at most −attenuation dB; both in dB, ripple < attenuation.
 *
 * Degree equation solved through the nome, then zeros and poles from Jacobi functions. Source: Orfanidis, Lecture Notes
 * on Elliptic Filter Design (Rutgers University, 2006) (MEMORY).
 */
export function ellipticPrototype(order: number, ripple: number, attenuation: number): ZerosPoles {
  const square = excess(ripple);
  if (order === 1) {
    const pole = -1 / Math.sqrt(square);
    return { zeros: [], poles: [complex(pole)], gain: -pole };
  }
  // The ratio of the two ripples is the parameter of the characteristic function.
  const ratio = square / excess(attenuation);
  const k1 = ellipticK(ratio);
  const nome = Math.exp((-Math.PI * ellipticK(1 - ratio, ratio)) / k1 / order);
  const { m, complement } = parameterOfNome(nome);
  const quarter = ellipticK(m, complement);

  // tan φ = 1/ε; F(φ | 1 − ratio) sets how far the poles lie from the axis.
  const depth = ellipticF(1 / Math.sqrt(1 + square), Math.sqrt(square / (1 + square)), ratio);
  const v = jacobi((quarter * depth) / (order * k1), complement, m);

  const zeros: Complex[] = [];
  const poles: Complex[] = [];
  for (let j = 1 - (order % 2); j < order; j += 2) {
    const { sn, cn, dn } = jacobi((j * quarter) / order, m, complement);
    const scale = v.cn ** 2 + m * (sn * v.sn) ** 2;
    const re = (-cn * dn * v.sn * v.cn) / scale;
    if (j === 0) {
      poles.push(complex(re));
      continue;
    }
    const height = 1 / (Math.sqrt(m) * sn);
    zeros.push(complex(0, height), complex(0, -height));
    const im = (sn * v.dn) / scale;
    poles.push(complex(re, im), complex(re, -im));
  }
  return { zeros, poles, gain: gainAtZero(zeros, poles, order % 2 === 0 ? 1 / Math.sqrt(1 + square) : 1) };
}
