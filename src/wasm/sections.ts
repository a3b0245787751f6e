// Cascades of second-order sections, transposed direct form II, in place.
// Coefficients: per section b0 b1 b2 a1 a2 (a0 = 1). States: per section z0 z1. `step` is +8 or -8 bytes.
//
// Two sections share a vector, and up to four vectors run as a wavefront: while section k works on sample i, section
// k + 1 works on sample i - 1, so the sections do not wait for each other. Every number is computed by the same
// operations in the same order as in the plain loop, so results are bit-identical to it.

/** The plain loop. */
export function cascadePlain(x: usize, n: i32, step: i32, sections: i32, c: usize, z: usize): void {
  let p = x;
  for (let i = 0; i < n; i++) {
    let v = load<f64>(p);
    let cc = c;
    let zz = z;
    for (let s = 0; s < sections; s++) {
      const o = load<f64>(cc) * v + load<f64>(zz);
      store<f64>(zz, load<f64>(cc, 8) * v - load<f64>(cc, 24) * o + load<f64>(zz, 8));
      store<f64>(zz, load<f64>(cc, 16) * v - load<f64>(cc, 32) * o, 8);
      v = o;
      cc += 40;
      zz += 16;
    }
    store<f64>(p, v);
    p += step;
  }
}

// @ts-ignore: decorator
@inline
function pair(at: usize, stride: usize): v128 {
  return f64x2.replace_lane(f64x2.splat(load<f64>(at)), 1, load<f64>(at + stride));
}

const LINE = memory.data(8 * 8);
// Coefficients of the sections of each vector side by side. They are read from here for every sample: kept in variables
// they would push the states out of the registers (measured: 8 sections take 1.2 times as long).
const PACKED = memory.data(4 * 80, 16);

/** First samples of the wavefront, section by section: section k has then seen samples 0 .. 2 pairs - 2 - k. */
// @ts-ignore: decorator
@inline
function fillLine(x: usize, step: i32, pairs: i32, c: usize, z: usize): void {
  const ahead = 2 * pairs - 1;
  for (let i = 0; i < ahead; i++) store<f64>(LINE + (<usize>i << 3), load<f64>(x + <usize>(i * step)));
  for (let k = 0; k < ahead; k++) cascadePlain(LINE, ahead - k, 8, 1, c + <usize>k * 40, z + <usize>k * 16);
}

/** Last samples: those still in the line when the input has ended, section by section. */
// @ts-ignore: decorator
@inline
function putStates(z: usize, a: v128, b: v128): void {
  v128.store64_lane(z, a, 0);
  v128.store64_lane(z, b, 0, 8);
  v128.store64_lane(z, a, 1, 16);
  v128.store64_lane(z, b, 1, 24);
}

/**
 * 2, 4, 6 or 8 sections at once on n > 2 pairs samples. The vectors stop when the first section has seen the last
 * sample; the samples still in the line are finished by the plain loop, so the states left behind are exact.
 */
// @ts-ignore: decorator
@inline
function wavefront(x: usize, n: i32, step: i32, pairs: i32, c: usize, z: usize): void {
  const ahead = 2 * pairs - 1;
  fillLine(x, step, pairs, c, z);
  // LINE[i] now holds the output of section (ahead - 1 - i) at sample i.
  const top = LINE + <usize>((ahead - 1) << 3);
  let y0 = pairs > 1 ? f64x2.replace_lane(f64x2.splat(load<f64>(top)), 1, load<f64>(top - 8)) : f64x2.splat(load<f64>(top));
  let y1 = y0;
  let y2 = y0;
  let y3 = y0;
  if (pairs > 1) {
    y1 = pairs > 2
      ? f64x2.replace_lane(f64x2.splat(load<f64>(top - 16)), 1, load<f64>(top - 24))
      : f64x2.splat(load<f64>(top - 16));
  }
  if (pairs > 2) {
    y2 = pairs > 3
      ? f64x2.replace_lane(f64x2.splat(load<f64>(top - 32)), 1, load<f64>(top - 40))
      : f64x2.splat(load<f64>(top - 32));
  }
  if (pairs > 3) y3 = f64x2.splat(load<f64>(top - 48));
  const z1: usize = pairs > 1 ? 32 : 0;
  const z2: usize = pairs > 2 ? 64 : 0;
  const z3: usize = pairs > 3 ? 96 : 0;
  for (let i: usize = 0; i < <usize>pairs; i++) {
    for (let j: usize = 0; j < 5; j++) v128.store(PACKED + 80 * i + 16 * j, pair(c + 80 * i + 8 * j, 40));
  }
  let a = pair(z, 16);
  let aa = pair(z + 8, 16);
  let b = pair(z + z1, 16);
  let bb = pair(z + z1 + 8, 16);
  let e = pair(z + z2, 16);
  let ee = pair(z + z2 + 8, 16);
  let d = pair(z + z3, 16);
  let dd = pair(z + z3 + 8, 16);
  let px = x + <usize>(ahead * step);
  let py = x;
  for (let i = ahead; i < n; i++) {
    const fresh = v128.load64_splat(px);
    px += step;
    if (pairs > 3) {
      const in3 = v128.shuffle<f64>(y2, y3, 1, 2);
      y3 = f64x2.add(f64x2.mul(v128.load(PACKED, 240), in3), d);
      d = f64x2.add(f64x2.sub(f64x2.mul(v128.load(PACKED, 256), in3), f64x2.mul(v128.load(PACKED, 288), y3)), dd);
      dd = f64x2.sub(f64x2.mul(v128.load(PACKED, 272), in3), f64x2.mul(v128.load(PACKED, 304), y3));
    }
    if (pairs > 2) {
      const in2 = v128.shuffle<f64>(y1, y2, 1, 2);
      y2 = f64x2.add(f64x2.mul(v128.load(PACKED, 160), in2), e);
      e = f64x2.add(f64x2.sub(f64x2.mul(v128.load(PACKED, 176), in2), f64x2.mul(v128.load(PACKED, 208), y2)), ee);
      ee = f64x2.sub(f64x2.mul(v128.load(PACKED, 192), in2), f64x2.mul(v128.load(PACKED, 224), y2));
    }
    if (pairs > 1) {
      const in1 = v128.shuffle<f64>(y0, y1, 1, 2);
      y1 = f64x2.add(f64x2.mul(v128.load(PACKED, 80), in1), b);
      b = f64x2.add(f64x2.sub(f64x2.mul(v128.load(PACKED, 96), in1), f64x2.mul(v128.load(PACKED, 128), y1)), bb);
      bb = f64x2.sub(f64x2.mul(v128.load(PACKED, 112), in1), f64x2.mul(v128.load(PACKED, 144), y1));
    }
    const in0 = v128.shuffle<f64>(fresh, y0, 0, 2);
    y0 = f64x2.add(f64x2.mul(v128.load(PACKED), in0), a);
    a = f64x2.add(f64x2.sub(f64x2.mul(v128.load(PACKED, 16), in0), f64x2.mul(v128.load(PACKED, 48), y0)), aa);
    aa = f64x2.sub(f64x2.mul(v128.load(PACKED, 32), in0), f64x2.mul(v128.load(PACKED, 64), y0));
    v128.store64_lane(py, pairs > 3 ? y3 : pairs > 2 ? y2 : pairs > 1 ? y1 : y0, 1);
    py += step;
  }
  putStates(z, a, aa);
  if (pairs > 1) putStates(z + z1, b, bb);
  if (pairs > 2) putStates(z + z2, e, ee);
  if (pairs > 3) putStates(z + z3, d, dd);
  // Section k has given its output for sample n - 1 - k; the last of them, k = ahead, is already stored.
  // Sample n - j (j = 1 .. ahead) waits behind section j - 1.
  for (let j = 1; j <= ahead; j++) {
    const k = j - 1;
    const v = k < 2 ? y0 : k < 4 ? y1 : k < 6 ? y2 : y3;
    store<f64>(x + <usize>((n - j) * step), k & 1 ? f64x2.extract_lane(v, 1) : f64x2.extract_lane(v, 0));
  }
  for (let k = 1; k <= ahead; k++) {
    cascadePlain(x + <usize>((n - k) * step), k, step, 1, c + <usize>k * 40, z + <usize>k * 16);
  }
}

function wavefront1(x: usize, n: i32, step: i32, c: usize, z: usize): void {
  wavefront(x, n, step, 1, c, z);
}
function wavefront2(x: usize, n: i32, step: i32, c: usize, z: usize): void {
  wavefront(x, n, step, 2, c, z);
}
function wavefront3(x: usize, n: i32, step: i32, c: usize, z: usize): void {
  wavefront(x, n, step, 3, c, z);
}
function wavefront4(x: usize, n: i32, step: i32, c: usize, z: usize): void {
  wavefront(x, n, step, 4, c, z);
}

/** Filters n samples at x in place; the states at z are read and left as after the last sample. */
export function cascade(x: usize, n: i32, step: i32, sections: i32, c: usize, z: usize): void {
  let s = 0;
  while (s < sections) {
    const rest = sections - s;
    const cc = c + <usize>s * 40;
    const zz = z + <usize>s * 16;
    let take = min(rest & ~1, 8);
    // An odd number ends in one pair and the plain loop for one section: 2 + 1, 4 + 1, ...
    if (n < 16 || take == 0) {
      take = rest;
      cascadePlain(x, n, step, take, cc, zz);
    } else if (take == 8) wavefront4(x, n, step, cc, zz);
    else if (take == 6) wavefront3(x, n, step, cc, zz);
    else if (take == 4) wavefront2(x, n, step, cc, zz);
    else wavefront1(x, n, step, cc, zz);
    s += take;
  }
}
