import { parseLine } from "../notation/parseLine.ts";
import type { Span } from "../notation/span.ts";
import type { Token } from "../notation/token.ts";
import { keywordEntry, keywordOf } from "../notation/vocabulary.ts";
import type { Note } from "../plan/note.ts";
import { type Parameter, parametersOf } from "./parametersOf.ts";

/** What a clause takes, and which of it the cursor stands at. */
export interface Signature {
  /** The keyword and its arguments, as the vocabulary writes them. */
  readonly label: string;
  /** Markdown. */
  readonly documentation: string;
  /** Where each argument stands in the label. */
  readonly parameters: readonly Span[];
  readonly active: number;
}

/** Null in prose, in remarks, before a clause has its keyword, and for a clause without arguments. */
export function signatureHelp(note: Note, line: number, character: number): Signature | null {
  const { document } = note;
  if (document.lineKind(line) !== "bar") return null;
  const text = document.lineText(line);
  const before = parseLine(text).tokens.filter(({ start }) => start < character);
  const separator = before.findLastIndex(({ kind }) => kind === "separator" || kind === "bar");
  const [head, ...rest] = before.slice(separator + 1).filter(({ kind }) => kind !== "blank");
  const inRemark = before.some(({ kind, end }) => kind === "remark" && character < end);
  if (head?.kind !== "keyword" || inRemark || (rest.length === 0 && character <= head.end)) return null;
  const keyword = keywordOf(text.slice(head.start, head.end));
  const entry = keyword && keywordEntry(keyword);
  if (!entry || entry.pattern === "") return null;
  const parameters = parametersOf(entry.pattern);
  const offset = entry.keyword.length + 1;
  return {
    label: `${entry.keyword} ${entry.pattern}`,
    documentation: `${entry.documentation}\n\nExample: \`${entry.example}\``,
    parameters: parameters.map(({ span }) => ({ start: offset + span.start, end: offset + span.end })),
    active: activeParameter(parameters, rest, text, character),
  };
}

/** Follows what is written up to the cursor through the parameters. */
function activeParameter(
  parameters: readonly Parameter[],
  tokens: readonly Token[],
  text: string,
  character: number,
): number {
  const pair = parameters.findIndex(({ repeats }) => repeats);
  const last = parameters.length - 1;
  let at = 0;
  /** True once the parameter has its value, so that another value is the next one's. */
  let done = false;
  /** The next parameter that a value without a word before it may stand for; a table goes on with its next pair. */
  const after = () => {
    if (0 <= pair && at === last) return pair;
    const bare = parameters.findIndex((one, i) => at < i && one.words.length === 0);
    return 0 <= bare ? bare : Math.min(at + 1, last);
  };
  for (const token of tokens) {
    const word = text.slice(token.start, token.end).toLowerCase();
    const named = parameters.findIndex(({ words }) => words.includes(word));
    if (word === ",") {
      const next = parameters.findIndex(({ afterComma }, i) => at < i && afterComma);
      if (0 <= next) at = next;
      else if (0 <= pair && pair <= after()) at = pair;
      done = false;
    } else if (token.kind === "sign") {
      const tolerance = parameters.findIndex(({ words }) => words.includes("+-"));
      if (0 <= tolerance && text.slice(token.start, token.end) !== "-" && word !== "+") at = tolerance;
    } else if (0 <= named) {
      at = named;
      done = parameters[named]?.choices.includes(word) === true;
    } else if (isValue(token)) {
      const only = parameters[at];
      if (done || only?.hasValue === false) at = after();
      done = true;
    }
  }
  const end = tokens[tokens.length - 1]?.end ?? 0;
  // Behind the blank the next one is due, unless this one still waits for its unit.
  return done && end < character && !awaitsUnit(parameters[at], tokens, text) ? after() : at;
}

function isValue({ kind }: Token): boolean {
  return ["name", "word", "number", "title", "unknown", "unread"].includes(kind);
}

function awaitsUnit(parameter: Parameter | undefined, tokens: readonly Token[], text: string): boolean {
  const token = tokens[tokens.length - 1];
  if (token?.kind !== "number" || !parameter) return false;
  return parameter.measured && !/^fl/i.test(text.slice(token.start, token.end));
}
