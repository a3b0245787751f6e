// Element-wise work on split complex arrays.
import { bytes, laneMax, laneSum, mulIm, mulRe } from './lanes';

/** o = a b; o may be a or b. */
export function multiply<T>(n: i32, ar: usize, ai: usize, br: usize, bi: usize, or: usize, oi: usize): void {
  const all = bytes<T>(n);
  const whole = all & ~15;
  let q: usize = 0;
  for (; q < whole; q += 16) {
    const a = v128.load(ar + q);
    const b = v128.load(ai + q);
    const c = v128.load(br + q);
    const d = v128.load(bi + q);
    v128.store(or + q, mulRe<T>(a, b, c, d));
    v128.store(oi + q, mulIm<T>(a, b, c, d));
  }
  for (; q < all; q += sizeof<T>()) {
    const a = load<T>(ar + q);
    const b = load<T>(ai + q);
    const c = load<T>(br + q);
    const d = load<T>(bi + q);
    store<T>(or + q, a * c - b * d);
    store<T>(oi + q, a * d + b * c);
  }
}

/** o = a conj(b); o may be a or b. */
export function multiplyConj<T>(n: i32, ar: usize, ai: usize, br: usize, bi: usize, or: usize, oi: usize): void {
  const all = bytes<T>(n);
  const whole = all & ~15;
  let q: usize = 0;
  for (; q < whole; q += 16) {
    const a = v128.load(ar + q);
    const b = v128.load(ai + q);
    const c = v128.load(br + q);
    const d = v128.load(bi + q);
    v128.store(or + q, v128.add<T>(v128.mul<T>(a, c), v128.mul<T>(b, d)));
    v128.store(oi + q, v128.sub<T>(v128.mul<T>(b, c), v128.mul<T>(a, d)));
  }
  for (; q < all; q += sizeof<T>()) {
    const a = load<T>(ar + q);
    const b = load<T>(ai + q);
    const c = load<T>(br + q);
    const d = load<T>(bi + q);
    store<T>(or + q, a * c + b * d);
    store<T>(oi + q, b * c - a * d);
  }
}

/** o = factor w x with real weights w (w = 0: no weights), zero from n to m. */
export function windowed<T>(
  n: i32, m: i32, xr: usize, xi: usize, w: usize, factor: f64, or: usize, oi: usize,
): void {
  const all = bytes<T>(n);
  const whole = all & ~15;
  const f = <T>factor;
  const fv = v128.splat<T>(f);
  let q: usize = 0;
  for (; q < whole; q += 16) {
    const c = w ? v128.mul<T>(fv, v128.load(w + q)) : fv;
    v128.store(or + q, v128.mul<T>(v128.load(xr + q), c));
    v128.store(oi + q, v128.mul<T>(v128.load(xi + q), c));
  }
  for (; q < all; q += sizeof<T>()) {
    const c = w ? f * load<T>(w + q) : f;
    store<T>(or + q, load<T>(xr + q) * c);
    store<T>(oi + q, load<T>(xi + q) * c);
  }
  if (m > n) {
    memory.fill(or + all, 0, bytes<T>(m - n));
    memory.fill(oi + all, 0, bytes<T>(m - n));
  }
}

/** Squared magnitudes into o (0: not stored); returns their sum, leaves their maximum in `largest`. */
export let largest: f64 = 0;
export function energy<T>(n: i32, r: usize, i: usize, o: usize): f64 {
  const all = bytes<T>(n);
  const whole = all & ~15;
  let sum = v128.splat<T>(<T>0);
  let top = sum;
  let total: f64 = 0;
  let q: usize = 0;
  // Blocks keep the float32 sums short: 4096 bytes each, added up in double.
  while (q < whole) {
    const stop = min(q + 4096, whole);
    for (; q < stop; q += 16) {
      const a = v128.load(r + q);
      const b = v128.load(i + q);
      const v = v128.add<T>(v128.mul<T>(a, a), v128.mul<T>(b, b));
      if (o) v128.store(o + q, v);
      sum = v128.add<T>(sum, v);
      top = v128.pmax<T>(top, v);
    }
    total += laneSum<T>(sum);
    sum = v128.splat<T>(<T>0);
  }
  let best = laneMax<T>(top);
  for (; q < all; q += sizeof<T>()) {
    const a = load<T>(r + q);
    const b = load<T>(i + q);
    const v = a * a + b * b;
    if (o) store<T>(o + q, v);
    total += <f64>v;
    if (<f64>v > best) best = <f64>v;
  }
  largest = best;
  return total;
}

/** Index of the first largest squared magnitude (left in `largest`); NaN never wins. -1 if all are NaN or n = 0. */
export function peak<T>(n: i32, r: usize, i: usize): i32 {
  const all = bytes<T>(n);
  let best: T = <T>-1;
  let at: usize = 0;
  let q: usize = 0;
  for (; q + 4096 <= all; q += 4096) {
    let m0 = v128.splat<T>(<T>-1);
    let m1 = m0;
    for (let p = q; p < q + 4096; p += 32) {
      const a = v128.load(r + p);
      const b = v128.load(i + p);
      const c = v128.load(r + p, 16);
      const d = v128.load(i + p, 16);
      m0 = v128.pmax<T>(m0, v128.add<T>(v128.mul<T>(a, a), v128.mul<T>(b, b)));
      m1 = v128.pmax<T>(m1, v128.add<T>(v128.mul<T>(c, c), v128.mul<T>(d, d)));
    }
    const m = <T>laneMax<T>(v128.pmax<T>(m0, m1));
    if (m > best) {
      best = m;
      at = q;
    }
  }
  for (; q < all; q += sizeof<T>()) {
    const a = load<T>(r + q);
    const b = load<T>(i + q);
    const v = a * a + b * b;
    if (v > best) {
      best = v;
      at = q;
    }
  }
  largest = <f64>best;
  if (best < <T>0) return -1;
  for (q = at; q < all; q += sizeof<T>()) {
    const a = load<T>(r + q);
    const b = load<T>(i + q);
    if (a * a + b * b >= best) return <i32>(q / sizeof<T>());
  }
  return -1;
}
