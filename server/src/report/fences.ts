import { caution } from "../plan/caution.ts";
import type { Note } from "../plan/note.ts";
import { findingsJson } from "./findingsJson.ts";
import { pointsTable, type TableRow } from "./pointsTable.ts";

/** A finding as a reader of a fence is told it; the line counts from 1. */
export interface FenceFinding {
  readonly line: number;
  readonly severity: string;
  readonly code: string;
  readonly message: string;
}

/** One `plumb` fence with everything that is shown of it, written out: nobody has to compute or to round. */
export interface Fence {
  /** The line of the opening mark, from 0. */
  readonly line: number;
  /** The line behind the closing mark, or behind the note where none closes it; from 0. */
  readonly endLine: number;
  readonly closed: boolean;
  readonly caption: string;
  /** Empty where the fence holds no point. */
  readonly rows: readonly TableRow[];
  readonly findings: readonly FenceFinding[];
}

/** Every `plumb` fence of a Markdown note, in the order of its lines. */
export interface Fences {
  readonly head: TableRow;
  readonly fences: readonly Fence[];
  readonly caution: string;
}

/** The fences of a note as tables of their points, each figure as the one formatter writes it. */
export function fences(note: Note): Fences {
  const { head, rows } = pointsTable(note);
  const findings = findingsJson(note).map(({ line, severity, code, message }) => ({
    line,
    severity,
    code,
    message,
  }));
  const found = places(note).map((place): Fence => {
    const holds = (line: number) => place.line < line && line <= place.endLine;
    return {
      ...place,
      caption: `Points of lines ${place.line + 1} to ${place.endLine}`,
      rows: rows.filter(([line]) => holds(Number(line))),
      findings: findings.filter(({ line }) => holds(line)),
    };
  });
  return { head, fences: found, caution };
}

function places({ document }: Note): readonly Pick<Fence, "line" | "endLine" | "closed">[] {
  const found: Pick<Fence, "line" | "endLine" | "closed">[] = [];
  let open: number | null = null;
  for (let line = 0; line < document.lineCount; line++) {
    if (document.lineKind(line) !== "plumb-fence") continue;
    if (open === null) open = line;
    else {
      found.push({ line: open, endLine: line + 1, closed: true });
      open = null;
    }
  }
  if (open !== null) found.push({ line: open, endLine: document.lineCount, closed: false });
  return found;
}
