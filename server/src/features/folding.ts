import type { Note } from "../plan/note.ts";
import { plumbFences } from "./plumbFences.ts";

export interface Fold {
  readonly firstLine: number;
  readonly lastLine: number;
}

/** Blocks of more than one line, and whole plumb fences. */
export function folding({ document }: Note): readonly Fold[] {
  const blocks = document.blocks
    .filter(({ lines }) => lines.length > 1)
    .map(({ start, lines }) => ({ firstLine: start, lastLine: start + lines.length - 1 }));
  return [...blocks, ...plumbFences(document)].sort((a, b) => a.firstLine - b.firstLine);
}
