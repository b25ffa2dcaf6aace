import type { BlockResult, Note } from "../plan/note.ts";
import { findingsJson } from "../report/findingsJson.ts";
import { blockAt } from "./blocksBetween.ts";
import { blockHints, type Hint } from "./inlayHints.ts";

/** Everything that is computed and found on a line (from 0) as one sentence to be listened to: no mark in it stands for a word. */
export function readLine(note: Note, line: number): string {
  const where = `Line ${line + 1}`;
  const result = blockAt(note, line);
  const findings = findingsJson(note)
    .filter((one) => one.line === line + 1)
    .map(({ severity, message }) => `${severity}: ${message}`);
  const parts = result
    ? [`${where}, ${nameOf(result)}`, ...values(result, line), ...findings]
    : [`${where} is prose, and nothing is computed for it`, ...findings];
  return `${parts.map((part) => part.replace(/\.$/, "")).join("; ")}.`;
}

function nameOf(result: BlockResult): string {
  switch (result.kind) {
    case "point": {
      const { phase, title, aside } = result.point;
      return [phase ?? "a point without a phase", title, aside ? "aside" : null].filter(Boolean).join(", ");
    }
    case "setting":
      return "setting";
    case "card":
      return `card ${result.card.name}`;
    case "limits":
      return `limits ${result.limits.name}`;
  }
}

/** The values behind the line's own clauses; a line of a point that has none is told the point's. */
function values(result: BlockResult, line: number): readonly string[] {
  const hints = blockHints({ flavour: "plumb" }, result, "full");
  const own = hints.filter((hint) => hint.line === line);
  if (own.length > 0) return own.map((hint) => spoken(result, hint));
  const point = hints.find(({ kind }) => kind === "points");
  return ["no value of its own", ...(point ? [`the point has ${said(point)}`] : [])];
}

function spoken(result: BlockResult, hint: Hint): string {
  const { block } = result;
  const placed = block.clauses.find(
    (one) => block.start + one.line === hint.line && one.clause.span.end === hint.character,
  );
  return `${placed?.clause.keyword ?? "value"}: ${said(hint)}`;
}

/** Where no figure is known, why. */
function said({ parts }: Hint): string {
  const text = parts.map((part) => part.text).join("");
  const why = parts.find((part) => part.text.endsWith("…"))?.tooltip;
  return why ? why.charAt(0).toLowerCase() + why.slice(1).replace(/\.$/, "") : text.replace(/^≈ /, "");
}
