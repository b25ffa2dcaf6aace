import { KNOT } from "./units.ts";

export type ApproachCategory = "A" | "B" | "C" | "D" | "E";

/** Each category ends below this, kt. */
const ends = [
  ["A", 91],
  ["B", 121],
  ["C", 141],
  ["D", 166],
] as const;

/** The fastest speed for which ICAO publishes approaches, kt. */
const GREATEST_ICAO = 210;

/**
 * Category by 14 CFR 97.3: A below 91 kt, B below 121, C below 141, D below 166, E from there.
 *
 * @param speed vref, or 1.3 vs where none is stated, at the greatest landing mass, m/s
 *
 * Example: 120.5 kt is B.
 */
export function faaCategory(speed: number): ApproachCategory {
  const knots = speed / KNOT;
  // A speed that is the bound but for the last bit of its conversion has reached it.
  return ends.find(([, end]) => knots < end * (1 - 1e-12))?.[0] ?? "E";
}

/**
 * Category by ICAO Doc 8168 and the EU: the same bounds, E to 210 kt. Null above, where there is none.
 *
 * @param speed the higher of 1.3 vs and 1.23 vs1g, of those the card states, m/s
 */
export function icaoCategory(speed: number): ApproachCategory | null {
  return speed / KNOT <= GREATEST_ICAO * (1 + 1e-12) ? faaCategory(speed) : null;
}
