import type { Block, PlacedClause } from "../notation/block.ts";
import type { ClauseBody, Quantity } from "../notation/tree.ts";
import type { Basis, Card, CardSpeed, Configuration, Contaminant, Stated } from "./card.ts";
import { intendedKeyword } from "./clauses.ts";
import { lowerConfigurations } from "./lowerConfigurations.ts";
import {
  all,
  cardSpeed,
  codeAtClause,
  interval,
  type Lowering,
  lowerSource,
  type Of,
  value,
} from "./lowering.ts";
import { lowerTable, type PairKinds } from "./lowerTable.ts";
import type { Origin } from "./origin.ts";
import { publishedFindings } from "./publishedSpeeds.ts";
import type { Measured } from "./quantity.ts";
import { findingAt, listed, originOf, type Site, stateFix } from "./site.ts";
import { checkTables } from "./tableChecks.ts";

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

/** Why the card gives no figures at all: an unknown keyword, or a required clause that is missing or in error. */
/** What a card cannot do without, as it is written; every figure is the author's. */
const needed = {
  basis: "`basis vsr`, `basis vs1g` or `basis vs` with its factor",
  reference: "`reference … t`, the mass at which the stall speeds hold",
  config: "`config NAME stall … kt`",
} as const;

function whyWithheld(lowering: Lowering, card: Card): Card["withheld"] {
  const { site, findings } = lowering;
  const head = site.block.clauses[0] as PlacedClause;
  const unknown = site.block.clauses.find((placed) => placed.clause.keyword === null);
  if (unknown) return { origin: originOf(site, unknown), code: "unknown-keyword" };
  if (!card.name) return { origin: card.origin, code: "missing-argument" };
  const missing: (keyof typeof needed)[] = [];
  if (!card.basis) missing.push("basis");
  if (!card.referenceMass) missing.push("reference");
  const spoiltConfig = site.block.clauses.some((placed) => intendedKeyword(placed) === "config");
  if (card.configurations.length === 0 && !spoiltConfig) missing.push("config");
  if (missing.length > 0) {
    findings.push(
      findingAt(
        "missing-value",
        head,
        `The card ${card.name} needs ${listed(missing.map((one) => `\`${one}\``))}, and does not state ${missing.length === 1 ? "it" : "them"}: write ${missing.map((one) => needed[one]).join("; ")}.`,
        {
          span: card.origin.span,
          fixes: missing.map((one) => stateFix(site.block, one, `Write ${one}`)),
        },
      ),
    );
    return { origin: card.origin, code: "missing-value" };
  }
  for (const one of [card.basis, card.referenceMass]) {
    if (one && one.value === null)
      return { origin: one.origin, code: codeAtClause(site.block, findings, one.origin) };
  }
  return null;
}
