import type { BlockResult, Note } from "../plan/note.ts";

/** The results of the blocks that touch a stretch of lines, found without a look at the others. */
export function blocksBetween(note: Note, from: number, to: number): readonly BlockResult[] {
  const results = note.results();
  let low = 0;
  let high = results.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    const { block } = results[middle] as BlockResult;
    if (block.start + block.lines.length <= from) low = middle + 1;
    else high = middle;
  }
  let end = low;
  while (end < results.length && (results[end] as BlockResult).block.start <= to) end++;
  return results.slice(low, end);
}

/** The result of the block that a line belongs to, if it is a bar line. */
export function blockAt(note: Note, line: number): BlockResult | null {
  return blocksBetween(note, line, line)[0] ?? null;
}
