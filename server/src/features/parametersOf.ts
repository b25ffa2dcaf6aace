import type { Span } from "../notation/span.ts";

/** One argument of a clause, as the vocabulary's pattern writes it. */
export interface Parameter {
  /** Where it stands in the pattern. */
  readonly span: Span;
  /** The words, in lower case, that lead to it or are its choices; `+-` for a tolerance. */
  readonly words: readonly string[];
  /** Those of the words that are all that is written. */
  readonly choices: readonly string[];
  /** True where a value follows its words or is all of it, false where the words are all. */
  readonly hasValue: boolean;
  /** True where its number has a unit that cannot be left out. */
  readonly measured: boolean;
  /** True where a comma begins it. */
  readonly afterComma: boolean;
  /** True for the first and the second of a table's pairs, which come again. */
  readonly repeats: boolean;
}

const MEASURED =
  /\b(?:MASS|FLOW|TIME|SPEED|PRESSURE|TEMPERATURE|ALTITUDE|PER CENT|AREA|LENGTH|IAS|CAS|CG|POWER)\b/;

/**
 * Takes a pattern apart: what stands in brackets is one argument, and so are choices between ` | ` and
 * a small word with what follows it. `, …` at the end says that the last two come again as pairs.
 */
export function parametersOf(pattern: string): readonly Parameter[] {
  const repeats = pattern.endsWith(", …");
  const pieces = [
    ...pattern
      .replace(/, …$/, "")
      .matchAll(/\[[^\]]*\]|(?:[a-z][a-z-]* (?!\|))?(?:PER CENT|"…"|\S+)(?: \| (?:PER CENT|\S+))*/g),
  ];
  return pieces.map((match, i) => {
    const [text] = match;
    const words: readonly string[] = text.match(/\+-|[a-z][a-z-]*/g) ?? [];
    return {
      span: { start: match.index, end: match.index + text.length },
      words,
      choices: text
        .replace(/[[\]]/g, "")
        .split(/ ?\| ?/)
        .filter((one) => words.includes(one)),
      hasValue: /[A-Z…]/.test(text),
      measured: MEASURED.test(text),
      afterComma: text.startsWith("[,"),
      repeats: repeats && pieces.length - 2 <= i,
    };
  });
}
