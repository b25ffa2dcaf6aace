import { G0 } from "./constants.ts";

/** Rate of a rate-one turn, rad/s: 360 degrees in two minutes. */
export const RATE_ONE = (3 * Math.PI) / 180;

/**
 * Load factor of a steady turn n = cos gamma / cos phi.
 *
 * @param bank phi, rad, about the flight path
 * @param path gamma, rad
 * @returns null from 90 degrees of bank, where no bank alone gives the load
 *
 * Source: level coordinated turn equilibrium (FAA-H-8083-25B, Aerodynamics of Flight).
 * Example: 60 degrees, level: 2.
 */
export function loadFactor(bank: number, path: number): number | null {
  if (!(0 <= bank && bank < Math.PI / 2)) return null;
  return bank === 0 && path === 0 ? 1 : Math.cos(path) / Math.cos(bank);
}

/** Flight-path angle, rad, of a gradient (tan gamma). Example: 2.4 % is 1.375 degrees. */
export function pathFromGradient(gradient: number): number | null {
  return Number.isFinite(gradient) ? Math.atan(gradient) : null;
}

/** Flight-path angle, rad, of a vertical speed w in m/s: sin gamma = w / TAS. Null where w exceeds the TAS. */
export function pathFromVerticalSpeed(verticalSpeed: number, tas: number): number | null {
  const sine = verticalSpeed / tas;
  return -1 < sine && sine < 1 ? Math.asin(sine) : null;
}

/**
 * Radius of a turn in still air, m: TAS^2 cos gamma / (g0 tan phi) in a steady turn, and
 * TAS^2 cos^2 gamma / (n g0 sin phi) with a stated load.
 *
 * @param tas m/s
 * @param bank phi, rad
 * @param path gamma, rad
 * @param load n where it is stated, else null
 * @returns null where nothing turns
 *
 * Example: 120 kt, 30 degrees: 673.1 m.
 */
export function turnRadius(tas: number, bank: number, path: number, load: number | null): number | null {
  const cosine = Math.cos(path);
  const radius =
    load === null
      ? (tas * tas * cosine) / (G0 * Math.tan(bank))
      : (tas * cosine) ** 2 / (load * G0 * Math.sin(bank));
  return turns(bank, load) && Number.isFinite(radius) && 0 < radius ? radius : null;
}

/**
 * Rate of turn, rad/s: g0 tan phi / TAS in a steady turn, n g0 sin phi / (TAS cos gamma) with a
 * stated load. Null where nothing turns. Example: 120 kt, 30 degrees: 5.255 deg/s.
 */
export function turnRate(tas: number, bank: number, path: number, load: number | null): number | null {
  const rate =
    load === null ? (G0 * Math.tan(bank)) / tas : (load * G0 * Math.sin(bank)) / (tas * Math.cos(path));
  return turns(bank, load) && Number.isFinite(rate) && 0 < rate ? rate : null;
}

function turns(bank: number, load: number | null): boolean {
  return load === null ? 0 < bank && bank < Math.PI / 2 : 0 < bank && bank < Math.PI && 0 < load;
}

/** Bank of a rate-one turn, rad: arctan(omega TAS / g0). Example: 160 kt TAS, 23.72 degrees. */
export function rateOneBank(tas: number): number {
  return Math.atan((RATE_ONE * tas) / G0);
}
