import type { Atmosphere } from "../flight/atmosphere.ts";
import { leastV2min, leastVfto, leastVref } from "../flight/referenceSpeeds.ts";
import { stallSpeed } from "../flight/stall.ts";
import { interpolate } from "../flight/table.ts";
import { airframeOf, cgFactorRange } from "./airframe.ts";
import type { Card, Configuration } from "./card.ts";
import type { ReferenceSpeed } from "./point.ts";

export type ReferenceName = "v2min" | "vfto" | "vref";

/** A reference speed, or the reason why there is none, as a sentence. */
export type Reference = { readonly speed: ReferenceSpeed } | { readonly why: string };

/**
 * The configuration a reference speed belongs to. v2min needs one marked `takeoff`, vfto is flown in
 * `clean`; vref takes the point's own where it is marked `landing`, else the card's only one.
 */
export function referenceConfiguration(
  name: ReferenceName,
  card: Card,
  configuration: Configuration,
): Configuration | { readonly why: string } {
  switch (name) {
    case "v2min":
      return configuration.takeoff
        ? configuration
        : { why: `${configuration.name} is not marked takeoff in the card.` };
    case "vfto":
      return (
        card.configurations.find((one) => one.name.toLowerCase() === "clean") ?? {
          why: "The card has no configuration called clean.",
        }
      );
    case "vref": {
      if (configuration.landing) return configuration;
      const landing = card.configurations.filter((one) => one.landing);
      const only = landing.length === 1 ? landing[0] : undefined;
      if (only) return only;
      return {
        why:
          landing.length === 0
            ? "The card marks no configuration landing."
            : `${configuration.name} is not marked landing, and the card marks ${landing.length} that are.`,
      };
    }
  }
}

/**
 * A reference speed at the nominal mass: the card's published figure where it has one that reaches,
 * else the least value of 14 CFR 25.107 and 25.125, with the largest cg factor and a clean wing.
 */
export function referenceSpeed(
  name: ReferenceName,
  card: Card,
  pointConfiguration: Configuration,
  mass: number,
  air: Atmosphere,
): Reference {
  const configuration = referenceConfiguration(name, card, pointConfiguration);
  if ("why" in configuration) return configuration;
  const published = configuration.published[name];
  if (published && !published.value) return { why: `The card's published ${name} is in error.` };
  if (published?.value) {
    const cas = interpolate(published.value, mass);
    if (cas !== null) return { speed: { cas, published: true, configuration: configuration.name } };
  }
  const vs1g = worstVs1g(card, configuration, mass, air);
  if (vs1g === null) return { why: `The stall speed in ${configuration.name} is not known here.` };
  const cas = leastSpeed(name, card, vs1g);
  if (cas === null) return { why: `The card does not give what ${name} needs.` };
  return { speed: { cas, published: false, configuration: configuration.name } };
}

/** The 1-g stall speed with the most adverse cg and a clean wing, CAS. */
function worstVs1g(card: Card, configuration: Configuration, mass: number, air: Atmosphere): number | null {
  const frame = airframeOf(card, configuration);
  const factors = cgFactorRange(card);
  if (!frame || !factors) return null;
  const stall = stallSpeed(frame.lift, { mass, load: 1, liftLoss: 0, cgFactor: factors.most }, air);
  return stall.kind === "speed" ? stall.cas : null;
}

function leastSpeed(name: ReferenceName, card: Card, vs1g: number): number | null {
  const basis = card.basis?.value;
  if (!basis) return null;
  const stall = basis.kind === "vs" ? vs1g * basis.factor : vs1g;
  switch (name) {
    case "vref":
      return leastVref(stall, basis.kind);
    case "vfto":
      return leastVfto(stall, basis.kind);
    case "v2min": {
      if (card.v2min && card.v2min.value === null) return null;
      const vmca = card.vmca?.value;
      // A minimum control speed that is in error, or that only the indicator shows, leaves v2min unknown.
      if (card.vmca && (!vmca || vmca.ias)) return null;
      return leastV2min(stall, basis.kind, vmca?.speed ?? null, card.v2min?.value ?? null);
    }
  }
}

/** The CAS of a stall at a limit load factor: the manoeuvring speed, smallest cg factor, clean wing. */
export function manoeuvringCas(
  card: Card,
  configuration: Configuration,
  mass: number,
  air: Atmosphere,
): { readonly cas: number } | { readonly why: string } {
  const limit = configuration.load;
  if (!limit) return { why: `The card states no limit load factors for ${configuration.name}.` };
  const frame = airframeOf(card, configuration);
  const factors = cgFactorRange(card);
  if (!limit.value || !frame || !factors) return { why: "The card is in error there." };
  const stall = stallSpeed(
    frame.lift,
    { mass, load: limit.value.high, liftLoss: 0, cgFactor: factors.least },
    air,
  );
  if (stall.kind !== "speed")
    return { why: "At this altitude the limit load factor is not reached before the lift table ends." };
  return { cas: stall.cas };
}
