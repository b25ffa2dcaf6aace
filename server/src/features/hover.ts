import type { PlacedClause } from "../notation/block.ts";
import type { Span } from "../notation/span.ts";
import type { Clause } from "../notation/tree.ts";
import { type Keyword, keywordEntry } from "../notation/vocabulary.ts";
import type { Card } from "../plan/card.ts";
import { formatMass, formatSpeed } from "../plan/format.ts";
import type { Limits } from "../plan/limits.ts";
import type { BlockResult, Note } from "../plan/note.ts";
import { plainMarkdown } from "../report/plainMarkdown.ts";
import { blockAt } from "./blocksBetween.ts";
import { derivation } from "./derivation.ts";
import { place } from "./place.ts";
import { targetAt } from "./target.ts";

export interface Hover {
  readonly line: number;
  readonly span: Span;
  /** Markdown. */
  readonly text: string;
}

/** What stands under the cursor: a name's definition, or the clause's result with its derivation. */
export function hover(note: Note, line: number, character: number): Hover | null {
  const result = blockAt(note, line);
  if (!result) return null;
  const placed = clauseAt(result, line, character);
  if (!placed) return null;
  const target = targetAt(note, result, placed, character);
  if (target && !inside(placed.clause.keywordSpan, character)) {
    return { line, span: target.span, text: definitionText(target.definition, note.uri) };
  }
  const onKeyword = inside(placed.clause.keywordSpan, character);
  const text = clauseText(result, placed, note.uri, onKeyword);
  return text ? { line, span: onKeyword ? placed.clause.keywordSpan : placed.clause.span, text } : null;
}

export function clauseAt(result: BlockResult, line: number, character: number): PlacedClause | null {
  const index = line - result.block.start;
  return (
    result.block.clauses.find((placed) => placed.line === index && inside(placed.clause.span, character)) ??
    null
  );
}

function inside(span: Span, character: number): boolean {
  return span.start <= character && character <= span.end;
}

function clauseText(
  result: BlockResult,
  placed: PlacedClause,
  uri: string,
  onKeyword: boolean,
): string | null {
  const { clause } = placed;
  const keyword = clause.keyword;
  if (keyword === null) return null;
  if (result.kind === "point" && (keyword === "phase" || !onKeyword || hasFigures(keyword))) {
    return `${derivation(result.point, placed, uri)}\n\n${keywordText(keyword, clause)}`;
  }
  return keywordText(keyword, clause);
}

/** Keywords whose own hover begins with what is computed. */
function hasFigures(keyword: Keyword): boolean {
  return [
    "weight",
    "burn",
    "altitude",
    "speed",
    "bank",
    "load",
    "path",
    "contamination",
    "claim",
    "config",
    "gust",
    "shear",
    "decel",
    "power",
    "accept",
    "expect",
  ].includes(keyword);
}

/** The documentation of a keyword, as completion shows it too. */
export function keywordText(keyword: Keyword, clause: Clause | null = null): string {
  const entry = keywordEntry(keyword);
  const pattern = entry.pattern ? ` ${entry.pattern}` : "";
  const head = clause ? "---\n\n" : "";
  return `${head}\`${keyword}${pattern}\`\n\n${entry.documentation}\n\nExample: \`${entry.example}\``;
}

function definitionText(definition: Card | Limits, uri: string): string {
  return "configurations" in definition ? cardText(definition, uri) : limitsText(definition, uri);
}

function where(definition: Card | Limits, uri: string): string {
  return "builtIn" in definition && definition.builtIn ? "built in" : place(definition.origin, uri);
}

/** The title behind a name, if there is one. */
function titled({ name, title }: Card | Limits): string {
  return `**${name}**${title ? ` - ${plainMarkdown(title)}` : ""}`;
}

function sourceText(definition: Card | Limits): string {
  const { source } = definition;
  if (!source) return "No source stated.";
  return `Source: ${plainMarkdown(source.title)}${source.issue ? `, issue ${source.issue}` : ""}${source.from ? `, from ${source.from}` : ""}.`;
}

function cardText(card: Card, uri: string): string {
  const reference = card.referenceMass?.value ?? null;
  const rows = card.configurations.map((one) => {
    const stall = one.statedStall === null ? "?" : formatSpeed(one.statedStall);
    const marks = [one.takeoff ? "takeoff" : "", one.landing ? "landing" : ""].filter(Boolean).join(", ");
    return `| ${one.name} | ${stall} | ${marks} |`;
  });
  const basis = card.basis?.value;
  const held =
    reference && basis
      ? `Stall speeds (${basis.kind}${basis.kind === "vs" ? ` ${basis.factor}` : ""}) at ${formatMass(reference, reference)}:`
      : "";
  return [
    `${titled(card)} (${where(card, uri)})`,
    held,
    ["| configuration | stall | marked |", "| --- | --- | --- |", ...rows].join("\n"),
    sourceText(card),
  ]
    .filter(Boolean)
    .join("\n\n");
}

function limitsText(limits: Limits, uri: string): string {
  const rows = limits.rows.map(
    (row) => `- ${plainMarkdown(row.text)}${row.remark ? ` *(${plainMarkdown(row.remark)})*` : ""}`,
  );
  return [
    `${titled(limits)} (${where(limits, uri)})`,
    rows.join("\n"),
    sourceText(limits),
    limits.builtIn ? "Replace these by the operator's own." : "",
  ]
    .filter(Boolean)
    .join("\n\n");
}
