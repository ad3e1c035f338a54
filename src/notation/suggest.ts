/**
 * "Did you mean …?": the nearest of the known names, and the product that a run-together word may stand for.
 * Pure functions on strings; import nothing.
 */

/** Words longer than this get no suggestion: the cost grows with the square of the length. */
const LONGEST = 64;

/** Edits (insert, delete, replace, swap of neighbours) from one word to another. */
export function editDistance(a: string, b: string): number {
  let before: number[] = [];
  let last = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const row = [i];
    for (let j = 1; j <= b.length; j++) {
      const same = a[i - 1] === b[j - 1] ? 0 : 1;
      let best = Math.min(row[j - 1]! + 1, last[j]! + 1, last[j - 1]! + same);
      if (i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1]) best = Math.min(best, before[j - 2]! + 1);
      row.push(best);
    }
    [before, last] = [last, row];
  }
  return last[b.length]!;
}

/**
 * The known name nearest to the word, or undefined when none is near: at most a third of its letters differ (one of
 * two), and a single letter only in case. Among equals the one with the same first letter wins, then the first.
 */
export function nearest(word: string, known: Iterable<string>): string | undefined {
  if (word.length > LONGEST) return undefined;
  const lower = word.toLowerCase();
  const allowed = word.length === 2 ? 1 : Math.floor(word.length / 3);
  let best: string | undefined;
  let bestCost = Number.POSITIVE_INFINITY;
  for (const name of known) {
    if (name.length > LONGEST || name === word) continue;
    const distance = editDistance(lower, name.toLowerCase());
    if (distance > allowed) continue;
    const cost = 2 * distance + (name[0]?.toLowerCase() === lower[0] ? 0 : 1);
    if (cost < bestCost) [best, bestCost] = [name, cost];
  }
  return best;
}

/** `c0M` as known names side by side (`c0 M`), when there is such a reading. */
export function splitWord(word: string, isKnown: (name: string) => boolean): string | undefined {
  if (word.length > LONGEST) return undefined;
  const readings: (string | undefined)[] = ['', ...Array.from({ length: word.length }, () => undefined)];
  for (let end = 1; end <= word.length; end++) {
    for (let start = 0; start < end; start++) {
      const head = readings[start];
      const piece = word.slice(start, end);
      if (head === undefined || !(isKnown(piece) || (start === 0 && /^[0-9]+$/.test(piece)))) continue;
      readings[end] = head === '' ? piece : `${head} ${piece}`;
      break;
    }
  }
  const reading = readings[word.length];
  return reading === word ? undefined : reading;
}
