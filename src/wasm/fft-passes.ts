// Transforms of length 2^a 3^b 5^c as a row of Stockham passes.
import { first4, first4Real } from './fft-first';
import { aligned, HEADER, KIND_VECTOR, rowBytes } from './fft-plan';
import { last8, pass8 } from './fft-radix8';
import { pass2, pass3, pass4, pass5, passScalar } from './fft-small-radix';
import { bytes, lanes } from './lanes';
import { fillPass, putTurn, turn, turnIm, turnRe } from './twiddle';

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

function fillFirst4<T>(at: usize, n: i32): void {
  const L = lanes<T>();
  for (let p = 0; p < n >> 2; p += L) {
    for (let k = 1; k < 4; k++) {
      for (let i = 0; i < L; i++) {
        turn(<u64>k * <u64>(p + i), n);
        store<T>(at + bytes<T>(i), <T>turnRe);
        store<T>(at + 16 + bytes<T>(i), <T>turnIm);
      }
      at += 32;
    }
  }
}

/** Lays out the passes after the header and returns where their tables end; writes nothing when dry. */
export function layOutPasses<T>(plan: usize, n: i32, vector: bool, dry: bool): usize {
  let at = plan + HEADER;
  let count = 0;
  let rest = n;
  while (rest > 1) {
    const first = vector && count == 0;
    const radix = first ? 4 : vector ? nextRadix(rest) : nextScalarRadix(rest);
    at = aligned(at);
    if (!dry) {
      store<i32>(plan + 32 + (<usize>count << 3), radix);
      store<usize>(plan + 32 + (<usize>count << 3), at, 4);
    }
    if (!vector) {
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

export function passesScratch<T>(n: i32): usize {
  return 2 * rowBytes<T>(n) + 4096;
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
export function runPasses<T>(
  plan: usize, xr: usize, xi: usize, yr: usize, yi: usize, scratch: usize, real: bool,
): void {
  let n = load<i32>(plan);
  const vector = load<i32>(plan, 4) == KIND_VECTOR;
  const count = load<i32>(plan, 8);
  // Scratch a quarter of a page from the output, so that no two streams share cache sets.
  const wr = scratch + ((yr + 1024 - scratch) & 4032);
  const wi = wr + rowBytes<T>(n);
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
    const tr = !last && toScratch ? wr : yr;
    const ti = !last && toScratch ? wi : yi;
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
