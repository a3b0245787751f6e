import { cosTurns, sinTurns } from './elementary';

/**
 * Fourier transforms for the demo's synthesis: slow-ish and plain, but the same to the bit everywhere, which the fast
 * kernels (whose twiddles and order of operations may change) do not promise. Cooley and Tukey, Math. Comp. 19, 297 (1965).
 */

/** cos and sin of 2πj/n for j in [0, n/2), each from its own angle: no error adds up along the table. */
function twiddles(n: number): { cos: Float64Array; sin: Float64Array } {
  const cos = new Float64Array(n / 2);
  const sin = new Float64Array(n / 2);
  for (let j = 0; j < n / 2; j++) {
    cos[j] = cosTurns(j / n);
    sin[j] = sinTurns(j / n);
  }
  return { cos, sin };
}

function checkSize(n: number): void {
  if (n < 4 || (n & (n - 1)) !== 0) throw new RangeError(`transform length ${n} is not a power of two`);
}

/** Radix 2, in place, kernel e^{sign·2πi jk/n}, no factor. `table` is of twice the length: every other entry is used. */
function complexTransform(
  re: Float64Array,
  im: Float64Array,
  sign: 1 | -1,
  table: { cos: Float64Array; sin: Float64Array },
): void {
  const n = re.length;
  for (let i = 1, j = 0; i < n; i++) {
    let bit = n >> 1;
    for (; j & bit; bit >>= 1) j ^= bit;
    j ^= bit;
    if (i < j) {
      const r = re[i];
      re[i] = re[j]!;
      re[j] = r;
      const s = im[i];
      im[i] = im[j]!;
      im[j] = s;
    }
  }
  for (let half = 1; half < n; half *= 2) {
    const stride = n / half;
    for (let base = 0; base < n; base += 2 * half) {
      for (let k = 0; k < half; k++) {
        const c = table.cos[k * stride];
        const s = sign * table.sin[k * stride];
        const p = base + k;
        const q = p + half;
        const x = re[q] * c - im[q] * s;
        const y = re[q] * s + im[q] * c;
        re[q] = re[p] - x;
        im[q] = im[p] - y;
        re[p] = re[p] + x;
        im[p] = im[p] + y;
      }
    }
  }
}

/**
 * Real samples from the positive half of their spectrum: x_n = (1/N) Σ_k X_k e^{2πikn/N} over all N bins, the negative
 * half being the conjugate. `re`, `im` hold bins 0 … N/2 (N/2+1 values); the imaginary parts of bins 0 and N/2 are ignored.
 */
export function realFromHalf(re: Float64Array, im: Float64Array): Float64Array {
  const half = re.length - 1;
  const n = 2 * half;
  checkSize(n);
  const table = twiddles(n);
  const zr = new Float64Array(half);
  const zi = new Float64Array(half);
  for (let k = 0; k < half; k++) {
    // even samples E = (X_k + X*_{half−k})/2, odd samples O = e^{2πik/N}(X_k − X*_{half−k})/2, packed as E + iO
    const ar = re[k];
    const ai = k === 0 ? 0 : im[k];
    const br = re[half - k];
    const bi = k === 0 ? 0 : -im[half - k];
    const dr = ar - br;
    const di = ai - bi;
    const or = dr * table.cos[k] - di * table.sin[k];
    const oi = dr * table.sin[k] + di * table.cos[k];
    zr[k] = (ar + br - oi) / n;
    zi[k] = (ai + bi + or) / n;
  }
  complexTransform(zr, zi, 1, table);
  const x = new Float64Array(n);
  for (let k = 0; k < half; k++) {
    x[2 * k] = zr[k]!;
    x[2 * k + 1] = zi[k]!;
  }
  return x;
}

/** Bins 0 … N/2 of X_k = Σ_n x_n e^{−2πikn/N}, no factor. */
export function halfFromReal(x: Float64Array): { re: Float64Array; im: Float64Array } {
  const n = x.length;
  checkSize(n);
  const half = n / 2;
  const table = twiddles(n);
  const zr = new Float64Array(half);
  const zi = new Float64Array(half);
  for (let k = 0; k < half; k++) {
    zr[k] = x[2 * k]!;
    zi[k] = x[2 * k + 1]!;
  }
  complexTransform(zr, zi, -1, table);
  const re = new Float64Array(half + 1);
  const im = new Float64Array(half + 1);
  for (let k = 0; k <= half; k++) {
    const a = k % half;
    const b = (half - k) % half;
    const evenRe = (zr[a] + zr[b]) / 2;
    const evenIm = (zi[a] - zi[b]) / 2;
    const oddRe = (zi[a] + zi[b]) / 2;
    const oddIm = (zr[b] - zr[a]) / 2;
    const c = k === half ? -1 : table.cos[k];
    const s = k === half ? 0 : -table.sin[k];
    re[k] = evenRe + oddRe * c - oddIm * s;
    im[k] = evenIm + oddRe * s + oddIm * c;
  }
  return { re, im };
}
