import { interpolate, type Table } from "./table.ts";

/*
 * An airspeed calibration table holds at 1 g and the reference mass. The position error follows the
 * angle of attack, so elsewhere the table is entered at V / sqrt(n m / m_ref).
 */

/** sqrt(n m / m_ref). */
function scale(load: number, mass: number, referenceMass: number): number {
  return Math.sqrt((load * mass) / referenceMass);
}

/**
 * Calibrated airspeed of an indicated one, m/s.
 *
 * @param table indicated to calibrated, m/s, both rising
 * @param ias m/s
 * @param load n, above 0
 * @returns null outside the table, or without load
 */
export function calibratedFromIndicated(
  table: Table,
  ias: number,
  load: number,
  mass: number,
  referenceMass: number,
): number | null {
  return scaled(table, ias, scale(load, mass, referenceMass));
}

/** The inverse of {@link calibratedFromIndicated}. */
export function indicatedFromCalibrated(
  table: Table,
  cas: number,
  load: number,
  mass: number,
  referenceMass: number,
): number | null {
  const inverse = { arguments: table.values, values: table.arguments };
  return scaled(inverse, cas, scale(load, mass, referenceMass));
}

function scaled(table: Table, speed: number, factor: number): number | null {
  if (!(0 < factor)) return null;
  const found = interpolate(table, speed / factor);
  return found === null ? null : found * factor;
}
