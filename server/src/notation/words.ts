import { isBlank, isDigit, isLetter } from "./characters.ts";
import type { Cursor } from "./cursor.ts";
import type { Fix } from "./finding.ts";
import { orListed } from "./orListed.ts";
import { nearestWord } from "./spelling.ts";
import type { CalendarDate, Name, Title } from "./tree.ts";
import { keywordOf } from "./vocabulary.ts";

/** A name: letters of any script, digits and hyphens; where one is due, one is read, even one that spells a keyword. */
export function readName(cursor: Cursor): Name | null {
  cursor.skip();
  const first = cursor.code();
  if (!isLetter(first) && !isDigit(first)) return null;
  const end = cursor.nameEnd();
  const span = cursor.take(end, "name");
  return { text: cursor.text.slice(span.start, span.end), span };
}

const closing: Readonly<Record<string, string>> = { '"': '"', "“": "”“", "„": "”“", "«": "»" };

/** `"…"`, also with typographic marks; one left open ends at the next `;` or the line's end. */
export function readTitle(cursor: Cursor): Title | null {
  cursor.skip();
  const { text, at } = cursor;
  const marks = closing[text.charAt(at)];
  if (!marks) return null;
  for (let i = at + 1; i < text.length; i++) {
    if (marks.includes(text.charAt(i))) {
      const span = cursor.take(i + 1, "title");
      cursor.tellControl(span);
      return { text: text.slice(at + 1, i), span };
    }
  }
  const semicolon = text.indexOf(";", at);
  const end = text.slice(0, semicolon < 0 ? text.length : semicolon).trimEnd().length;
  const span = cursor.take(Math.max(end, at + 1), "title");
  const mark = marks.charAt(0);
  cursor.report("unclosed-title", span, `This title is not closed, so it ends here: write ${mark}.`, [
    {
      title: "Close the title",
      preferred: true,
      edits: [{ line: 0, start: span.end, end: span.end, newText: mark }],
    },
  ]);
  return { text: text.slice(at + 1, span.end), span };
}

/** `2027-03-31`, a real day. */
export function readDate(cursor: Cursor): CalendarDate | null {
  cursor.skip();
  const match = /^\d{4}-\d{2}-\d{2}(?![\d-])/.exec(cursor.text.slice(cursor.at, cursor.at + 11));
  if (!match) return null;
  const span = cursor.take(cursor.at + 10, "number");
  const text = match[0];
  if (!isRealDay(text)) {
    cursor.report("bad-quantity", span, `${text} is no day of the calendar: check it.`);
  }
  return { text, span };
}

function isRealDay(text: string): boolean {
  const [year, month, day] = text.split("-").map(Number) as [number, number, number];
  const leap = (year % 4 === 0 && year % 100 !== 0) || year % 400 === 0;
  const days = [31, leap ? 29 : 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31];
  return 1 <= month && month <= 12 && 1 <= day && day <= (days[month - 1] as number);
}

/**
 * A word of a closed list. Null with nothing taken at the clause's end or at a keyword; another word
 * is told under `code` with the list and the nearest.
 */
export function readWord<T extends string>(
  cursor: Cursor,
  words: readonly T[],
  code: UnknownWord,
  noun: string,
  synonyms: Readonly<Record<string, string>> = {},
): { readonly word: T; readonly span: { start: number; end: number } } | null {
  cursor.skip();
  const typed = cursor.word();
  if (typed === "") return null;
  const wanted = synonyms[typed] ?? typed;
  if ((words as readonly string[]).includes(wanted)) {
    return { word: wanted as T, span: cursor.take(cursor.at + typed.length, "word") };
  }
  if (keywordOf(typed)) return null;
  tellUnknownWord(cursor, words, code, noun);
  return null;
}

type UnknownWord = "unknown-phase" | "unknown-result" | "unknown-code" | "unexpected-text";

/** Longer lists than this are not read out in a message. */
const MOST_LISTED = 20;

/** Takes the word that begins here and is none of those that may, and tells so: the nearest, or all of them. */
export function tellUnknownWord(
  cursor: Cursor,
  words: readonly string[],
  code: UnknownWord,
  noun: string,
): void {
  const typed = cursor.word();
  const span = cursor.take(cursor.at + typed.length, "unread");
  const nearest = nearestWord(typed, words);
  const fixes: Fix[] = nearest
    ? [{ title: `Write ${nearest}`, preferred: true, edits: [{ line: 0, ...span, newText: nearest }] }]
    : [];
  const said = cursor.text.slice(span.start, span.end);
  const way = nearest
    ? `did you mean ${nearest}?`
    : words.length <= MOST_LISTED
      ? `write ${orListed(words)}.`
      : "write it as the list of problems shows it.";
  cursor.report(code, span, `${said} is no ${noun}: ${way}`, fixes);
}

/** Takes a `,`. */
export function takeComma(cursor: Cursor): boolean {
  cursor.skip();
  if (cursor.code() !== 44) return false;
  cursor.take(cursor.at + 1, "comma");
  cursor.skip();
  return true;
}

/** The word after a `,` that stands here, without taking either; empty where there is none. */
export function wordAfterComma(cursor: Cursor): string {
  if (cursor.code() !== 44) return "";
  let at = cursor.at + 1;
  while (isBlank(cursor.text.charCodeAt(at))) at++;
  return cursor.text.slice(at, cursor.nameEnd(at)).toLowerCase();
}
