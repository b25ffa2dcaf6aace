import type { Cursor } from "./cursor.ts";
import { atTolerance, toleranceMark } from "./numbers.ts";
import { readQuantity, unitHere } from "./quantities.ts";
import type { Quantity, Range, Sweep, Tolerance, Unknown, Value } from "./tree.ts";
import { missingUnit } from "./unitFindings.ts";
import { type QuantityKind, unitRule } from "./units.ts";
import type { Unit } from "./vocabulary.ts";

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
  if (tolerance) sameMeasure(cursor, own, tolerance);
  const span = tolerance ? { start: own.span.start, end: tolerance.span.end } : own.span;
  return { kind: "scalar", quantity: own, tolerance, span };
}

/** Units of a path that measure the same: an angle, a gradient, a vertical speed. */
const slopes: readonly (readonly (Unit | null)[])[] = [["deg"], ["%", "ft/nm"], ["ft/min"]];

/** An angle, a gradient and a vertical speed cannot be added, so every part of a path is in one of them. */
function sameMeasure(cursor: Cursor, { unit }: Quantity, other: Quantity | Tolerance): void {
  const own = slopes.find((units) => units.includes(unit));
  if (!own || other.unit === null || own.includes(other.unit)) return;
  cursor.report(
    "wrong-unit",
    other.span,
    `This path is in ${unit} and a part of it in ${other.unit}, which cannot be added: write both in ${unit}.`,
  );
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
  for (const other of by ? [high, by] : [high]) sameMeasure(cursor, low, other);
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
  // A flight level has its letters before the number, so that none can stand behind a `?`.
  if (unit && unit !== "FL" && unitRule(kind).units.includes(unit)) {
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
