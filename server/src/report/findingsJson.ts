import type { Acceptance } from "../plan/finding.ts";
import type { Note } from "../plan/note.ts";
import type { JsonValue } from "./pointsJson.ts";

/** One finding as scripts read it: lines and columns count from 1, columns in UTF-16 code units. */
export interface FindingJson {
  readonly [key: string]: JsonValue;
  readonly code: string;
  readonly severity: string;
  readonly line: number;
  readonly column: number;
  readonly endLine: number;
  readonly endColumn: number;
  readonly message: string;
  /** Who took it and why; null where nobody did. */
  readonly accepted: Acceptance | null;
  readonly expected: boolean;
}

export function findingsJson(note: Note): readonly FindingJson[] {
  return note.findings().map(({ line, finding }) => ({
    code: finding.code,
    severity: finding.severity,
    line: line + 1,
    column: finding.span.start + 1,
    endLine: line + 1,
    endColumn: finding.span.end + 1,
    message: finding.message,
    accepted: finding.accepted ?? null,
    expected: finding.expected ?? false,
  }));
}
