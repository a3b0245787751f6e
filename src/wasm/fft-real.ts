// Real transforms. An even length N is one complex transform of N / 2 points and a pass that separates the spectra
// of the even and odd samples; an odd length is a complex transform with zero imaginary part.
//
// A real plan: word 0 length N, 1 complex plan, 2 cosines, 3 sines of 2 pi k / N (k = 0 .. N / 4).
import { bytes, evens, lanes, mixHigh, mixLow, odds, reversed } from './lanes';
import { aligned, rowBytes } from './fft-plan';
import { planBytes, planInit, scratchBytes, transform, transformPairs } from './fft';
import { turn, turnIm, turnRe } from './twiddle';

function tableBytes<T>(N: i32): usize {
  return aligned(bytes<T>((N >> 2) + 1 + lanes<T>())) + 64;
}

function innerLength(N: i32): i32 {
  return N & 1 ? N : N >> 1;
}

export function realPlanBytes<T>(N: i32): usize {
  return 64 + 2 * tableBytes<T>(N) + planBytes<T>(innerLength(N));
}

export function realScratchBytes<T>(N: i32): usize {
  const n = innerLength(N);
  return 4 * rowBytes<T>(n) + scratchBytes<T>(n);
}

export function realPlanInit<T>(plan: usize, N: i32, scratch: usize): void {
  const cosines = plan + 64;
  const sines = cosines + tableBytes<T>(N);
  const inner = sines + tableBytes<T>(N);
  store<i32>(plan, N);
  store<usize>(plan, inner, 4);
  store<usize>(plan, cosines, 8);
  store<usize>(plan, sines, 12);
  planInit<T>(inner, innerLength(N), scratch);
  if (N & 1) return;
  for (let k = 0; k <= N >> 2; k++) {
    turn(k, N);
    store<T>(cosines + bytes<T>(k), <T>turnRe);
    store<T>(sines + bytes<T>(k), <T>-turnIm);
  }
}

/** Interleaved pairs -> split. */
function split<T>(n: i32, x: usize, yr: usize, yi: usize): void {
  const whole = bytes<T>(n) & ~15;
  let q: usize = 0;
  for (; q < whole; q += 16) {
    const a = v128.load(x + 2 * q);
    const b = v128.load(x + 2 * q, 16);
    v128.store(yr + q, evens<T>(a, b));
    v128.store(yi + q, odds<T>(a, b));
  }
  for (; q < bytes<T>(n); q += sizeof<T>()) {
    store<T>(yr + q, load<T>(x + 2 * q));
    store<T>(yi + q, load<T>(x + 2 * q + sizeof<T>()));
  }
}

/** Split -> interleaved pairs. */
function join<T>(n: i32, xr: usize, xi: usize, y: usize): void {
  const whole = bytes<T>(n) & ~15;
  let q: usize = 0;
  for (; q < whole; q += 16) {
    const a = v128.load(xr + q);
    const b = v128.load(xi + q);
    v128.store(y + 2 * q, mixLow<T>(a, b));
    v128.store(y + 2 * q, mixHigh<T>(a, b), 16);
  }
  for (; q < bytes<T>(n); q += sizeof<T>()) {
    store<T>(y + 2 * q, load<T>(xr + q));
    store<T>(y + 2 * q + sizeof<T>(), load<T>(xi + q));
  }
}

/** Spectrum Z of the pairs (n points) -> one-sided spectrum of the 2 n samples (n + 1 points), in place. */
function separate<T>(n: i32, yr: usize, yi: usize, cosines: usize, sines: usize): void {
  const r0 = load<T>(yr);
  const i0 = load<T>(yi);
  store<T>(yr, r0 + i0);
  store<T>(yi, <T>0);
  store<T>(yr + bytes<T>(n), r0 - i0);
  store<T>(yi + bytes<T>(n), <T>0);
  const half = v128.splat<T>(<T>0.5);
  const L = lanes<T>();
  const middle = n >> 1;
  let k = 1;
  for (; k + L <= middle + 1; k += L) {
    const o = bytes<T>(k);
    const m = bytes<T>(n - k - L + 1);
    const ar = v128.load(yr + o);
    const ai = v128.load(yi + o);
    const br = reversed<T>(v128.load(yr + m));
    const bi = reversed<T>(v128.load(yi + m));
    const c = v128.load(cosines + o);
    const s = v128.load(sines + o);
    const er = v128.mul<T>(half, v128.add<T>(ar, br));
    const ei = v128.mul<T>(half, v128.sub<T>(ai, bi));
    const dr = v128.mul<T>(half, v128.add<T>(ai, bi));
    const di = v128.mul<T>(half, v128.sub<T>(br, ar));
    const pr = v128.add<T>(v128.mul<T>(dr, c), v128.mul<T>(di, s));
    const pi = v128.sub<T>(v128.mul<T>(di, c), v128.mul<T>(dr, s));
    v128.store(yr + o, v128.add<T>(er, pr));
    v128.store(yi + o, v128.add<T>(ei, pi));
    v128.store(yr + m, reversed<T>(v128.sub<T>(er, pr)));
    v128.store(yi + m, reversed<T>(v128.sub<T>(pi, ei)));
  }
  for (; k <= middle; k++) {
    const o = bytes<T>(k);
    const m = bytes<T>(n - k);
    const ar = load<T>(yr + o);
    const ai = load<T>(yi + o);
    const br = load<T>(yr + m);
    const bi = load<T>(yi + m);
    const c = load<T>(cosines + o);
    const s = load<T>(sines + o);
    const er = (ar + br) * <T>0.5;
    const ei = (ai - bi) * <T>0.5;
    const dr = (ai + bi) * <T>0.5;
    const di = (br - ar) * <T>0.5;
    const pr = dr * c + di * s;
    const pi = di * c - dr * s;
    store<T>(yr + o, er + pr);
    store<T>(yi + o, ei + pi);
    store<T>(yr + m, er - pr);
    store<T>(yi + m, pi - ei);
  }
}

/** One-sided spectrum (n + 1 points) -> spectrum of the pairs, doubled (n points); not in place. */
function combine<T>(n: i32, xr: usize, xi: usize, zr: usize, zi: usize, cosines: usize, sines: usize): void {
  const first = load<T>(xr);
  const last = load<T>(xr + bytes<T>(n));
  store<T>(zr, first + last);
  store<T>(zi, first - last);
  const L = lanes<T>();
  const middle = n >> 1;
  let k = 1;
  for (; k + L <= middle + 1; k += L) {
    const o = bytes<T>(k);
    const m = bytes<T>(n - k - L + 1);
    const ar = v128.load(xr + o);
    const ai = v128.load(xi + o);
    const br = reversed<T>(v128.load(xr + m));
    const bi = reversed<T>(v128.load(xi + m));
    const c = v128.load(cosines + o);
    const s = v128.load(sines + o);
    const er = v128.add<T>(ar, br);
    const ei = v128.sub<T>(ai, bi);
    const ur = v128.sub<T>(ar, br);
    const ui = v128.add<T>(ai, bi);
    // (ur + i ui) e^{+i a} i, added to the even part
    const pr = v128.sub<T>(v128.mul<T>(ur, c), v128.mul<T>(ui, s));
    const pi = v128.add<T>(v128.mul<T>(ui, c), v128.mul<T>(ur, s));
    v128.store(zr + o, v128.sub<T>(er, pi));
    v128.store(zi + o, v128.add<T>(ei, pr));
    v128.store(zr + m, reversed<T>(v128.add<T>(er, pi)));
    v128.store(zi + m, reversed<T>(v128.sub<T>(pr, ei)));
  }
  for (; k <= middle; k++) {
    const o = bytes<T>(k);
    const m = bytes<T>(n - k);
    const ar = load<T>(xr + o);
    const ai = load<T>(xi + o);
    const br = load<T>(xr + m);
    const bi = load<T>(xi + m);
    const c = load<T>(cosines + o);
    const s = load<T>(sines + o);
    const er = ar + br;
    const ei = ai - bi;
    const ur = ar - br;
    const ui = ai + bi;
    const pr = ur * c - ui * s;
    const pi = ui * c + ur * s;
    store<T>(zr + o, er - pi);
    store<T>(zi + o, ei + pr);
    store<T>(zr + m, er + pi);
    store<T>(zi + m, pr - ei);
  }
}

/** One-sided spectrum (floor(N / 2) + 1 points) of N real samples. x and y do not overlap. */
export function realForward<T>(plan: usize, x: usize, yr: usize, yi: usize, scratch: usize): void {
  const N = load<i32>(plan);
  const inner = load<usize>(plan, 4);
  const n = innerLength(N);
  const row = rowBytes<T>(n);
  const a = scratch;
  const b = a + row;
  const rest = scratch + 4 * row;
  if (N & 1) {
    memory.copy(a, x, bytes<T>(n));
    memory.fill(b, 0, bytes<T>(n));
    const c = b + row;
    transform<T>(inner, a, b, c, c + row, rest);
    memory.copy(yr, c, bytes<T>((N >> 1) + 1));
    memory.copy(yi, c + row, bytes<T>((N >> 1) + 1));
    return;
  }
  if (!transformPairs<T>(inner, x, yr, yi, rest)) {
    split<T>(n, x, a, b);
    transform<T>(inner, a, b, yr, yi, rest);
  }
  separate<T>(n, yr, yi, load<usize>(plan, 8), load<usize>(plan, 12));
}

/** N real samples, N times those of the one-sided spectrum x; imaginary parts at 0 and N / 2 are ignored. */
export function realBackward<T>(plan: usize, xr: usize, xi: usize, y: usize, scratch: usize): void {
  const N = load<i32>(plan);
  const inner = load<usize>(plan, 4);
  const n = innerLength(N);
  const row = rowBytes<T>(n);
  const a = scratch;
  const b = a + row;
  const c = b + row;
  const d = c + row;
  const rest = scratch + 4 * row;
  if (N & 1) {
    store<T>(a, load<T>(xr));
    store<T>(b, <T>0);
    for (let k = 1; k <= N >> 1; k++) {
      const re = load<T>(xr + bytes<T>(k));
      const im = load<T>(xi + bytes<T>(k));
      store<T>(a + bytes<T>(k), re);
      store<T>(b + bytes<T>(k), im);
      store<T>(a + bytes<T>(N - k), re);
      store<T>(b + bytes<T>(N - k), -im);
    }
    transform<T>(inner, b, a, d, c, rest);
    memory.copy(y, c, bytes<T>(n));
    return;
  }
  combine<T>(n, xr, xi, a, b, load<usize>(plan, 8), load<usize>(plan, 12));
  transform<T>(inner, b, a, d, c, rest);
  join<T>(n, c, d, y);
}
