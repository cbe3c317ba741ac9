/** How many letters apart two words are, for "did you mean". */

/**
 * Letters to insert, remove, change or exchange with a neighbour to get from one word to the other (Damerau 1964, restricted
 * form). "brannok" → "brannock" is 1. Empty words: the length of the other.
 */
export function editDistance(a: string, b: string): number {
  let before: number[] = [];
  let last = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const now = [i];
    for (let j = 1; j <= b.length; j++) {
      const changed = last[j - 1]! + (a[i - 1] === b[j - 1] ? 0 : 1);
      let least = Math.min(last[j]! + 1, now[j - 1]! + 1, changed);
      if (i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1]) least = Math.min(least, before[j - 2]! + 1);
      now.push(least);
    }
    [before, last] = [last, now];
  }
  return last[b.length]!;
}

/** The one nearest word within a quarter of its length (at least one letter), case aside; null when none or two are. */
export function nearest(word: string, words: readonly string[]): string | null {
  const lower = word.toLowerCase();
  let best: string | null = null;
  let least = Number.POSITIVE_INFINITY;
  let tied = false;
  for (const each of words) {
    const room = Math.max(1, Math.floor(each.length / 4));
    if (each.length < 3 || Math.abs(each.length - word.length) > room) continue;
    const distance = editDistance(lower, each.toLowerCase());
    if (distance > room || distance > least) continue;
    tied = distance === least;
    [best, least] = [each, distance];
  }
  return tied ? null : best;
}
