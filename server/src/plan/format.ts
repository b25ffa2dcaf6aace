import { fromSI, type UnitName } from "../flight/units.ts";
import type { Quantity } from "../notation/tree.ts";
import type { Keyword, ResultName } from "../notation/vocabulary.ts";
import type { FigureRule } from "./figureRules.ts";
import type { Written } from "./openClause.ts";
import { inShownUnit, type Rounding, results } from "./results.ts";
import { MOST_DECIMALS, roundShown } from "./roundShown.ts";
import { ALLOWANCE } from "./rules.ts";
import type { Spread } from "./spread.ts";

/**
 * The one formatter: every number that is shown anywhere is written here. A text can be copied back
 * into the notation: no digit groups, `-` for minus, a blank before a unit, none before the degree
 * sign. `more` asks for decimals beyond the usual ones. A figure that is not finite is "unknown".
 */

/** What stands for a figure that is none. */
const UNKNOWN = "unknown";

/** A result at its worst corner with its unit: "134 kt", "62°", "1.45". With `spread`, "134 kt (132 to 134)" where the ends read differently. */
export function formatResult(
  name: ResultName,
  spread: Spread,
  { decimals, spread: withSpread }: { readonly decimals?: number; readonly spread?: boolean } = {},
): string {
  const { decimals: usual, worst } = results[name];
  const more = (decimals ?? usual) - usual;
  const shown = formatResultValue(name, spread[worst], more);
  if (!withSpread) return shown;
  const low = resultFigure(name, spread.low, usual + more);
  const high = resultFigure(name, spread.high, usual + more);
  return low === high ? shown : `${shown} (${low} to ${high})`;
}

/** One value of a result, SI, with its unit. */
export function formatResultValue(name: ResultName, si: number, more = 0): string {
  const { decimals, unit } = results[name];
  return withUnit(resultFigure(name, si, decimals + more), unit);
}

/** The computed figure in a claim's own unit and decimals, to be compared with the figure that is claimed. */
export function shownClaim(name: ResultName, spread: Spread, claimed: Quantity): number {
  const { worst, rounding, unit } = results[name];
  const si = spread[worst];
  return roundShown(inShownUnit(name, si, claimed.unit ?? unit), clipped(claimed.decimals), rounding);
}

/** The computed figure as the claim would be written now; without a spread, the claim's own figure. */
export function formatClaim(name: ResultName, spread: Spread | null, claimed: Quantity, more = 0): string {
  const decimals = spread ? claimed.decimals + more : claimed.decimals;
  const value = spread ? shownClaim(name, spread, { ...claimed, decimals }) : claimed.value;
  return withUnit(fixed(value, decimals), claimed.unit ?? results[name].unit);
}

type Formatter = (value: number, more: number) => string;

/**
 * Two figures of one message. Where they would read alike, both get one decimal more, until they
 * differ or have six. `formatOther` is for a second figure that is another kind of thing.
 */
export function formatDistinct(
  one: number,
  other: number,
  format: Formatter,
  formatOther: Formatter = format,
): readonly [string, string] {
  let more = 0;
  while (more < MOST_DECIMALS && format(one, more) === formatOther(other, more)) more++;
  return [format(one, more), formatOther(other, more)];
}

/** A speed in knots: "195 kt", "203 kt tas". A least speed is rounded up, a greatest one down. */
export function formatSpeed(
  mps: number,
  more = 0,
  {
    type = "cas",
    rounding = "nearest",
  }: { readonly type?: "cas" | "eas" | "tas" | "ias"; readonly rounding?: Rounding } = {},
): string {
  const text = inUnit(mps, "kt", more, rounding);
  return type === "cas" || text === UNKNOWN ? text : `${text} ${type}`;
}

/** "M 0.740". */
export function formatMach(mach: number, more = 0, rounding: Rounding = "nearest"): string {
  const text = rounded(mach, 3 + more, rounding);
  return text === UNKNOWN ? text : `M ${text}`;
}

/**
 * A bank that is flown or allowed: "25°". It is cut, so that who flies the figure shown banks no more
 * than was checked.
 */
export function formatBank(rad: number, more = 0): string {
  return inUnit(rad, "deg", more, "down");
}

/** An angle of the path: "-3.0°". */
export function formatAngle(rad: number, more = 0): string {
  return inUnit(rad, "deg", 1 + more, "nearest");
}

/** A claim's figure as it would be written now, without its unit. */
export function formatClaimNumber(name: ResultName, spread: Spread, claimed: Quantity, more: number): string {
  const decimals = claimed.decimals + more;
  return fixed(shownClaim(name, spread, { ...claimed, decimals }), decimals);
}

/** What a row holds against its bound, beside the bank that is flown. */
type Bounded = "bank" | "load" | "radius" | "ratio" | "margin" | "overshoot" | "buffet-load";

/**
 * The bound of a row, in SI: as it was written, or to the strict side where that is no round figure. Cut
 * as results are, "at least 12.5°" would read as less than it asks.
 */
export function formatBound(name: Bounded, si: number, strict: "up" | "down", more = 0): string {
  const { unit, decimals } = results[name === "bank" ? "overshoot" : name];
  const shown = unit === null ? si : fromSI(si, unit);
  const written = [0, 1, 2].find((own) => isRound(shown, decimals + own)) ?? 0;
  return withUnit(rounded(shown, decimals + Math.max(more, written), strict), unit);
}

function isRound(value: number, decimals: number): boolean {
  return Math.abs(roundShown(value, decimals, "nearest") - value) <= Math.abs(value) * ALLOWANCE;
}

/** A load factor that is flown or needed: "1.11". What is left of it is a result, and is cut. */
export function formatLoad(load: number, more = 0): string {
  return formatResultValue("load", load, more);
}

/** "1.30 nm". */
export function formatRadius(metres: number, more = 0): string {
  return formatResultValue("radius", metres, more);
}

/** "56.02 t"; "712 kg" where the card's reference mass is below 5,700 kg. */
export function formatMass(kg: number, referenceMass: number, more = 0): string {
  return referenceMass < 5700 ? inUnit(kg, "kg", more, "nearest") : inUnit(kg, "t", 2 + more, "nearest");
}

/** "3200 ft". Cut, so that an altitude that can be reached is never read as more. */
export function formatAltitude(metres: number, more = 0): string {
  return inUnit(metres, "ft", more, "down");
}

/** "FL032", cut to the level that is reached; below the zero level, where none has a name, in feet. */
export function formatFlightLevel(pressureAltitude: number): string {
  const level = roundShown(fromSI(pressureAltitude, "FL"), 0, "down");
  if (!Number.isFinite(level)) return UNKNOWN;
  if (level < 0) return `pressure altitude ${formatAltitude(pressureAltitude)}`;
  return `FL${fixed(level, 0).padStart(3, "0")}`;
}

/** A deviation from the standard atmosphere, which has its sign where it is not 0: "+8", "-6". */
export function formatDeviation(kelvin: number, more = 0): string {
  const text = trimmed(kelvin, 1 + more);
  return Number(text) > 0 ? `+${text}` : text;
}

/** A plain factor of a table: "0.992". */
export function formatFactor(factor: number, more = 0): string {
  return rounded(factor, 3 + more, "nearest");
}

/** A share: "8 %", "7.5 %". */
export function formatPercent(fraction: number, more = 0): string {
  return withUnit(trimmed(fromSI(fraction, "%"), 1 + more), "%");
}

/** "1013 hPa". */
export function formatQnh(pascal: number, more = 0): string {
  return inUnit(pascal, "hPa", more, "nearest");
}

/** A derived gust: "30 ft/s". */
export function formatGust(mps: number, more = 0): string {
  return inUnit(mps, "ft/s", more, "nearest");
}

/** A deceleration: "1.0 kt/s". */
export function formatDecel(rate: number, more = 0): string {
  return inUnit(rate, "kt/s", 1 + more, "nearest");
}

/** A time that is left, cut: "12 s". */
export function formatSeconds(seconds: number, more = 0): string {
  return withUnit(rounded(seconds, more, "down"), "s");
}

/** A figure of a finding as an `accept` writes it, rounded so that it covers the figure: "35", "1.21", "57.2 t". */
export function writtenFigure({ what, worse, units, decimals }: FigureRule, si: number): string {
  const unit = units[0] ?? null;
  const shownIn = unit ?? (what === "bank" || what === "overshoot" ? "deg" : null);
  const value = shownIn === null ? si : fromSI(si, shownIn);
  return withUnit(rounded(value, decimals, worse === "more" ? "up" : "down"), unit);
}

/** A value as it is spoken of, with what its clause says besides: "41", "56.4 t", "M 0.742", "200 kt tas". */
export function formatSpoken(written: Written, what: Keyword): string {
  const text = formatWritten(written, what);
  if (written.of === undefined) return text;
  return written.of === "M" ? `M ${text}` : `${text} ${written.of}`;
}

/** A value as it is written in the place that is open: "41", "56.4 t", "0.742", "FL310", "+8". */
export function formatWritten({ value, unit, decimals }: Written, what: Keyword): string {
  const figure = fixed(value, decimals);
  if (unit === "FL") return `FL${figure.padStart(3, "0")}`;
  if (what === "isa" && 0 < value) return `+${withUnit(figure, unit === "C" ? null : unit)}`;
  return unit === null || unit === "deg" ? figure : `${figure} ${unit}`;
}

function resultFigure(name: ResultName, si: number, decimals: number): string {
  return rounded(inShownUnit(name, si), decimals, results[name].rounding);
}

function inUnit(si: number, unit: UnitName, decimals: number, rounding: Rounding): string {
  return withUnit(rounded(fromSI(si, unit), decimals, rounding), unit);
}

function rounded(value: number, decimals: number, rounding: Rounding): string {
  return fixed(roundShown(value, clipped(decimals), rounding), clipped(decimals));
}

/** To the nearest, without zeros at the end. */
function trimmed(value: number, decimals: number): string {
  const figure = roundShown(value, clipped(decimals), "nearest");
  return Number.isFinite(figure) ? String(figure) : UNKNOWN;
}

function fixed(value: number, decimals: number): string {
  return Number.isFinite(value) ? value.toFixed(clipped(decimals)) : UNKNOWN;
}

function clipped(decimals: number): number {
  return Math.min(Math.max(decimals, 0), MOST_DECIMALS);
}

/** The degree sign touches its figure; every other unit stands behind a blank. */
function withUnit(figure: string, unit: UnitName | null): string {
  if (unit === null || figure === UNKNOWN) return figure;
  if (unit === "deg") return `${figure}°`;
  if (unit === "deg/s") return `${figure}°/s`;
  return `${figure} ${unit === "C" ? "°C" : unit}`;
}
