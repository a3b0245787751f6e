/** ψ(x), the derivative of ln Γ(x), for x > 0: recurrence to x ≥ 10, then the asymptotic series. Abramowitz & Stegun 6.3.5, 6.3.18 (MEMORY). */
export function digamma(x: number): number {
  let sum = 0;
  let y = x;
  for (; y < 10; y++) sum -= 1 / y;
  const s = 1 / (y * y);
  return (
    sum +
    Math.log(y) -
    0.5 / y -
    s * (1 / 12 - s * (1 / 120 - s * (1 / 252 - s * (1 / 240 - (s * 5) / 660 + (s * s * 691) / 32760))))
  );
}

/** ψ′(x) for x > 0, likewise. Abramowitz & Stegun 6.4.6, 6.4.12 (MEMORY). */
export function trigamma(x: number): number {
  let sum = 0;
  let y = x;
  for (; y < 10; y++) sum += 1 / (y * y);
  const s = 1 / (y * y);
  return sum + (1 + 0.5 / y + s * (1 / 6 - s * (1 / 30 - s * (1 / 42 - s * (1 / 30 - (s * 5) / 66))))) / y;
}
