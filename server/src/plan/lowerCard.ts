import type { Block, PlacedClause } from "../notation/block.ts";
import type { BodyOf, ClauseBody, ConfigAttribute, Quantity, Range } from "../notation/tree.ts";
import type { Basis, Card, CardSpeed, Configuration, Contaminant, Interval, Source, Stated } from "./card.ts";
import { calibratedStall } from "./cardIas.ts";
import { intendedKeyword } from "./clauses.ts";
import type { Finding } from "./finding.ts";
import { lowerTable, type PairKinds } from "./lowerTable.ts";
import type { Origin } from "./origin.ts";
import { publishedFindings } from "./publishedSpeeds.ts";
import { type Measured, measure } from "./quantity.ts";
import { findingAt, listed, originOf, type Site, stateFix } from "./site.ts";
import { checkTables } from "./tableChecks.ts";

type Of<K extends ClauseBody["kind"]> = BodyOf<K>;

/** What the steps below share while one card is read. */
export interface Lowering {
  readonly site: Site;
  readonly findings: Finding[];
}

/**
 * Reads a card, in SI. A clause in error gives a value of null, from which nothing may be computed;
 * a clause that cannot be told withholds the whole card.
 */
export function lowerCard(block: Block, uri: string): Card {
  const site: Site = { uri, block, anchor: block };
  const lowering: Lowering = { site, findings: [] };
  const head = block.clauses[0] as PlacedClause;
  const names = cardName(head);
  const origin: Origin = { ...originOf(site, head), span: names.span };
  const find = <K extends ClauseBody["kind"]>(kind: K) => all(block, kind)[0] ?? null;
  const number = (kind: ClauseBody["kind"], what: Measured, pick: (body: never) => Quantity) =>
    single(lowering, kind, what, pick as (body: ClauseBody) => Quantity);

  const basis = stated(lowering, "basis", (placed, body: Of<"basis">): Basis | null => {
    if (body.basis !== "vs") return { kind: body.basis, factor: 1 };
    const factor = value(lowering, placed, body.factor, "factor");
    if (factor === null) return null;
    if (0.8 <= factor && factor <= 1.05) return { kind: "vs", factor };
    lowering.findings.push(
      findingAt(
        "out-of-range",
        placed,
        `The factor ${body.factor.value} of vs is vs over the 1-g stall speed, which lies from 0.8 to 1.05: check it.`,
      ),
    );
    return null;
  });
  const referenceMass = number("reference", "mass", (body: Of<"reference">) => body.mass);
  const mass = stated(lowering, "mass", (placed, body: Of<"mass">) =>
    interval(lowering, placed, body.range, "mass"),
  );
  const landingClause = find("mass");
  const landingMass =
    landingClause?.body.landing && mass
      ? {
          value: value(lowering, landingClause.placed, landingClause.body.landing, "mass"),
          origin: mass.origin,
        }
      : null;
  const configurations = lowerConfigurations(lowering, basis?.value ?? null, referenceMass?.value ?? null);
  const card: Card = {
    name: names.name,
    title: names.title,
    origin,
    block,
    source: lowerSource(block),
    withheld: null,
    basis,
    referenceMass,
    mass,
    landingMass,
    configurations,
    wing: stated(lowering, "wing", (placed, body: Of<"wing">) => lowerWing(lowering, placed, body)),
    vmo: limitSpeed(lowering, "vmo", configurations),
    vmca: limitSpeed(lowering, "vmca", configurations),
    vne: limitSpeed(lowering, "vne", configurations),
    vno: limitSpeed(lowering, "vno", configurations),
    mmo: number("mmo", "mach", (body: Of<"mmo">) => body.value),
    ceiling: number("ceiling", "altitude", (body: Of<"ceiling">) => body.altitude),
    warning: bounded(lowering, "warning", 1, 1.5),
    v2min: bounded(lowering, "v2min", 1, 1.3),
    cgEffect: stated(lowering, "cg-effect", (placed, body: Of<"cg-effect">) =>
      lowerTable(lowering, placed, body.table, effectPairs),
    ),
    powerEffect: stated(lowering, "power-effect", (placed, body: Of<"power-effect">) =>
      lowerTable(lowering, placed, body.table, powerPairs),
    ),
    contaminants: lowerContaminants(lowering),
    findings: lowering.findings,
  };
  const checked = checkTables(lowering, card);
  lowering.findings.push(...publishedFindings(checked, site));
  return { ...checked, withheld: whyWithheld(lowering, checked) };
}

const effectPairs: PairKinds = { argument: "cg", value: "factor", unit: null };
const powerPairs: PairKinds = { argument: "power", value: "factor", unit: null };

function cardName({ clause }: PlacedClause) {
  const body = clause.body;
  if (body?.kind === "aircraft")
    return { name: body.name.text, title: body.title?.text ?? null, span: body.name.span };
  return { name: "", title: null, span: clause.span };
}

/** The clauses of one kind that count. */
function all<K extends ClauseBody["kind"]>(block: Block, kind: K): { placed: PlacedClause; body: Of<K> }[] {
  return block.clauses.flatMap((placed) => {
    const body = placed.clause.body;
    return placed.counts && body?.kind === kind ? [{ placed, body: body as Of<K> }] : [];
  });
}

/** True where a clause of the keyword stands in the card but gives no value. */
function spoiltClause(block: Block, keyword: string): PlacedClause | null {
  return block.clauses.find((placed) => !placed.counts && placed.clause.keyword === keyword) ?? null;
}

/** What one clause states. Null where no such clause stands here; a value of null where it is in error. */
function stated<K extends ClauseBody["kind"], T>(
  lowering: Lowering,
  kind: K,
  read: (placed: PlacedClause, body: Of<K>) => T | null,
): Stated<T> | null {
  const { block } = lowering.site;
  const first = all(block, kind)[0];
  if (first) return { value: read(first.placed, first.body), origin: originOf(lowering.site, first.placed) };
  const spoilt = spoiltClause(block, kind);
  return spoilt && { value: null, origin: originOf(lowering.site, spoilt) };
}

function single(
  lowering: Lowering,
  kind: ClauseBody["kind"],
  what: Measured,
  pick: (body: ClauseBody) => Quantity,
): Stated<number> | null {
  return stated(lowering, kind, (placed, body) => value(lowering, placed, pick(body), what));
}

function bounded(
  lowering: Lowering,
  kind: "warning" | "v2min",
  least: number,
  most: number,
): Stated<number> | null {
  return stated(lowering, kind, (placed, body) => {
    const factor = value(lowering, placed, body.value, "factor");
    if (factor === null || (least <= factor && factor <= most)) return factor;
    lowering.findings.push(
      findingAt(
        "out-of-range",
        placed,
        `The factor ${factor} of ${kind} lies outside ${least} to ${most}: check it.`,
        { span: body.value.span },
      ),
    );
    return null;
  });
}

/** The SI value of a quantity; out of its range it is told and gives none. */
export function value(
  lowering: Lowering,
  placed: PlacedClause,
  quantity: Quantity,
  what: Measured,
): number | null {
  const measured = measure(quantity, what);
  if (measured.problem === null) return measured.value;
  lowering.findings.push(findingAt("out-of-range", placed, measured.problem, { span: quantity.span }));
  return null;
}

function interval(lowering: Lowering, placed: PlacedClause, range: Range, what: Measured): Interval | null {
  const low = value(lowering, placed, range.from, what);
  const high = value(lowering, placed, range.to, what);
  if (low === null || high === null) return null;
  if (low < high) return { low, high };
  lowering.findings.push(
    findingAt(
      "out-of-range",
      placed,
      "A range goes from the lower figure to the higher one: turn them round.",
      { span: range.span },
    ),
  );
  return null;
}

export function lowerSource(block: Block): Source | null {
  const source = all(block, "source")[0];
  if (!source) return null;
  const { title, issue, from } = source.body;
  return { title: title.text, issue: issue?.text ?? null, from: from?.text ?? null };
}

function lowerWing(lowering: Lowering, placed: PlacedClause, body: Of<"wing">) {
  const area = value(lowering, placed, body.area, "area");
  const chord = body.chord ? value(lowering, placed, body.chord, "length") : null;
  if (area === null || (body.chord && chord === null)) return null;
  if (!body.slope) return { area, chord, slope: null };
  const slope =
    "pairs" in body.slope
      ? lowerTable(lowering, placed, body.slope, { argument: "machFromZero", value: "slope", unit: null })
      : value(lowering, placed, body.slope, "slope");
  return slope === null ? null : { area, chord, slope };
}

function limitSpeed(
  lowering: Lowering,
  kind: "vmo" | "vmca" | "vne" | "vno",
  configurations: readonly Configuration[],
): Stated<CardSpeed> | null {
  return stated(lowering, kind, (placed, body) =>
    cardSpeed(
      lowering,
      placed,
      body.speed,
      body.ias,
      configurations.some((one) => one.ias !== null),
    ),
  );
}

function cardSpeed(
  lowering: Lowering,
  placed: PlacedClause,
  quantity: Quantity,
  ias: boolean,
  hasTable: boolean,
): CardSpeed | null {
  const speed = value(lowering, placed, quantity, "speed");
  if (speed === null) return null;
  if (!ias || hasTable) return { speed, ias };
  lowering.findings.push(
    findingAt(
      "missing-value",
      placed,
      "An indicated speed needs an ias table in this card: write one with `ias`, or the calibrated speed.",
      { span: quantity.span },
    ),
  );
  return null;
}

function lowerContaminants(lowering: Lowering): readonly Contaminant[] {
  const { site } = lowering;
  const found = all(site.block, "contaminant").map(
    ({ placed, body }): Contaminant => ({
      name: body.name.text,
      loss: value(lowering, placed, body.loss, "liftLoss"),
      rain: body.rain,
      origin: originOf(site, placed),
    }),
  );
  const spoilt = site.block.clauses.flatMap((placed): Contaminant[] => {
    const body = placed.clause.body;
    return !placed.counts && body?.kind === "contaminant"
      ? [{ name: body.name.text, loss: null, rain: false, origin: originOf(site, placed) }]
      : [];
  });
  return [...found, ...spoilt];
}

function lowerConfigurations(
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
      takeoff: false,
      landing: false,
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
    return { value: placed.counts ? lowerTable(lowering, placed, body.table, pairs) : null, origin, cg };
  }
  // A table that was not understood names no configuration, so it may be this one's.
  const lost = site.block.clauses.find(
    (placed) => !placed.counts && placed.clause.keyword === kind && !placed.clause.body,
  );
  return lost ? { value: null, origin: originOf(site, lost), cg: null } : null;
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
  const lost = site.block.clauses.find(
    (placed) => !placed.counts && placed.clause.keyword === "published" && !placed.clause.body,
  );
  return lost ? { value: null, origin: originOf(site, lost) } : null;
}

/** Why the card gives no figures at all: an unknown keyword, or a required clause that is missing or in error. */
function whyWithheld(lowering: Lowering, card: Card): Card["withheld"] {
  const { site, findings } = lowering;
  const head = site.block.clauses[0] as PlacedClause;
  const unknown = site.block.clauses.find((placed) => placed.clause.keyword === null);
  if (unknown) return { origin: originOf(site, unknown), code: "unknown-keyword" };
  if (!card.name) return { origin: card.origin, code: "missing-argument" };
  const missing: string[] = [];
  if (!card.basis) missing.push("basis");
  if (!card.referenceMass) missing.push("reference");
  const spoiltConfig = site.block.clauses.some((placed) => intendedKeyword(placed) === "config");
  if (card.configurations.length === 0 && !spoiltConfig) missing.push("config");
  if (missing.length > 0) {
    findings.push(
      findingAt(
        "missing-value",
        head,
        `The card ${card.name} needs ${listed(missing.map((one) => `\`${one}\``))}, and does not state ${missing.length === 1 ? "it" : "them"}.`,
        {
          span: card.origin.span,
          fixes: missing.map((one) => stateFix(site.block, one, `Write ${one}`)),
        },
      ),
    );
    return { origin: card.origin, code: "missing-value" };
  }
  for (const one of [card.basis, card.referenceMass]) {
    if (one && one.value === null) return { origin: one.origin, code: "bad-quantity" };
  }
  return null;
}
