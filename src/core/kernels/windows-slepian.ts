import { UserError } from '../data/errors';
import { eigenvalueFromTop, eigenvector } from './windows-tridiagonal';

export interface SlepianTapers {
  /** Tapers with Σ v² = 1, mutually orthogonal, best concentrated first. */
  readonly tapers: readonly Float64Array[];
  /** Part of each taper's energy inside the band, below 1; 1 − concentration is its leakage. */
  readonly concentration: Float64Array;
}

/**
 * Discrete prolate spheroidal sequences (Slepian tapers): of all tapers of n samples those with most energy within
 * ± halfBandwidth bins. For multitaper spectra.
 *
 * @param n Length in samples, at least 2.
 * @param halfBandwidth Time–half-bandwidth product NW, in bins of 1/n, above 0 and below n/2; usual values 2.5 to 4.
 * @param count Number of tapers, 1 to n; of use are those up to 2·NW − 1, later ones leak.
 * @throws UserError outside these limits.
 *
 * Even tapers have a positive mean, odd ones begin with a positive lobe, as in `scipy.signal.windows.dpss`. Eigenvectors
 * of the tridiagonal matrix that commutes with the concentration operator; concentration by applying that operator at
 * the largest sample, absolute error about 1e-14. Source: Slepian, Bell Syst. Tech. J. 57, 1371 (1978); Thomson, Proc. IEEE
 * 70, 1055 (1982) (MEMORY).
 *
 * @example 1 - slepianTapers(1024, 4, 1).concentration[0] // 2.944e-10
 */
export function slepianTapers(n: number, halfBandwidth: number, count: number): SlepianTapers {
  if (!Number.isSafeInteger(n) || n < 2)
    throw new UserError(
      'taper-length',
      `taper length ${n}: it must be a whole number of samples, at least 2`,
    );
  if (!(halfBandwidth > 0 && halfBandwidth < n / 2))
    throw new UserError(
      'taper-bandwidth',
      `half bandwidth ${halfBandwidth} bins: it must lie above 0 and below ${n / 2}, half the length`,
    );
  if (!Number.isSafeInteger(count) || count < 1 || count > n)
    throw new UserError(
      'taper-count',
      `${count} tapers of ${n} samples: the number must be whole, 1 to ${n}`,
    );
  const w = halfBandwidth / n;
  const cosine = Math.cos(2 * Math.PI * w);
  const matrix = {
    diagonal: Float64Array.from({ length: n }, (_, i) => ((n - 1 - 2 * i) / 2) ** 2 * cosine),
    beside: Float64Array.from({ length: n - 1 }, (_, i) => ((i + 1) * (n - 1 - i)) / 2),
  };
  const tapers = Array.from({ length: count }, (_, k) =>
    signed(eigenvector(matrix, eigenvalueFromTop(matrix, k)), k),
  );
  return { tapers, concentration: Float64Array.from(tapers, (v) => concentration(v, w)) };
}

/** Even tapers: positive mean. Odd ones: the first sample that stands out of the flat beginning is positive. */
function signed(v: Float64Array, k: number): Float64Array {
  const threshold = Math.max(1e-7, 1 / v.length);
  const lead = k % 2 === 0 ? v.reduce((s, x) => s + x, 0) : (v.find((x) => x * x > threshold) ?? v[0]);
  return lead < 0 ? v.map((x) => -x) : v;
}

/** λ from Σ_m sin(2πW(j − m))/(π(j − m)) v_m = λ v_j at the largest sample j. */
function concentration(v: Float64Array, w: number): number {
  let j = 0;
  v.forEach((x, i) => {
    if (Math.abs(x) > Math.abs(v[j])) j = i;
  });
  let sum = 2 * w * v[j];
  v.forEach((x, m) => {
    if (m !== j) sum += (Math.sin(2 * Math.PI * w * (j - m)) / (Math.PI * (j - m))) * x;
  });
  return sum / v[j];
}
