import type { Position } from "../notation/document.ts";
import { parseLine } from "../notation/parseLine.ts";
import type { Span } from "../notation/span.ts";
import type { Note } from "../plan/note.ts";
import { plumbFences } from "./plumbFences.ts";

/** A stretch of the note's text; `end` is exclusive. */
export interface Stretch {
  readonly start: Position;
  readonly end: Position;
}

/**
 * What a selection grows to from a place, the least first: word, argument, clause, line, block or
 * paragraph, fence, note. Each holds the one before. A place beyond the text is brought to its edge.
 */
export function selectionRanges(note: Note, at: Position): readonly Stretch[] {
  const { document } = note;
  const last = document.lineCount - 1;
  const line = Math.min(Math.max(at.line, 0), last);
  const text = document.lineText(line);
  const character = Math.min(Math.max(at.character, 0), text.length);
  const around = (span: Span) => span.start <= character && character <= span.end;
  const inLine = [...wordSpans(text, character), ...barSpans(note, line), ...lineSpans(text)].filter(around);
  const wider = [
    ...blockLines(note, line),
    ...plumbFences(document).flatMap(({ firstLine, lastLine }) => [
      { from: firstLine + 1, to: lastLine - 1 },
      { from: firstLine, to: lastLine },
    ]),
    { from: 0, to: last },
  ].filter(({ from, to }) => from <= line && line <= to);
  return growing([
    ...inLine
      .sort((a, b) => a.end - a.start - (b.end - b.start))
      .map((span) => ({ start: { line, character: span.start }, end: { line, character: span.end } })),
    ...wider.map(({ from, to }) => ({
      start: { line: from, character: 0 },
      end: { line: to, character: document.lineText(to).length },
    })),
  ]);
}

/** The word at the place, also inside a title, a remark or prose. */
function wordSpans(text: string, character: number): readonly Span[] {
  const words = [...text.matchAll(/[\p{L}\p{M}\p{N}]+(?:[-.][\p{L}\p{M}\p{N}]+)*/gu)].map((match) => ({
    start: match.index,
    end: match.index + match[0].length,
  }));
  // Between two words the one that begins here is meant.
  const own =
    words.find(({ start, end }) => start <= character && character < end) ??
    words.find(({ end }) => end === character);
  return own ? [own] : [];
}

/** Tokens, arguments and clauses of a bar line, and all that stands behind the bar. */
function barSpans({ document }: Note, line: number): readonly Span[] {
  if (document.lineKind(line) !== "bar") return [];
  const text = document.lineText(line);
  const { tokens, clauses } = parseLine(text);
  const marked = tokens.filter(({ kind }) => kind !== "blank" && kind !== "indent");
  const first = clauses[0]?.span.start ?? text.length;
  return [
    ...marked,
    ...clauses.flatMap(({ body, span, keywordSpan }) => [keywordSpan, ...spansIn(body), span]),
    { start: first, end: Math.max(first, text.trimEnd().length) },
  ].filter(({ start, end }) => start < end);
}

/** Every span that a clause's body holds, however deep: each argument and its parts. */
function spansIn(value: unknown): readonly Span[] {
  if (typeof value !== "object" || value === null) return [];
  if (isSpan(value)) return [value];
  return Object.values(value).flatMap(spansIn);
}

function isSpan(value: object): value is Span {
  return "start" in value && "end" in value;
}

/** The line's text without the blanks around it, then the whole line. */
function lineSpans(text: string): readonly Span[] {
  const start = text.length - text.trimStart().length;
  return [
    { start, end: Math.max(start, text.trimEnd().length) },
    { start: 0, end: text.length },
  ];
}

/** The block of a bar line; for other text the lines around it that are of its kind and not blank. */
function blockLines({ document }: Note, line: number): readonly { from: number; to: number }[] {
  const block = document.blockAt(line);
  if (block) return [{ from: block.start, to: block.start + block.lines.length - 1 }];
  const kind = document.lineKind(line);
  const belongs = (at: number) => document.lineKind(at) === kind && document.lineText(at).trim() !== "";
  if (kind === "plumb-fence" || !belongs(line)) return [];
  let from = line;
  while (0 < from && belongs(from - 1)) from--;
  let to = line;
  while (to + 1 < document.lineCount && belongs(to + 1)) to++;
  return [{ from, to }];
}

/** Leaves out what does not hold the stretch before, or is the same. */
function growing(stretches: readonly Stretch[]): readonly Stretch[] {
  const kept: Stretch[] = [];
  for (const one of stretches) {
    const last = kept[kept.length - 1];
    if (!last || (holds(one, last) && !holds(last, one))) kept.push(one);
  }
  return kept;
}

function holds(outer: Stretch, inner: Stretch): boolean {
  return compare(outer.start, inner.start) <= 0 && compare(inner.end, outer.end) <= 0;
}

function compare(a: Position, b: Position): number {
  return a.line - b.line || a.character - b.character;
}
