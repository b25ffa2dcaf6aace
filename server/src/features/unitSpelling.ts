import type { Edit } from "../notation/finding.ts";
import { unitOf } from "../notation/units.ts";
import type { Note } from "../plan/note.ts";

/**
 * Writes every unit of the note as the notation spells it: `kts`, `KT` and `knots` become `kt`. Only
 * the spelling changes, never which unit it is: none is added, and where a word may be several units
 * or a number has several readings the author is asked instead.
 */
export function unitSpelling(note: Note): readonly Edit[] {
  return [...respelt(note), ...spelledOut(note)].sort((a, b) => a.line - b.line || a.start - b.start);
}

/** Units that are read already, in other letters. Signs such as ° stay: they are no misspelling. */
function respelt({ document }: Note): readonly Edit[] {
  return document.blocks.flatMap(({ start: first, lines }) =>
    lines.flatMap(({ text, tokens }, index) =>
      tokens.flatMap(({ kind, start, end }): readonly Edit[] => {
        if (kind !== "unit") return [];
        const word = text.slice(start, end);
        const unit = unitOf(word);
        const isSpelt = unit === null || unit === word || !/^[a-z]/i.test(word) || word.includes("²");
        return isSpelt ? [] : [{ line: first + index, start, end, newText: unit }];
      }),
    ),
  );
}

/** Units written as whole words, which are told as findings with one way out. */
function spelledOut(note: Note): readonly Edit[] {
  return note.findings().flatMap(({ line, finding }) => {
    const [fix] = finding.fixes;
    if (finding.code !== "wrong-unit" || finding.fixes.length !== 1 || !fix?.preferred) return [];
    return fix.edits.map((edit) => ({ ...edit, line: line - finding.line + edit.line }));
  });
}
