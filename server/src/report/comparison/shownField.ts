import { toSI } from "../../flight/units.ts";
import type { ResultName } from "../../notation/vocabulary.ts";
import {
  formatAltitude,
  formatBank,
  formatFactor,
  formatLoad,
  formatMach,
  formatRadius,
  formatResultValue,
  formatSeconds,
  formatSpeed,
} from "../../plan/format.ts";
import { fromShownUnit, resultNames } from "../../plan/results.ts";
import type { JsonValue } from "../pointsJson.ts";

/**
 * A field of the points' JSON as a reader sees it. Its name says the unit, so that a field which
 * comes to the JSON is compared without anything being added here. A value that is not known is "-".
 */
export function shownField(name: string, value: JsonValue): string {
  if (value === null) return "-";
  if (typeof value === "string") return value;
  if (typeof value === "number") return shownNumber(name, value);
  if (typeof value === "boolean") return value ? "yes" : "no";
  if (Array.isArray(value)) {
    return value.length === 0 ? "-" : value.map((one: JsonValue) => shownField(name, one)).join("; ");
  }
  return Object.entries(value)
    .filter(([key, one]) => one !== null && !behindTheScenes.has(key))
    .map(([key, one]) => `${fieldName(key)} ${shownField(key, one)}`)
    .join(", ");
}

/** Full precision that is rounded in its neighbour, and lines, which are no figures. */
const behindTheScenes = new Set(["exact", "line"]);

/** A field's name without its unit and the corner it is of: the figure says both. */
export function fieldName(field: string): string {
  return field.replace(/(_(low|high|kt|deg|ft|nm|s))+$/, "").replaceAll("_", " ");
}

/** The result that a field is a value of; null where it is another figure. */
export function resultOfField(field: string): ResultName | null {
  const stem = field.replace(/(_(low|high|kt|deg|nm|deg_s))+$/, "").replaceAll("_", "-");
  return resultNames.find((name) => name === stem) ?? null;
}

const byName: readonly (readonly [RegExp, (value: number) => string])[] = [
  [/^(ratio|margin)(_|$)/, (value) => formatResultValue("margin", value)],
  [/mach(_|$)/, (value) => formatMach(value)],
  [/load(_|$)/, (value) => formatLoad(value)],
  [/^seconds_/, (value) => formatSeconds(value)],
  [/_kt$/, (value) => formatSpeed(toSI(value, "kt"))],
  [/_ft$/, (value) => formatAltitude(toSI(value, "ft"))],
  [/_nm$/, (value) => formatRadius(toSI(value, "nm"))],
  [/_deg$/, (value) => formatBank(toSI(value, "deg"))],
];

function shownNumber(name: string, value: number): string {
  const result = resultOfField(name);
  if (result) return formatResultValue(result, fromShownUnit(result, value));
  const format = byName.find(([pattern]) => pattern.test(name))?.[1];
  if (format) return format(value);
  return Number.isInteger(value) ? String(value) : formatFactor(value);
}
