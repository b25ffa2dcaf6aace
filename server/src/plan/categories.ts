import { type ApproachCategory, faaCategory, icaoCategory } from "../flight/approachCategory.ts";
import { atmosphere } from "../flight/atmosphere.ts";
import { leastVref } from "../flight/referenceSpeeds.ts";
import { stallSpeed } from "../flight/stall.ts";
import { airframeOf, cgFactorRange } from "./airframe.ts";
import type { Card, Configuration } from "./card.ts";
import { referenceConfiguration, referenceSpeed } from "./reference.ts";

/** The approach category of an aeroplane, and what it was worked out with. */
export interface Categories {
  readonly icao: ApproachCategory | null;
  readonly faa: ApproachCategory | null;
  readonly configuration: string;
  /** kg. */
  readonly mass: number;
  /** True where the card states a greatest landing mass; else it is the greatest mass. */
  readonly landingMass: boolean;
}

const known = new WeakMap<Configuration, Categories | null>();

/**
 * ICAO and the EU take 1.23 vs1g or 1.3 vs, whichever the card's own stall speed is: one that was only
 * converted into the other does not count. 14 CFR 97.3 takes vref, the published one where the card has
 * one. Both in the landing configuration at the greatest landing mass, at sea level.
 */
export function approachCategories(card: Card, configuration: Configuration): Categories | null {
  let found = known.get(configuration);
  if (found === undefined) {
    found = findCategories(card, configuration);
    known.set(configuration, found);
  }
  return found;
}

function findCategories(card: Card, configuration: Configuration): Categories | null {
  const landing = referenceConfiguration("vref", card, configuration);
  if ("why" in landing) return null;
  // A landing mass that is in error is not replaced by the greatest mass.
  const mass = card.landingMass ? card.landingMass.value : (card.mass?.value?.high ?? null);
  const air = atmosphere(0, 0);
  const frame = airframeOf(card, landing);
  const factors = cgFactorRange(card);
  const basis = card.basis?.value;
  if (mass === null || !air || !frame || !factors || !basis) return null;
  const stall = stallSpeed(frame.lift, { mass, load: 1, liftLoss: 0, cgFactor: factors.most }, air);
  const reference = referenceSpeed("vref", card, landing, mass, air);
  if (stall.kind !== "speed") return null;
  const stated = basis.kind === "vs" ? stall.cas * basis.factor : stall.cas;
  return {
    icao: icaoCategory(leastVref(stated, basis.kind)),
    faa: "speed" in reference ? faaCategory(reference.speed.cas) : null,
    configuration: landing.name,
    mass,
    landingMass: card.landingMass !== null,
  };
}
