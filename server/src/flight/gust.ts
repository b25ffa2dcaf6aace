import type { Atmosphere } from "./atmosphere.ts";
import { G0, RHO0 } from "./constants.ts";

/** What a gust does to a wing. */
export interface GustedWing {
  /** S, m2. */
  readonly area: number;
  /** Mean geometric chord, m. */
  readonly chord: number;
  /** Lift-curve slope a of the aeroplane, per rad. */
  readonly slope: number;
}

/** mu = 2 (m/S) / (rho c a), rho at the altitude flown. Example: 16 lb/ft2, 5 ft, 4.7 per rad at sea level: 17.8. */
export function gustMassRatio(mass: number, wing: GustedWing, air: Atmosphere): number {
  return (2 * mass) / (wing.area * air.density * wing.chord * wing.slope);
}

/** Kg = 0.88 mu / (5.3 + mu). Example: mu 17.806 gives 0.678. */
export function gustAlleviation(massRatio: number): number {
  return (0.88 * massRatio) / (5.3 + massRatio);
}

/**
 * Load factor that a vertical gust adds, and that one downwards takes away:
 * Kg rho0 U V a / (2 m g0/S).
 *
 * @param gust U, the derived gust velocity, m/s EAS, not a reported wind gust
 * @param eas V, m/s EAS
 * @param mass m, kg
 *
 * Source: 14 CFR 23.341(c) before Amendment 23-64.
 * Example: 16 lb/ft2, 5 ft, 4.7 per rad, 150 kt and 25 ft/s at sea level: 1.50.
 */
export function gustLoad(gust: number, eas: number, mass: number, wing: GustedWing, air: Atmosphere): number {
  const alleviation = gustAlleviation(gustMassRatio(mass, wing, air));
  return (alleviation * RHO0 * gust * eas * wing.slope * wing.area) / (2 * mass * G0);
}
