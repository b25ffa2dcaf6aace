/**
 * The word of a list that is closest to what was typed. A guess by spelling needs three letters; a
 * shorter word gets the word it begins, if it begins only one.
 */
export function nearestWord(typed: string, words: readonly string[]): string | null {
  const wanted = typed.toLowerCase();
  const begun = words.filter((word) => word.toLowerCase().startsWith(wanted));
  if (wanted.length > 0 && begun.length === 1) return begun[0] ?? null;
  if (wanted.length < 3) return null;
  let best: string | null = null;
  let least = Math.max(1, Math.floor(wanted.length / 3)) + 1;
  for (const word of words) {
    const distance = editDistance(wanted, word.toLowerCase(), least);
    if (distance < least) {
      least = distance;
      best = word;
    }
  }
  return best ?? begun[0] ?? null;
}

/** Edits between two words, a swap of neighbours counting as one (optimal string alignment); `cap` and more are all the same. */
function editDistance(a: string, b: string, cap: number): number {
  if (Math.abs(a.length - b.length) >= cap) return cap;
  let beforeLast: number[] = [];
  let last = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const row = [i];
    for (let j = 1; j <= b.length; j++) {
      const same = a[i - 1] === b[j - 1];
      let cost = Math.min(
        (last[j] as number) + 1,
        (row[j - 1] as number) + 1,
        (last[j - 1] as number) + (same ? 0 : 1),
      );
      if (i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1]) {
        cost = Math.min(cost, (beforeLast[j - 2] as number) + 1);
      }
      row.push(cost);
    }
    beforeLast = last;
    last = row;
  }
  return last[b.length] as number;
}
