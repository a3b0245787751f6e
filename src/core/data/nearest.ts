/** Edits (insert, delete, replace, swap of neighbours) that turn `a` into `b`; optimal string alignment distance. */
export function editDistance(a: string, b: string): number {
  let before: number[] = [];
  let previous = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const row = [i];
    for (let j = 1; j <= b.length; j++) {
      const same = a[i - 1] === b[j - 1] ? 0 : 1;
      let d = Math.min(previous[j] + 1, row[j - 1] + 1, previous[j - 1] + same);
      if (i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1])
        d = Math.min(d, before[j - 2] + 1);
      row.push(d);
    }
    before = previous;
    previous = row;
  }
  return previous[b.length];
}

/** Known names close enough to a mistyped one to be worth offering, best first, at most three. */
export function nearestNames(name: string, known: readonly string[]): string[] {
  const wanted = name.toLowerCase();
  const limit = Math.max(2, Math.floor(wanted.length / 3));
  return known
    .map((k) => {
      const candidate = k.toLowerCase();
      const inside = wanted.length >= 3 && (candidate.includes(wanted) || wanted.includes(candidate));
      return { k, d: inside ? 1 : editDistance(wanted, candidate) };
    })
    .filter(({ d }) => d <= limit)
    .sort((p, q) => p.d - q.d || p.k.localeCompare(q.k))
    .slice(0, 3)
    .map(({ k }) => k);
}

/** " Did you mean x or y?" or nothing. */
export function hint(suggestions: readonly string[]): string {
  return suggestions.length === 0 ? '' : ` Did you mean ${suggestions.map((s) => `"${s}"`).join(' or ')}?`;
}
