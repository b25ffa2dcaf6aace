import type { Note } from "../plan/note.ts";

export interface Fold {
  readonly firstLine: number;
  readonly lastLine: number;
}

/** Blocks of more than one line, and whole plumb fences. */
export function folding(note: Note): readonly Fold[] {
  const { document } = note;
  const folds: Fold[] = [];
  for (const { start, lines } of document.blocks) {
    if (lines.length > 1) folds.push({ firstLine: start, lastLine: start + lines.length - 1 });
  }
  let open = -1;
  for (let line = 0; line < document.lineCount; line++) {
    if (document.lineKind(line) !== "plumb-fence") continue;
    if (open < 0) open = line;
    else {
      folds.push({ firstLine: open, lastLine: line });
      open = -1;
    }
  }
  return folds.sort((a, b) => a.firstLine - b.firstLine);
}
