import { type LineEdit, layout } from "../notation/layout.ts";
import type { Note } from "../plan/note.ts";

/** The lines that the formatter would write anew, in a range of lines. */
export function formatting(note: Note, from: number, to: number): readonly LineEdit[] {
  return layout(note.document, from, to);
}
