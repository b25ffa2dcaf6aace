import type { Cursor } from "./cursor.ts";
import type { Fix } from "./finding.ts";
import { type ReadNumber, replace } from "./numbers.ts";
import { orListed } from "./orListed.ts";
import type { Span } from "./span.ts";
import { type QuantityKind, unitInWords, unitRule } from "./units.ts";
import type { Unit } from "./vocabulary.ts";

/** The units to write; a flight level is no unit behind a number. */
function choicesOf(kind: QuantityKind): readonly Unit[] {
  return unitRule(kind).units.filter((unit) => unit !== "FL");
}

export function wrongUnit(kind: QuantityKind, word: string, unit: Unit): string {
  if (kind === "gust" && unit === "kt") {
    return "A gust here is the derived gust velocity of the load rules, in ft/s or m/s; a reported wind gust in knots is another thing and gives no load factor.";
  }
  if (unit === "FL") return "A flight level is written FL and three digits, such as FL350.";
  const { units, noun } = unitRule(kind);
  if (units.length === 0) return `${word} does not belong here: this is a plain number.`;
  return `${word} is no unit of ${noun}: write ${orListed(choicesOf(kind))}.`;
}

export function unknownUnit(kind: QuantityKind, word: string): string {
  if (kind === "mass" && word.toLowerCase().startsWith("ton")) {
    return `A ${word} may be 1000 kg, 2000 lb or 2240 lb: write t, kg or lb.`;
  }
  const unit = unitInWords(word, kind);
  if (unit) return `A unit is written short: write ${unit} instead of ${word}.`;
  const { noun } = unitRule(kind);
  return `${word} is no unit of ${noun}: write ${orListed(choicesOf(kind))}.`;
}

/** A word that can mean one unit only has one way out; that a ton is one is the author's to say. */
export function unknownUnitFixes(kind: QuantityKind, word: string, span: Span): Fix[] {
  if (word.toLowerCase().startsWith("ton")) {
    return [{ title: "Write t (1000 kg)", edits: [{ line: 0, ...span, newText: "t" }] }];
  }
  const unit = unitInWords(word, kind);
  return unit ? [{ ...replace(span, unit), preferred: true }] : unitFixes(kind, span);
}

export function wrongUnitFixes(kind: QuantityKind, span: Span, unit: Unit): Fix[] {
  if (kind === "gust" && unit === "kt") return [];
  return unitFixes(kind, span);
}

function unitFixes(kind: QuantityKind, span: Span): Fix[] {
  return choicesOf(kind).map((unit) => replace(span, unit));
}

export function missingUnit(cursor: Cursor, kind: QuantityKind, number: ReadNumber, at: number): void {
  const { noun } = unitRule(kind);
  const written = cursor.text.slice(number.span.start, number.span.end);
  const choices = choicesOf(kind);
  const readings = choices.slice(0, 3).map((unit) => `${written} ${unit}`);
  const subject = noun.replace(/^an? /, "");
  const name = subject.charAt(0).toUpperCase() + subject.slice(1);
  cursor.report(
    "missing-unit",
    number.span,
    `${name} ${written} of what? Write ${orListed(readings)}.`,
    choices.map(
      (unit): Fix => ({
        title: `Write ${written} ${unit}`,
        edits: [{ line: 0, start: at, end: at, newText: ` ${unit}` }],
      }),
    ),
  );
}
