import { isBlank, isDigit, isMinus } from "./characters.ts";
import type { Cursor } from "./cursor.ts";
import type { Fix } from "./finding.ts";
import type { Span } from "./span.ts";
import { unitOf } from "./units.ts";

export interface ReadNumber {
  readonly value: number;
  readonly decimals: number;
  readonly signed: boolean;
  readonly span: Span;
}

/** True where a number begins, its sign included. */
export function atNumber(cursor: Cursor): boolean {
  let code = cursor.code();
  let offset = 0;
  if (code === 43 || isMinus(code)) {
    // `+-` is a tolerance, not a number.
    offset = 1;
    while (isBlank(cursor.code(offset))) offset++;
    code = cursor.code(offset);
  }
  return isDigit(code) || (code === 46 && isDigit(cursor.code(offset + 1)));
}

/** `+-`, `±`, `+/-`: how many characters, or 0. */
export function toleranceMark(cursor: Cursor): number {
  const code = cursor.code();
  if (code === 0xb1) return 1;
  if (code !== 43) return 0;
  if (isMinus(cursor.code(1))) return 2;
  return cursor.code(1) === 47 && isMinus(cursor.code(2)) ? 3 : 0;
}

export function atTolerance(cursor: Cursor): boolean {
  return toleranceMark(cursor) > 0;
}

/** Reads a number with its sign. Null, with nothing taken, where none begins. */
export function readNumber(cursor: Cursor): ReadNumber | null {
  if (!atNumber(cursor)) return null;
  const { text } = cursor;
  const start = cursor.at;
  const sign = cursor.code();
  const negative = isMinus(sign);
  const signed = negative || sign === 43;
  if (signed) {
    cursor.pass(start + 1, "sign");
    cursor.skip();
  }
  const first = cursor.at;
  let end = first;
  while (isDigit(text.charCodeAt(end))) end++;
  let decimals = 0;
  if (text.charCodeAt(end) === 46 && isDigit(text.charCodeAt(end + 1))) {
    const point = end;
    end++;
    while (isDigit(text.charCodeAt(end))) end++;
    decimals = end - point - 1;
  } else if (text.charCodeAt(end) === 46 && end > first) {
    // `25.` is read as 25: the point is the number's own.
    end++;
  }
  cursor.pass(end, "number");
  const size =
    decimals === 0 && end - first < 10 ? integer(text, first, end) : Number(text.slice(first, end));
  const value = negative ? -size : size;
  const span = { start, end };
  if (text.charCodeAt(end) === 44 && isDigit(text.charCodeAt(end + 1)))
    commaNumber(cursor, first, text.slice(first, end));
  else if (text.charCodeAt(end) === 39 && isDigit(text.charCodeAt(end + 1)))
    groupedNumber(cursor, first, text.slice(first, end), end + 1);
  return { value: value === 0 ? 0 : value, decimals, signed, span };
}

/** The value of a run of digits, which needs no slice of the text; a point at its end is passed over. */
function integer(text: string, first: number, end: number): number {
  let value = 0;
  for (let i = first; i < end; i++) {
    const code = text.charCodeAt(i);
    if (code !== 46) value = value * 10 + code - 48;
  }
  return value;
}

/** A comma between digits is asked back, never guessed. */
function commaNumber(cursor: Cursor, first: number, before: string): void {
  const { text } = cursor;
  let end = cursor.at;
  while (text.charCodeAt(end) === 44 && isDigit(text.charCodeAt(end + 1))) {
    end++;
    while (
      isDigit(text.charCodeAt(end)) ||
      (text.charCodeAt(end) === 46 && isDigit(text.charCodeAt(end + 1)))
    )
      end++;
  }
  const span = { start: first, end };
  const written = text.slice(first, end);
  const groups = written.split(",");
  const asGroups =
    groups.slice(1).every((group) => /^\d{3}(\.\d+)?$/.test(group)) && /^\d{1,3}$/.test(before);
  const asDecimal = groups.length === 2 && !written.includes(".");
  cursor.take(end, "unread");
  const whole = written.replaceAll(",", "");
  const decimal = written.replace(",", ".");
  const after = unitAhead(cursor);
  if (asGroups && asDecimal) {
    const plain = String(Number(decimal));
    cursor.report(
      "ambiguous-number",
      span,
      `Is ${written}${after} ${whole}${after} or ${plain}${after}? Choose one.`,
      [replace(span, whole), replace(span, plain)],
    );
  } else if (asGroups) {
    cursor.report(
      "ambiguous-number",
      span,
      `${written} is not read, for digits stand without groups: write ${whole}.`,
      [{ ...replace(span, whole), preferred: true }],
    );
  } else if (asDecimal) {
    cursor.report(
      "ambiguous-number",
      span,
      `${written} is not read, for the decimal mark is a point: write ${decimal}.`,
      [{ ...replace(span, decimal), preferred: true }],
    );
  } else {
    cursor.report("bad-quantity", span, `${written} is no number: write digits with at most one point.`);
  }
}

/** Digits in groups of three, by blanks or apostrophes, are asked back. */
export function groupedNumber(cursor: Cursor, first: number, before: string, from: number): void {
  const { text } = cursor;
  const rest = /^\d{3}(?!\d)/.exec(text.slice(from));
  if (!rest || !/^\d{1,3}$/.test(before)) return;
  const end = from + 3;
  const span = { start: first, end };
  cursor.take(end, "unread");
  const whole = before + rest[0];
  cursor.report(
    "ambiguous-number",
    span,
    `${text.slice(first, end)} is not read, for digits stand without groups: write ${whole}.`,
    [{ ...replace(span, whole), preferred: true }],
  );
}

export function replace(span: Span, newText: string): Fix {
  return { title: `Write ${newText}`, edits: [{ line: 0, ...span, newText }] };
}

function unitAhead(cursor: Cursor): string {
  const match = /^\s*([A-Za-z°%²/]+)/.exec(cursor.text.slice(cursor.at, cursor.at + 12));
  return match?.[1] && unitOf(match[1]) ? ` ${match[1]}` : "";
}
