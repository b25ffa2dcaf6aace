import type { ApproachCategory } from "./approachCategory.ts";
import { FOOT, KNOT } from "./units.ts";

/** A greatest speed in a hold: indicated, m/s, or a Mach number. */
export type HoldingSpeed =
  | { readonly kind: "ias"; readonly speed: number }
  | { readonly kind: "mach"; readonly mach: number };

const knots = (speed: number): HoldingSpeed => ({ kind: "ias", speed: speed * KNOT });

/** Altitudes that a conversion of units has moved by its last bit stay in their band. */
const upTo = (altitude: number, feet: number) => altitude <= feet * FOOT * (1 + 1e-12);

/**
 * ICAO: to 14,000 ft 230 kt (170 kt in categories A and B), to 20,000 ft 240 kt, to 34,000 ft 265 kt,
 * M 0.83 above; in normal conditions.
 *
 * @param altitude m
 * @param category null where it is not known; 230 kt is then taken
 *
 * Source: ICAO Doc 8168 Vol. I, Part II, Section 4, table of holding speeds.
 */
export function greatestHoldingIcao(altitude: number, category: ApproachCategory | null): HoldingSpeed {
  if (upTo(altitude, 14_000)) return knots(category === "A" || category === "B" ? 170 : 230);
  if (upTo(altitude, 20_000)) return knots(240);
  return upTo(altitude, 34_000) ? knots(265) : { kind: "mach", mach: 0.83 };
}

/**
 * FAA: to 6,000 ft 200 kt, to 14,000 ft 230 kt, 265 kt above.
 *
 * Source: FAA Aeronautical Information Manual, 5-3-8 j 2.
 */
export function greatestHoldingFaa(altitude: number): HoldingSpeed {
  if (upTo(altitude, 6000)) return knots(200);
  return knots(upTo(altitude, 14_000) ? 230 : 265);
}
