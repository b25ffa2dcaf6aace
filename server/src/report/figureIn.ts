import { fromSI, type UnitName } from "../flight/units.ts";

/**
 * A figure in a unit, for scripts: to 15 significant digits, all that a double carries for certain, so that
 * what the author wrote as 30 degrees comes out as 30 and not as 29.999999999999996.
 */
export function figureIn(si: number, unit: UnitName): number {
  return Number(fromSI(si, unit).toPrecision(15));
}
