import type { Block } from "../notation/block.ts";
import type { Edit, Fix } from "../notation/finding.ts";
import { unitOf } from "../notation/units.ts";
import { isAcceptable } from "../plan/accepts.ts";
import { canCome } from "../plan/expects.ts";
import { figureRules } from "../plan/figureRules.ts";
import type { Finding } from "../plan/finding.ts";
import { formatWritten, writtenFigure } from "../plan/format.ts";
import type { BlockResult, Note } from "../plan/note.ts";
import type { PointResult } from "../plan/point.ts";
import { measure } from "../plan/quantity.ts";
import { blockAt, blocksBetween } from "./blocksBetween.ts";
import { clauseAt } from "./hover.ts";
import { preferredFix } from "./preferredFix.ts";
import { cardInUse } from "./target.ts";

/** A change that is offered, with its edits on lines of the document. */
export interface CodeAction {
  readonly title: string;
  /** A way out of a finding, its acceptance or expectation, or a rewriting that no finding asks for. */
  readonly kind: "fix" | "review" | "rewrite";
  readonly finding: Finding | null;
  readonly findingLine: number;
  readonly edits: readonly Edit[];
  readonly preferred: boolean;
}

/**
 * What is offered on a range of lines: the quick fixes of its findings, taking or expecting a finding,
 * and writing in a value that was sought. All are worked out from the note as it is now.
 */
export function codeActions(note: Note, from: number, to: number): readonly CodeAction[] {
  return [...fixes(note, from, to), ...blocksBetween(note, from, to).flatMap(offers(note, from, to))];
}

function offers(note: Note, from: number, to: number) {
  return (result: BlockResult): readonly CodeAction[] =>
    result.kind === "point"
      ? [...solvedAction(result.point, from, to), ...reviewActions(note, result, from, to)]
      : [];
}

function fixes(note: Note, from: number, to: number): readonly CodeAction[] {
  return note.findings().flatMap(({ line, finding }) => {
    if (line < from || to < line) return [];
    // A finding of a block counts its lines from the block's first, one of the whole note from the note's.
    const base = line - finding.line;
    const own = inOrder(note, line, finding);
    const all = [...own.map((fix) => ({ ...fix, base })), ...joinFix(note, line, finding)];
    const preferred = preferredFix(finding.code, all);
    return all.map(
      (fix): CodeAction => ({
        title: fix.title,
        kind: "fix",
        finding,
        findingLine: line,
        edits: fix.edits.map((edit) => ({ ...edit, line: fix.base + edit.line })),
        preferred: fix === preferred,
      }),
    );
  });
}

/** Writes the value that was found for a `?` in its place, and nothing else. */
function solvedAction({ block, solved }: PointResult, from: number, to: number): readonly CodeAction[] {
  if (!solved?.best || !solved.written) return [];
  const line = block.start + solved.open.placed.line;
  if (line < from || to < line) return [];
  const { value } = solved.open;
  if (value.kind !== "unknown") return [];
  const text = formatWritten(solved.written, solved.what);
  // A unit that is written behind the `?` stays where it is.
  const newText = value.unit === null ? text : (text.split(" ")[0] ?? text);
  const { start } = value.span;
  return [
    {
      title: `Write ${solved.what} ${text} (bound by ${solved.best.boundBy})`,
      kind: "rewrite",
      finding: null,
      findingLine: line,
      edits: [{ line, start, end: start + 1, newText }],
      preferred: false,
    },
  ];
}

/** Taking a finding with a reason, and in an exercise expecting it. The reason is left to be written. */
function reviewActions(
  note: Note,
  { block, point }: Extract<BlockResult, { kind: "point" }>,
  from: number,
  to: number,
): readonly CodeAction[] {
  if (!point.conditions) return [];
  const named = new Set(
    block.clauses.flatMap(({ clause: { body } }) =>
      body?.kind === "accept" || body?.kind === "expect" ? [body.code] : [],
    ),
  );
  return point.findings.flatMap((finding): readonly CodeAction[] => {
    const findingLine = block.start + finding.line;
    // A clause that names the code already is mended where it stands.
    if (findingLine < from || to < findingLine || named.has(finding.code)) return [];
    const action = (title: string, clause: string): CodeAction => ({
      title,
      kind: "review",
      finding,
      findingLine,
      edits: [newLine(note, block, clause)],
      preferred: false,
    });
    const isTold = finding.severity === "error" || finding.severity === "warning";
    // Where no figure is known no `to` can be written, and without one nothing is accepted.
    const hasFigure = finding.figure !== undefined || !figureRules[finding.code];
    return [
      ...(isTold && hasFigure && isAcceptable(finding.code, point.phase)
        ? [action(`Accept ${finding.code}, with a reason`, acceptClause(finding))]
        : []),
      ...(point.phase === "manoeuvre" && canCome(finding.code)
        ? [action(`Expect ${finding.code} in this exercise`, `expect ${finding.code}`)]
        : []),
    ];
  });
}

function acceptClause({ code, figure }: Finding): string {
  const rule = figureRules[code];
  const to = rule && figure !== undefined ? ` to ${writtenFigure(rule, figure)}` : "";
  return `accept ${code}${to} because "" by ""`;
}

/** A bar line of its own below the block, indented as its last line is. */
function newLine(note: Note, block: Block, clause: string): Edit {
  const line = block.start + block.lines.length - 1;
  const text = note.document.lineText(line);
  const indent = /^[^|]*/.exec(text)?.[0] ?? "";
  return { line, start: text.length, end: text.length, newText: `\n${indent}| ${clause}` };
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
