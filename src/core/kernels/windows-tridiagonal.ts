/** A real symmetric tridiagonal matrix: n diagonal elements, n − 1 beside them. */
export interface Tridiagonal {
  readonly diagonal: Float64Array;
  readonly beside: Float64Array;
}

/** Number of eigenvalues above x: positive pivots of the elimination (Sylvester's law of inertia). */
function countAbove({ diagonal, beside }: Tridiagonal, x: number): number {
  let count = 0;
  let pivot = 1;
  for (let i = 0; i < diagonal.length; i++) {
    const b = i === 0 ? 0 : beside[i - 1];
    pivot = diagonal[i] - x - (b * b) / pivot;
    // A zero pivot stands for a tiny one of either sign.
    if (pivot === 0) pivot = -Number.MIN_VALUE * 2 ** 60;
    if (pivot > 0) count++;
  }
  return count;
}

/** The eigenvalue number k counted from the largest (0), by bisection to the last digit. */
export function eigenvalueFromTop(matrix: Tridiagonal, k: number): number {
  const { diagonal, beside } = matrix;
  const radius = (i: number): number =>
    (i > 0 ? Math.abs(beside[i - 1]) : 0) + (i < beside.length ? Math.abs(beside[i]) : 0);
  // Gershgorin's discs hold all of them.
  let low = Infinity;
  let high = -Infinity;
  diagonal.forEach((d, i) => {
    low = Math.min(low, d - radius(i));
    high = Math.max(high, d + radius(i));
  });
  for (;;) {
    const middle = low + (high - low) / 2;
    if (middle <= low || middle >= high) return middle;
    if (countAbove(matrix, middle) > k) low = middle;
    else high = middle;
  }
}

/** Unit eigenvector of a simple eigenvalue by inverse iteration. */
export function eigenvector(matrix: Tridiagonal, eigenvalue: number): Float64Array {
  const n = matrix.diagonal.length;
  // Any start that is not perpendicular to the vector will do; this one has no symmetry.
  let v: Float64Array = Float64Array.from({ length: n }, (_, i) => 1 + ((i * 7919) % 13) / 13);
  for (let pass = 0; pass < 4; pass++) {
    v = solveShifted(matrix, eigenvalue, v);
    const size = Math.sqrt(v.reduce((sum, x) => sum + x * x, 0));
    v = v.map((x) => x / size);
  }
  return v;
}

/** Solves (matrix − shift) x = right by elimination with row exchanges; a singular pivot is replaced by a tiny one. */
function solveShifted({ diagonal, beside }: Tridiagonal, shift: number, right: Float64Array): Float64Array {
  const n = diagonal.length;
  const scale = diagonal.reduce((most, d) => Math.max(most, Math.abs(d)), 0) + Math.abs(shift) + 1;
  const [u0, u1, u2] = [new Float64Array(n), new Float64Array(n), new Float64Array(n)];
  const x = right.slice();
  let [a, b] = [diagonal[0] - shift, n > 1 ? beside[0] : 0];
  for (let i = 0; i < n - 1; i++) {
    const below = beside[i];
    const [c, d] = [diagonal[i + 1] - shift, i + 2 < n ? beside[i + 1] : 0];
    if (Math.abs(a) >= Math.abs(below)) {
      if (a === 0) a = scale * Number.EPSILON;
      const factor = below / a;
      [u0[i], u1[i], u2[i]] = [a, b, 0];
      x[i + 1] -= factor * x[i];
      [a, b] = [c - factor * b, d];
    } else {
      const factor = a / below;
      [u0[i], u1[i], u2[i]] = [below, c, d];
      [x[i], x[i + 1]] = [x[i + 1], x[i] - factor * x[i + 1]];
      [a, b] = [b - factor * c, -factor * d];
    }
  }
  u0[n - 1] = a === 0 ? scale * Number.EPSILON : a;
  for (let i = n - 1; i >= 0; i--) {
    const after = i + 1 < n ? u1[i] * x[i + 1] : 0;
    const second = i + 2 < n ? u2[i] * x[i + 2] : 0;
    x[i] = (x[i] - after - second) / u0[i];
  }
  return x;
}
