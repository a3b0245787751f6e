// Order statistics of one column without data-dependent branches.

const SAMPLE = memory.data(64 * 8);

/** A guess of the k-th smallest of m numbers from 5, 9 or 25 of them, sorted. */
function pivot(src: usize, m: i32, k: i32): f64 {
  const count = m > 400 ? 25 : m > 100 ? 9 : 5;
  const step = m / count;
  for (let i = 0; i < count; i++) {
    const v = load<f64>(src + (<usize>(i * step + (step >> 1)) << 3));
    let j = i - 1;
    while (j >= 0 && load<f64>(SAMPLE + (<usize>j << 3)) > v) {
      store<f64>(SAMPLE + (<usize>(j + 1) << 3), load<f64>(SAMPLE + (<usize>j << 3)));
      j--;
    }
    store<f64>(SAMPLE + (<usize>(j + 1) << 3), v);
  }
  const at = <i32>(((<f64>k + 0.5) / <f64>m) * <f64>count);
  return load<f64>(SAMPLE + (<usize>max(0, min(count - 1, at)) << 3));
}

/** k-th smallest (from 0) of n numbers at a, which is overwritten; b: room for n numbers. NaN if a pivot is NaN. */
export function kthSmallest(a: usize, b: usize, n: i32, k: i32): f64 {
  let src = a;
  let m = n;
  let inA = true;
  while (m > 24) {
    const p = pivot(src, m, k);
    if (p != p) return p;
    const dst = inA ? b : a;
    // Every number is written to both ends; only one of the ends moves.
    let low: usize = dst;
    let high: usize = dst + (<usize>(m - 1) << 3);
    for (let q = src, e = src + (<usize>m << 3); q < e; q += 8) {
      const v = load<f64>(q);
      store<f64>(low, v);
      store<f64>(high, v);
      const c = <usize>(v < p);
      low += c << 3;
      high -= (1 - c) << 3;
    }
    const below = <i32>((low - dst) >> 3);
    if (k < below) {
      m = below;
      src = dst;
    } else if (below > 0) {
      k -= below;
      m -= below;
      src = dst + (<usize>below << 3);
    } else {
      // The pivot is the smallest: take out all its equals.
      let equals = 0;
      let o = dst;
      for (let q = src, e = src + (<usize>m << 3); q < e; q += 8) {
        const v = load<f64>(q);
        if (v != p) {
          store<f64>(o, v);
          o += 8;
        } else equals++;
      }
      if (k < equals) return p;
      k -= equals;
      m -= equals;
      src = dst;
    }
    inA = !inA;
  }
  for (let i = 1; i < m; i++) {
    const v = load<f64>(src + (<usize>i << 3));
    let j = i - 1;
    while (j >= 0 && load<f64>(src + (<usize>j << 3)) > v) {
      store<f64>(src + (<usize>(j + 1) << 3), load<f64>(src + (<usize>j << 3)));
      j--;
    }
    store<f64>(src + (<usize>(j + 1) << 3), v);
  }
  return load<f64>(src + (<usize>k << 3));
}

/** Smallest number above v among n at a, or v itself when more than `rank` of them are at or below v. */
function following(a: usize, n: i32, v: f64, rank: i32): f64 {
  let count = 0;
  let next: f64 = Infinity;
  for (let q = a, e = a + (<usize>n << 3); q < e; q += 8) {
    const x = load<f64>(q);
    count += <i32>(x <= v);
    next = min(next, x > v ? x : Infinity);
  }
  return count > rank ? v : next;
}

/**
 * Medians of columns. Row s starts at `rows` + s `stride` bytes; columns 0 .. columns - 1 go to `out`.
 * `work`: 10 `count` numbers. An even count gives the mean of the two middle numbers.
 */
export function medians(rows: usize, stride: usize, count: i32, columns: i32, work: usize, out: usize): void {
  const column = <usize>count << 3;
  const spare = work + 8 * column;
  const kept = spare + column;
  for (let k = 0; k < columns; k += 8) {
    const width = min(8, columns - k);
    for (let s = 0; s < count; s++) {
      const r = rows + <usize>s * stride + (<usize>k << 3);
      const d = work + (<usize>s << 3);
      for (let c = 0; c < width; c++) store<f64>(d + <usize>c * column, load<f64>(r + (<usize>c << 3)));
    }
    for (let c = 0; c < width; c++) {
      const a = work + <usize>c * column;
      let v: f64;
      if (count & 1) v = kthSmallest(a, spare, count, count >> 1);
      else {
        memory.copy(kept, a, column);
        const low = kthSmallest(a, spare, count, (count >> 1) - 1);
        v = 0.5 * (low + following(kept, count, low, count >> 1));
      }
      store<f64>(out + (<usize>(k + c) << 3), v);
    }
  }
}
