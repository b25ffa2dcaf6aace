/** Standard gravity, m/s2 (exact by definition). */
export const G0 = 9.80665;
/** Sea-level density of the standard atmosphere, kg/m3 (ICAO Doc 7488). */
export const RHO0 = 1.225;
/** Sea-level pressure of the standard atmosphere, Pa. */
export const P0 = 101325;
/** Sea-level temperature of the standard atmosphere, K. */
export const T0 = 288.15;
/** Specific gas constant of air, J/(kg K). */
export const R = 287.05287;
/** Ratio of specific heats of air. */
export const KAPPA = 1.4;
/** Lapse rate of the troposphere, K/m. */
export const LAPSE = 0.0065;
/** Geopotential height of the tropopause, m. */
export const TROPOPAUSE = 11000;
/** Sea-level speed of sound, m/s. */
export const A0 = Math.sqrt(KAPPA * R * T0);
