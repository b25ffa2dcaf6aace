import type { Rounding } from "./results.ts";
import { ALLOWANCE } from "./rules.ts";

/** The most decimals that any figure is shown with. */
export const MOST_DECIMALS = 6;

/**
 * A figure as it is shown, with so many decimals (0 to 6).
 *
 * `down` gives the largest figure that the value still meets as a least value, `up` the smallest it
 * still meets as a greatest one, by the very comparison that rules are held with. So a value flown
 * exactly at its limit reads as the limit, and one that fails never reads as met. Half a unit goes
 * away from zero under `nearest`. Never -0; what is not finite stays what it is.
 */
export function roundShown(value: number, decimals: number, rounding: Rounding): number {
  if (!Number.isFinite(value)) return value;
  const scale = 10 ** decimals;
  const scaled = value * scale;
  // Beyond 15 digits a number has no decimals left to cut.
  if (Number.MAX_SAFE_INTEGER <= Math.abs(scaled)) return value;
  return units(value, scaled, scale, rounding) / scale + 0;
}

function units(value: number, scaled: number, scale: number, rounding: Rounding): number {
  switch (rounding) {
    case "nearest": {
      // A half that a conversion of units has brought below the half by its last bit is still a half.
      const size = Math.abs(scaled);
      return Math.sign(scaled) * Math.round(size + size * 1e-12);
    }
    case "down": {
      const next = Math.floor(scaled) + 1;
      return isAtLeast(value, next / scale) ? next : next - 1;
    }
    case "up": {
      const next = Math.ceil(scaled) - 1;
      return isAtMost(value, next / scale) ? next : next + 1;
    }
  }
}

function isAtLeast(value: number, bound: number): boolean {
  return bound * (0 <= bound ? 1 - ALLOWANCE : 1 + ALLOWANCE) <= value;
}

function isAtMost(value: number, bound: number): boolean {
  return value <= bound * (0 <= bound ? 1 + ALLOWANCE : 1 - ALLOWANCE);
}
