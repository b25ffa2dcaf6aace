import type { Edit } from "../notation/finding.ts";
import type { Finding } from "../plan/finding.ts";
import type { Note } from "../plan/note.ts";

/** A way out of a finding, with its edits on lines of the document. */
export interface CodeAction {
  readonly title: string;
  readonly finding: Finding;
  readonly findingLine: number;
  readonly edits: readonly Edit[];
  readonly preferred: boolean;
}

/** The quick fixes of the findings that touch a range of lines. They are worked out from the note as it is now. */
export function codeActions(note: Note, from: number, to: number): readonly CodeAction[] {
  return note.findings().flatMap(({ line, finding }) => {
    if (line < from || to < line) return [];
    // A finding of a block counts its lines from the block's first, one of the whole note from the note's.
    const base = line - finding.line;
    const fixes = [...finding.fixes.map((fix) => ({ ...fix, base })), ...joinFix(note, line, finding)];
    return fixes.map(
      ({ title, edits, preferred, base: first }): CodeAction => ({
        title,
        finding,
        findingLine: line,
        edits: edits.map((edit) => ({ ...edit, line: first + edit.line })),
        preferred: preferred === true && fixes.filter((one) => one.preferred).length === 1,
      }),
    );
  });
}

/** A block without a phase may belong to the point above: one blank line between them is all that parts them. */
function joinFix(note: Note, line: number, finding: Finding) {
  if (finding.code !== "point-needs-phase") return [];
  const { document } = note;
  const block = document.blockAt(line);
  if (!block || block.start < 2) return [];
  const gap = block.start - 1;
  if (document.lineText(gap).trim() !== "" || document.blockAt(gap - 1)?.kind !== "point") return [];
  const join: Edit = {
    line: gap,
    start: 0,
    end: document.lineText(gap).length,
    newText: "",
    wholeLine: true,
  };
  return [{ title: "Join it to the point above", preferred: false, edits: [join], base: 0 }];
}
