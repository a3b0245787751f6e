// Transforms of any length as a circular convolution with a chirp (Bluestein, IEEE Trans. AU-18, 451, 1970).
import { multiply } from './complex';
import { transform } from './fft';
import { rowBytes, smooth } from './fft-plan';
import { bytes } from './lanes';
import { turn, turnIm, turnRe } from './twiddle';

/** Shortest fast length that holds a circular convolution of 2 n - 1 points. */
export function paddedLength(n: i32): i32 {
  const need = 2 * n - 1;
  let best = 16;
  while (best < need) best <<= 1;
  for (let odd = 3; odd <= 15; odd += 2) {
    if (!smooth(odd)) continue;
    let m = odd << 4;
    while (m < need) m <<= 1;
    if (m < best) best = m;
  }
  return best;
}

export function fillChirp<T>(chirp: usize, n: i32): void {
  const period = 2 * <u64>n;
  for (let k = 0; k < n; k++) {
    turn((<u64>k * <u64>k) % period, period);
    store<T>(chirp + bytes<T>(k), <T>turnRe);
    store<T>(chirp + rowBytes<T>(n) + bytes<T>(k), <T>turnIm);
  }
}

/** Spectrum of the conjugate chirp, wrapped and divided by m, into `out`; `work` holds a wrapped copy and scratch. */
export function fillChirpSpectrum<T>(chirp: usize, n: i32, m: i32, inner: usize, out: usize, work: usize): void {
  const row = rowBytes<T>(m);
  memory.fill(work, 0, 2 * row);
  for (let k = 0; k < n; k++) {
    const re = load<T>(chirp + bytes<T>(k)) / <T>m;
    const im = -load<T>(chirp + rowBytes<T>(n) + bytes<T>(k)) / <T>m;
    const wrapped = k == 0 ? 0 : m - k;
    store<T>(work + bytes<T>(k), re);
    store<T>(work + row + bytes<T>(k), im);
    store<T>(work + bytes<T>(wrapped), re);
    store<T>(work + row + bytes<T>(wrapped), im);
  }
  transform<T>(inner, work, work + row, out, out + row, work + 2 * row);
}

export function runChirp<T>(plan: usize, xr: usize, xi: usize, yr: usize, yi: usize, scratch: usize): void {
  const n = load<i32>(plan);
  const m = load<i32>(plan, 12);
  const chirp = load<usize>(plan, 16);
  const chirpIm = chirp + rowBytes<T>(n);
  const spectrum = load<usize>(plan, 20);
  const inner = load<usize>(plan, 24);
  const row = rowBytes<T>(m);
  const a = scratch;
  const b = scratch + 2 * row;
  const rest = scratch + 4 * row;
  multiply<T>(n, xr, xi, chirp, chirpIm, a, a + row);
  memory.fill(a + bytes<T>(n), 0, bytes<T>(m - n));
  memory.fill(a + row + bytes<T>(n), 0, bytes<T>(m - n));
  transform<T>(inner, a, a + row, b, b + row, rest);
  multiply<T>(m, b, b + row, spectrum, spectrum + row, b, b + row);
  transform<T>(inner, b + row, b, a + row, a, rest);
  multiply<T>(n, a, a + row, chirp, chirpIm, yr, yi);
}
