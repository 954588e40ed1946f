/**
 * Number of single-letter insertions, deletions, replacements and swaps of neighbours between two names, case ignored.
 *
 * Source  optimal string alignment, P. H. Damerau, Commun. ACM 7 (1964) 171–176, by the three-row recurrence.
 * Cost    |a|·|b|; names are cut at 80 letters.
 */
export function editDistance(left: string, right: string): number {
  const a = left.slice(0, 80).toLowerCase();
  const b = right.slice(0, 80).toLowerCase();
  let twoAbove: number[] = [];
  let above = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const row = [i];
    for (let j = 1; j <= b.length; j++) {
      const same = a[i - 1] === b[j - 1] ? 0 : 1;
      let best = least((above[j] ?? 0) + 1, (row[j - 1] ?? 0) + 1, (above[j - 1] ?? 0) + same);
      if (i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1])
        best = least(best, (twoAbove[j - 2] ?? 0) + 1);
      row.push(best);
    }
    twoAbove = above;
    above = row;
  }
  return above[b.length] ?? 0;
}

// by comparison: nothing on the way into a hash uses the host's Math
function least(...values: number[]): number {
  let smallest = Number.POSITIVE_INFINITY;
  for (const value of values) if (value < smallest) smallest = value;
  return smallest;
}

/** The known name with the fewest edits to `name`; the first one of equals. Undefined for an empty list. */
export function nearestName(name: string, known: readonly string[]): string | undefined {
  let nearest: string | undefined;
  let fewest = Number.POSITIVE_INFINITY;
  for (const candidate of known) {
    const distance = editDistance(name, candidate);
    if (distance < fewest) {
      fewest = distance;
      nearest = candidate;
    }
  }
  return nearest;
}
