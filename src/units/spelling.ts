/** The candidate that a misspelt word most likely meant, or null when none is close.
 *
 *  A difference of case only is closest; then the edit distance (insert, delete, replace, swap neighbours), up to a third of the longer word. */
export function nearestSpelling(word: string, candidates: Iterable<string>): string | null {
  // no word of this program is longer than 40 letters; the distance is quadratic in the length
  if (word.length === 0 || word.length > 40) return null;
  let best: string | null = null;
  let bestDistance = Number.POSITIVE_INFINITY;
  for (const candidate of candidates) {
    const sameButCase = candidate.toLowerCase() === word.toLowerCase();
    const distance = sameButCase ? 0.5 : editDistance(fold(word), fold(candidate)) + 0.01 * Math.abs(word.length - candidate.length);
    const limit = Math.max(1.01, Math.max(word.length, candidate.length) / 3 + 0.1);
    if (distance <= limit && distance < bestDistance) {
      best = candidate;
      bestDistance = distance;
    }
  }
  return best;
}

const fold = (word: string): string => word.toLowerCase().replaceAll('-', '_');

function editDistance(a: string, b: string): number {
  let beforeLast: number[] = [];
  let last = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const row = [i];
    for (let j = 1; j <= b.length; j++) {
      row[j] = Math.min(last[j] + 1, row[j - 1] + 1, last[j - 1] + (a[i - 1] === b[j - 1] ? 0 : 1));
      if (i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1]) row[j] = Math.min(row[j], beforeLast[j - 2] + 1);
    }
    beforeLast = last;
    last = row;
  }
  return last[b.length];
}
