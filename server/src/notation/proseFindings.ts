import { isBlank, isLetter } from "./characters.ts";
import type { LineKind, LineState } from "./classify.ts";
import type { TextFinding } from "./finding.ts";
import { parseLine } from "./parseLine.ts";
import type { BarLine } from "./tree.ts";
import { keywordOf } from "./vocabulary.ts";

/** A line of a document. All but `kind` follows from its text and what is open above it. */
export interface Line {
  readonly text: string;
  /** Its line end as written; empty on the last line. */
  end: string;
  /** Null until it is classified. */
  kind: LineKind | null;
  /** The kind before tables are told from blocks. */
  raw: LineKind | null;
  /** What is open above the line, and after it. */
  before: LineState;
  after: LineState;
  opens: boolean;
  tree: BarLine | null;
  /** Clauses the line would have if a bar stood before it, 0 if it would not read without error; -1 until asked. */
  likeness: number;
}

const noFindings: readonly TextFinding[] = [];

/** Slips at the bar: prose that reads as notation, fences without a bar line, fences left open. */
export function proseFindings(lines: readonly Line[], everywhere: boolean): readonly TextFinding[] {
  const findings: TextFinding[] = [];
  let open = -1;
  let bars = 0;
  let texts = 0;
  for (let i = 0; i < lines.length; i++) {
    const line = lines[i] as Line;
    if (line.opens) {
      open = i;
      bars = 0;
      texts = 0;
      continue;
    }
    if (line.kind === "bar") bars++;
    else if (line.kind === "prose") {
      if (line.text.length > 3 && (everywhere || line.after !== null)) missingBar(lines, i, findings);
      if (open >= 0 && texts === 0 && line.text.trim() !== "") texts++;
    } else if (line.kind === "fence" && line.after !== null) {
      if (line.text.trimStart().startsWith("|")) bars++;
    } else if (line.kind === "plumb-fence" && open >= 0) {
      if (texts > 0 && bars === 0) findings.push(noBarLines(lines, open));
      open = -1;
    } else if (line.kind === "fence" && line.after === null) open = -1;
  }
  if (open >= 0) unclosed(lines, open, bars, findings);
  return findings.length > 0 ? findings : noFindings;
}

/** True for a line that may have a finding here: a fence, or prose that reads as notation. */
export function isSuspect(line: Line): boolean {
  if (line.opens) return true;
  return line.raw === "prose" && line.text.length > 3 && likeness(line) > 0;
}

function likeness(line: Line): number {
  if (line.likeness < 0) line.likeness = computeLikeness(line.text);
  return line.likeness;
}

/** Only a line that begins with a keyword is worth parsing. */
function computeLikeness(text: string): number {
  let start = 0;
  while (isBlank(text.charCodeAt(start))) start++;
  let end = start;
  while (isLetter(text.charCodeAt(end)) || text.charCodeAt(end) === 45) end++;
  if (end === start || !keywordOf(text.slice(start, end))) return 0;
  const { clauses, findings } = parseLine(`|${text}`);
  return findings.length === 0 ? clauses.length : 0;
}

function missingBar(lines: readonly Line[], index: number, findings: TextFinding[]): void {
  const line = lines[index] as Line;
  const clauses = likeness(line);
  if (clauses === 0) return;
  const touches = lines[index - 1]?.kind === "bar" || lines[index + 1]?.kind === "bar";
  if (!touches && clauses < 2) return;
  const start = line.text.length - line.text.trimStart().length;
  findings.push({
    code: "missing-bar",
    line: index,
    span: { start, end: line.text.trimEnd().length },
    message:
      "This line reads as notation but no bar stands before it, so it is prose: write `|` before it, or begin it with `\\|` if it is meant as prose.",
    fixes: [
      {
        title: "Write | before it",
        preferred: true,
        edits: [{ line: index, start, end: start, newText: "| " }],
      },
    ],
  });
}

function noBarLines(lines: readonly Line[], open: number): TextFinding {
  const { text } = lines[open] as Line;
  return {
    code: "no-bar-lines",
    line: open,
    span: { start: text.length - text.trimStart().length, end: text.trimEnd().length },
    message:
      "This plumb fence holds text and no bar line, so nothing in it is read: begin its lines with `|`.",
    fixes: [],
  };
}

/** A fence that is left open swallows the rest of the file. */
function unclosed(lines: readonly Line[], open: number, bars: number, findings: TextFinding[]): void {
  const line = lines[open] as Line;
  const state = line.after;
  if (!state || state === "front-matter" || (!state.plumb && bars === 0)) return;
  const last = lines.length - 1;
  const marks = String.fromCharCode(state.mark).repeat(state.length);
  const lastText = (lines[last] as Line).text;
  findings.push({
    code: "unclosed-fence",
    line: open,
    span: { start: line.text.length - line.text.trimStart().length, end: line.text.trimEnd().length },
    message: state.plumb
      ? `This fence is not closed, so everything below it is in it: write \`${marks}\` where it ends.`
      : `This fence is not closed, so the bar lines below it are not read: write \`${marks}\` where it ends.`,
    fixes: [
      {
        title: "Close the fence at the end of the file",
        edits: [
          {
            line: last,
            start: lastText.length,
            end: lastText.length,
            newText: `${lastText === "" ? "" : "\n"}${marks}`,
          },
        ],
      },
    ],
  });
}
