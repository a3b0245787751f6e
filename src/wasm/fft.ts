// Complex transforms of any length. A plan is a header of i32 words followed by its tables, laid out by one walk that
// either only measures (dry) or also fills. Inverse transform (unscaled): the same call with re and im exchanged.
//
//   word 0 length, 1 kind, 2 number of passes, 3 padded length, 4 chirp, 5 chirp spectrum, 6 inner plan;
//   from byte 32: per pass its radix and the address of its twiddles.
import { first4, first4Real } from './fft-first';
import { last8, pass8 } from './fft-radix8';
import { pass2, pass3, pass4, pass5, passScalar } from './fft-small-radix';
import { bytes, lanes } from './lanes';
import { turn, turnIm, turnRe } from './twiddle';
import { multiply } from './complex';

const HEADER: usize = 320;
const KIND_ONE = 0; // length 1
const KIND_VECTOR = 1; // 2^a 3^b 5^c with enough factors of two for vectors
const KIND_SCALAR = 2; // 2^a 3^b 5^c otherwise
const KIND_CHIRP = 3; // any other length, as a convolution (Bluestein, IEEE Trans. AU-18, 451, 1970)

// @ts-ignore: decorator
@inline
function aligned(at: usize): usize {
  return (at + 63) & ~63;
}

/** Bytes of one scratch row, shifted by whole cache lines so that rows do not start at the same offset in a page. */
// @ts-ignore: decorator
@inline
function rowBytes<T>(n: i32): usize {
  return aligned(bytes<T>(n)) + 192;
}

function smooth(n: i32): bool {
  while (n % 2 == 0) n /= 2;
  while (n % 3 == 0) n /= 3;
  while (n % 5 == 0) n /= 5;
  return n == 1;
}

function kindOf<T>(n: i32): i32 {
  if (n == 1) return KIND_ONE;
  if (!smooth(n)) return KIND_CHIRP;
  return n % (4 * lanes<T>()) == 0 ? KIND_VECTOR : KIND_SCALAR;
}

/** Shortest fast length that holds a circular convolution of 2 n - 1 points. */
function paddedLength(n: i32): i32 {
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

/** Radix of the next pass on n remaining points. Odd factors first, so that the last pass is 8 or 4 where it can be. */
function nextRadix(n: i32): i32 {
  if (n % 5 == 0) return 5;
  if (n % 3 == 0) return 3;
  const l = ctz(n);
  if (l == 1) return 2;
  return l % 3 == 0 || l == 5 || (l % 3 == 2 && l > 5) ? 8 : 4;
}

function nextScalarRadix(n: i32): i32 {
  if (n % 5 == 0) return 5;
  if (n % 3 == 0) return 3;
  return n % 4 == 0 ? 4 : 2;
}

function putTurn<T>(at: usize, k: i64, n: i64): void {
  turn(k, n);
  store<T>(at, <T>turnRe);
  store<T>(at + sizeof<T>(), <T>turnIm);
}

function fillFirst4<T>(at: usize, n: i32): void {
  const L = lanes<T>();
  for (let p = 0; p < n >> 2; p += L) {
    for (let k = 1; k < 4; k++) {
      for (let i = 0; i < L; i++) {
        turn(<i64>k * (p + i), n);
        store<T>(at + bytes<T>(i), <T>turnRe);
        store<T>(at + 16 + bytes<T>(i), <T>turnIm);
      }
      at += 32;
    }
  }
}

function fillPass<T>(at: usize, n: i32, radix: i32): void {
  for (let p = 0; p < n / radix; p++) {
    for (let k = 1; k < radix; k++) {
      putTurn<T>(at, <i64>k * p, n);
      at += 2 * sizeof<T>();
    }
  }
}

function fillChirp<T>(chirp: usize, n: i32): void {
  const period = 2 * <i64>n;
  for (let k = 0; k < n; k++) {
    turn((<i64>k * <i64>k) % period, period);
    store<T>(chirp + bytes<T>(k), <T>turnRe);
    store<T>(chirp + rowBytes<T>(n) + bytes<T>(k), <T>turnIm);
  }
}

/** Spectrum of the conjugate chirp, wrapped and divided by m, into `out`; `work` holds a wrapped copy and scratch. */
function fillChirpSpectrum<T>(chirp: usize, n: i32, m: i32, inner: usize, out: usize, work: usize): void {
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

/** Lays out the plan of length n at `plan` and returns where it ends; writes nothing when dry. */
function layOut<T>(plan: usize, n: i32, scratch: usize, dry: bool): usize {
  const kind = kindOf<T>(n);
  let at = plan + HEADER;
  let count = 0;
  if (!dry) {
    memory.fill(plan, 0, HEADER);
    store<i32>(plan, n);
    store<i32>(plan, kind, 4);
  }
  if (kind == KIND_CHIRP) {
    const m = paddedLength(n);
    const chirp = aligned(at);
    const spectrum = aligned(chirp + 2 * rowBytes<T>(n));
    const inner = aligned(spectrum + 2 * rowBytes<T>(m));
    at = layOut<T>(inner, m, scratch, dry);
    if (!dry) {
      store<i32>(plan, m, 12);
      store<usize>(plan, chirp, 16);
      store<usize>(plan, spectrum, 20);
      store<usize>(plan, inner, 24);
      fillChirp<T>(chirp, n);
      fillChirpSpectrum<T>(chirp, n, m, inner, spectrum, scratch);
    }
    return at;
  }
  let rest = n;
  while (rest > 1) {
    const first = kind == KIND_VECTOR && count == 0;
    const radix = first ? 4 : kind == KIND_VECTOR ? nextRadix(rest) : nextScalarRadix(rest);
    at = aligned(at);
    if (!dry) {
      store<i32>(plan + 32 + (<usize>count << 3), radix);
      store<usize>(plan + 32 + (<usize>count << 3), at, 4);
    }
    if (kind == KIND_SCALAR) {
      if (!dry) for (let k = 0; k < radix; k++) putTurn<T>(at + bytes<T>(2 * k), k, radix);
      at += bytes<T>(2 * radix);
    }
    if (!dry) {
      if (first) fillFirst4<T>(at, n);
      else fillPass<T>(at, rest, radix);
    }
    at += bytes<T>(2 * (rest / radix)) * <usize>(radix - 1);
    rest /= radix;
    count++;
  }
  if (!dry) store<i32>(plan, count, 8);
  return at;
}

/** Bytes a plan of length n takes. */
export function planBytes<T>(n: i32): usize {
  return layOut<T>(0, n, 0, true) + 64;
}

/** Bytes of scratch a transform of length n needs (building the plan needs no more). */
export function scratchBytes<T>(n: i32): usize {
  const kind = kindOf<T>(n);
  if (kind == KIND_ONE) return 64;
  if (kind != KIND_CHIRP) return 2 * rowBytes<T>(n);
  const m = paddedLength(n);
  return 4 * rowBytes<T>(m) + scratchBytes<T>(m);
}

export function planInit<T>(plan: usize, n: i32, scratch: usize): void {
  layOut<T>(plan, n, scratch, false);
}

function runPass<T>(
  vector: bool, radix: i32, n: i32, s: i32, xr: usize, xi: usize, yr: usize, yi: usize, tw: usize,
): void {
  if (!vector) passScalar<T>(radix, n, s, xr, xi, yr, yi, tw + bytes<T>(2 * radix), tw);
  else if (n == 8) last8<T>(s, xr, xi, yr, yi);
  else if (radix == 8) pass8<T>(n, s, xr, xi, yr, yi, tw);
  else if (radix == 4) pass4<T>(n, s, xr, xi, yr, yi, tw);
  else if (radix == 2) pass2<T>(n, s, xr, xi, yr, yi, tw);
  else if (radix == 3) pass3<T>(n, s, xr, xi, yr, yi, tw);
  else pass5<T>(n, s, xr, xi, yr, yi, tw);
}

/** All passes; `real`: the input is 2 n real samples at xr. The input may be the output, except when real. */
function passes<T>(
  plan: usize, xr: usize, xi: usize, yr: usize, yi: usize, scratch: usize, real: bool,
): void {
  let n = load<i32>(plan);
  const vector = load<i32>(plan, 4) == KIND_VECTOR;
  const count = load<i32>(plan, 8);
  const wr = scratch;
  const wi = scratch + rowBytes<T>(n);
  // Targets alternate between y and the scratch, ending in y. The last pass may work in place, so the one before it
  // writes to y as well; working in place from the start shifts the alternation so that the first target is scratch.
  const shared = xr == yr || xi == yi || xr == yi || xi == yr;
  let toScratch = shared || (count & 1) == 1;
  let s = 1;
  let fr = xr;
  let fi = xi;
  for (let i = 0; i < count; i++) {
    const radix = load<i32>(plan + 32 + (<usize>i << 3));
    const tw = load<usize>(plan + 32 + (<usize>i << 3), 4);
    const last = i == count - 1;
    const tr = last ? yr : toScratch ? wr : yr;
    const ti = last ? yi : toScratch ? wi : yi;
    if (i == 0 && vector) {
      if (real) first4Real<T>(n, xr, tr, ti, tw);
      else first4<T>(n, xr, xi, tr, ti, tw);
    } else runPass<T>(vector, radix, n, s, fr, fi, tr, ti, tw);
    n /= radix;
    s *= radix;
    fr = tr;
    fi = ti;
    toScratch = !toScratch;
  }
}

function chirpTransform<T>(plan: usize, xr: usize, xi: usize, yr: usize, yi: usize, scratch: usize): void {
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

/** y = sum_j x[j] exp(-2 pi i j k / n), unscaled; x may be y. */
export function transform<T>(plan: usize, xr: usize, xi: usize, yr: usize, yi: usize, scratch: usize): void {
  const kind = load<i32>(plan, 4);
  if (kind == KIND_ONE) {
    const re = load<T>(xr);
    const im = load<T>(xi);
    store<T>(yr, re);
    store<T>(yi, im);
  } else if (kind == KIND_CHIRP) chirpTransform<T>(plan, xr, xi, yr, yi, scratch);
  else passes<T>(plan, xr, xi, yr, yi, scratch, false);
}

/** Transform of 2 n real samples read as n complex numbers; false where the plan cannot read them in place. */
export function transformPairs<T>(plan: usize, x: usize, yr: usize, yi: usize, scratch: usize): bool {
  if (load<i32>(plan, 4) != KIND_VECTOR) return false;
  passes<T>(plan, x, 0, yr, yi, scratch, true);
  return true;
}
