/**
 * Rates close to a wanted one that a simple ratio of whole numbers gives: the best fractions with both factors up to `most`
 * next below and next above, nearest first.
 *
 * Walks the tree of all fractions in lowest terms (Stern, J. reine angew. Math. 55, 193, 1858; MEMORY).
 *
 * @example nearestRates(4096, 1000.0001, 1000) // [1000, 1002.1…]
 */
export function nearestRates(from: number, to: number, most = 1000): number[] {
  const target = to / from;
  let below = [0, 1];
  let above = [1, 0];
  for (;;) {
    const [n, d] = [below[0] + above[0], below[1] + above[1]];
    if (n > most || d > most) break;
    if (n / d <= target) below = [n, d];
    else above = [n, d];
  }
  return [below, above]
    .filter(([n, d]) => n > 0 && d > 0)
    .map(([n, d]) => (from * n) / d)
    .sort((a, b) => Math.abs(a - to) - Math.abs(b - to));
}
