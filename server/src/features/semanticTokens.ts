import type { Block, PlacedClause } from "../notation/block.ts";
import type { Span } from "../notation/span.ts";
import type { Token } from "../notation/token.ts";
import type { Keyword } from "../notation/vocabulary.ts";
import type { Note } from "../plan/note.ts";
import { type NameKind, namesIn } from "./namesIn.ts";

/**
 * What a stretch of a bar line is, as the protocol calls it where it has a word for it. Words of a
 * closed list are `enumMember`, results and speeds with a name `variable`, what a row or a
 * configuration states `type`, the kind of an airspeed `modifier` and a finding's code `event`.
 */
export const colours = [
  "keyword",
  "class",
  "namespace",
  "property",
  "enumMember",
  "variable",
  "type",
  "modifier",
  "event",
  "number",
  "unit",
  "string",
  "comment",
  "operator",
] as const;
export type Colour = (typeof colours)[number];

export interface ColouredToken extends Span {
  readonly line: number;
  readonly colour: Colour;
  /** True for the name that a definition gives. */
  readonly defines: boolean;
}

const nameColours: Readonly<Record<NameKind, Colour>> = {
  card: "class",
  limits: "namespace",
  configuration: "property",
  contaminant: "property",
};

/** What the bar lines among some lines are made of, in the order of the text; nothing is evaluated for it. */
export function semanticTokens(note: Note, from: number, to: number): readonly ColouredToken[] {
  const found: ColouredToken[] = [];
  for (const block of note.document.blocks) {
    if (to < block.start || block.start + block.lines.length <= from) continue;
    for (const token of tokensOf(block)) {
      const line = block.start + token.line;
      if (from <= line && line <= to) found.push({ ...token, line });
    }
  }
  return found;
}

/** A block whose lines stay is coloured once: an edit in a long note costs its own block. */
const coloured = new WeakMap<Block, readonly ColouredToken[]>();

/** The block's tokens with their lines counted from its first. */
function tokensOf(block: Block): readonly ColouredToken[] {
  const known = coloured.get(block);
  if (known) return known;
  const tokens = blockTokens(block);
  coloured.set(block, tokens);
  return tokens;
}

function blockTokens(block: Block): readonly ColouredToken[] {
  return block.lines.flatMap(({ text, tokens }, index) => {
    const clauses = block.clauses.filter((placed) => placed.line === index);
    const names = clauses.flatMap((placed) => namesIn(placed, block));
    return tokens.flatMap((token, i): readonly ColouredToken[] => {
      const { start, end } = token;
      const name = names.find((one) => one.name.span.start === start);
      const own = clauses.find(({ clause: { span } }) => span.start <= start && start < span.end);
      const colour = name ? nameColours[name.kind] : colourOf(token, tokens[i + 1], text, own);
      const defines = name?.defines === true;
      return colour ? [{ line: index, start, end, colour, defines }] : [];
    });
  });
}

function colourOf(
  token: Token,
  next: Token | undefined,
  text: string,
  placed: PlacedClause | undefined,
): Colour | null {
  switch (token.kind) {
    case "keyword":
    case "number":
    case "unit":
      return token.kind;
    case "title":
      return "string";
    case "remark":
      return "comment";
    case "unknown":
      return "operator";
    case "sign":
      // A sign that touches its number is part of it.
      return next?.kind === "number" && next.start === token.end && token.end - token.start === 1
        ? "number"
        : "operator";
    case "word":
      return placed ? wordColour(text.slice(token.start, token.end).toLowerCase(), token, placed) : null;
    default:
      return null;
  }
}

const connectives: ReadonlySet<string> = new Set([
  "to",
  "by",
  "within",
  "for",
  "per",
  "rad",
  "because",
  "until",
  "issue",
  "from",
  "when",
  "above",
  "below",
  "after",
  "or",
]);

const airspeedKinds: ReadonlySet<string> = new Set(["cas", "eas", "tas", "ias"]);

/** Words that say which part of a card's clause follows. */
const attributes: Partial<Record<Keyword, readonly string[]>> = {
  config: ["stall", "load", "vfe", "takeoff", "landing", "ias"],
  mass: ["landing"],
  wing: ["chord", "slope"],
  buffet: ["cg"],
  vmo: ["ias"],
  vmca: ["ias"],
  vne: ["ias"],
  vno: ["ias"],
};

function wordColour(word: string, { start }: Token, { clause }: PlacedClause): Colour {
  const { keyword, body } = clause;
  if (connectives.has(word)) return "keyword";
  switch (keyword) {
    case "speed":
      if (airspeedKinds.has(word)) return "modifier";
      return word === "m" || word === "mach" ? "unit" : "variable";
    case "claim":
    case "published":
      return "variable";
    case "expect":
    case "accept":
      return word === "not" && body?.kind === "expect" && start < body.codeSpan.start ? "operator" : "event";
    case "must":
    case "should":
      return word === "vs" || (body?.kind === "row" && body.subjectSpan.start === start)
        ? "type"
        : "enumMember";
    default:
      return keyword && attributes[keyword]?.includes(word) ? "type" : "enumMember";
  }
}
