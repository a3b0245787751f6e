// Helpers shared by every kernel. "split" = real and imaginary parts in two arrays; T is f32 or f64.

/** Lanes of one 128-bit vector. */
// @ts-ignore: decorator
@inline
export function lanes<T>(): i32 {
  return 16 / sizeof<T>();
}

/** Bytes of n elements. */
// @ts-ignore: decorator
@inline
export function bytes<T>(n: i32): usize {
  return <usize>n * sizeof<T>();
}

/** Even-numbered elements of the 2 vectors a, b read as one row. */
// @ts-ignore: decorator
@inline
export function evens<T>(a: v128, b: v128): v128 {
  return sizeof<T>() == 4 ? v128.shuffle<f32>(a, b, 0, 2, 4, 6) : v128.shuffle<f64>(a, b, 0, 2);
}

/** Odd-numbered elements of the 2 vectors a, b read as one row. */
// @ts-ignore: decorator
@inline
export function odds<T>(a: v128, b: v128): v128 {
  return sizeof<T>() == 4 ? v128.shuffle<f32>(a, b, 1, 3, 5, 7) : v128.shuffle<f64>(a, b, 1, 3);
}

/** Elements a0 b0 (a1 b1) of two vectors: first half of the interleaved row. */
// @ts-ignore: decorator
@inline
export function mixLow<T>(a: v128, b: v128): v128 {
  return sizeof<T>() == 4 ? v128.shuffle<f32>(a, b, 0, 4, 1, 5) : v128.shuffle<f64>(a, b, 0, 2);
}

/** Second half of the interleaved row of two vectors. */
// @ts-ignore: decorator
@inline
export function mixHigh<T>(a: v128, b: v128): v128 {
  return sizeof<T>() == 4 ? v128.shuffle<f32>(a, b, 2, 6, 3, 7) : v128.shuffle<f64>(a, b, 1, 3);
}

/** Elements in reverse order. */
// @ts-ignore: decorator
@inline
export function reversed<T>(a: v128): v128 {
  return sizeof<T>() == 4 ? v128.shuffle<f32>(a, a, 3, 2, 1, 0) : v128.shuffle<f64>(a, a, 1, 0);
}

// @ts-ignore: decorator
@inline
export function mulRe<T>(ar: v128, ai: v128, br: v128, bi: v128): v128 {
  return v128.sub<T>(v128.mul<T>(ar, br), v128.mul<T>(ai, bi));
}

// @ts-ignore: decorator
@inline
export function mulIm<T>(ar: v128, ai: v128, br: v128, bi: v128): v128 {
  return v128.add<T>(v128.mul<T>(ar, bi), v128.mul<T>(ai, br));
}

/** Sum of the lanes, in double. */
// @ts-ignore: decorator
@inline
export function laneSum<T>(v: v128): f64 {
  if (sizeof<T>() == 4) {
    return (
      <f64>f32x4.extract_lane(v, 0) +
      <f64>f32x4.extract_lane(v, 1) +
      (<f64>f32x4.extract_lane(v, 2) + <f64>f32x4.extract_lane(v, 3))
    );
  }
  return f64x2.extract_lane(v, 0) + f64x2.extract_lane(v, 1);
}

/** Largest of the lanes, in double. */
// @ts-ignore: decorator
@inline
export function laneMax<T>(v: v128): f64 {
  if (sizeof<T>() == 4) {
    return <f64>max(
      max(f32x4.extract_lane(v, 0), f32x4.extract_lane(v, 1)),
      max(f32x4.extract_lane(v, 2), f32x4.extract_lane(v, 3)),
    );
  }
  return max(f64x2.extract_lane(v, 0), f64x2.extract_lane(v, 1));
}
