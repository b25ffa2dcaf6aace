import { isBlank, isControl, isInvisible, isNameCharacter } from "./characters.ts";
import type { Fix, TextCode, TextFinding } from "./finding.ts";
import type { Span } from "./span.ts";
import type { Token, TokenKind } from "./token.ts";
import { keywordOf } from "./vocabulary.ts";

const noFindings: readonly TextFinding[] = [];

const LONGEST_QUOTE = 60;

/** Findings that cost only their report: the clause they stand in reads one way all the same. */
const harmless = new Set<TextCode>(["separator", "unclosed-remark", "unclosed-title"]);

/**
 * A place in one bar line that moves on as the line is read. It takes blanks and remarks between any
 * tokens, gathers findings, and, where asked to, the tokens themselves.
 */
export class Cursor {
  readonly text: string;
  #findings: TextFinding[] | null = null;
  /** Null where nobody asked for tokens, which is the usual case: they cost more than the tree. */
  readonly tokens: Token[] | null;
  at = 0;
  /** True where a finding of the clause being read keeps it from giving a value. */
  faulty = false;
  /** End of the last token that was neither blank nor remark. */
  lastEnd = 0;

  constructor(text: string, recordTokens: boolean) {
    this.text = text;
    this.tokens = recordTokens ? [] : null;
  }

  get findings(): readonly TextFinding[] {
    return this.#findings ?? noFindings;
  }

  code(offset = 0): number {
    const index = this.at + offset;
    return index < this.text.length ? this.text.charCodeAt(index) : -1;
  }

  /** Passes the text up to `end` as one token. */
  pass(end: number, kind: TokenKind): void {
    if (this.at < end) {
      this.tokens?.push({ start: this.at, end, kind });
      this.at = end;
      if (kind !== "blank" && kind !== "remark") this.lastEnd = end;
    }
  }

  /** Takes the text up to `end` as one token. */
  take(end: number, kind: TokenKind): Span {
    const start = this.at;
    this.pass(end, kind);
    return { start, end };
  }

  report(code: TextCode, span: Span, message: string, fixes: readonly Fix[] = []): void {
    this.#findings ??= [];
    const said = this.text.slice(span.start, span.end);
    // What is quoted of a very long line is cut: nobody reads a message of a million characters.
    const short =
      said.length > LONGEST_QUOTE ? message.replaceAll(said, `${said.slice(0, LONGEST_QUOTE)}…`) : message;
    this.#findings.push({ code, line: 0, span, message: short, fixes });
    if (!harmless.has(code)) this.faulty = true;
  }

  /** Passes blanks and remarks. */
  skip(): void {
    for (;;) {
      const code = this.code();
      if (code === 32 || code === 9 || (code > 32 && code < 0x7f)) {
        if (code === 40) this.#remark();
        else if (code > 32) return;
        else this.#blank();
      } else if (code === -1) return;
      else if (isBlank(code)) this.#blank();
      else if (isInvisible(code)) this.#invisible();
      else return;
    }
  }

  #blank(): void {
    let end = this.at + 1;
    while (end < this.text.length && isBlank(this.text.charCodeAt(end))) end++;
    this.pass(end, "blank");
  }

  #invisible(): void {
    this.#tellInvisible(this.take(this.at + 1, "unread"));
  }

  /** Tells the first character of a title or a remark that hides what else stands there. */
  tellControl({ start, end }: Span): void {
    for (let i = start; i < end; i++) {
      if (!isControl(this.text.charCodeAt(i))) continue;
      this.#tellInvisible({ start: i, end: i + 1 });
      return;
    }
  }

  #tellInvisible(span: Span): void {
    const code = this.text.charCodeAt(span.start).toString(16).toUpperCase().padStart(4, "0");
    this.report(
      "unexpected-text",
      span,
      `An invisible character (U+${code}) stands here and may change what is read: remove it.`,
      [
        {
          title: "Remove the invisible character",
          preferred: true,
          edits: [{ line: 0, ...span, newText: "" }],
        },
      ],
    );
  }

  /** `( … )`, nested; one left open ends at the next `;` or the line's end. */
  #remark(): void {
    const start = this.at;
    let depth = 0;
    for (let i = start; i < this.text.length; i++) {
      const code = this.text.charCodeAt(i);
      if (code === 40) depth++;
      else if (code === 41 && --depth === 0) {
        const span = this.take(i + 1, "remark");
        this.tellControl(span);
        this.#speedKindInRemark(span);
        return;
      }
    }
    const semicolon = this.text.indexOf(";", start);
    const end = semicolon < 0 ? this.text.length : semicolon;
    const span = this.take(end, "remark");
    const close = this.text.slice(0, end).trimEnd().length;
    this.report("unclosed-remark", span, "This remark is not closed, so it ends here: write `)`.", [
      {
        title: "Close the remark",
        preferred: true,
        edits: [{ line: 0, start: close, end: close, newText: ")" }],
      },
    ]);
  }

  /** `200 kt (TAS)` means what a remark never says, so it is told instead of passed over. */
  #speedKindInRemark(span: Span): void {
    const length = span.end - span.start;
    if (length < 5 || 9 < length) return;
    const content = this.text
      .slice(span.start + 1, span.end - 1)
      .trim()
      .toLowerCase();
    const kind = /^k?([cetiCETI]as)$/.exec(content)?.[1];
    if (!kind) return;
    this.report(
      "remark-not-read",
      span,
      `A remark is never read, so the speed would stay calibrated: write ${kind} without the brackets, or leave it out.`,
      [{ title: `Write ${kind}`, preferred: kind !== "cas", edits: [{ line: 0, ...span, newText: kind }] }],
    );
  }

  /** The end of the run of name characters that begins here. */
  nameEnd(from = this.at): number {
    let end = from;
    while (end < this.text.length && isNameCharacter(this.text.charCodeAt(end))) end++;
    return end;
  }

  /** The word that begins here, in lower case; empty where none does. */
  word(): string {
    return this.text.slice(this.at, this.nameEnd()).toLowerCase();
  }

  /** True where this word, in lower case ASCII, begins here, whatever its case. */
  isWord(word: string): boolean {
    const { text, at } = this;
    const { length } = word;
    for (let i = 0; i < length; i++) {
      const code = text.charCodeAt(at + i);
      const wanted = word.charCodeAt(i);
      // Only a letter has another case: 32 apart in ASCII.
      if (code !== wanted && !(97 <= wanted && wanted <= 122 && code === wanted - 32)) return false;
    }
    const next = at + length;
    return next >= text.length || !isNameCharacter(text.charCodeAt(next));
  }

  /** Takes the word if it is this one. */
  takeWord(word: string): Span | null {
    return this.isWord(word) ? this.take(this.at + word.length, "word") : null;
  }

  /** True at `;`, at the line's end, and where a keyword begins that the argument due cannot be. */
  atClauseEnd(): boolean {
    const code = this.code();
    return code === -1 || code === 59;
  }

  /** The keyword that begins here, if one does. */
  keywordHere(): string | null {
    const end = this.nameEnd();
    return end === this.at ? null : keywordOf(this.text.slice(this.at, end));
  }
}
