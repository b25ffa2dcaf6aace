import type { BlockKind } from "../notation/block.ts";
import { parseLine } from "../notation/parseLine.ts";
import type { Span } from "../notation/span.ts";
import { type Keyword, type KeywordEntry, vocabulary } from "../notation/vocabulary.ts";
import type { BlockResult, Note } from "../plan/note.ts";
import { argumentCompletions } from "./argumentCompletions.ts";
import { blockAt } from "./blocksBetween.ts";
import { keywordText } from "./hover.ts";
import { lastUnit } from "./lastUnit.ts";

export interface Completion {
  readonly label: string;
  readonly kind: "keyword" | "name" | "unit" | "value" | "word";
  readonly detail: string;
  /** Markdown; null where the label says it all. */
  readonly documentation: string | null;
  /** What replaces `span`; `$0` is where the cursor stops, where `snippet` is true. */
  readonly insertText: string;
  readonly snippet: boolean;
  /** The order in the list. */
  readonly rank: number;
  readonly span: Span;
}

/** What completion needs to know of the place. */
export interface CompletionPlace {
  readonly note: Note;
  readonly result: BlockResult | null;
  readonly line: number;
  /** The clause up to the cursor: its keyword and what follows. */
  readonly before: string;
  /** What is typed of the word under the cursor, which completion replaces. */
  readonly word: string;
  readonly span: Span;
}

/** Nothing in prose, remarks and titles; else keywords at a clause's start and arguments after one. */
export function completion(note: Note, line: number, character: number): readonly Completion[] {
  const kind = note.document.lineKind(line);
  if (kind !== "bar") return [];
  const text = note.document.lineText(line);
  const left = text.slice(0, character);
  if (inRemarkOrTitle(text, character)) return [];
  const clauseStart = startOfClause(text, character);
  const before = left.slice(clauseStart).trimStart();
  const word = /[\p{L}\p{M}\p{N}°%/-]*$/u.exec(left)?.[0] ?? "";
  const span = { start: character - word.length, end: character };
  const place: CompletionPlace = { note, result: blockAt(note, line), line, before, word, span };
  if (!/\s/.test(before)) return keywordCompletions(place);
  return argumentCompletions(place);
}

function startOfClause(text: string, character: number): number {
  let start = text.indexOf("|") + 1;
  for (const { start: at, end, kind } of parseLine(text).tokens) {
    if (character <= at) break;
    if (kind === "separator") start = end;
  }
  return start;
}

function inRemarkOrTitle(text: string, character: number): boolean {
  return parseLine(text).tokens.some(({ kind, start, end }) => {
    if (kind !== "remark" && kind !== "title") return false;
    const closed = kind === "remark" ? text.charAt(end - 1) === ")" : end - start > 1;
    return start < character && (character < end || (!closed && character === end));
  });
}

/** What a point still lacks comes first, and never a clause that is there already. */
function keywordCompletions(place: CompletionPlace): readonly Completion[] {
  const { note, result, line, span } = place;
  const kind = blockKindAt(place);
  const there = new Set<Keyword>();
  for (const { clause } of result?.block.clauses ?? []) {
    // The word being typed is no clause yet.
    if (clause.keyword && clause.keywordSpan.end !== span.end) there.add(clause.keyword);
  }
  const lacking = lackingKeywords(result);
  const start = result === null || there.size === 0;
  const offered = vocabulary.filter(
    (entry) => isOffered(entry, kind, start) && (!there.has(entry.keyword) || lists(entry.keyword)),
  );
  return offered.map((entry): Completion => {
    const insertText = snippetOf(entry, note, line);
    return {
      label: entry.keyword,
      kind: "keyword",
      detail: entry.pattern,
      documentation: keywordText(entry.keyword),
      insertText,
      snippet: insertText.includes("$"),
      rank: rankOf(entry.keyword, start, lacking),
      span,
    };
  });
}

/** At a block's start a point, then a card and limits; inside one what it still lacks. */
function rankOf(keyword: Keyword, start: boolean, lacking: ReadonlySet<Keyword>): number {
  if (start && (keyword === "phase" || keyword === "fly")) return 0;
  if (lacking.has(keyword) || (start && (keyword === "aircraft" || keyword === "limits"))) return 1;
  return 2;
}

function snippetOf(entry: KeywordEntry, note: Note, line: number): string {
  if (entry.keyword === "aircraft") {
    return 'aircraft ${1:name}\n| source "${2:flight manual}" issue ${3:1}\n| basis ${4|vsr,vs1g,vs|}; reference ${5}\n| config ${6:clean} stall $0';
  }
  if (entry.keyword === "limits") return "limits ${1:name}, from common-practice\n| must any bank $0";
  const unit = lastUnit(note, line, entry.keyword);
  if (unit === null) return entry.snippet;
  return unit === "FL" ? `${entry.keyword} FL$0` : `${entry.keyword} $1 ${unit}$0`;
}

/** Clauses that may stand more than once. */
function lists(keyword: Keyword): boolean {
  return [
    "config",
    "contamination",
    "lift-mach",
    "buffet",
    "ias",
    "published",
    "must",
    "should",
    "claim",
    "expect",
    "accept",
  ].includes(keyword);
}

function blockKindAt({ result }: CompletionPlace): BlockKind {
  return result?.block.kind ?? "setting";
}

/** At a block's start every keyword that may begin one; inside, those of the block's kind. */
function isOffered({ keyword, blocks }: KeywordEntry, kind: BlockKind, start: boolean): boolean {
  if (keyword === "aircraft" || keyword === "limits") return start;
  if (start) return blocks.includes("point") || blocks.includes("setting");
  if (keyword === "config" || keyword === "contamination") return kind !== "limits";
  return blocks.includes(kind) || (kind === "setting" && blocks.includes("point"));
}

function lackingKeywords(result: BlockResult | null): ReadonlySet<Keyword> {
  if (result?.kind === "card") {
    const { card } = result;
    const missing: Keyword[] = [];
    if (!card.basis) missing.push("basis");
    if (!card.referenceMass) missing.push("reference");
    if (card.configurations.length === 0) missing.push("config");
    if (!card.source) missing.push("source");
    return new Set(missing);
  }
  if (result?.kind !== "point") return new Set();
  const { inputs } = result.point;
  return new Set(
    (["fly", "weight", "config", "altitude", "speed", "bank"] as const).filter((one) => !inputs.has(one)),
  );
}
