import type { Edit } from "../notation/finding.ts";
import { layout } from "../notation/layout.ts";
import type { Note } from "../plan/note.ts";

/**
 * What Enter brings about when the cursor has come to a place: the line just left is laid out, unless
 * it has a finding, and a bar line that says something goes on with a bar where the editor has not
 * written one itself. Other lines stay as they are, and none comes or goes.
 */
export function onEnter(note: Note, line: number, character: number): readonly Edit[] {
  const { document } = note;
  const left = line - 1;
  if (document.lineKind(left) !== "bar") return [];
  const laidOut = layout(document, left, left).map(({ newText }) => ({
    line: left,
    start: 0,
    end: document.lineText(left).length,
    newText,
  }));
  const text = document.lineText(line);
  const indent = text.length - text.trimStart().length;
  return continues(note, line) && character <= indent
    ? [...laidOut, { line, start: indent, end: indent, newText: "| " }]
    : laidOut;
}

/**
 * True where the new line belongs to the block: it is blank, or the rest of a bar line that Enter cut
 * in two. Enter behind a bar alone ends the block, as in an editor that writes the bars.
 */
function continues({ document }: Note, line: number): boolean {
  const block = document.blockAt(line - 1);
  const hasClause = block?.lines[line - 1 - block.start]?.clauses.length;
  return hasClause !== undefined && 0 < hasClause && document.lineKind(line) === "prose";
}
