/**
 * Root of a decreasing or increasing function by Newton's method inside a bracket that closes in from both sides; when
 * a step leaves the bracket, it is halved instead. For functions with one root.
 *
 * @param f Value and derivative; either may be infinite or NaN where the value has left the range of numbers, but its
 * sign must hold.
 * @param rising Whether f increases.
 * @param start First guess.
 * @param scale Length by which to look for the other side of the root.
 */
export function solve(
  f: (u: number) => { readonly value: number; readonly slope: number },
  rising: boolean,
  start: number,
  scale = 1,
): number {
  let low = -Infinity;
  let high = Infinity;
  let u = start;
  for (let i = 0; i < 400; i++) {
    const { value, slope } = f(u);
    if (value === 0) return u;
    if (value > 0 === rising) high = u;
    else low = u;
    let next = u - value / slope;
    if (!(next > low && next < high)) {
      if (low === -Infinity) next = high - scale * 2 ** i;
      else if (high === Infinity) next = low + scale * 2 ** i;
      else next = (low + high) / 2;
    }
    if (Math.abs(next - u) <= 4e-16 * Math.max(Math.abs(u), 1e-3) || next === low || next === high)
      return next;
    u = next;
  }
  return u;
}
