import type { PlacedClause } from "../notation/block.ts";
import type { ConfigAttribute } from "../notation/tree.ts";
import type { Basis, Configuration } from "./card.ts";
import { calibratedStall } from "./cardIas.ts";
import { all, cardSpeed, interval, type Lowering, type Of, value } from "./lowering.ts";
import { lowerTable, type PairKinds } from "./lowerTable.ts";
import type { Origin } from "./origin.ts";
import { findingAt, originOf } from "./site.ts";

/** The configurations of a card, with the tables that name them. */
export function lowerConfigurations(
  lowering: Lowering,
  basis: Basis | null,
  referenceMass: number | null,
): readonly Configuration[] {
  const { site } = lowering;
  return [
    ...all(site.block, "config").map(({ placed, body }) =>
      lowerConfiguration(lowering, placed, body, basis, referenceMass),
    ),
    ...spoiltConfigurations(lowering),
  ];
}

/** A configuration in error keeps its name, so that a plan that flies it waits for it, and gives no figure. */
function spoiltConfigurations({ site }: Lowering): readonly Configuration[] {
  const spoilt = new Map<string, Configuration>();
  for (const placed of site.block.clauses) {
    const body = placed.clause.body;
    if (placed.counts || body?.kind !== "config") continue;
    const origin: Origin = { ...originOf(site, placed), span: body.name.span };
    spoilt.set(body.name.text.toLowerCase(), {
      name: body.name.text,
      origin,
      statedStall: null,
      stallSpeed: null,
      load: null,
      vfe: null,
      // What it is marked stays, lest another pass for the card's only landing configuration.
      takeoff: attribute(body, "takeoff") !== null,
      landing: attribute(body, "landing") !== null,
      liftMach: null,
      buffet: null,
      ias: null,
      published: { vref: null, v2min: null, vfto: null },
    });
  }
  return [...spoilt.values()];
}

function lowerConfiguration(
  lowering: Lowering,
  placed: PlacedClause,
  body: Of<"config">,
  basis: Basis | null,
  referenceMass: number | null,
): Configuration {
  const { site } = lowering;
  const named = { lowering, name: body.name.text };
  const ias = configTable(named, "ias", { argument: "speed", value: "speed", unit: "rising" });
  const stall = attribute(body, "stall");
  const stallValue = stall ? value(lowering, placed, stall.speed, "speed") : null;
  if (!stall) {
    lowering.findings.push(
      findingAt(
        "missing-value",
        placed,
        `${body.name.text} needs its stall speed: write \`stall\` and the speed after the name.`,
        { span: body.name.span },
      ),
    );
  }
  const statedStall =
    stall?.ias && stallValue !== null
      ? calibratedStall(lowering, placed, stall.speed, stallValue, ias, referenceMass)
      : stallValue;
  const load = attribute(body, "load");
  const vfe = attribute(body, "vfe");
  const at = (span: { start: number; end: number }): Origin => ({ ...originOf(site, placed), span });
  const liftMach = configTable(named, "lift-mach", { argument: "mach", value: "factor", unit: null });
  const buffet = configTable(named, "buffet", { argument: "mach", value: "liftCoefficient", unit: null });
  return {
    name: body.name.text,
    origin: at(body.name.span),
    statedStall,
    stallSpeed: statedStall !== null && basis ? statedStall / basis.factor : null,
    load: load ? { value: interval(lowering, placed, load.range, "load"), origin: at(load.span) } : null,
    vfe: vfe
      ? { value: cardSpeed(lowering, placed, vfe.speed, vfe.ias, ias !== null), origin: at(vfe.span) }
      : null,
    takeoff: attribute(body, "takeoff") !== null,
    landing: attribute(body, "landing") !== null,
    liftMach: liftMach && { value: liftMach.value, origin: liftMach.origin },
    buffet: buffet && { value: buffet.value, origin: buffet.origin, cg: buffet.cg },
    ias,
    published: {
      vref: published(named, "vref"),
      v2min: published(named, "v2min"),
      vfto: published(named, "vfto"),
    },
  };
}

function attribute<K extends ConfigAttribute["kind"]>(body: Of<"config">, kind: K) {
  return (body.attributes.find((one) => one.kind === kind) ?? null) as Extract<
    ConfigAttribute,
    { kind: K }
  > | null;
}

interface Named {
  readonly lowering: Lowering;
  readonly name: string;
}

/** The table of one configuration; a value of null where it is in error. */
function configTable({ lowering, name }: Named, kind: "ias" | "lift-mach" | "buffet", pairs: PairKinds) {
  const { site } = lowering;
  for (const placed of site.block.clauses) {
    const body = placed.clause.body;
    if (body?.kind !== kind || body.config.text.toLowerCase() !== name.toLowerCase()) continue;
    const origin = originOf(site, placed);
    const stated = "cg" in body ? body.cg : null;
    const cg = placed.counts && stated ? value(lowering, placed, stated, "cg") : null;
    const table = placed.counts ? lowerTable(lowering, placed, body.table, pairs) : null;
    return { value: stated && cg === null ? null : table, origin, cg };
  }
  const lost = lostTable(lowering, kind, () => true);
  return lost ? { value: null, origin: originOf(site, lost), cg: null } : null;
}

/**
 * A table that may be any configuration's: one that was not understood, or that names none of the
 * card's. Without it a configuration would pass for one that states no table.
 */
function lostTable(
  { site }: Lowering,
  kind: "ias" | "lift-mach" | "buffet" | "published",
  isMeant: (body: Of<"ias" | "lift-mach" | "buffet" | "published">) => boolean,
): PlacedClause | null {
  const names = new Set<string>();
  for (const { clause } of site.block.clauses)
    if (clause.body?.kind === "config") names.add(clause.body.name.text.toLowerCase());
  const lost = site.block.clauses.find(({ clause, counts }) => {
    if (clause.keyword !== kind) return false;
    const { body } = clause;
    if (!body) return !counts;
    return "config" in body && isMeant(body) && !names.has(body.config.text.toLowerCase());
  });
  return lost ?? null;
}

function published({ lowering, name }: Named, speed: "vref" | "v2min" | "vfto") {
  const { site } = lowering;
  for (const placed of site.block.clauses) {
    const body = placed.clause.body;
    if (
      body?.kind !== "published" ||
      body.speed !== speed ||
      body.config.text.toLowerCase() !== name.toLowerCase()
    )
      continue;
    const pairs: PairKinds = { argument: "mass", value: "speed", unit: null };
    return {
      value: placed.counts ? lowerTable(lowering, placed, body.table, pairs) : null,
      origin: originOf(site, placed),
    };
  }
  const lost = lostTable(lowering, "published", (body) => body.kind === "published" && body.speed === speed);
  return lost ? { value: null, origin: originOf(site, lost) } : null;
}
