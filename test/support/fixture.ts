/** A text with a cursor mark `$0`, as its lines without it and the place where it stood. */
export interface Fixture {
  readonly text: string;
  readonly line: number;
  readonly character: number;
}

export function atCursor(marked: string): Fixture {
  const at = marked.indexOf("$0");
  if (at < 0) throw new Error("The fixture has no $0.");
  const before = marked.slice(0, at).split("\n");
  return {
    text: marked.slice(0, at) + marked.slice(at + 2),
    line: before.length - 1,
    character: before[before.length - 1]?.length ?? 0,
  };
}

/** A stretch of a line that carets mark, with what is written behind them. */
export interface Mark {
  readonly line: number;
  readonly start: number;
  readonly end: number;
  readonly says: string;
}

/**
 * Takes apart a text in which a line of carets stands under what is expected there:
 *
 *     | weight 61.4
 *              ^^^^ missing-unit
 */
export function withMarks(marked: string): { readonly text: string; readonly marks: readonly Mark[] } {
  const lines: string[] = [];
  const marks: Mark[] = [];
  for (const line of marked.split("\n")) {
    const caret = /^(\s*)(\^+)\s+(.+)$/.exec(line);
    if (!caret) {
      lines.push(line);
      continue;
    }
    const start = caret[1]?.length ?? 0;
    marks.push({ line: lines.length - 1, start, end: start + (caret[2]?.length ?? 0), says: caret[3] ?? "" });
  }
  return { text: lines.join("\n"), marks };
}

/**
 * Takes apart a text in which stretches stand between `⟦` and `⟧`, the ones that begin with `=` marked
 * as `gives` and the others as `uses`: for a text where carets would stand too far from their words.
 */
export function withBrackets(marked: string): { readonly text: string; readonly marks: readonly Mark[] } {
  const marks: Mark[] = [];
  const lines = marked.split("\n").map((line, at) => {
    let plain = "";
    for (const [i, part] of line.split(/⟦|⟧/).entries()) {
      const inside = i % 2 === 1;
      const gives = inside && part.startsWith("=");
      const text = gives ? part.slice(1) : part;
      if (inside) {
        const start = plain.length;
        marks.push({ line: at, start, end: start + text.length, says: gives ? "gives" : "uses" });
      }
      plain += text;
    }
    return plain;
  });
  return { text: lines.join("\n"), marks };
}
