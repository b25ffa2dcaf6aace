import { leastV2min, leastVfto, leastVref } from "../flight/referenceSpeeds.ts";
import type { PlacedClause } from "../notation/block.ts";
import type { Card, Configuration } from "./card.ts";
import type { Finding } from "./finding.ts";
import { formatDistinct, formatMass, formatResultValue, formatSpeed } from "./format.ts";
import { ALLOWANCE } from "./rules.ts";
import { findingAt, type Site } from "./site.ts";

/** A published reference speed below the least value of the rule is told at the card, at each mass it stands at. */
export function publishedFindings(card: Card, site: Site): readonly Finding[] {
  return card.configurations.flatMap((configuration) =>
    (["v2min", "vfto", "vref"] as const).flatMap((name) => belowLeast(card, configuration, name, site)),
  );
}

function belowLeast(
  card: Card,
  configuration: Configuration,
  name: "v2min" | "vfto" | "vref",
  site: Site,
): Finding[] {
  const stated = configuration.published[name];
  const table = stated?.value;
  const referenceMass = card.referenceMass?.value;
  const basis = card.basis?.value;
  const stall = configuration.statedStall;
  if (!stated || !table || !referenceMass || !basis || stall === null) return [];
  // Where a clause that the least value depends on is in error, it is not known.
  const needed = [
    card.cgEffect,
    configuration.liftMach,
    ...(name === "v2min" ? [card.v2min, card.vmca] : []),
  ];
  if (needed.some((one) => one?.value === null)) return [];
  const cg = card.cgEffect?.value ? Math.max(...card.cgEffect.value.values) : 1;
  for (const [i, mass] of table.arguments.entries()) {
    const published = table.values[i] as number;
    const own = stall * cg * Math.sqrt(mass / referenceMass);
    const least = leastOf(card, name, own, basis.kind);
    if (least * (1 - ALLOWANCE) <= published) continue;
    const [written, lowest] = formatDistinct(
      published,
      least,
      (mps, more) => formatSpeed(mps, more),
      (mps, more) => formatResultValue(name, mps, more),
    );
    const placed = site.block.clauses.find(
      (one) => one.line === stated.origin.line && one.clause.span.start === stated.origin.span.start,
    ) as PlacedClause;
    return [
      findingAt(
        "published-below-least",
        placed,
        `The published ${name} of ${configuration.name} at ${formatMass(mass, referenceMass)}, ${written}, is below the least value that the stall speed gives, ${lowest}: check the table and the stall speed.`,
      ),
    ];
  }
  return [];
}

function leastOf(
  card: Card,
  name: "v2min" | "vfto" | "vref",
  stall: number,
  basis: "vsr" | "vs1g" | "vs",
): number {
  switch (name) {
    case "v2min": {
      const vmca = card.vmca?.value;
      return leastV2min(stall, basis, vmca && !vmca.ias ? vmca.speed : null, card.v2min?.value ?? null);
    }
    case "vfto":
      return leastVfto(stall, basis);
    case "vref":
      return leastVref(stall, basis);
  }
}
