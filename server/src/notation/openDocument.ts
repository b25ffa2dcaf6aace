import type { Block } from "./block.ts";
import {
  classify,
  hasSecondBar,
  isDelimiterRow,
  type LineKind,
  type LineState,
  sameState,
} from "./classify.ts";
import type { BlockChange, Document, Flavour, Position } from "./document.ts";
import type { TextFinding } from "./finding.ts";
import { makeBlock } from "./makeBlock.ts";
import { parseLine } from "./parseLine.ts";
import { isSuspect, type Line, proseFindings } from "./proseFindings.ts";
import type { BarLine } from "./tree.ts";

/** Opens a text as a document that can be edited in place. */
export function openDocument(text: string, flavour: Flavour): Document {
  return new OpenDocument(text, flavour);
}

const noFindings: readonly TextFinding[] = [];

class OpenDocument implements Document {
  readonly flavour: Flavour;
  readonly #everywhere: boolean;
  #lines: Line[] = [];
  #blocks: Block[] = [];
  #findings: readonly TextFinding[] | null = null;
  #suspects = 0;

  constructor(text: string, flavour: Flavour) {
    this.flavour = flavour;
    this.#everywhere = flavour === "plumb";
    this.#reset(text);
  }

  get lineCount(): number {
    return this.#lines.length;
  }

  get lineEnd(): string {
    return this.#lines[0]?.end || "\n";
  }

  lineText(line: number): string {
    return this.#lines[line]?.text ?? "";
  }

  lineKind(line: number): LineKind {
    return this.#lines[line]?.kind ?? "prose";
  }

  get blocks(): readonly Block[] {
    return this.#blocks;
  }

  blockAt(line: number): Block | null {
    const index = this.#firstBlockFrom(line + 1) - 1;
    const block = this.#blocks[index];
    return block && line < block.start + block.lines.length ? block : null;
  }

  get findings(): readonly TextFinding[] {
    this.#findings ??= this.#suspects === 0 ? noFindings : proseFindings(this.#lines, this.#everywhere);
    return this.#findings;
  }

  text(): string {
    let text = "";
    for (const line of this.#lines) text += line.text + line.end;
    return text;
  }

  edit(start: Position, end: Position, newText: string): BlockChange {
    const [from, to] = this.#ordered(start, end);
    const first = this.#lines[from.line] as Line;
    const last = this.#lines[to.line] as Line;
    const fresh = splitLines(first.text.slice(0, from.character) + newText + last.text.slice(to.character));
    (fresh[fresh.length - 1] as Line).end = last.end;
    if (this.#joinsLineEnds(fresh, from.line)) {
      splice(this.#lines, from.line, to.line - from.line + 1, fresh);
      const removed = this.#blocks.length;
      this.#reset(this.text());
      return { from: 0, removed, added: this.#blocks.length };
    }
    const removed = to.line - from.line + 1;
    this.#watch(from.line, to.line, -1);
    splice(this.#lines, from.line, removed, fresh);
    const delta = fresh.length - removed;
    const changedTo = this.#classifyFrom(from.line, from.line + fresh.length - 1);
    // Lines beyond the edit that are something else now were counted as what they were.
    this.#watch(from.line, from.line + fresh.length - 1, 1);
    if (from.line + fresh.length - 1 < changedTo) this.#count();
    this.#findings = null;
    return this.#rebuildBlocks(from.line, changedTo, delta);
  }

  /** Counts the lines that slips at the bar may come from: where there are none, nothing is looked for. */
  #watch(from: number, to: number, sign: 1 | -1): void {
    for (let i = from; i <= to; i++) if (isSuspect(this.#lines[i] as Line)) this.#suspects += sign;
  }

  #count(): void {
    this.#suspects = 0;
    this.#watch(0, this.#lines.length - 1, 1);
  }

  /** True where a CR now stands before a LF: the two are one line end, and the text is split anew. */
  #joinsLineEnds(fresh: readonly Line[], at: number): boolean {
    const before = at > 0 ? [this.#lines[at - 1] as Line] : [];
    const around = [...before, ...fresh];
    return around.some((line, i) => {
      const next = around[i + 1];
      return line.end === "\r" && next !== undefined && next.text === "" && next.end === "\n";
    });
  }

  #reset(text: string): void {
    this.#lines = splitLines(text);
    this.#classifyFrom(0, this.#lines.length - 1);
    this.#blocks = this.#makeBlocks(0, this.#lines.length - 1, []);
    this.#count();
    this.#findings = null;
  }

  #ordered(start: Position, end: Position): readonly [Position, Position] {
    const a = this.#clamp(start);
    const b = this.#clamp(end);
    const swapped = b.line < a.line || (b.line === a.line && b.character < a.character);
    return swapped ? [b, a] : [a, b];
  }

  #clamp({ line, character }: Position): Position {
    if (line < 0) return { line: 0, character: 0 };
    const last = this.#lines.length - 1;
    if (last < line) return { line: last, character: (this.#lines[last] as Line).text.length };
    const length = (this.#lines[line] as Line).text.length;
    return { line, character: Math.min(Math.max(character, 0), length) };
  }

  /** Classifies from a line on, at least up to `to`, until what reaches the next line is what it was. Gives the last line done. */
  #classifyFrom(from: number, to: number): number {
    const lines = this.#lines;
    let state: LineState = from === 0 ? null : (lines[from - 1] as Line).after;
    for (let i = from; i < lines.length; i++) {
      const line = lines[i] as Line;
      if (to < i && line.kind !== null && sameState(line.before, state)) return i - 1;
      const { kind, after, opens } = classify(line.text, state, i === 0, this.#everywhere);
      line.before = state;
      line.raw = kind;
      line.kind = kind;
      line.after = after;
      line.opens = opens;
      state = after;
    }
    return lines.length - 1;
  }

  #rebuildBlocks(from: number, to: number, delta: number): BlockChange {
    // A run of bar lines is one block or one table: what touches the change is read again with it.
    let first = from;
    while (first > 0 && (this.#lines[first - 1] as Line).raw === "bar") first--;
    let last = to;
    while (last + 1 < this.#lines.length && (this.#lines[last + 1] as Line).raw === "bar") last++;
    const head = this.#firstBlockFrom(first);
    const tail = Math.max(head, this.#firstBlockFrom(last - delta + 1));
    const gone = this.#blocks.slice(head, tail);
    if (delta !== 0)
      for (let i = tail; i < this.#blocks.length; i++) (this.#blocks[i] as Block).start += delta;
    const come = this.#makeBlocks(first, last, gone);
    splice(this.#blocks, head, gone.length, come);
    return { from: head, removed: gone.length, added: come.length };
  }

  /** Index of the first block that starts at or after the line. */
  #firstBlockFrom(line: number): number {
    let low = 0;
    let high = this.#blocks.length;
    while (low < high) {
      const middle = (low + high) >> 1;
      if ((this.#blocks[middle] as Block).start < line) low = middle + 1;
      else high = middle;
    }
    return low;
  }

  /** The blocks of a stretch of lines that begins and ends with whole runs; one whose lines are as they were is kept. */
  #makeBlocks(from: number, to: number, old: readonly Block[]): Block[] {
    const lines = this.#lines;
    const made: Block[] = [];
    for (let i = from; i <= to; i++) {
      if ((lines[i] as Line).raw !== "bar") continue;
      let end = i + 1;
      while (end < lines.length && (lines[end] as Line).raw === "bar") end++;
      const table = isTable(lines, i, end);
      for (let j = i; j < end; j++) (lines[j] as Line).kind = table ? "table" : "bar";
      if (!table) made.push(this.#block(i, end, old));
      i = end - 1;
    }
    return made;
  }

  #block(from: number, end: number, old: readonly Block[]): Block {
    const trees: BarLine[] = [];
    for (let i = from; i < end; i++) {
      const line = this.#lines[i] as Line;
      line.tree ??= parseLine(line.text);
      trees.push(line.tree);
    }
    const kept = old.find(
      (block) => block.lines.length === trees.length && block.lines.every((tree, i) => tree === trees[i]),
    );
    if (kept) {
      kept.start = from;
      return kept;
    }
    return makeBlock(trees, from);
  }
}

/** A run of bar lines whose second is a delimiter row, and whose first two each hold a second bar. */
function isTable(lines: readonly Line[], from: number, end: number): boolean {
  if (end - from < 2) return false;
  const head = (lines[from] as Line).text;
  const second = (lines[from + 1] as Line).text;
  return isDelimiterRow(second) && hasSecondBar(head) && hasSecondBar(second);
}

function splitLines(text: string): Line[] {
  const lines: Line[] = [];
  let start = 0;
  for (;;) {
    let end = start;
    let code = 0;
    while (end < text.length) {
      code = text.charCodeAt(end);
      if (code === 10 || code === 13) break;
      end++;
    }
    if (end === text.length) {
      lines.push(newLine(text.slice(start), ""));
      return lines;
    }
    const mark = code === 13 ? (text.charCodeAt(end + 1) === 10 ? "\r\n" : "\r") : "\n";
    lines.push(newLine(text.slice(start, end), mark));
    start = end + mark.length;
  }
}

function newLine(text: string, end: string): Line {
  return {
    text,
    end,
    kind: null,
    raw: null,
    before: null,
    after: null,
    opens: false,
    tree: null,
    likeness: -1,
  };
}

/** `splice` with many items without spreading them over the stack. */
function splice<T>(array: T[], at: number, remove: number, items: readonly T[]): void {
  if (items.length < 1000) {
    array.splice(at, remove, ...items);
    return;
  }
  const tail = array.slice(at + remove);
  array.length = at;
  for (const item of items) array.push(item);
  for (const item of tail) array.push(item);
}
