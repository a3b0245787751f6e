// Radix-8 Stockham passes on vectors; see fft-small-radix.ts for the recurrence and the twiddle table.
import { mulIm, mulRe } from './lanes';

const ROOT_HALF: f64 = 0.70710678118654752440;

// @ts-ignore: decorator
@inline
function put<T>(y: usize, z: usize, r: v128, i: v128, tw: usize, turned: bool): void {
  if (turned) {
    const wr = v128.load_splat<T>(tw);
    const wi = v128.load_splat<T>(tw, sizeof<T>());
    v128.store(y, mulRe<T>(r, i, wr, wi));
    v128.store(z, mulIm<T>(r, i, wr, wi));
  } else {
    v128.store(y, r);
    v128.store(z, i);
  }
}

/** One radix-8 butterfly on vectors: inputs `xm` bytes apart, outputs `ym` bytes apart, twiddled unless last. */
// @ts-ignore: decorator
@inline
export function butterfly8<T>(
  a: usize, b: usize, xm: usize, y: usize, z: usize, ym: usize, tw: usize, turned: bool, h: v128,
): void {
  const e: usize = turned ? 2 * sizeof<T>() : 0;
  const x0r = v128.load(a);
  const x0i = v128.load(b);
  const x4r = v128.load(a + 4 * xm);
  const x4i = v128.load(b + 4 * xm);
  const s04r = v128.add<T>(x0r, x4r);
  const s04i = v128.add<T>(x0i, x4i);
  const d04r = v128.sub<T>(x0r, x4r);
  const d04i = v128.sub<T>(x0i, x4i);
  const x2r = v128.load(a + 2 * xm);
  const x2i = v128.load(b + 2 * xm);
  const x6r = v128.load(a + 6 * xm);
  const x6i = v128.load(b + 6 * xm);
  const s26r = v128.add<T>(x2r, x6r);
  const s26i = v128.add<T>(x2i, x6i);
  const d26r = v128.sub<T>(x2r, x6r);
  const d26i = v128.sub<T>(x2i, x6i);
  const x1r = v128.load(a + xm);
  const x1i = v128.load(b + xm);
  const x5r = v128.load(a + 5 * xm);
  const x5i = v128.load(b + 5 * xm);
  const s15r = v128.add<T>(x1r, x5r);
  const s15i = v128.add<T>(x1i, x5i);
  const d15r = v128.sub<T>(x1r, x5r);
  const d15i = v128.sub<T>(x1i, x5i);
  const x3r = v128.load(a + 3 * xm);
  const x3i = v128.load(b + 3 * xm);
  const x7r = v128.load(a + 7 * xm);
  const x7i = v128.load(b + 7 * xm);
  const s37r = v128.add<T>(x3r, x7r);
  const s37i = v128.add<T>(x3i, x7i);
  const d37r = v128.sub<T>(x3r, x7r);
  const d37i = v128.sub<T>(x3i, x7i);
  // even-numbered results
  const e0r = v128.add<T>(s04r, s26r);
  const e0i = v128.add<T>(s04i, s26i);
  const e1r = v128.sub<T>(s04r, s26r);
  const e1i = v128.sub<T>(s04i, s26i);
  const f0r = v128.add<T>(s15r, s37r);
  const f0i = v128.add<T>(s15i, s37i);
  const f1r = v128.sub<T>(s15r, s37r);
  const f1i = v128.sub<T>(s15i, s37i);
  v128.store(y, v128.add<T>(e0r, f0r));
  v128.store(z, v128.add<T>(e0i, f0i));
  put<T>(y + 4 * ym, z + 4 * ym, v128.sub<T>(e0r, f0r), v128.sub<T>(e0i, f0i), tw + 3 * e, turned);
  put<T>(y + 2 * ym, z + 2 * ym, v128.add<T>(e1r, f1i), v128.sub<T>(e1i, f1r), tw + e, turned);
  put<T>(y + 6 * ym, z + 6 * ym, v128.sub<T>(e1r, f1i), v128.add<T>(e1i, f1r), tw + 5 * e, turned);
  // odd-numbered results
  const g0r = v128.add<T>(d04r, d26i);
  const g0i = v128.sub<T>(d04i, d26r);
  const g1r = v128.sub<T>(d04r, d26i);
  const g1i = v128.add<T>(d04i, d26r);
  const t1r = v128.add<T>(d15r, d15i);
  const t1i = v128.sub<T>(d15i, d15r);
  const t3r = v128.sub<T>(d37i, d37r);
  const t3i = v128.add<T>(d37i, d37r);
  const h0r = v128.mul<T>(h, v128.add<T>(t1r, t3r));
  const h0i = v128.mul<T>(h, v128.sub<T>(t1i, t3i));
  const h1r = v128.mul<T>(h, v128.sub<T>(t1r, t3r));
  const h1i = v128.mul<T>(h, v128.add<T>(t1i, t3i));
  put<T>(y + ym, z + ym, v128.add<T>(g0r, h0r), v128.add<T>(g0i, h0i), tw, turned);
  put<T>(y + 5 * ym, z + 5 * ym, v128.sub<T>(g0r, h0r), v128.sub<T>(g0i, h0i), tw + 4 * e, turned);
  put<T>(y + 3 * ym, z + 3 * ym, v128.add<T>(g1r, h1i), v128.sub<T>(g1i, h1r), tw + 2 * e, turned);
  put<T>(y + 7 * ym, z + 7 * ym, v128.sub<T>(g1r, h1i), v128.add<T>(g1i, h1r), tw + 6 * e, turned);
}

export function pass8<T>(n: i32, s: i32, xr: usize, xi: usize, yr: usize, yi: usize, tw: usize): void {
  const m = n >> 3;
  const row = <usize>s * sizeof<T>();
  const xm = <usize>m * row;
  const h = v128.splat<T>(<T>ROOT_HALF);
  for (let p = 0; p < m; p++) {
    const x = <usize>p * row;
    const y = <usize>(8 * p) * row;
    for (let q: usize = 0; q < row; q += 16) {
      butterfly8<T>(xr + x + q, xi + x + q, xm, yr + y + q, yi + y + q, row, tw, true, h);
    }
    tw += 14 * sizeof<T>();
  }
}

/** Last radix-8 pass: n = 8, no twiddles; may work in place. */
export function last8<T>(s: i32, xr: usize, xi: usize, yr: usize, yi: usize): void {
  const row = <usize>s * sizeof<T>();
  const h = v128.splat<T>(<T>ROOT_HALF);
  for (let q: usize = 0; q < row; q += 16) {
    butterfly8<T>(xr + q, xi + q, row, yr + q, yi + q, row, 0, false, h);
  }
}
