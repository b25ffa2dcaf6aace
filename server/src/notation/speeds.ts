import { isBlank, isDigit, isMinus } from "./characters.ts";
import type { Cursor } from "./cursor.ts";
import { atNumber, atTolerance } from "./numbers.ts";
import { readQuantity } from "./quantities.ts";
import type { AirspeedKind, ClauseBody, Quantity, Speed, Sweep } from "./tree.ts";
import { unitOf } from "./units.ts";
import { isRange, readTolerance, readUnknown, readValue } from "./values.ts";
import { type SpeedName, speedNames } from "./vocabulary.ts";

const airspeedKinds: readonly string[] = ["cas", "eas", "tas", "ias"] satisfies AirspeedKind[];

/** `200 kt`, `210 kt tas`, `M 0.76`, `1.3 vs1g`, `vref + 5 kt`, `warning`, `?`. */
export function readSpeed(cursor: Cursor): ClauseBody | null {
  cursor.skip();
  const start = cursor.at;
  const speed = readExpression(cursor, start);
  return speed && { kind: "speed", speed };
}

function readExpression(cursor: Cursor, start: number): Speed | null {
  if (cursor.code() === 63) return readUnknown(cursor, "speed");
  if (atMach(cursor)) return readMach(cursor, start);
  if (atNumber(cursor))
    return multipleAhead(cursor) ? readMultiple(cursor, start) : readAirspeed(cursor, start);
  return readNamed(cursor, start);
}

/** `M 0.76`, `M.76`, `M0.76`, `mach 0.76`, `M ?`. */
function atMach(cursor: Cursor): boolean {
  const { text, at } = cursor;
  if ((cursor.code() | 32) !== 109) return false;
  return /^(m|mach)(?=[\s.\d?]|$)/i.test(text.slice(at, at + 6));
}

function readMach(cursor: Cursor, start: number): Speed | null {
  const long = cursor.text.slice(cursor.at, cursor.at + 4).toLowerCase() === "mach";
  cursor.take(cursor.at + (long ? 4 : 1), "word");
  cursor.skip();
  if (cursor.code() === 63) {
    const value = readUnknown(cursor, "number");
    return { kind: "mach", value, span: { start, end: cursor.lastEnd } };
  }
  const value = readValue(cursor, "number");
  if (!value) return null;
  if (isRange(value)) return lacksStep(cursor, value.span);
  return { kind: "mach", value, span: { start, end: cursor.lastEnd } };
}

function lacksStep(cursor: Cursor, span: { start: number; end: number }): null {
  cursor.report("missing-argument", span, "A sweep needs its step: write `by` and the step after it.");
  return null;
}

/** True where the number, or the sweep of numbers, is followed by a speed's name instead of a unit. */
function multipleAhead(cursor: Cursor): boolean {
  const { text } = cursor;
  let at = cursor.at;
  for (let words = 0; words < 12 && at < text.length; words++) {
    while (isBlank(text.charCodeAt(at))) at++;
    const code = text.charCodeAt(at);
    if (isDigit(code) || code === 46 || code === 43 || isMinus(code)) {
      at++;
      while (isDigit(text.charCodeAt(at)) || text.charCodeAt(at) === 46) at++;
      continue;
    }
    const end = cursor.nameEnd(at);
    const word = text.slice(at, end).toLowerCase();
    if (word === "to" || word === "by") at = end;
    else return isSpeedName(word) && !unitOf(word);
  }
  return false;
}

function isSpeedName(word: string): word is SpeedName {
  return (speedNames as readonly string[]).includes(word);
}

function readMultiple(cursor: Cursor, start: number): Speed | null {
  const value = readValue(cursor, "number");
  if (!value) return null;
  if (isRange(value)) return lacksStep(cursor, value.span);
  cursor.skip();
  const word = cursor.word() as SpeedName;
  const ofSpan = cursor.take(cursor.at + word.length, "word");
  const factor: Quantity | Sweep = value.kind === "scalar" ? value.quantity : value;
  if (value.kind === "scalar" && value.tolerance) {
    cursor.report(
      "bad-quantity",
      value.tolerance.span,
      `A multiple of ${word} takes no tolerance of its own: write it in knots after the name, such as ${word} +- 3 kt.`,
    );
  }
  return { kind: "multiple", factor, of: word, ofSpan, span: { start, end: cursor.lastEnd } };
}

function readAirspeed(cursor: Cursor, start: number): Speed | null {
  const before = cursor.findings.length;
  const value = readValue(cursor, "speed");
  if (!value) return null;
  if (isRange(value)) return lacksStep(cursor, value.span);
  const quantity: Quantity = value.kind === "scalar" ? value.quantity : value.from;
  if (quantity.signed && before === cursor.findings.length) {
    cursor.report("bad-quantity", quantity.span, "A speed has no sign: write the number alone.");
  }
  cursor.skip();
  const word = cursor.word();
  let type: AirspeedKind = "cas";
  if (airspeedKinds.includes(word)) {
    cursor.take(cursor.at + word.length, "word");
    type = word as AirspeedKind;
  }
  return { kind: "airspeed", value, type, span: { start, end: cursor.lastEnd } };
}

/** `vref`, `vref + 5 kt +- 3 kt`, `warning +- 2 kt`. */
function readNamed(cursor: Cursor, start: number): Speed | null {
  const word = leadingName(cursor);
  if (!word) return null;
  const nameSpan = cursor.take(cursor.at + word.length, "word");
  cursor.skip();
  let offset: Quantity | null = null;
  const code = cursor.code();
  if (!atTolerance(cursor) && (code === 43 || isMinus(code))) {
    const signStart = cursor.at;
    cursor.take(signStart + 1, "sign");
    cursor.skip();
    const size = atNumber(cursor) && isDigitOrPoint(cursor.code()) ? readQuantity(cursor, "speed") : null;
    if (!size) {
      cursor.report(
        "missing-argument",
        { start: signStart, end: signStart + 1 },
        `After the sign comes a speed: write it, such as ${word} + 5 kt.`,
      );
      return null;
    }
    const value = isMinus(code) ? -size.value : size.value;
    offset = { ...size, value: value === 0 ? 0 : value };
    cursor.skip();
  }
  const tolerance = atTolerance(cursor) ? readTolerance(cursor, "speed") : null;
  if (tolerance && !tolerance.unit && !offset?.unit && !cursor.faulty) {
    cursor.report(
      "missing-unit",
      tolerance.span,
      `The tolerance ${tolerance.value} of what? Write ${tolerance.value} kt.`,
      [
        {
          title: `Write ${tolerance.value} kt`,
          edits: [{ line: 0, start: tolerance.span.end, end: tolerance.span.end, newText: " kt" }],
        },
      ],
    );
  }
  return { kind: "named", name: word, nameSpan, offset, tolerance, span: { start, end: cursor.lastEnd } };
}

function isDigitOrPoint(code: number): boolean {
  return isDigit(code) || code === 46;
}

/** The speed name that begins here, also where a sign touches it: `vref-5`. */
function leadingName(cursor: Cursor): SpeedName | null {
  const run = cursor.text.slice(cursor.at, cursor.nameEnd()).toLowerCase();
  if (isSpeedName(run)) return run;
  const hyphen = run.indexOf("-");
  const before = hyphen > 0 ? run.slice(0, hyphen) : "";
  return isSpeedName(before) && (hyphen === run.length - 1 || isDigit(run.charCodeAt(hyphen + 1)))
    ? before
    : null;
}
