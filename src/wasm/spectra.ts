// Per-segment work of spectral estimates, in double.

/** o = (x - mean) w, or x w when `centre` is 0. Returns the sum of x, which is not finite if any x is not. */
export function taper(n: i32, x: usize, w: usize, centre: i32, o: usize): f64 {
  const all = <usize>n << 3;
  const blocks = all & ~63;
  const whole = all & ~15;
  let s0 = f64x2.splat(0);
  let s1 = s0;
  let s2 = s0;
  let s3 = s0;
  let q: usize = 0;
  for (; q < blocks; q += 64) {
    s0 = f64x2.add(s0, v128.load(x + q));
    s1 = f64x2.add(s1, v128.load(x + q, 16));
    s2 = f64x2.add(s2, v128.load(x + q, 32));
    s3 = f64x2.add(s3, v128.load(x + q, 48));
  }
  s0 = f64x2.add(f64x2.add(s0, s1), f64x2.add(s2, s3));
  let sum = f64x2.extract_lane(s0, 0) + f64x2.extract_lane(s0, 1);
  for (; q < all; q += 8) sum += load<f64>(x + q);
  const mean = centre ? sum / <f64>n : 0;
  const m = f64x2.splat(mean);
  for (q = 0; q < whole; q += 16) v128.store(o + q, f64x2.mul(f64x2.sub(v128.load(x + q), m), v128.load(w + q)));
  for (; q < all; q += 8) store<f64>(o + q, (load<f64>(x + q) - mean) * load<f64>(w + q));
  return sum;
}

// @ts-ignore: decorator
@inline
function squared(r: usize, i: usize, q: usize): v128 {
  const a = v128.load(r + q);
  const b = v128.load(i + q);
  return f64x2.add(f64x2.mul(a, a), f64x2.mul(b, b));
}

// @ts-ignore: decorator
@inline
function squared1(r: usize, i: usize, q: usize): f64 {
  const a = load<f64>(r + q);
  const b = load<f64>(i + q);
  return a * a + b * b;
}

/** o = |x|^2. */
export function power(n: i32, r: usize, i: usize, o: usize): void {
  const all = <usize>n << 3;
  const whole = all & ~15;
  let q: usize = 0;
  for (; q < whole; q += 16) v128.store(o + q, squared(r, i, q));
  for (; q < all; q += 8) store<f64>(o + q, squared1(r, i, q));
}

/** o += |x|^2. */
export function addPower(n: i32, r: usize, i: usize, o: usize): void {
  const all = <usize>n << 3;
  const whole = all & ~15;
  let q: usize = 0;
  for (; q < whole; q += 16) v128.store(o + q, f64x2.add(v128.load(o + q), squared(r, i, q)));
  for (; q < all; q += 8) store<f64>(o + q, load<f64>(o + q) + squared1(r, i, q));
}

/** (cr, ci) += a conj(b). */
export function addCross(n: i32, ar: usize, ai: usize, br: usize, bi: usize, cr: usize, ci: usize): void {
  const all = <usize>n << 3;
  const whole = all & ~15;
  let q: usize = 0;
  for (; q < whole; q += 16) {
    const a = v128.load(ar + q);
    const b = v128.load(ai + q);
    const c = v128.load(br + q);
    const d = v128.load(bi + q);
    v128.store(cr + q, f64x2.add(v128.load(cr + q), f64x2.add(f64x2.mul(a, c), f64x2.mul(b, d))));
    v128.store(ci + q, f64x2.add(v128.load(ci + q), f64x2.sub(f64x2.mul(b, c), f64x2.mul(a, d))));
  }
  for (; q < all; q += 8) {
    const a = load<f64>(ar + q);
    const b = load<f64>(ai + q);
    const c = load<f64>(br + q);
    const d = load<f64>(bi + q);
    store<f64>(cr + q, load<f64>(cr + q) + (a * c + b * d));
    store<f64>(ci + q, load<f64>(ci + q) + (b * c - a * d));
  }
}

/** Running mean and sum of squared deviations of |x| (Welford, Technometrics 4, 419, 1962); count: this one included. */
export function addMagnitude(n: i32, count: i32, r: usize, i: usize, mean: usize, spread: usize): void {
  const all = <usize>n << 3;
  const whole = all & ~15;
  const share = 1 / <f64>count;
  const shares = f64x2.splat(share);
  let q: usize = 0;
  for (; q < whole; q += 16) {
    const v = f64x2.sqrt(squared(r, i, q));
    const before = v128.load(mean + q);
    const d = f64x2.sub(v, before);
    const after = f64x2.add(before, f64x2.mul(d, shares));
    v128.store(mean + q, after);
    v128.store(spread + q, f64x2.add(v128.load(spread + q), f64x2.mul(d, f64x2.sub(v, after))));
  }
  for (; q < all; q += 8) {
    const v = Math.sqrt(squared1(r, i, q));
    const before = load<f64>(mean + q);
    const d = v - before;
    const after = before + d * share;
    store<f64>(mean + q, after);
    store<f64>(spread + q, load<f64>(spread + q) + d * (v - after));
  }
}
