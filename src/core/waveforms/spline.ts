/**
 * Natural cubic spline through (x, y): second derivative zero at both ends. x rises; outside of it the end pieces go on.
 *
 * @returns value at one position
 */
export function cubicSpline(x: Float64Array, y: Float64Array): (at: number) => number {
  const n = x.length;
  const second = new Float64Array(n);
  const work = new Float64Array(n);
  // Tridiagonal system for the second derivatives, forward elimination and back substitution.
  for (let i = 1; i < n - 1; i++) {
    const part = (x[i] - x[i - 1]) / (x[i + 1] - x[i - 1]);
    const p = part * second[i - 1] + 2;
    second[i] = (part - 1) / p;
    const bend = (y[i + 1] - y[i]) / (x[i + 1] - x[i]) - (y[i] - y[i - 1]) / (x[i] - x[i - 1]);
    work[i] = ((6 * bend) / (x[i + 1] - x[i - 1]) - part * work[i - 1]) / p;
  }
  for (let i = n - 2; i >= 0; i--) second[i] = second[i] * second[i + 1] + work[i];
  second[0] = 0;
  let k = 0;
  return (at) => {
    if (at < x[k]) k = 0;
    if (at > x[Math.min(n - 1, k + 1)]) {
      let high = n - 1;
      while (high - k > 1) {
        const middle = (k + high) >> 1;
        if (x[middle] > at) high = middle;
        else k = middle;
      }
    }
    k = Math.min(k, n - 2);
    const h = x[k + 1] - x[k];
    const a = (x[k + 1] - at) / h;
    const b = 1 - a;
    return a * y[k] + b * y[k + 1] + (((a ** 3 - a) * second[k] + (b ** 3 - b) * second[k + 1]) * h * h) / 6;
  };
}
