// Stockham passes of radix 2, 3, 4 and 5, on vectors and on single numbers.
//
// A pass of radix r over n points in rows of s: with m = n / r,
//   y[q + s (r p + k)] = w_n^(p k) sum_j w_r^(j k) x[q + s (p + m j)],   0 <= p < m, 0 <= q < s.
// Vector passes run over q, so s is a multiple of the lanes. A pass with m = 1 may work in place.
// Twiddle tables: per p, for k = 1 .. r-1, one number (re, im).
import { mulIm, mulRe } from './lanes';

const COS_72: f64 = 0.30901699437494742410;
const COS_144: f64 = -0.80901699437494742410;
const SIN_72: f64 = 0.95105651629515357212;
const SIN_144: f64 = 0.58778525229247312917;
const SIN_60: f64 = 0.86602540378443864676;

// @ts-ignore: decorator
@inline
function putTurned<T>(y: usize, z: usize, r: v128, i: v128, tw: usize): void {
  const wr = v128.load_splat<T>(tw);
  const wi = v128.load_splat<T>(tw, sizeof<T>());
  v128.store(y, mulRe<T>(r, i, wr, wi));
  v128.store(z, mulIm<T>(r, i, wr, wi));
}

export function pass2<T>(n: i32, s: i32, xr: usize, xi: usize, yr: usize, yi: usize, tw: usize): void {
  const m = n >> 1;
  const row = <usize>s * sizeof<T>();
  const xm = <usize>m * row;
  for (let p = 0; p < m; p++) {
    const a = xr + <usize>p * row;
    const b = xi + <usize>p * row;
    const y = yr + <usize>(2 * p) * row;
    const z = yi + <usize>(2 * p) * row;
    for (let q: usize = 0; q < row; q += 16) {
      const x0r = v128.load(a + q);
      const x0i = v128.load(b + q);
      const x1r = v128.load(a + xm + q);
      const x1i = v128.load(b + xm + q);
      v128.store(y + q, v128.add<T>(x0r, x1r));
      v128.store(z + q, v128.add<T>(x0i, x1i));
      putTurned<T>(y + row + q, z + row + q, v128.sub<T>(x0r, x1r), v128.sub<T>(x0i, x1i), tw);
    }
    tw += 2 * sizeof<T>();
  }
}

export function pass3<T>(n: i32, s: i32, xr: usize, xi: usize, yr: usize, yi: usize, tw: usize): void {
  const m = n / 3;
  const row = <usize>s * sizeof<T>();
  const xm = <usize>m * row;
  const half = v128.splat<T>(<T>0.5);
  const sine = v128.splat<T>(<T>SIN_60);
  for (let p = 0; p < m; p++) {
    const a = xr + <usize>p * row;
    const b = xi + <usize>p * row;
    const y = yr + <usize>(3 * p) * row;
    const z = yi + <usize>(3 * p) * row;
    for (let q: usize = 0; q < row; q += 16) {
      const x0r = v128.load(a + q);
      const x0i = v128.load(b + q);
      const x1r = v128.load(a + xm + q);
      const x1i = v128.load(b + xm + q);
      const x2r = v128.load(a + 2 * xm + q);
      const x2i = v128.load(b + 2 * xm + q);
      const sr = v128.add<T>(x1r, x2r);
      const si = v128.add<T>(x1i, x2i);
      const dr = v128.mul<T>(sine, v128.sub<T>(x1r, x2r));
      const di = v128.mul<T>(sine, v128.sub<T>(x1i, x2i));
      const cr = v128.sub<T>(x0r, v128.mul<T>(half, sr));
      const ci = v128.sub<T>(x0i, v128.mul<T>(half, si));
      v128.store(y + q, v128.add<T>(x0r, sr));
      v128.store(z + q, v128.add<T>(x0i, si));
      const o = row + q;
      putTurned<T>(y + o, z + o, v128.add<T>(cr, di), v128.sub<T>(ci, dr), tw);
      putTurned<T>(y + row + o, z + row + o, v128.sub<T>(cr, di), v128.add<T>(ci, dr), tw + 2 * sizeof<T>());
    }
    tw += 4 * sizeof<T>();
  }
}

export function pass4<T>(n: i32, s: i32, xr: usize, xi: usize, yr: usize, yi: usize, tw: usize): void {
  const m = n >> 2;
  const row = <usize>s * sizeof<T>();
  const xm = <usize>m * row;
  for (let p = 0; p < m; p++) {
    const a = xr + <usize>p * row;
    const b = xi + <usize>p * row;
    const y = yr + <usize>(4 * p) * row;
    const z = yi + <usize>(4 * p) * row;
    for (let q: usize = 0; q < row; q += 16) {
      const x0r = v128.load(a + q);
      const x0i = v128.load(b + q);
      const x1r = v128.load(a + xm + q);
      const x1i = v128.load(b + xm + q);
      const x2r = v128.load(a + 2 * xm + q);
      const x2i = v128.load(b + 2 * xm + q);
      const x3r = v128.load(a + 3 * xm + q);
      const x3i = v128.load(b + 3 * xm + q);
      const s02r = v128.add<T>(x0r, x2r);
      const s02i = v128.add<T>(x0i, x2i);
      const d02r = v128.sub<T>(x0r, x2r);
      const d02i = v128.sub<T>(x0i, x2i);
      const s13r = v128.add<T>(x1r, x3r);
      const s13i = v128.add<T>(x1i, x3i);
      const d13r = v128.sub<T>(x1r, x3r);
      const d13i = v128.sub<T>(x1i, x3i);
      v128.store(y + q, v128.add<T>(s02r, s13r));
      v128.store(z + q, v128.add<T>(s02i, s13i));
      let o = row + q;
      putTurned<T>(y + o, z + o, v128.add<T>(d02r, d13i), v128.sub<T>(d02i, d13r), tw);
      o += row;
      putTurned<T>(y + o, z + o, v128.sub<T>(s02r, s13r), v128.sub<T>(s02i, s13i), tw + 2 * sizeof<T>());
      o += row;
      putTurned<T>(y + o, z + o, v128.sub<T>(d02r, d13i), v128.add<T>(d02i, d13r), tw + 4 * sizeof<T>());
    }
    tw += 6 * sizeof<T>();
  }
}

export function pass5<T>(n: i32, s: i32, xr: usize, xi: usize, yr: usize, yi: usize, tw: usize): void {
  const m = n / 5;
  const row = <usize>s * sizeof<T>();
  const xm = <usize>m * row;
  const c1 = v128.splat<T>(<T>COS_72);
  const c2 = v128.splat<T>(<T>COS_144);
  const s1 = v128.splat<T>(<T>SIN_72);
  const s2 = v128.splat<T>(<T>SIN_144);
  for (let p = 0; p < m; p++) {
    const a = xr + <usize>p * row;
    const b = xi + <usize>p * row;
    const y = yr + <usize>(5 * p) * row;
    const z = yi + <usize>(5 * p) * row;
    for (let q: usize = 0; q < row; q += 16) {
      const x0r = v128.load(a + q);
      const x0i = v128.load(b + q);
      const x1r = v128.load(a + xm + q);
      const x1i = v128.load(b + xm + q);
      const x2r = v128.load(a + 2 * xm + q);
      const x2i = v128.load(b + 2 * xm + q);
      const x3r = v128.load(a + 3 * xm + q);
      const x3i = v128.load(b + 3 * xm + q);
      const x4r = v128.load(a + 4 * xm + q);
      const x4i = v128.load(b + 4 * xm + q);
      const ar = v128.add<T>(x1r, x4r);
      const ai = v128.add<T>(x1i, x4i);
      const br = v128.add<T>(x2r, x3r);
      const bi = v128.add<T>(x2i, x3i);
      const dr = v128.sub<T>(x1r, x4r);
      const di = v128.sub<T>(x1i, x4i);
      const er = v128.sub<T>(x2r, x3r);
      const ei = v128.sub<T>(x2i, x3i);
      v128.store(y + q, v128.add<T>(x0r, v128.add<T>(ar, br)));
      v128.store(z + q, v128.add<T>(x0i, v128.add<T>(ai, bi)));
      const f1r = v128.add<T>(x0r, v128.add<T>(v128.mul<T>(c1, ar), v128.mul<T>(c2, br)));
      const f1i = v128.add<T>(x0i, v128.add<T>(v128.mul<T>(c1, ai), v128.mul<T>(c2, bi)));
      const f2r = v128.add<T>(x0r, v128.add<T>(v128.mul<T>(c2, ar), v128.mul<T>(c1, br)));
      const f2i = v128.add<T>(x0i, v128.add<T>(v128.mul<T>(c2, ai), v128.mul<T>(c1, bi)));
      const g1r = v128.add<T>(v128.mul<T>(s1, dr), v128.mul<T>(s2, er));
      const g1i = v128.add<T>(v128.mul<T>(s1, di), v128.mul<T>(s2, ei));
      const g2r = v128.sub<T>(v128.mul<T>(s2, dr), v128.mul<T>(s1, er));
      const g2i = v128.sub<T>(v128.mul<T>(s2, di), v128.mul<T>(s1, ei));
      let o = row + q;
      putTurned<T>(y + o, z + o, v128.add<T>(f1r, g1i), v128.sub<T>(f1i, g1r), tw);
      o += row;
      putTurned<T>(y + o, z + o, v128.add<T>(f2r, g2i), v128.sub<T>(f2i, g2r), tw + 2 * sizeof<T>());
      o += row;
      putTurned<T>(y + o, z + o, v128.sub<T>(f2r, g2i), v128.add<T>(f2i, g2r), tw + 4 * sizeof<T>());
      o += row;
      putTurned<T>(y + o, z + o, v128.sub<T>(f1r, g1i), v128.add<T>(f1i, g1r), tw + 6 * sizeof<T>());
    }
    tw += 8 * sizeof<T>();
  }
}

// Room for the r inputs of one butterfly on single numbers.
const IN_RE = memory.data(5 * 8);
const IN_IM = memory.data(5 * 8);

/**
 * One pass of radix r <= 5 on single numbers, any s. `roots`: r numbers exp(-2 pi i k / r) as (re, im).
 * For lengths with too few factors of two for vectors; not tuned.
 */
export function passScalar<T>(
  r: i32, n: i32, s: i32, xr: usize, xi: usize, yr: usize, yi: usize, tw: usize, roots: usize,
): void {
  const m = n / r;
  const e = sizeof<T>();
  const step = <usize>m * <usize>s * e;
  for (let p = 0; p < m; p++) {
    for (let q = 0; q < s; q++) {
      const at = (<usize>p * <usize>s + <usize>q) * e;
      for (let j: usize = 0; j < <usize>r; j++) {
        store<T>(IN_RE + j * e, load<T>(xr + at + j * step));
        store<T>(IN_IM + j * e, load<T>(xi + at + j * step));
      }
      for (let k = 0; k < r; k++) {
        let re = load<T>(IN_RE);
        let im = load<T>(IN_IM);
        let turnIndex = 0;
        for (let j: usize = 1; j < <usize>r; j++) {
          turnIndex += k;
          if (turnIndex >= r) turnIndex -= r;
          const wr = load<T>(roots + <usize>(2 * turnIndex) * e);
          const wi = load<T>(roots + <usize>(2 * turnIndex + 1) * e);
          const a = load<T>(IN_RE + j * e);
          const b = load<T>(IN_IM + j * e);
          re += a * wr - b * wi;
          im += a * wi + b * wr;
        }
        const to = (<usize>s * <usize>(r * p + k) + <usize>q) * e;
        if (k == 0) {
          store<T>(yr + to, re);
          store<T>(yi + to, im);
        } else {
          const wr = load<T>(tw + <usize>(2 * (k - 1)) * e);
          const wi = load<T>(tw + <usize>(2 * (k - 1) + 1) * e);
          store<T>(yr + to, re * wr - im * wi);
          store<T>(yi + to, re * wi + im * wr);
        }
      }
    }
    tw += <usize>(2 * (r - 1)) * e;
  }
}
