import { isBlank, isDigit, isLetter } from "./characters.ts";
import type { Cursor } from "./cursor.ts";
import { groupedNumber, type ReadNumber, readNumber, replace } from "./numbers.ts";
import type { Span } from "./span.ts";
import type { Quantity } from "./tree.ts";
import { missingUnit, unknownUnit, unknownUnitFixes, wrongUnit, wrongUnitFixes } from "./unitFindings.ts";
import { type QuantityKind, unitInWords, unitOf, unitRule } from "./units.ts";
import { keywordOf, type Unit } from "./vocabulary.ts";

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
export function unitHere(cursor: Cursor): {
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
  if (unit) {
    const span = cursor.take(end, "unread");
    cursor.report("wrong-unit", span, wrongUnit(kind, word, unit), wrongUnitFixes(kind, span, unit));
    return quantity(cursor, number, null);
  }
  if (
    !unit &&
    word &&
    (!rule.optional || unitInWords(word, kind)) &&
    !keywordOf(cursor.text.slice(cursor.at, cursor.nameEnd())) &&
    !isDueWord(cursor)
  ) {
    const span = cursor.take(end, "unread");
    cursor.report("wrong-unit", span, unknownUnit(kind, word), unknownUnitFixes(kind, word, span));
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
