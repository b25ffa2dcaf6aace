import { describe, expect, it } from "vitest";
import { codeActions } from "../../server/src/features/codeActions.ts";
import { completion } from "../../server/src/features/completion.ts";
import { definition } from "../../server/src/features/definition.ts";
import { documentSymbols } from "../../server/src/features/documentSymbols.ts";
import { folding } from "../../server/src/features/folding.ts";
import { formatting } from "../../server/src/features/formatting.ts";
import { hover } from "../../server/src/features/hover.ts";
import { inlayHints } from "../../server/src/features/inlayHints.ts";
import type { Note } from "../../server/src/plan/note.ts";
import { besideDemo } from "../support/besideDemo.ts";
import { demoFiles } from "../support/sampleText.ts";

/** Figures that are none, and values that a text was made of by mistake. */
const nonsense = /NaN|Infinity|undefined|\[object|unknown kt/;

function everyTextAt(note: Note, line: number, character: number): string {
  const completions = completion(note, line, character);
  for (const { span } of completions) {
    // A client refuses a list whose edits do not reach the cursor.
    expect(span.start <= character && character <= span.end).toBe(true);
  }
  definition(note, line, character);
  return [
    hover(note, line, character)?.text ?? "",
    ...completions.map((one) => `${one.label} ${one.detail} ${one.insertText}`),
  ].join("\n");
}

function everyTextOf(note: Note): string {
  const last = note.document.lineCount - 1;
  const hints = [...inlayHints(note, 0, last, "full"), ...inlayHints(note, 0, last, "brief")];
  for (const { line, character } of hints)
    expect(character <= note.document.lineText(line).length, `a hint on line ${line + 1}`).toBe(true);
  for (const { firstLine, lastLine } of folding(note)) expect(firstLine <= lastLine).toBe(true);
  for (const { edits } of codeActions(note, 0, last)) {
    for (const { line, start, end } of edits)
      expect(0 <= start && start <= end && end <= note.document.lineText(line).length).toBe(true);
  }
  formatting(note, 0, last);
  return [
    ...hints.flatMap(({ parts }) => parts.map((part) => `${part.text} ${part.tooltip}`)),
    ...documentSymbols(note).map(({ name, detail }) => `${name} ${detail}`),
  ].join("\n");
}

describe("what an editor shows of half-typed text", () => {
  it.each(demoFiles)(
    "of $name is whole at every cursor, and no figure is made up",
    ({ name, text, flavour }) => {
      // A prime, so that over the files every place of a clause is cut somewhere.
      for (let cut = 1; cut <= text.length; cut += 13) {
        const note = besideDemo(text.slice(0, cut), flavour, name);
        const line = note.document.lineCount - 1;
        const end = note.document.lineText(line).length;
        expect(everyTextOf(note)).not.toMatch(nonsense);
        for (const character of new Set([0, end >> 1, end]))
          expect(everyTextAt(note, line, character)).not.toMatch(nonsense);
      }
    },
  );

  it.each(demoFiles)("of $name holds at every clause of the whole note", ({ name, text, flavour }) => {
    const note = besideDemo(text, flavour, name);
    for (let line = 0; line < note.document.lineCount; line++) {
      for (let character = 0; character <= note.document.lineText(line).length; character += 3)
        expect(everyTextAt(note, line, character)).not.toMatch(nonsense);
    }
  });
});
