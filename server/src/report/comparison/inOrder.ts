import type { Pair } from "./align.ts";

/** The most of these pairs that keep their order, sorted; what is left over was moved. */
export function inOrder(pairs: readonly Pair[]): readonly Pair[] {
  const sorted = [...pairs].sort((a, b) => a.old - b.old);
  /** By length, the end of the run of that length whose new place is lowest; and what stands before each. */
  const ends: number[] = [];
  const before: number[] = [];
  sorted.forEach((pair, i) => {
    let low = 0;
    let high = ends.length;
    while (low < high) {
      const middle = (low + high) >> 1;
      if ((sorted[ends[middle] as number] as Pair).new < pair.new) low = middle + 1;
      else high = middle;
    }
    before[i] = ends[low - 1] ?? -1;
    ends[low] = i;
  });
  const run: Pair[] = [];
  for (let i = ends[ends.length - 1] ?? -1; 0 <= i; i = before[i] as number) run.push(sorted[i] as Pair);
  return run.reverse();
}
