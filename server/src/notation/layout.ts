import type { Block } from "./block.ts";
import type { Document } from "./document.ts";
import type { Token } from "./token.ts";
import type { BarLine } from "./tree.ts";

/** A line of the document that the formatter would write anew. */
export interface LineEdit {
  readonly line: number;
  readonly newText: string;
}

/**
 * Lays out the bar lines of a document, or of some of its lines. It works on the parser's own tokens
 * and changes blanks only; empty clauses and a trailing `;` go. A line with a finding stays byte for byte.
 */
export function layout(document: Document, from = 0, to = document.lineCount - 1): readonly LineEdit[] {
  const edits: LineEdit[] = [];
  for (const block of document.blocks) {
    if (block.start + block.lines.length <= from || to < block.start) continue;
    layoutBlock(block).forEach((newText, index) => {
      const line = block.start + index;
      if (from <= line && line <= to && newText !== block.lines[index]?.text) edits.push({ line, newText });
    });
  }
  return edits;
}

/** The lines of a block as the formatter writes them. */
function layoutBlock(block: Block): readonly string[] {
  const faulty = new Set(block.findings.map((finding) => finding.line));
  const names = block.kind === "card" ? alignedNames(block, faulty) : [];
  return block.lines.map((line, index) =>
    faulty.has(index) ? line.text : layoutLine(line, names[index] ?? 0),
  );
}

/** For each line of a run of `config` lines, the width that its name is padded to; 0 elsewhere. */
function alignedNames(block: Block, faulty: ReadonlySet<number>): readonly number[] {
  const widths = block.lines.map((line, index) => {
    const body = line.clauses[0]?.body;
    const aligns = !faulty.has(index) && body?.kind === "config" && body.attributes.length > 0;
    return aligns ? body.name.text.length : 0;
  });
  const padded = [...widths];
  for (let i = 0; i < widths.length; i++) {
    if (widths[i] === 0) continue;
    let end = i;
    while ((widths[end] ?? 0) > 0) end++;
    const widest = Math.max(...widths.slice(i, end));
    padded.fill(widest, i, end);
    i = end;
  }
  return padded;
}

function layoutLine(line: BarLine, nameWidth: number): string {
  const { text } = line;
  const tokens = line.tokens.filter((token) => token.kind !== "blank");
  let result = "";
  let clause = "";
  let pending = "";
  let previous: Token | null = null;
  let configName = nameWidth > 0;
  for (const token of tokens) {
    const written = text.slice(token.start, token.end);
    if (token.kind === "indent" || token.kind === "bar") {
      result += written;
      continue;
    }
    if (token.kind === "separator") {
      // A separator is written once something follows it, so that empty clauses and a last one go.
      if (previous) pending = ";";
      previous = null;
      clause = "";
      continue;
    }
    if (!previous) {
      result += `${pending} `;
      pending = "";
    } else result += gap(previous, token, text, clause);
    if (token.kind === "keyword") clause = written.toLowerCase();
    result += written;
    if (configName && token.kind === "name") {
      const next = tokens[tokens.indexOf(token) + 1];
      if (next && next.kind !== "separator") result += " ".repeat(nameWidth - written.length);
      configName = false;
    }
    previous = token;
  }
  return result;
}

/** The blank between two neighbours of one clause. */
function gap(left: Token, right: Token, text: string, clause: string): string {
  if (right.kind === "comma") return "";
  if (
    left.kind === "sign" &&
    left.end - left.start === 1 &&
    text[left.start] !== "±" &&
    !isOffset(left, text, clause)
  )
    return "";
  if (right.kind === "unit" && text[right.start] === "°" && left.kind === "number") return "";
  return " ";
}

/** The sign of a speed expression stands between blanks: `vref + 5 kt`. Any other belongs to its number. */
function isOffset(sign: Token, text: string, clause: string): boolean {
  return (
    clause === "speed" &&
    /[a-z0-9]\s*$/i.test(text.slice(0, sign.start)) &&
    !/^speed$/i.test(lastWord(text.slice(0, sign.start)))
  );
}

function lastWord(text: string): string {
  return /([^\s;|]+)\s*$/.exec(text)?.[1] ?? "";
}
