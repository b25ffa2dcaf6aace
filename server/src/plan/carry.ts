import { standardTemperature } from "../flight/atmosphere.ts";
import type { PlacedClause } from "../notation/block.ts";
import type { Quantity, Scalar, Unknown, Value } from "../notation/tree.ts";
import type { Phase } from "../notation/vocabulary.ts";
import type { Clauses } from "./clauses.ts";
import { intendedKeyword } from "./clauses.ts";
import type { Definitions } from "./definitions.ts";
import type { Finding } from "./finding.ts";
import { formatMass } from "./format.ts";
import { flyCard, underLimits, useContaminant } from "./names.ts";
import type { Origin } from "./origin.ts";
import { canBe, type Measured, measure, measureTolerance } from "./quantity.ts";
import { findingAt, originOf, type Site } from "./site.ts";
import { pressureAltitudeOf } from "./situation.ts";
import { exactly, type Spread } from "./spread.ts";
import {
  type Carried,
  type CarriedKey,
  type CarriedState,
  type CarriedValues,
  keywordOf,
  type State,
} from "./state.ts";

/** A block's carried clauses applied to what reached it. The speed comes later: it may need the turn. */
export interface Applied {
  readonly carried: CarriedState;
  readonly landed: boolean;
  /** What was stated after the landing, this block's own clauses among it. */
  readonly sinceLanding: readonly CarriedKey[];
  /** True where a takeoff began a new sector. */
  readonly newSector: boolean;
  /** True where what was told as missing before no longer counts: a new sector, or another aeroplane. */
  readonly afresh: boolean;
  readonly findings: readonly Finding[];
}

type Draft = { -readonly [K in CarriedKey]: CarriedState[K] };

/** Everything the steps below share while one block is applied. */
export interface Applying {
  readonly site: Site;
  readonly clauses: Clauses;
  readonly definitions: Definitions;
  readonly phase: Phase | null;
  readonly draft: Draft;
  readonly findings: Finding[];
}

/** Applies `fly`, `under`, `rules`, `qnh`, `weight`, `burn`, `config`, `altitude`, `isa`, `oat`, `cg`, `power`, `contamination` and `engine-out`. */
export function applyClauses(site: Site, clauses: Clauses, definitions: Definitions, before: State): Applied {
  const phase = clauses.phase?.body.phase ?? null;
  const draft: Draft = { ...before.carried };
  const applying: Applying = { site, clauses, definitions, phase, draft, findings: [] };
  const newSector = before.landed && phase === "takeoff";
  if (newSector) {
    for (const key of ofOneSector) if (!before.sinceLanding.includes(key)) draft[key] = undefined;
  }
  const another = applyAircraft(applying);
  if (clauses.under) set(applying, "limits", clauses.under.placed, underLimits(applying, clauses.under));
  if (clauses.rules) set(applying, "rules", clauses.rules.placed, clauses.rules.body.rules);
  if (clauses.qnh) set(applying, "qnh", clauses.qnh.placed, single(applying, clauses.qnh, "qnh"));
  applyMass(applying);
  if (clauses.config) set(applying, "config", clauses.config.placed, clauses.config.body.name.text);
  applyAltitude(applying);
  applyDeviation(applying);
  for (const key of ["cg", "power"] as const) {
    const read = clauses[key];
    if (read) set(applying, key, read.placed, spreadIn(applying, read.placed, read.body.value, key));
  }
  applyContamination(applying);
  if (clauses.engineOut) set(applying, "engineOut", clauses.engineOut.placed, clauses.engineOut.body.engine);
  spoil(applying);
  const landed = before.landed && !newSector && !another;
  return {
    carried: draft,
    landed,
    sinceLanding: landed ? statedSince(before, clauses) : [],
    newSector,
    afresh: newSector || another,
    findings: applying.findings,
  };
}

/** What a takeoff after a landing does not take over. */
const ofOneSector = ["mass", "config", "altitude", "speed", "contamination", "engineOut"] as const;

/** A clause in error counts too: what it should have stated is unknown in the next sector as well. */
function statedSince({ sinceLanding }: State, clauses: Clauses): readonly CarriedKey[] {
  const spoiled = clauses.spoiled.map((placed) => intendedKeyword(placed));
  const stated = ofOneSector.filter((key) => {
    // A burn starts from the weight of the sector before.
    const slot = key === "mass" ? "weight" : key;
    return clauses[slot] !== null || spoiled.includes(keywordOf[key]);
  });
  return stated.length === 0 ? sinceLanding : [...new Set([...sinceLanding, ...stated])].sort();
}

function set<K extends CarriedKey>(
  { site, draft, phase, findings }: Applying,
  key: K,
  placed: PlacedClause,
  value: CarriedValues[K] | null,
): void {
  const origin = originOf(site, placed);
  const unknown = value === null ? codeAt(findings, placed) : null;
  (draft as Record<CarriedKey, Carried<unknown> | undefined>)[key] = { value, origin, unknown, phase };
}

/** The code of the finding that keeps a clause from giving a value. */
export function codeAt(
  findings: readonly Finding[],
  { line, clause }: PlacedClause,
  otherwise = "missing-value",
): string {
  const { start, end } = clause.span;
  const own = findings.find((one) => one.line === line && start <= one.span.start && one.span.start <= end);
  return own?.code ?? otherwise;
}

/** Another aeroplane starts afresh; only limits and rules go on. */
function applyAircraft(applying: Applying): boolean {
  const { clauses, draft } = applying;
  const fly = clauses.fly;
  if (!fly) return false;
  const current = draft.aircraft?.value;
  const another = draft.aircraft !== undefined && !sameName(current?.name ?? "", fly.body.name.text);
  if (another) {
    for (const key of Object.keys(keywordOf) as CarriedKey[]) {
      if (key !== "limits" && key !== "rules") draft[key] = undefined;
    }
  }
  const flown = flyCard(applying, fly);
  set(applying, "aircraft", fly.placed, flown.value);
  if (flown.code) {
    const carried = draft.aircraft as Carried<CarriedValues["aircraft"]>;
    draft.aircraft = { ...carried, unknown: flown.code };
  }
  return another;
}

export function sameName(a: string, b: string): boolean {
  return a.toLowerCase() === b.toLowerCase();
}

function applyMass(applying: Applying): void {
  const { clauses, draft, findings, site, phase } = applying;
  if (clauses.weight) {
    const { placed, body } = clauses.weight;
    set(applying, "mass", placed, spreadIn(applying, placed, body.value, "mass"));
    return;
  }
  if (!clauses.burn) return;
  const { placed } = clauses.burn;
  const burnt = burntMass(applying);
  const before = draft.mass;
  if (burnt === null || !before) {
    if (!before) {
      findings.push(
        findingAt(
          "missing-value",
          placed,
          "A burn needs the weight it is taken from, and no line up to here states one: write `weight` once before it.",
        ),
      );
    }
    draft.mass = {
      value: null,
      origin: originOf(site, placed),
      unknown: before ? codeAt(findings, placed) : "missing-value",
      phase,
    };
    return;
  }
  if (before.value === null) return;
  const mass = {
    nominal: before.value.nominal - burnt.nominal,
    low: before.value.low - burnt.high,
    high: before.value.high - burnt.low,
  };
  if (!(0 < mass.low)) {
    findings.push(
      findingAt(
        "out-of-range",
        placed,
        `A burn of ${formatMass(burnt.high, before.value.nominal)} leaves nothing of the ${formatMass(before.value.nominal, before.value.nominal)} that the aeroplane weighs here: check the burn or the weight.`,
      ),
    );
    set(applying, "mass", placed, null);
    return;
  }
  set(applying, "mass", placed, mass);
}

function burntMass(applying: Applying): Spread | null {
  const burn = applying.clauses.burn;
  if (!burn) return null;
  const { placed, body } = burn;
  if (body.kind === "burn") return spreadIn(applying, placed, body.amount, "fuel");
  const rate = measured(applying, placed, body.rate, "fuelFlow");
  const time = measured(applying, placed, body.time, "time");
  return rate === null || time === null ? null : exactly(rate * time);
}

function applyAltitude(applying: Applying): void {
  const altitude = applying.clauses.altitude;
  if (!altitude) return;
  const { placed, body } = altitude;
  const spread = spreadIn(applying, placed, body.value, "altitude");
  const flightLevel = body.value.kind === "scalar" && body.value.quantity.unit === "FL";
  set(applying, "altitude", placed, spread && { altitude: spread, flightLevel });
}

/** An outside air temperature carries as the deviation it is at its own altitude. */
function applyDeviation(applying: Applying): void {
  const { clauses, draft, findings } = applying;
  if (!clauses.isa) return;
  const { placed, body } = clauses.isa;
  if (body.kind === "isa") {
    set(applying, "deviation", placed, spreadIn(applying, placed, body.value, "deviation"));
    return;
  }
  const oat = spreadIn(applying, placed, body.value, "oat");
  const altitude = draft.altitude;
  if (oat && !altitude) {
    findings.push(
      findingAt(
        "missing-value",
        placed,
        "A temperature becomes a deviation from ISA at its altitude, and no line up to here states one: write `altitude` with it, or `isa` instead.",
      ),
    );
  }
  const unknownAbove = altitude?.value ? draft.qnh?.value === null && !altitude.value.flightLevel : true;
  if (!oat || !altitude?.value || unknownAbove) {
    set(applying, "deviation", placed, null);
    return;
  }
  const height = pressureAltitudeOf(altitude.value, draft.qnh?.value ?? null).nominal;
  const standard = standardTemperature(height);
  if (standard === null) {
    set(applying, "deviation", placed, null);
    return;
  }
  set(applying, "deviation", placed, {
    nominal: oat.nominal - standard,
    low: oat.low - standard,
    high: oat.high - standard,
  });
}

function applyContamination(applying: Applying): void {
  const contamination = applying.clauses.contamination;
  if (!contamination) return;
  const { placed, body } = contamination;
  if (body.value === "none") {
    set(applying, "contamination", placed, { loss: exactly(0), contaminant: null, rain: false });
  } else if ("kind" in body.value) {
    const loss = spreadIn(applying, placed, body.value, "liftLoss");
    set(applying, "contamination", placed, loss && { loss, contaminant: null, rain: false });
  } else {
    set(applying, "contamination", placed, useContaminant(applying, placed, body.value));
  }
}

/** A clause in error never falls back on an older value: what it should have stated is unknown from here on. */
function spoil(applying: Applying): void {
  const { clauses, draft, site, phase, findings } = applying;
  for (const placed of clauses.spoiled) {
    const keyword = intendedKeyword(placed);
    const key = keyword === null ? null : carriedBy[keyword];
    if (!key) continue;
    const code = textCode(site, placed) ?? codeAt(findings, placed);
    const origin: Origin = originOf(site, placed);
    (draft as Record<CarriedKey, Carried<unknown> | undefined>)[key] = {
      value: null,
      origin,
      unknown: code,
      phase,
    };
  }
}

const carriedBy: Readonly<Record<string, CarriedKey>> = {
  fly: "aircraft",
  aircraft: "aircraft",
  under: "limits",
  limits: "limits",
  rules: "rules",
  qnh: "qnh",
  weight: "mass",
  mass: "mass",
  burn: "mass",
  config: "config",
  altitude: "altitude",
  isa: "deviation",
  oat: "deviation",
  cg: "cg",
  power: "power",
  contamination: "contamination",
  "engine-out": "engineOut",
  speed: "speed",
};

/** The code of the text finding that spoilt a clause. */
export function textCode(site: Site, placed: PlacedClause): string | null {
  const { span } = placed.clause;
  const own = site.block.findings.find(
    (one) => one.line === placed.line && span.start <= one.span.start && one.span.start <= span.end,
  );
  if (own) return own.code;
  // A clause that was read and does not count was given twice; the finding stands at the second.
  return placed.clause.faulty || !placed.clause.body ? null : "duplicate-clause";
}

function single(
  applying: Applying,
  read: { placed: PlacedClause; body: { value: Quantity } },
  what: Measured,
): number | null {
  return measured(applying, read.placed, read.body.value, what);
}

/** The SI value of a quantity; out of its range it is told and gives none. */
export function measured(
  applying: { readonly findings: Finding[] },
  placed: PlacedClause,
  quantity: Quantity,
  what: Measured,
): number | null {
  const { value, problem } = measure(quantity, what);
  if (problem === null) return value;
  applying.findings.push(findingAt("out-of-range", placed, problem, { span: quantity.span }));
  return null;
}

/** The SI spread of a value with its tolerance. A `?` or a sweep gives none. */
export function spreadIn(
  applying: { readonly findings: Finding[] },
  placed: PlacedClause,
  value: Value | Unknown | Scalar,
  what: Measured,
): Spread | null {
  if (value.kind !== "scalar") return null;
  const nominal = measured(applying, placed, value.quantity, what);
  if (nominal === null) return null;
  if (!value.tolerance) return exactly(nominal);
  const half = measureTolerance(value.tolerance, value.quantity.unit, what);
  const spread = { nominal, low: nominal - half, high: nominal + half };
  // A bank about wings level banks either way; nothing else may leave its range.
  if ((what === "bank" || canBe(spread.low, what)) && canBe(spread.high, what)) return spread;
  applying.findings.push(
    findingAt(
      "out-of-range",
      placed,
      "With its tolerance this value leaves what it can be: check the figure and the tolerance.",
      { span: value.span },
    ),
  );
  return null;
}
