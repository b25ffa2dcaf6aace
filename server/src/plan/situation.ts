import { type Atmosphere, atmosphere, pressureAltitudeOffset } from "../flight/atmosphere.ts";
import { exactly, type Spread } from "./spread.ts";
import type { Carried, CarriedState, StatedAltitude } from "./state.ts";

/** Pressure altitude of a stated altitude: a flight level is one; feet are on the qnh, or taken as one where none is stated. */
export function pressureAltitudeOf(stated: StatedAltitude, qnh: number | null): Spread {
  if (stated.flightLevel || qnh === null) return stated.altitude;
  const offset = pressureAltitudeOffset(qnh);
  const { nominal, low, high } = stated.altitude;
  return { nominal: nominal + offset, low: low + offset, high: high + offset };
}

export interface Air {
  readonly pressureAltitude: Spread;
  readonly deviation: Spread;
  readonly nominal: Atmosphere;
}

/**
 * The air that a state flies in. Null where the altitude is not known, or something it depends on is
 * in error, or it lies outside the atmosphere that is modelled.
 */
export function airOf(carried: CarriedState): Air | null {
  const altitude = carried.altitude?.value;
  if (!altitude) return null;
  if (!altitude.flightLevel && isUnknown(carried.qnh)) return null;
  if (isUnknown(carried.deviation)) return null;
  const pressureAltitude = pressureAltitudeOf(altitude, carried.qnh?.value ?? null);
  const deviation = carried.deviation?.value ?? exactly(0);
  const nominal = atmosphere(pressureAltitude.nominal, deviation.nominal);
  return nominal ? { pressureAltitude, deviation, nominal } : null;
}

/** True where a clause states the value but is in error, as distinct from never stated. */
export function isUnknown(carried: Carried<unknown> | undefined): boolean {
  return carried !== undefined && carried.value === null;
}
