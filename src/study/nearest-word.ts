/** Edits (insert, delete, replace, swap neighbours) that turn one word into the other. */
function editDistance(a: string, b: string): number {
  let before: number[] = [];
  let last = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i += 1) {
    const row = [i];
    for (let j = 1; j <= b.length; j += 1) {
      const cost = a[i - 1] === b[j - 1] ? 0 : 1;
      let best = Math.min((last[j] as number) + 1, (row[j - 1] as number) + 1, (last[j - 1] as number) + cost);
      if (i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1]) best = Math.min(best, (before[j - 2] as number) + 1);
      row.push(best);
    }
    before = last;
    last = row;
  }
  return last[b.length] as number;
}

/** Longer words are not compared: nobody mistypes that much, and the cost grows with the square. */
const longestWord = 64;

/**
 * The known word that a misspelt one most likely means, or null when nothing is near: at most a third of its letters
 * (and at least one) may be wrong, of two letters only their order. Case, blanks, `-` and `_` do not count; a word that only one known word starts with is near too.
 * Optimal string alignment distance (Damerau, Commun ACM 1964;7:171).
 *
 * @example nearestWord('matrixReed', ['matrixRead', 'matrixPhase']) //=> 'matrixRead'
 * @example nearestWord('colour', ['matrixRead', 'matrixPhase']) //=> null
 */
export function nearestWord(word: string, known: readonly string[]): string | null {
  if (word.length > longestWord) return null;
  const plain = (text: string) => text.toLowerCase().replace(/[\s_-]/g, '');
  const wanted = plain(word);
  if (wanted === '') return null;
  if (wanted.length < 3) {
    const letters = (text: string) => [...text].sort().join('');
    return known.find((candidate) => letters(plain(candidate)) === letters(wanted)) ?? null;
  }
  let best: string | null = null;
  let bestDistance = Math.max(1, Math.floor(wanted.length / 3)) + 1;
  for (const candidate of known) {
    const distance = editDistance(wanted, plain(candidate));
    if (distance < bestDistance) {
      best = candidate;
      bestDistance = distance;
    }
  }
  if (best !== null) return best;
  const starting = known.filter((candidate) => plain(candidate).startsWith(wanted));
  return starting.length === 1 ? (starting[0] as string) : null;
}
