import type { Note } from "../plan/note.ts";
import { type FindingJson, findingsJson } from "../report/findingsJson.ts";
import { blocksBetween } from "./blocksBetween.ts";
import { blockHints, type Hint } from "./inlayHints.ts";

/** A line of a note with what is computed for it. */
export interface ValuedLine {
  /** From 0. */
  readonly line: number;
  /** As the author wrote it. */
  readonly text: string;
  /** With each value behind its clause. */
  readonly annotated: string;
  /** The values alone, in their order: "≈ 56.02 t, vs1g 129 kt". */
  readonly values: readonly string[];
  readonly findings: readonly FindingJson[];
}

/** The lines from one to another, both included, with every value there is: what hints leave out for want of room, too. */
export function valuedLines(note: Note, from: number, to: number): readonly ValuedLine[] {
  const last = Math.min(to, note.document.lineCount - 1);
  const hints = blocksBetween(note, from, last).flatMap((block) =>
    blockHints({ flavour: "plumb" }, block, "full"),
  );
  const findings = findingsJson(note);
  const lines: ValuedLine[] = [];
  for (let line = from; line <= last; line++) {
    const text = note.document.lineText(line);
    const own = hints.filter((hint) => hint.line === line);
    lines.push({
      line,
      text,
      annotated: withHints(text, own),
      values: own.map(hintText),
      findings: findings.filter((one) => one.line === line + 1),
    });
  }
  return lines;
}

/** A line with each hint at its place; `draw` may set a hint apart. */
export function withHints(
  text: string,
  hints: readonly Hint[],
  draw: (hint: string) => string = (hint) => hint,
): string {
  let shown = text;
  // From the right, so that the columns of those on the left stay.
  for (const hint of [...hints].reverse()) {
    shown = `${shown.slice(0, hint.character)}${draw(` ${hintText(hint)}`)}${shown.slice(hint.character)}`;
  }
  return shown;
}

function hintText({ parts }: Hint): string {
  return parts.map(({ text }) => text).join("");
}
