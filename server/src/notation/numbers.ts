import { isBlank, isDigit, isLetter, isMinus } from "./characters.ts";
import type { Cursor } from "./cursor.ts";
import type { Fix } from "./finding.ts";
import type { Span } from "./span.ts";
import type { Quantity, Range, Sweep, Tolerance, Unknown, Value } from "./tree.ts";
import { type QuantityKind, unitOf, unitRule } from "./units.ts";
import { keywordOf, type Unit } from "./vocabulary.ts";

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
function toleranceMark(cursor: Cursor): number {
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
function groupedNumber(cursor: Cursor, first: number, before: string, from: number): void {
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

function replace(span: Span, newText: string): Fix {
  return { title: `Write ${newText}`, edits: [{ line: 0, ...span, newText }] };
}

function unitAhead(cursor: Cursor): string {
  const match = /^\s*([A-Za-z°%²/]+)/.exec(cursor.text.slice(cursor.at, cursor.at + 12));
  return match?.[1] && unitOf(match[1]) ? ` ${match[1]}` : "";
}

/** The end of the run of characters that may spell a unit. */
function unitEnd(cursor: Cursor): number {
  const { text } = cursor;
  let end = cursor.at;
  for (;;) {
    const code = text.charCodeAt(end);
    if (code === 0xb0 || code === 37 || code === 0xb2 || isLetter(code)) end++;
    else if (code === 47 && end > cursor.at) end++;
    else if (
      code === 50 &&
      end > cursor.at &&
      !isDigit(text.charCodeAt(end + 1)) &&
      isLetter(text.charCodeAt(end - 1))
    )
      end++;
    else return end;
  }
}

/** The word where a unit is due, and the unit it spells. */
function unitHere(cursor: Cursor): {
  readonly end: number;
  readonly word: string;
  readonly unit: Unit | null;
} {
  let end = unitEnd(cursor);
  let word = cursor.text.slice(cursor.at, end);
  let unit = unitOf(word);
  // `25°left` and `8%,`: a mark is a unit by itself.
  if (!unit && (word.charCodeAt(0) === 0xb0 || word.charCodeAt(0) === 37)) {
    end = cursor.at + 1;
    word = word.charAt(0);
    unit = unitOf(word);
  }
  return { end, word, unit };
}

export interface QuantityOptions {
  /** A missing unit is no finding: another part of the value may state it. */
  readonly unitLater?: boolean;
  /** A pair's first number may be followed by its second: no groups are looked for. */
  readonly inPair?: boolean;
}

/**
 * Reads a number and its unit. Null, after a finding, where there is none; a quantity with a wrong or
 * missing unit is told and given with the unit null.
 */
export function readQuantity(
  cursor: Cursor,
  kind: QuantityKind,
  options: QuantityOptions = {},
): Quantity | null {
  cursor.skip();
  if (kind === "altitude") {
    const level = readFlightLevel(cursor);
    if (level) return level;
  }
  const number = readNumber(cursor);
  if (!number) return null;
  if (!options.inPair) spacedGroups(cursor, number);
  const before = cursor.at;
  const faultyBefore = cursor.faulty;
  cursor.skip();
  const { end, word, unit } = unitHere(cursor);
  const rule = unitRule(kind);
  if (unit && rule.units.includes(unit) && unit !== "FL") {
    cursor.pass(end, "unit");
    threeDecimals(cursor, number, unit);
    return quantity(cursor, number, unit);
  }
  if (unit && !isAhead(cursor, word)) {
    const span = cursor.take(end, "unread");
    cursor.report("wrong-unit", span, wrongUnit(kind, word, unit), wrongUnitFixes(kind, span, unit));
    return quantity(cursor, number, null);
  }
  if (
    !unit &&
    word &&
    !rule.optional &&
    !keywordOf(cursor.text.slice(cursor.at, cursor.nameEnd())) &&
    !isDueWord(cursor)
  ) {
    const span = cursor.take(end, "unread");
    cursor.report(
      "wrong-unit",
      span,
      unknownUnit(kind, word),
      word.toLowerCase().startsWith("ton") ? tonFixes(span) : unitFixes(kind, span),
    );
    return quantity(cursor, number, null);
  }
  if (!rule.optional && !options.unitLater && !(cursor.faulty && !faultyBefore))
    missingUnit(cursor, kind, number, before);
  return quantity(cursor, number, null);
}

function quantity(cursor: Cursor, number: ReadNumber, unit: Unit | null): Quantity {
  return {
    kind: "quantity",
    value: number.value,
    unit,
    decimals: number.decimals,
    signed: number.signed,
    span: unit ? { start: number.span.start, end: cursor.lastEnd } : number.span,
    numberSpan: number.span,
  };
}

/** A word that reads as a unit but is the next word of the clause, such as `m` before nothing else. */
function isAhead(_cursor: Cursor, word: string): boolean {
  return word === "";
}

const dueWords = new Set([
  "to",
  "by",
  "for",
  "within",
  "or",
  "when",
  "above",
  "below",
  "after",
  "left",
  "right",
  "per",
  "from",
  "because",
  "until",
  "cas",
  "eas",
  "tas",
  "ias",
  "chord",
  "slope",
  "landing",
  "vs",
  "vs1g",
  "stall",
  "warning",
  "v2min",
  "vfto",
  "vref",
  "va",
  "rain",
]);

function isDueWord(cursor: Cursor): boolean {
  return dueWords.has(cursor.word());
}

function readFlightLevel(cursor: Cursor): Quantity | null {
  const { text, at } = cursor;
  const f = text.charCodeAt(at);
  const l = text.charCodeAt(at + 1);
  if ((f !== 70 && f !== 102) || (l !== 76 && l !== 108)) return null;
  let end = at + 2;
  while (isDigit(text.charCodeAt(end))) end++;
  const digits = text.slice(at + 2, end);
  if (digits === "") {
    // `FL 350`: the blank is dropped by the fix, and not read.
    const spaced = /^\s+(\d{3})(?!\d)/.exec(text.slice(end));
    if (!spaced) return null;
    const span = cursor.take(end + spaced[0].length, "unread");
    cursor.report("bad-quantity", span, `A flight level is written without a blank: FL${spaced[1]}.`, [
      { ...replace(span, `FL${spaced[1]}`), preferred: true },
    ]);
    return level(span, Number(spaced[1]));
  }
  const span = { start: at, end };
  if (digits.length !== 3) {
    cursor.take(end, "unread");
    const padded = digits.padStart(3, "0");
    if (digits.length < 3) {
      const tenfold = `${digits}0`.padStart(3, "0");
      const readings = tenfold === padded || tenfold.length > 3 ? [padded] : [padded, tenfold];
      cursor.report(
        "ambiguous-number",
        span,
        `A flight level has three digits: is FL${digits} ${readings.map((one) => `FL${one}`).join(" or ")}? Choose one.`,
        readings.map((one) => replace(span, `FL${one}`)),
      );
    } else
      cursor.report(
        "ambiguous-number",
        span,
        `A flight level has three digits, and FL${digits} has ${digits.length}: write FL and three digits.`,
      );
    return level(span, Number(digits));
  }
  cursor.take(end, "number");
  return level(span, Number(digits));
}

function level(span: Span, value: number): Quantity {
  return { kind: "quantity", value, unit: "FL", decimals: 0, signed: false, span, numberSpan: span };
}

/** `3 000 ft`: digits in groups. */
function spacedGroups(cursor: Cursor, number: ReadNumber): void {
  const { text, at } = cursor;
  if (number.decimals > 0 || !isBlank(text.charCodeAt(at)) || !isDigit(text.charCodeAt(at + 1))) return;
  const digits = text.slice(number.span.start, number.span.end).replace(/^[^\d]*/, "");
  groupedNumber(cursor, at - digits.length, digits, at + 1);
}

/** `3.000 ft` may be three thousand where the point groups digits. */
function threeDecimals(cursor: Cursor, number: ReadNumber, unit: Unit): void {
  if (number.decimals !== 3 || !["ft", "m", "kg", "lb", "N"].includes(unit)) return;
  const written = cursor.text.slice(number.span.start, number.span.end);
  const digits = written.replace(/^[^\d]*/, "");
  if (!/^\d{1,3}\.\d{3}$/.test(digits)) return;
  const span = { start: number.span.end - digits.length, end: number.span.end };
  const whole = String(Number(digits.replace(".", "")));
  const plain = String(Number(digits)).includes(".") ? String(Number(digits)) : `${Number(digits)}`;
  cursor.report(
    "ambiguous-number",
    span,
    `Is ${digits} ${unit} ${whole} ${unit} or ${plain} ${unit}? Choose one.`,
    [replace(span, whole), replace(span, plain)],
  );
}

function wrongUnit(kind: QuantityKind, word: string, unit: Unit): string {
  if (kind === "gust" && unit === "kt") {
    return "A gust here is the derived gust velocity of the load rules, in ft/s or m/s; a reported wind gust in knots is another thing and gives no load factor.";
  }
  if (unit === "FL") return "A flight level is written FL and three digits, such as FL350.";
  const { units, noun } = unitRule(kind);
  if (units.length === 0) return `${word} does not belong here: this is a plain number.`;
  return `${word} is no unit of ${noun}: write ${orList(units)}.`;
}

function unknownUnit(kind: QuantityKind, word: string): string {
  if (kind === "mass" && word.toLowerCase().startsWith("ton")) {
    return `A ${word} may be 1000 kg, 2000 lb or 2240 lb: write t, kg or lb.`;
  }
  const { units, noun } = unitRule(kind);
  return `${word} is no unit of ${noun}: write ${orList(units)}.`;
}

function tonFixes(span: Span): Fix[] {
  return [{ title: "Write t (1000 kg)", edits: [{ line: 0, ...span, newText: "t" }] }];
}

function wrongUnitFixes(kind: QuantityKind, span: Span, unit: Unit): Fix[] {
  if (kind === "gust" && unit === "kt") return [];
  return unitFixes(kind, span);
}

function unitFixes(kind: QuantityKind, span: Span): Fix[] {
  return unitRule(kind)
    .units.filter((unit) => unit !== "FL")
    .map((unit) => replace(span, unit));
}

function missingUnit(cursor: Cursor, kind: QuantityKind, number: ReadNumber, at: number): void {
  const { units, noun } = unitRule(kind);
  const written = cursor.text.slice(number.span.start, number.span.end);
  const choices = units.filter((unit) => unit !== "FL");
  const readings = choices.slice(0, 3).map((unit) => `${written} ${unit}`);
  const subject = noun.replace(/^an? /, "");
  const name = subject.charAt(0).toUpperCase() + subject.slice(1);
  cursor.report(
    "missing-unit",
    number.span,
    `${name} ${written} of what? Write ${orList(readings)}.`,
    choices.map(
      (unit): Fix => ({
        title: `Write ${written} ${unit}`,
        edits: [{ line: 0, start: at, end: at, newText: ` ${unit}` }],
      }),
    ),
  );
}

function orList(items: readonly string[]): string {
  return items.length < 2
    ? (items[0] ?? "")
    : `${items.slice(0, -1).join(", ")} or ${items[items.length - 1]}`;
}

/** `+- NUMBER [UNIT]`. */
export function readTolerance(cursor: Cursor, kind: QuantityKind): Tolerance | null {
  cursor.skip();
  const length = toleranceMark(cursor);
  if (length === 0) return null;
  const start = cursor.at;
  cursor.take(start + length, "sign");
  cursor.skip();
  const size = readQuantity(cursor, kind === "altitude" ? "altitude" : kind, { unitLater: true });
  if (!size || size.signed) {
    cursor.report(
      "bad-quantity",
      { start, end: cursor.lastEnd },
      "A tolerance is a number after +-, without a sign of its own: write it, such as +- 0.4 t.",
    );
    return null;
  }
  return { value: size.value, unit: size.unit, span: { start, end: size.span.end } };
}

/** `QTY [+- …]` or `QTY to QTY by QTY`. Null, after a finding, where there is no number. */
export function readValue(cursor: Cursor, kind: QuantityKind): Value | Range | null {
  cursor.skip();
  const first = readQuantity(cursor, kind, { unitLater: true });
  if (!first) return null;
  cursor.skip();
  if (cursor.isWord("to")) return readSweep(cursor, kind, first);
  const tolerance = atTolerance(cursor) ? readTolerance(cursor, kind) : null;
  const own = first.unit ? first : needUnit(cursor, kind, first, tolerance ? [tolerance.unit] : []);
  if (tolerance && !tolerance.unit && own.unit === "FL") levelTolerance(cursor, tolerance);
  const span = tolerance ? { start: own.span.start, end: tolerance.span.end } : own.span;
  return { kind: "scalar", quantity: own, tolerance, span };
}

/** A flight level counts hundreds of feet, so a bare tolerance on one may mean either. */
function levelTolerance(cursor: Cursor, { value, span }: Tolerance): void {
  cursor.report("missing-unit", span, `The tolerance ${value} of what? Write ${value} ft.`, [
    {
      title: `Write ${value} ft`,
      edits: [{ line: 0, start: span.end, end: span.end, newText: " ft" }],
    },
  ]);
}

/** The quantity with its unit, which another part of the value may have stated; told where none did. */
function needUnit(
  cursor: Cursor,
  kind: QuantityKind,
  own: Quantity,
  others: readonly (Unit | null)[],
): Quantity {
  if (own.unit || unitRule(kind).optional) return own;
  const stated = others.find((unit) => unit !== null && unit !== "FL");
  if (stated) return { ...own, unit: stated };
  if (!cursor.faulty) missingUnit(cursor, kind, { ...own, span: own.numberSpan }, own.numberSpan.end);
  return own;
}

function readSweep(cursor: Cursor, kind: QuantityKind, from: Quantity): Sweep | Range | null {
  cursor.takeWord("to");
  cursor.skip();
  const to = readQuantity(cursor, kind, { unitLater: true });
  if (!to) {
    cursor.report(
      "missing-argument",
      { start: from.span.start, end: cursor.lastEnd },
      "After `to` comes the last value: write it.",
    );
    return null;
  }
  cursor.skip();
  let by: Quantity | null = null;
  if (cursor.isWord("by")) {
    cursor.takeWord("by");
    cursor.skip();
    by = readQuantity(cursor, kind, { unitLater: true });
    if (!by) {
      cursor.report(
        "missing-argument",
        { start: from.span.start, end: cursor.lastEnd },
        "After `by` comes the step: write it.",
      );
      return null;
    }
  }
  const units = [from.unit, to.unit, by?.unit ?? null];
  const low = needUnit(cursor, kind, from, units);
  const high = needUnit(cursor, kind, to, units);
  const span = { start: low.span.start, end: cursor.lastEnd };
  if (!by) return { kind: "range", from: low, to: high, span };
  return { kind: "sweep", from: low, to: high, by: needUnit(cursor, kind, by, units), span };
}

/** `? [UNIT] [+- …]`. */
export function readUnknown(cursor: Cursor, kind: QuantityKind): Unknown {
  const start = cursor.at;
  cursor.take(start + 1, "unknown");
  cursor.skip();
  const { end, unit } = unitHere(cursor);
  let own: Unit | null = null;
  if (unit && unitRule(kind).units.includes(unit)) {
    cursor.take(end, "unit");
    own = unit;
  }
  cursor.skip();
  const tolerance = atTolerance(cursor) ? readTolerance(cursor, kind) : null;
  return { kind: "unknown", unit: own, tolerance, span: { start, end: cursor.lastEnd } };
}

export function isRange(value: Value | Range): value is Range {
  return value.kind === "range";
}
