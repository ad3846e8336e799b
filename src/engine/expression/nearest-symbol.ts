/**
 * Nearest known symbol to a misspelt one, or null where none is near: at most a third of the
 * letters (at least one) may differ. A difference of case alone counts as the nearest of all.
 * Cost: length of the name times total length of the known names.
 */
export function nearestSymbol(name: string, known: Iterable<string>): string | null {
  const allowed = Math.max(1, Math.floor(name.length / 3));
  let best: string | null = null;
  let bestDistance = allowed + 1;
  for (const candidate of known) {
    if (candidate === name || Math.abs(candidate.length - name.length) > allowed) continue;
    const sameLetters = candidate.toLowerCase() === name.toLowerCase();
    const distance = sameLetters ? 0.5 : editDistance(name, candidate);
    // One letter replaced by another is no misspelling: `b` is not nearly `a`.
    if (!sameLetters && distance >= Math.max(name.length, candidate.length)) continue;
    if (distance < bestDistance) {
      best = candidate;
      bestDistance = distance;
    }
  }
  return best;
}

/**
 * Smallest number of letters to insert, delete, replace or swap with their neighbour that turns a
 * into b (optimal string alignment: Damerau 1964; rows as in Wagner & Fischer 1974).
 */
export function editDistance(a: string, b: string): number {
  let before: number[] = [];
  let previous = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i += 1) {
    const row = [i];
    for (let j = 1; j <= b.length; j += 1) {
      const replaced = (previous[j - 1] ?? 0) + (a[i - 1] === b[j - 1] ? 0 : 1);
      let least = Math.min((previous[j] ?? 0) + 1, (row[j - 1] ?? 0) + 1, replaced);
      if (i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1]) {
        least = Math.min(least, (before[j - 2] ?? 0) + 1);
      }
      row.push(least);
    }
    before = previous;
    previous = row;
  }
  return previous[b.length] ?? 0;
}
