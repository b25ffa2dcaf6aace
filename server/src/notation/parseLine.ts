import { cardClauses } from "./cardClauses.ts";
import { isBlank, isDigit, isMinus } from "./characters.ts";
import { Cursor } from "./cursor.ts";
import type { Fix, TextFinding } from "./finding.ts";
import { limitsClauses, rowPhases } from "./limitsClauses.ts";
import { type ClauseReader, planClauses } from "./planClauses.ts";
import type { Span } from "./span.ts";
import { nearestWord } from "./spelling.ts";
import type { Token } from "./token.ts";
import type { BarLine, Clause, ClauseBody } from "./tree.ts";
import {
  type Keyword,
  keywordEntry,
  keywordOf,
  keywords,
  phases,
  strangers,
  subjects,
  synonyms,
} from "./vocabulary.ts";

/*
 * bar-line  = { B } "|" [ clause ] { ";" [ clause ] } ;
 * clause    = keyword { argument } ;                        (the arguments: planClauses, cardClauses, limitsClauses)
 * B         = Unicode white space except line ends | U+FEFF ;   (B and remarks stand between any tokens)
 * remark    = "(" { remark | other than ( ) } ")" ;             (left open: to ";" or the line's end)
 * title     = '"' text '"' | ("“"|"„") text ("”"|"“") | "«" text "»" ;
 * name      = (letter|digit) { letter|mark|digit|"-" } ;
 * number    = digits [ "." digits ] | "." digits ;
 * signed    = [ "+" | minus ] number ;
 * qty       = signed [ unit ] | "FL" digit digit digit ;
 * tol       = ( "+-" | "±" | "+/-" ) number [ unit ] ;
 * scalar    = qty [ tol ] ;   sweep = qty "to" qty "by" qty ;   range = qty "to" qty ;
 * unknown   = "?" [ unit ] [ tol ] ;
 *
 * The argument that is due decides how the next characters are read, for `isa-3`, `vref-5`, `60t` and
 * `2027-03-31` all look like names.
 */

const readers = new Map<string, ClauseReader>([
  ...Object.entries(planClauses),
  ...Object.entries(cardClauses),
  ...Object.entries(limitsClauses),
]);
// A card's contamination and configuration take both shapes.
readers.set("contamination", planClauses.contamination as ClauseReader);

const LONGEST_KEYWORD = Math.max(...keywords.map((keyword) => keyword.length));

/** More findings than this on one line are told as a number. */
const MOST_FINDINGS = 20;

/** Parses one bar line. It never fails: what is not understood is told, and disturbs no neighbour. */
export function parseLine(text: string): BarLine {
  const { clauses, findings } = read(text, false);
  return new ParsedLine(text, clauses, findings);
}

class ParsedLine implements BarLine {
  readonly text: string;
  readonly clauses: readonly Clause[];
  readonly findings: readonly TextFinding[];
  #tokens: readonly Token[] | null = null;

  constructor(text: string, clauses: readonly Clause[], findings: readonly TextFinding[]) {
    this.text = text;
    this.clauses = clauses;
    this.findings = findings;
  }

  /** The line is read once more for its tokens when somebody asks: most lines are never asked. */
  get tokens(): readonly Token[] {
    this.#tokens ??= read(this.text, true).cursor.tokens ?? [];
    return this.#tokens;
  }
}

const noFindings: readonly TextFinding[] = [];

function read(text: string, recordTokens: boolean) {
  const cursor = new Cursor(text, recordTokens);
  let bar = 0;
  while (isBlank(text.charCodeAt(bar))) bar++;
  cursor.pass(bar, "indent");
  cursor.pass(bar + 1, "bar");
  const clauses: Clause[] = [];
  for (;;) {
    cursor.faulty = false;
    cursor.skip();
    const code = cursor.code();
    if (code === -1) break;
    if (code === 59) cursor.pass(cursor.at + 1, "separator");
    else clauses.push(readClause(cursor, text));
  }
  return { cursor, clauses, findings: cap(cursor.findings, text) };
}

function cap(findings: readonly TextFinding[], text: string): readonly TextFinding[] {
  if (findings.length === 0) return noFindings;
  if (findings.length <= MOST_FINDINGS) return findings;
  const rest = findings.length - MOST_FINDINGS + 1;
  const first = findings.slice(0, MOST_FINDINGS - 1);
  const span = { start: 0, end: text.length };
  return [
    ...first,
    {
      code: "unexpected-text",
      line: 0,
      span,
      message: `And ${rest} more findings on this line: mend the first ones.`,
      fixes: [],
    },
  ];
}

function readClause(cursor: Cursor, text: string): Clause {
  const start = cursor.at;
  const before = cursor.findings.length;
  const word = keywordAt(cursor);
  if (!word) return unreadable(cursor, start);
  if (!word.keyword) return unknownKeyword(cursor, start, word.end);
  const keywordSpan = cursor.take(word.end, "keyword");
  slipAfterKeyword(cursor);
  const reader = readers.get(word.keyword) as ClauseReader;
  const body = reader(cursor);
  if (!body && !cursor.faulty) missingArgument(cursor, word.keyword, keywordSpan, before);
  finish(cursor, text, word.keyword === "must" || word.keyword === "should");
  const end = Math.max(cursor.lastEnd, keywordSpan.end);
  const keyword = canonical(word.keyword, body);
  return { span: { start, end }, keywordSpan, keyword, meant: null, faulty: cursor.faulty, body };
}

/** `mass 56 t` is a weight; only with a range it is a card's. */
function canonical(keyword: Keyword, body: ClauseBody | null): Keyword {
  return keyword === "mass" && body?.kind === "weight" ? "weight" : keyword;
}

/** The keyword that begins here, also where its argument touches it: `isa-3`, `weight61.4t`. */
function keywordAt(cursor: Cursor): { readonly end: number; readonly keyword: Keyword | null } | null {
  const { text, at } = cursor;
  const end = cursor.nameEnd();
  if (end === at || text.charCodeAt(at) === 45) return null;
  const run = text.slice(at, end);
  const whole = keywordOf(run);
  if (whole) return { end, keyword: whole };
  // No keyword is longer than this, however long the run.
  for (let i = at + 1; i < Math.min(end, at + LONGEST_KEYWORD + 1); i++) {
    const code = text.charCodeAt(i);
    const touches =
      isDigit(code) || (isMinus(code) && (isDigit(text.charCodeAt(i + 1)) || text.charCodeAt(i + 1) === 46));
    if (!touches) continue;
    const part = keywordOf(text.slice(at, i));
    if (part) return { end: i, keyword: part };
  }
  return { end, keyword: null };
}

/** Text that no clause begins with. */
function unreadable(cursor: Cursor, start: number): Clause {
  const span = takeRest(cursor);
  const bar = cursor.text.charCodeAt(start) === 124;
  cursor.report(
    "unexpected-text",
    span,
    bar
      ? "A `|` begins a line and means nothing inside it; if this is a Markdown table, leave a blank line above it and make its second line `| --- | --- |`."
      : "A clause begins with a keyword: write one, or `;` and the next clause.",
  );
  return unread(span, { start, end: start }, null);
}

function unknownKeyword(cursor: Cursor, start: number, end: number): Clause {
  const { text } = cursor;
  const typed = text.slice(start, end);
  const keywordSpan = cursor.take(end, "unread");
  const home = partOf[typed.toLowerCase()];
  const inCard = /\bconfig\b.*\bstall\b/i.test(text.slice(0, start));
  const figure = /^\s*[-+\d.]/.test(text.slice(end));
  const isPhase = !figure && (phases as readonly string[]).includes(typed.toLowerCase());
  if (home && (inCard || !isPhase)) return partAlone(cursor, keywordSpan, home);
  if (isPhase) return phaseAlone(cursor, keywordSpan);
  const stranger = strangers[typed.toLowerCase()] ?? null;
  const guess = stranger ?? guessKeyword(typed);
  const span = takeRest(cursor);
  const follows = guess ? null : guessByWhatFollows(cursor.text.slice(keywordSpan.end, span.end));
  cursor.report(
    "unknown-keyword",
    keywordSpan,
    follows === "row" ? rowMessage(typed) : unknownMessage(typed, stranger, guess ?? follows),
    follows === "row"
      ? writeOne(["must", "should"], keywordSpan)
      : keywordFixes(typed, keywordSpan, guess ?? follows),
  );
  return unread(
    { start, end: Math.max(span.end, end) },
    keywordSpan,
    guess ?? (follows === "phase" ? follows : null),
  );
}

/** Words that begin no clause but stand within one, with an example of where. */
const partOf: Readonly<Record<string, string>> = {
  stall: "config flaps-5 stall 127 kt",
  vfe: "config flaps-5 stall 127 kt, vfe 228 kt",
  takeoff: "config flaps-15 stall 117 kt, takeoff",
  landing: "config flaps-30 stall 106 kt, landing",
  chord: "wing 104 m2, chord 3.7 m",
  issue: 'source "operations manual" issue 3',
  from: "limits own-rules, from common-practice",
  within: "claim margin 1.34 within 0.02",
  because: 'accept bank-over-limit to 35 because "terrain"',
  by: 'accept bank-over-limit to 35 because "terrain" by "J. Lund"',
  until: 'accept bank-over-limit to 35 because "terrain" until 2027-03-31',
};

/** `landing` for `phase landing`. */
function phaseAlone(cursor: Cursor, keywordSpan: Span): Clause {
  const { start, end } = keywordSpan;
  const typed = cursor.text.slice(start, end);
  const span = takeRest(cursor);
  cursor.report("unknown-keyword", keywordSpan, `\`${typed}\` is a phase: write \`phase ${typed}\`.`, [
    {
      title: `Write phase ${typed}`,
      preferred: true,
      edits: [{ line: 0, start, end: start, newText: "phase " }],
    },
  ]);
  return unread({ start, end: Math.max(span.end, end) }, keywordSpan, "phase");
}

/** A clause of which nothing is read. */
function unread(span: Span, keywordSpan: Span, meant: Keyword | null): Clause {
  return { span, keywordSpan, keyword: null, meant, faulty: true, body: null };
}

/** A part of a clause that a `;` has cut off, or that begins a line. */
function partAlone(cursor: Cursor, keywordSpan: Span, example: string): Clause {
  const { text } = cursor;
  const typed = text.slice(keywordSpan.start, keywordSpan.end);
  const span = takeRest(cursor);
  const before = text.slice(0, keywordSpan.start).trimEnd();
  const comma = example.includes(`, ${typed.toLowerCase()}`);
  const cut = before.endsWith(";") ? { start: before.length - 1, end: before.length } : null;
  cursor.report(
    "unknown-keyword",
    keywordSpan,
    `\`${typed}\` begins no clause, it is a part of one, as in \`${example}\`: write it there.`,
    cut
      ? [
          {
            title: comma ? "Write a comma before it" : "Join it to the clause before it",
            edits: [{ line: 0, ...cut, newText: comma ? "," : "" }],
          },
        ]
      : [],
  );
  return unread({ start: keywordSpan.start, end: Math.max(span.end, keywordSpan.end) }, keywordSpan, null);
}

function guessKeyword(typed: string): Keyword | null {
  const letters = /^[\p{L}-]+/u.exec(typed)?.[0] ?? typed;
  if (letters.length >= 3) return nearestWord(letters, keywords) as Keyword | null;
  const begun = keywords.filter((one) => one.startsWith(typed.toLowerCase()));
  return begun.length > 0 ? (begun[0] as Keyword) : null;
}

/** Behind a word that no keyword is close to, one phase alone makes it `phase`, phases and a subject a row of limits. */
function guessByWhatFollows(rest: string): "phase" | "row" | null {
  const isPhase = (word: string) => (rowPhases as readonly string[]).includes(synonyms[word] ?? word);
  const words = rest.toLowerCase().match(/[\p{L}-]+/gu) ?? [];
  const subject = words.findIndex((word) => !isPhase(word));
  if (0 < subject && (subjects as readonly string[]).includes(words[subject] as string)) return "row";
  const alone = /^\s*([\p{L}-]+)\s*(?:$|["“„«(])/u.exec(rest.toLowerCase())?.[1];
  if (alone === undefined || alone === "any" || alone === "emergency") return null;
  return isPhase(alone) ? "phase" : null;
}

function rowMessage(typed: string): string {
  return `\`${typed}\` is not a keyword: a row of limits begins with \`must\` or, where it is advice, with \`should\`.`;
}

function unknownMessage(typed: string, stranger: Keyword | null, guess: Keyword | null): string {
  if (stranger === "config") return `\`${typed}\` is not a keyword; a configuration is \`config flaps-5\`.`;
  if (guess)
    return `\`${typed}\` is not a keyword; did you mean \`${guess}\`, as in \`${keywordEntry(guess).example}\`?`;
  return `\`${typed}\` is not a keyword: write one, or begin the line with \`\\|\` if it is prose.`;
}

function keywordFixes(typed: string, span: Span, guess: Keyword | null): Fix[] {
  if (!guess) return [];
  const short = typed.length < 3 ? keywords.filter((one) => one.startsWith(typed.toLowerCase())) : [guess];
  return writeOne(short.length > 0 ? short : [guess], span);
}

function writeOne(choices: readonly Keyword[], span: Span): Fix[] {
  return choices.map((keyword) => ({
    title: `Write ${keyword}`,
    preferred: choices.length === 1,
    edits: [{ line: 0, ...span, newText: keyword }],
  }));
}

/** `weight: 56 t` and `weight = 56 t` read one way only. */
function slipAfterKeyword(cursor: Cursor): void {
  cursor.skip();
  const code = cursor.code();
  if (code !== 58 && code !== 61) return;
  const mark = cursor.text.charAt(cursor.at);
  const span = cursor.take(cursor.at + 1, "slip");
  cursor.report("separator", span, `No \`${mark}\` stands after a keyword: leave it out.`, [
    { title: `Remove ${mark}`, preferred: true, edits: [{ line: 0, ...span, newText: "" }] },
  ]);
}

function missingArgument(
  cursor: Cursor,
  keyword: Keyword,
  span: { start: number; end: number },
  before: number,
): void {
  if (cursor.findings.length > before && cursor.faulty) return;
  const { example } = keywordEntry(keyword);
  cursor.report(
    "missing-argument",
    span,
    `\`${keyword}\` says nothing yet: write what it states, as in \`${example}\`.`,
  );
}

/**
 * Brings the cursor to the clause's end; what stands before it is told, or read as a missing `;`. In a
 * row that is in error `bank` or `load` is its subject, not a clause of its own.
 */
function finish(cursor: Cursor, text: string, isRow: boolean): void {
  cursor.skip();
  if (cursor.atClauseEnd()) return;
  if (cursor.code() === 44) {
    let next = cursor.at + 1;
    while (isBlank(text.charCodeAt(next))) next++;
    if (startsKeyword(cursor, next) && !(cursor.faulty && isRow)) {
      const word = text.slice(next, cursor.nameEnd(next));
      const span = cursor.take(cursor.at + 1, "slip");
      cursor.report(
        "separator",
        span,
        `Clauses are separated by \`;\`: put one here instead of the comma, before ${word}.`,
        [{ title: "Write ;", preferred: true, edits: [{ line: 0, ...span, newText: ";" }] }],
      );
      return;
    }
  } else if (startsKeyword(cursor, cursor.at) && !(cursor.faulty && isRow)) {
    const word = text.slice(cursor.at, cursor.nameEnd());
    const at = cursor.lastEnd;
    cursor.report(
      "separator",
      { start: cursor.at, end: cursor.at + word.length },
      `Clauses are separated by \`;\`: put one here, before ${word}.`,
      [{ title: "Write ;", preferred: true, edits: [{ line: 0, start: at, end: at, newText: ";" }] }],
    );
    return;
  }
  const start = cursor.at;
  const already = cursor.faulty;
  const bar = cursor.code() === 124;
  const span = takeRest(cursor);
  if (already) return;
  const keyword = text.slice(0, start).trimEnd().split(/[;|]/).pop()?.trim().split(/\s+/)[0] ?? "the clause";
  const rest = text.slice(span.start, span.end).trimEnd();
  if (titled.has(keyword.toLowerCase()) && /^\p{L}[^"|]*$/u.test(rest)) {
    cursor.report(
      "unexpected-text",
      span,
      `A title of ${keyword} stands in quotation marks: write "${rest}".`,
      [
        {
          title: "Put the title in quotation marks",
          edits: [{ line: 0, start: span.start, end: span.start + rest.length, newText: `"${rest}"` }],
        },
      ],
    );
    return;
  }
  if (tellRange(cursor, span)) return;
  cursor.report(
    "unexpected-text",
    span,
    bar
      ? "A `|` begins a line and means nothing inside it; if this is a Markdown table, leave a blank line above it and make its second line `| --- | --- |`."
      : `This is not understood after ${keyword}: write \`;\` before a new clause, or leave it out.`,
  );
}

/** `4000 kg - 6200 kg`: true where what stands here would be a range, which is told. */
function tellRange(cursor: Cursor, span: Span): boolean {
  const { text } = cursor;
  const dash = /^(?:[-\u2012-\u2015\u2212]|until|till)(?=\s*[\d.])/iu.exec(
    text.slice(span.start, span.end),
  )?.[0];
  if (!dash) return false;
  const end = span.start + dash.length;
  const blankAt = (index: number) => (isBlank(text.charCodeAt(index)) ? "" : " ");
  cursor.report(
    "unexpected-text",
    span,
    `A range is written with \`to\`, as in \`5 t to 9 t\`: write it in place of \`${dash}\`.`,
    [
      {
        title: "Write to",
        edits: [{ line: 0, start: span.start, end, newText: `${blankAt(span.start - 1)}to${blankAt(end)}` }],
      },
    ],
  );
  return true;
}

/** Clauses that may end with a title. */
const titled: ReadonlySet<string> = new Set(["aircraft", "limits", "phase", "emergency"]);

function startsKeyword(cursor: Cursor, at: number): boolean {
  const end = cursor.nameEnd(at);
  if (end === at) return false;
  return keywordOf(cursor.text.slice(at, end)) !== null;
}

/** Takes everything up to the next `;` that no remark or title holds. */
function takeRest(cursor: Cursor): { start: number; end: number } {
  const start = cursor.at;
  let end = start;
  for (;;) {
    cursor.skip();
    const code = cursor.code();
    if (code === -1 || code === 59) return { start, end: Math.max(end, start) };
    const { text } = cursor;
    let next = cursor.at + 1;
    if (code === 34) {
      const close = text.indexOf('"', next);
      const semicolon = text.indexOf(";", next);
      next = close >= 0 ? close + 1 : semicolon >= 0 ? semicolon : text.length;
    } else {
      while (
        next < text.length &&
        !isBlank(text.charCodeAt(next)) &&
        text.charCodeAt(next) !== 59 &&
        text.charCodeAt(next) !== 40 &&
        text.charCodeAt(next) !== 34
      )
        next++;
    }
    cursor.take(next, "unread");
    end = cursor.at;
  }
}
