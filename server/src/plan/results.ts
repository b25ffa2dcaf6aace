import { fromSI, toSI, type UnitName } from "../flight/units.ts";
import type { ResultName } from "../notation/vocabulary.ts";

export type Rounding = "nearest" | "up" | "down";

/** How a result is named, shown and compared. */
export interface ResultEntry {
  /** A few plain words, for a table's head or a hover. */
  readonly label: string;
  /** The unit it is shown in; null for a plain number. */
  readonly unit: "kt" | "deg" | "nm" | "deg/s" | null;
  /** Decimals it is shown with. */
  readonly decimals: number;
  /** The direction that never flatters. */
  readonly rounding: Rounding;
  /** The end of the spread that is shown, and that claims are held against. */
  readonly worst: "nominal" | "low" | "high";
  /** The side of the truth on which a claim promises more than there is. */
  readonly unsafeWhenClaimed: "lower" | "higher";
}

/** A speed at which something bad begins: more is worse. */
const onset = {
  unit: "kt",
  decimals: 0,
  rounding: "nearest",
  worst: "high",
  unsafeWhenClaimed: "lower",
} as const;
/** A least speed to fly, at the nominal mass by definition. */
const least = {
  unit: "kt",
  decimals: 0,
  rounding: "up",
  worst: "nominal",
  unsafeWhenClaimed: "lower",
} as const;
/** Bank left: less is worse. */
const bankLeft = {
  unit: "deg",
  decimals: 0,
  rounding: "down",
  worst: "low",
  unsafeWhenClaimed: "higher",
} as const;
/** A plain number of which less is worse. */
const factorLeft = {
  unit: null,
  decimals: 2,
  rounding: "down",
  worst: "low",
  unsafeWhenClaimed: "higher",
} as const;

/**
 * The results of a point. Rounding never flatters: what is left is cut, what must be kept clear of
 * is rounded up. The stall speeds alone go to the nearest knot, as every speed of the point does, so
 * that a speed reads the same wherever it stands; ratio and margin, which are cut, say whether it
 * suffices.
 */
export const results: Readonly<Record<ResultName, ResultEntry>> = {
  vs1g: { label: "1-g stall speed", ...onset },
  stall: { label: "stall speed in the turn", ...onset },
  // Rounded up: the warning is never read as coming later than it does.
  warning: { label: "stall warning speed", ...onset, rounding: "up" },
  ratio: { label: "speed over 1-g stall speed", ...factorLeft },
  margin: { label: "speed over stall speed", ...factorLeft },
  // The load that is flown: never read as less than wing and structure carry, nor as met where it is not.
  load: {
    label: "load factor",
    unit: null,
    decimals: 2,
    rounding: "up",
    worst: "high",
    unsafeWhenClaimed: "lower",
  },
  "stall-load": { label: "load factor at the stall", ...factorLeft },
  "stall-bank": { label: "bank at the stall", ...bankLeft },
  "warning-bank": { label: "bank at the stall warning", ...bankLeft },
  overshoot: { label: "bank left before the warning", ...bankLeft },
  "buffet-load": { label: "load factor at buffet onset", ...factorLeft },
  "buffet-bank": { label: "bank at buffet onset", ...bankLeft },
  // A turn is never read as tighter or quicker than it is: the radius goes up, the rate down.
  radius: {
    label: "turn radius",
    unit: "nm",
    decimals: 2,
    rounding: "up",
    worst: "high",
    unsafeWhenClaimed: "lower",
  },
  rate: {
    label: "rate of turn",
    unit: "deg/s",
    decimals: 1,
    rounding: "down",
    worst: "low",
    unsafeWhenClaimed: "higher",
  },
  // It serves as a ceiling of the bank (`or rate-one`), so it is cut: who flies the figure shown keeps it.
  "rate-one-bank": { label: "bank for 3 degrees a second", ...bankLeft },
  v2min: { label: "least take-off safety speed", ...least },
  vfto: { label: "least final take-off speed", ...least },
  vref: { label: "least landing reference speed", ...least },
  // Full control is promised up to it, so a higher figure promises too much.
  va: {
    label: "manoeuvring speed",
    unit: "kt",
    decimals: 0,
    rounding: "down",
    worst: "nominal",
    unsafeWhenClaimed: "higher",
  },
};

export function resultEntry(name: ResultName): ResultEntry {
  return results[name];
}

/** The results in the order they are listed. */
export const resultNames = Object.keys(results) as readonly ResultName[];

/** From SI to the unit the result is shown in, unrounded; `unit` names another one. */
export function inShownUnit(
  name: ResultName,
  si: number,
  unit: UnitName | null = results[name].unit,
): number {
  return unit === null ? si : fromSI(si, unit);
}

/** The inverse of {@link inShownUnit}. */
export function fromShownUnit(
  name: ResultName,
  shown: number,
  unit: UnitName | null = results[name].unit,
): number {
  return unit === null ? shown : toSI(shown, unit);
}
