import { G0, KAPPA, LAPSE, P0, R, RHO0, T0, TROPOPAUSE } from "./constants.ts";
import { FOOT } from "./units.ts";

/** The air at one pressure altitude. */
export interface Atmosphere {
  /** m, geopotential. */
  readonly pressureAltitude: number;
  /** Deviation from the standard temperature, K. */
  readonly deviation: number;
  /** Pa; a deviation leaves it as it is. */
  readonly pressure: number;
  /** K. */
  readonly temperature: number;
  /** kg/m3. */
  readonly density: number;
  /** m/s. */
  readonly soundSpeed: number;
  /** p / p0. */
  readonly delta: number;
  /** T / T0. */
  readonly theta: number;
  /** rho / rho0. */
  readonly sigma: number;
}

const LOWEST = -5000 * FOOT;
const HIGHEST = 20000;
const EXPONENT = G0 / (R * LAPSE);
const TROPOPAUSE_TEMPERATURE = T0 - LAPSE * TROPOPAUSE;
const TROPOPAUSE_PRESSURE = P0 * (TROPOPAUSE_TEMPERATURE / T0) ** EXPONENT;

/** A height converted from its printed limit is inside. */
function isModelled(h: number): boolean {
  return LOWEST - 1e-6 <= h && h <= HIGHEST + 1e-6;
}

/**
 * Standard temperature, K, at a pressure altitude h in m: T0 - 6.5 K/km up to 11 000 m, constant to
 * 20 000 m. Null outside -5000 ft to 20 000 m. Source: ICAO Doc 7488.
 */
export function standardTemperature(h: number): number | null {
  if (!isModelled(h)) return null;
  return h <= TROPOPAUSE ? T0 - LAPSE * h : TROPOPAUSE_TEMPERATURE;
}

/** Pressure, Pa, at a pressure altitude h in m that is modelled. */
function standardPressure(h: number): number {
  if (h <= TROPOPAUSE) return P0 * (1 - (LAPSE * h) / T0) ** EXPONENT;
  return TROPOPAUSE_PRESSURE * Math.exp((-G0 * (h - TROPOPAUSE)) / (R * TROPOPAUSE_TEMPERATURE));
}

/**
 * International Standard Atmosphere with a temperature deviation.
 *
 * p(h) of the standard; T = T_std(h) + dT; rho = p / (R T); a = sqrt(kappa R T).
 *
 * @param pressureAltitude h, m, -5000 ft to 20 000 m
 * @param deviation dT, K
 * @returns null outside the range, or where the temperature would not be positive
 *
 * Sources: ICAO Doc 7488; US Standard Atmosphere 1976.
 * Example: 3048 m (10 000 ft), dT 0: T 268.338 K, delta 0.687704, sigma 0.738477.
 */
export function atmosphere(pressureAltitude: number, deviation: number): Atmosphere | null {
  const standard = standardTemperature(pressureAltitude);
  if (standard === null) return null;
  const temperature = standard + deviation;
  if (!(0 < temperature)) return null;
  const pressure = standardPressure(pressureAltitude);
  const delta = pressure / P0;
  const theta = temperature / T0;
  const sigma = delta / theta;
  return {
    pressureAltitude,
    deviation,
    pressure,
    temperature,
    density: RHO0 * sigma,
    soundSpeed: Math.sqrt(KAPPA * R * temperature),
    delta,
    theta,
    sigma,
  };
}

/** The pressure altitude, m, of a pressure in Pa: the inverse of the standard. Null outside the range. */
export function altitudeOfPressure(pressure: number): number | null {
  if (!(0 < pressure)) return null;
  const h =
    TROPOPAUSE_PRESSURE <= pressure
      ? (T0 / LAPSE) * (1 - (pressure / P0) ** (1 / EXPONENT))
      : TROPOPAUSE - ((R * TROPOPAUSE_TEMPERATURE) / G0) * Math.log(pressure / TROPOPAUSE_PRESSURE);
  return isModelled(h) ? h : null;
}

/**
 * What is added to an altitude on a qnh to give the pressure altitude: H(q), the altimeter's own
 * offset, with H(q) = (T0 / L)(1 - (q / p0)^(R L / g0)).
 *
 * @param qnh q, Pa
 * @returns m; 0 at 1013.25 hPa, positive below it
 *
 * Source: ICAO Doc 7488, the pressure-height relation that altimeters are calibrated to.
 * Example: 985 hPa gives 239.0 m (784 ft).
 */
export function pressureAltitudeOffset(qnh: number): number {
  return (T0 / LAPSE) * (1 - (qnh / P0) ** (1 / EXPONENT));
}
