import type { Edit, Fix } from "../notation/finding.ts";
import { unitOf } from "../notation/units.ts";
import type { Finding } from "../plan/finding.ts";
import type { Note } from "../plan/note.ts";
import { measure } from "../plan/quantity.ts";
import { blockAt } from "./blocksBetween.ts";
import { clauseAt } from "./hover.ts";
import { preferredFix } from "./preferredFix.ts";
import { cardInUse } from "./target.ts";

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
    const own = inOrder(note, line, finding);
    const fixes = [...own.map((fix) => ({ ...fix, base })), ...joinFix(note, line, finding)];
    const preferred = preferredFix(finding.code, fixes);
    return fixes.map(
      (fix): CodeAction => ({
        title: fix.title,
        finding,
        findingLine: line,
        edits: fix.edits.map((edit) => ({ ...edit, line: fix.base + edit.line })),
        preferred: fix === preferred,
      }),
    );
  });
}

/** Where a weight lacks its unit, the units that bring it within the card's masses come first. */
function inOrder(note: Note, line: number, finding: Finding): readonly Fix[] {
  const result = finding.code === "missing-unit" ? blockAt(note, line) : null;
  const masses = result ? cardInUse(result)?.mass?.value : null;
  const placed = result && clauseAt(result, line, finding.span.start);
  const body = placed?.clause.body;
  if (!masses || body?.kind !== "weight" || body.value.kind !== "scalar") return finding.fixes;
  const { quantity } = body.value;
  const fits = (fix: Fix) => {
    const unit = unitOf(fix.edits[0]?.newText.trim() ?? "");
    const kilograms = unit ? measure({ ...quantity, unit }, "mass").value : Number.NaN;
    return masses.low <= kilograms && kilograms <= masses.high;
  };
  return [
    ...finding.fixes.filter(fits).map((fix) => ({ ...fix, preferred: true })),
    ...finding.fixes.filter((fix) => !fits(fix)),
  ];
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
