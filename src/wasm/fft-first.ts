// First Stockham pass, radix 4, rows of one number: vectors run over p and are transposed when stored.
// Twiddle table: per vector of p, for k = 1, 2, 3: a vector of re, a vector of im.
import { evens, mixHigh, mixLow, mulIm, mulRe, odds } from './lanes';

// @ts-ignore: decorator
@inline
function putColumns<T>(a: v128, b: v128, c: v128, d: v128, y: usize): void {
  const ab0 = mixLow<T>(a, b);
  const ab1 = mixHigh<T>(a, b);
  const cd0 = mixLow<T>(c, d);
  const cd1 = mixHigh<T>(c, d);
  if (sizeof<T>() == 4) {
    v128.store(y, v128.shuffle<f64>(ab0, cd0, 0, 2));
    v128.store(y, v128.shuffle<f64>(ab0, cd0, 1, 3), 16);
    v128.store(y, v128.shuffle<f64>(ab1, cd1, 0, 2), 32);
    v128.store(y, v128.shuffle<f64>(ab1, cd1, 1, 3), 48);
  } else {
    v128.store(y, ab0);
    v128.store(y, cd0, 16);
    v128.store(y, ab1, 32);
    v128.store(y, cd1, 48);
  }
}

// @ts-ignore: decorator
@inline
function butterfly4<T>(
  ar: v128, ai: v128, br: v128, bi: v128, cr: v128, ci: v128, dr: v128, di: v128, tw: usize, y: usize, z: usize,
): void {
  const sacr = v128.add<T>(ar, cr);
  const saci = v128.add<T>(ai, ci);
  const dacr = v128.sub<T>(ar, cr);
  const daci = v128.sub<T>(ai, ci);
  const sbdr = v128.add<T>(br, dr);
  const sbdi = v128.add<T>(bi, di);
  const dbdr = v128.sub<T>(br, dr);
  const dbdi = v128.sub<T>(bi, di);
  const u1r = v128.add<T>(dacr, dbdi);
  const u1i = v128.sub<T>(daci, dbdr);
  const u2r = v128.sub<T>(sacr, sbdr);
  const u2i = v128.sub<T>(saci, sbdi);
  const u3r = v128.sub<T>(dacr, dbdi);
  const u3i = v128.add<T>(daci, dbdr);
  const w1r = v128.load(tw);
  const w1i = v128.load(tw, 16);
  const w2r = v128.load(tw, 32);
  const w2i = v128.load(tw, 48);
  const w3r = v128.load(tw, 64);
  const w3i = v128.load(tw, 80);
  putColumns<T>(
    v128.add<T>(sacr, sbdr), mulRe<T>(u1r, u1i, w1r, w1i), mulRe<T>(u2r, u2i, w2r, w2i), mulRe<T>(u3r, u3i, w3r, w3i), y,
  );
  putColumns<T>(
    v128.add<T>(saci, sbdi), mulIm<T>(u1r, u1i, w1r, w1i), mulIm<T>(u2r, u2i, w2r, w2i), mulIm<T>(u3r, u3i, w3r, w3i), z,
  );
}

export function first4<T>(n: i32, xr: usize, xi: usize, yr: usize, yi: usize, tw: usize): void {
  const mb = <usize>(n >> 2) * sizeof<T>();
  for (let q: usize = 0; q < mb; q += 16) {
    const a = xr + q;
    const b = xi + q;
    butterfly4<T>(
      v128.load(a), v128.load(b), v128.load(a + mb), v128.load(b + mb),
      v128.load(a + 2 * mb), v128.load(b + 2 * mb), v128.load(a + 3 * mb), v128.load(b + 3 * mb),
      tw, yr + 4 * q, yi + 4 * q,
    );
    tw += 96;
  }
}

/** The same on 2 n real samples read as n complex numbers (even samples real, odd samples imaginary). */
export function first4Real<T>(n: i32, x: usize, yr: usize, yi: usize, tw: usize): void {
  const mb = <usize>(n >> 2) * sizeof<T>();
  for (let q: usize = 0; q < mb; q += 16) {
    const a = x + 2 * q;
    const b = a + 2 * mb;
    const c = b + 2 * mb;
    const d = c + 2 * mb;
    const a0 = v128.load(a);
    const a1 = v128.load(a, 16);
    const b0 = v128.load(b);
    const b1 = v128.load(b, 16);
    const c0 = v128.load(c);
    const c1 = v128.load(c, 16);
    const d0 = v128.load(d);
    const d1 = v128.load(d, 16);
    butterfly4<T>(
      evens<T>(a0, a1), odds<T>(a0, a1), evens<T>(b0, b1), odds<T>(b0, b1),
      evens<T>(c0, c1), odds<T>(c0, c1), evens<T>(d0, d1), odds<T>(d0, d1),
      tw, yr + 4 * q, yi + 4 * q,
    );
    tw += 96;
  }
}
