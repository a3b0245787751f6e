import type { KernelArray } from '../complex-arrays';

type Doubles = KernelArray<'f64'>;

/** Second-order sections, transposed direct form II, in place; the order of operations the wasm kernel keeps to. */
export function cascade(
  x: Doubles,
  count: number,
  backwards: boolean,
  coefficients: Doubles,
  states: Doubles,
): void {
  const [v, c, z] = [x.view(), coefficients.view(), states.view()];
  const sections = Math.floor(c.length / 5);
  const step = backwards ? -1 : 1;
  for (let j = 0, i = backwards ? count - 1 : 0; j < count; j++, i += step) {
    let y = v[i];
    for (let s = 0; s < sections; s++) {
      const o = c[5 * s] * y + z[2 * s];
      z[2 * s] = c[5 * s + 1] * y - c[5 * s + 3] * o + z[2 * s + 1];
      z[2 * s + 1] = c[5 * s + 2] * y - c[5 * s + 4] * o;
      y = o;
    }
    v[i] = y;
  }
}
