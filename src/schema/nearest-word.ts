/**
 * The known word that somebody who wrote `word` most likely meant: the one with the fewest single-letter changes (Levenshtein, 1966), case left out. Undefined when none
 * is within two changes, or a third of the longer word's letters; of equals the first.
 */
export function nearestWord(word: string, known: readonly string[]): string | undefined {
  const wanted = word.toLowerCase();
  let best: { readonly name: string; readonly changes: number } | undefined;
  for (const name of known) {
    const changes = changesBetween(wanted, name.toLowerCase());
    const most = Math.max(2, Math.floor(Math.max(name.length, word.length) / 3));
    // A word of two letters is two changes from every other.
    if (changes > most || changes >= Math.min(name.length, word.length)) continue;
    if (best === undefined || changes < best.changes) best = { name, changes };
  }
  return best?.name;
}

/** Letters to put in, take out or replace. */
function changesBetween(a: string, b: string): number {
  let row = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const next = [i];
    for (let j = 1; j <= b.length; j++) next.push(Math.min(row[j]! + 1, next[j - 1]! + 1, row[j - 1]! + (a[i - 1] === b[j - 1] ? 0 : 1)));
    row = next;
  }
  return row[b.length]!;
}
