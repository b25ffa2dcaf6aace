import type { Block } from "../../notation/block.ts";
import type { Token, TokenKind } from "../../notation/token.ts";
import type { BarLine } from "../../notation/tree.ts";

/** A clause of a block as it is written, its remarks with it; or a remark that stands alone. */
export interface Part {
  /** Counted from the block's first line. */
  readonly line: number;
  /** As the vocabulary spells it; the word as written where it is no keyword; null for a remark alone. */
  readonly keyword: string | null;
  readonly text: string;
  /** What it says whatever its blanks and the case of its words. */
  readonly says: string;
  readonly words: readonly string[];
}

/** The parts of a block in the order they are written. */
export function partsOf(block: Block): readonly Part[] {
  return block.lines.flatMap((line, index) =>
    stretches(line).flatMap((tokens) => partOf(line, index, tokens)),
  );
}

const silent = new Set<TokenKind>(["indent", "bar", "blank", "slip"]);
const anyCase = new Set<TokenKind>(["keyword", "word", "name", "unit"]);

/** A line's tokens, cut at separators and before each further clause. */
function stretches(line: BarLine): readonly (readonly Token[])[] {
  const starts = new Set(line.clauses.map((clause) => clause.span.start));
  const cut: Token[][] = [[]];
  let clauses = 0;
  for (const token of line.tokens) {
    if (token.kind === "separator") clauses = 0;
    else if (starts.has(token.start)) clauses++;
    if (token.kind === "separator" || (clauses > 1 && starts.has(token.start))) cut.push([]);
    if (token.kind !== "separator" && token.kind !== "bar") cut[cut.length - 1]?.push(token);
  }
  return cut;
}

function partOf({ text, clauses }: BarLine, line: number, tokens: readonly Token[]): readonly Part[] {
  const speaking = tokens.filter((token) => !silent.has(token.kind));
  const [first] = speaking;
  const last = speaking[speaking.length - 1];
  if (!first || !last) return [];
  const clause = clauses.find(({ span }) => first.start <= span.start && span.start < last.end);
  const words = speaking.map((token) => {
    const written = text.slice(token.start, token.end);
    return anyCase.has(token.kind) ? written.toLowerCase() : written;
  });
  return [
    {
      line,
      keyword: clause
        ? (clause.keyword ?? text.slice(clause.keywordSpan.start, clause.keywordSpan.end).toLowerCase())
        : null,
      text: text.slice(first.start, last.end),
      says: words.join(" "),
      words,
    },
  ];
}
