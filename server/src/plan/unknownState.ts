import type { Slot } from "./clauses.ts";
import type { Carried, CarriedKey, State } from "./state.ts";

/** What a clause leaves behind, for those that carry. */
const carriedBySlot: Partial<Record<Slot, CarriedKey>> = {
  weight: "mass",
  altitude: "altitude",
  isa: "deviation",
  speed: "speed",
  cg: "cg",
  power: "power",
  contamination: "contamination",
};

/** The state with the value of a clause made unknown. */
export function withUnknown(after: State, slot: Slot, unknown: Carried<never>): State {
  const key = carriedBySlot[slot];
  return key ? { ...after, carried: { ...after.carried, [key]: unknown } } : after;
}
