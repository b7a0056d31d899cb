/**
 * The candidate that a mistyped word most likely meant, or undefined when none is near: at most one slip for
 * every three letters, at least one allowed from two letters on. A slip is a letter too many, too few, another
 * one, or two swapped (optimal string alignment distance). Case is ignored.
 */
export function nearest(word: string, candidates: Iterable<string>): string | undefined {
  if (word.length < 2 || word.length > LONGEST_WORD) return undefined;
  const lower = word.toLowerCase();
  let best: string | undefined;
  let allowed = Math.max(1, Math.floor(word.length / 3));
  for (const candidate of candidates) {
    if (Math.abs(candidate.length - word.length) > allowed) continue;
    const distance = slips(lower, candidate.toLowerCase());
    if (distance < allowed || (distance === allowed && best === undefined)) {
      best = candidate;
      allowed = distance;
    }
  }
  return best;
}

/** Longer words are not names somebody mistyped; chosen so that hostile text costs little. */
const LONGEST_WORD = 40;

function slips(a: string, b: string): number {
  let before: number[] = [];
  let previous = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const row = [i];
    for (let j = 1; j <= b.length; j++) {
      const same = a[i - 1] === b[j - 1];
      let least = Math.min(previous[j] + 1, row[j - 1] + 1, previous[j - 1] + (same ? 0 : 1));
      const swapped = i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1];
      if (swapped) least = Math.min(least, before[j - 2] + 1);
      row.push(least);
    }
    before = previous;
    previous = row;
  }
  return previous[b.length];
}
