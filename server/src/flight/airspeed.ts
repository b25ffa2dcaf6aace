import type { Atmosphere } from "./atmosphere.ts";
import { A0, P0 } from "./constants.ts";

/*
 * Compressible subsonic airspeed, kappa = 1.4: M < 1 and CAS < a0. Every conversion has a closed
 * form both ways. Sources: NACA Report 837; NASA RP-1046.
 */

/**
 * Impact pressure qc = p((1 + 0.2 M^2)^3.5 - 1), Pa.
 *
 * @param mach M, 0 to below 1
 * @param pressure static pressure p, Pa
 */
export function impactPressure(mach: number, pressure: number): number | null {
  return isSubsonic(mach) ? pressure * Math.expm1(3.5 * Math.log1p(0.2 * mach * mach)) : null;
}

/** Impact pressure of a calibrated airspeed, Pa: that of the same Mach number at sea level. Null at a0 and above. */
export function impactPressureOfCas(cas: number): number | null {
  return impactPressure(cas / A0, P0);
}

/** The Mach number whose impact pressure over the static pressure is `ratio`. */
function machOfRatio(ratio: number): number {
  // expm1 and log1p keep slow speeds exact, where 1 + ratio would drop their last digits.
  return Math.sqrt(5 * Math.expm1((2 / 7) * Math.log1p(ratio)));
}

function isSubsonic(mach: number): boolean {
  return 0 <= mach && mach < 1;
}

function subsonic(mach: number): number | null {
  return isSubsonic(mach) ? mach : null;
}

/** Mach number of a calibrated airspeed in m/s. Example: 250 kt at 10 000 ft is M 0.45228. */
export function machFromCas(cas: number, air: Atmosphere): number | null {
  const qc = impactPressureOfCas(cas);
  return qc === null ? null : subsonic(machOfRatio(qc / air.pressure));
}

/** Calibrated airspeed, m/s. Null where it would reach a0. Example: M 0.78 at 35 000 ft is 264.42 kt. */
export function casFromMach(mach: number, air: Atmosphere): number | null {
  const qc = impactPressure(mach, air.pressure);
  if (qc === null) return null;
  const cas = A0 * machOfRatio(qc / P0);
  return cas < A0 ? cas : null;
}

/** Equivalent airspeed EAS = M a0 sqrt(delta), m/s. */
export function easFromMach(mach: number, air: Atmosphere): number | null {
  return isSubsonic(mach) ? mach * A0 * Math.sqrt(air.delta) : null;
}

export function machFromEas(eas: number, air: Atmosphere): number | null {
  return subsonic(eas / (A0 * Math.sqrt(air.delta)));
}

/** True airspeed TAS = M a, m/s. */
export function tasFromMach(mach: number, air: Atmosphere): number | null {
  return isSubsonic(mach) ? mach * air.soundSpeed : null;
}

export function machFromTas(tas: number, air: Atmosphere): number | null {
  return subsonic(tas / air.soundSpeed);
}

export function casFromEas(eas: number, air: Atmosphere): number | null {
  const mach = machFromEas(eas, air);
  return mach === null ? null : casFromMach(mach, air);
}

export function easFromCas(cas: number, air: Atmosphere): number | null {
  const mach = machFromCas(cas, air);
  return mach === null ? null : easFromMach(mach, air);
}
