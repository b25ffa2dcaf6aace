import { G0 } from "./constants.ts";

/** Internally everything is SI: kg, N, m, s, rad, K, Pa, m/s. */

/** m/s in one knot (exact: 1852 m an hour). */
export const KNOT = 1852 / 3600;
/** m in one foot (exact). */
export const FOOT = 0.3048;
/** kg in one pound (exact). */
export const POUND = 0.45359237;
/** m in one nautical mile (exact). */
export const NAUTICAL_MILE = 1852;
/** Pa in one conventional inch of mercury at 0 degrees C. */
export const INCH_OF_MERCURY = 3386.389;

/** C and K are differences of temperature; N and kN are forces that stand for a mass; FL is hundreds of feet. */
export type UnitName =
  | "t"
  | "kg"
  | "lb"
  | "N"
  | "kN"
  | "kt"
  | "km/h"
  | "m/s"
  | "mph"
  | "ft"
  | "m"
  | "FL"
  | "hPa"
  | "inHg"
  | "ft/s"
  | "C"
  | "K"
  | "deg"
  | "%"
  | "ft/nm"
  | "ft/min"
  | "m2"
  | "ft2"
  | "t/h"
  | "kg/h"
  | "lb/h"
  | "kg/min"
  | "h"
  | "min"
  | "s"
  | "kt/s"
  | "deg/s"
  | "nm"
  | "km";

/** How many SI units one of each is. */
const size: Readonly<Record<UnitName, number>> = {
  t: 1000,
  kg: 1,
  lb: POUND,
  N: 1 / G0,
  kN: 1000 / G0,
  kt: KNOT,
  "km/h": 1 / 3.6,
  "m/s": 1,
  mph: 1609.344 / 3600,
  ft: FOOT,
  m: 1,
  FL: 100 * FOOT,
  hPa: 100,
  inHg: INCH_OF_MERCURY,
  "ft/s": FOOT,
  C: 1,
  K: 1,
  deg: Math.PI / 180,
  "%": 0.01,
  "ft/nm": FOOT / NAUTICAL_MILE,
  "ft/min": FOOT / 60,
  m2: 1,
  ft2: FOOT * FOOT,
  "t/h": 1000 / 3600,
  "kg/h": 1 / 3600,
  "lb/h": POUND / 3600,
  "kg/min": 1 / 60,
  h: 3600,
  min: 60,
  s: 1,
  "kt/s": KNOT,
  "deg/s": Math.PI / 180,
  nm: NAUTICAL_MILE,
  km: 1000,
};

/**
 * A value in SI. A weight in N or kN becomes the mass that weighs so under standard gravity.
 *
 * Example: `toSI(100, "kt")` is 51.444 m/s.
 */
export function toSI(value: number, unit: UnitName): number {
  return value * size[unit];
}

/** The inverse of {@link toSI}. */
export function fromSI(value: number, unit: UnitName): number {
  return value / size[unit];
}

/** Absolute temperature in K of a temperature in degrees Celsius. */
export function celsiusToKelvin(celsius: number): number {
  return celsius + 273.15;
}
