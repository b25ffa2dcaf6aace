import type { Block, PlacedClause } from "../notation/block.ts";
import type { BodyOf, ClauseBody } from "../notation/tree.ts";
import type { Keyword } from "../notation/vocabulary.ts";

/** A clause that counts, with its body at hand. */
export interface Read<K extends ClauseBody["kind"]> {
  readonly placed: PlacedClause;
  readonly body: BodyOf<K>;
}

/** The clauses of a point or setting by what they state. */
export interface Clauses {
  readonly fly: Read<"fly" | "under"> | null;
  readonly under: Read<"fly" | "under"> | null;
  readonly rules: Read<"rules"> | null;
  readonly aside: boolean;
  readonly phase: Read<"phase"> | null;
  readonly weight: Read<"weight"> | null;
  readonly burn: Read<"burn"> | Read<"burn-rate"> | null;
  readonly config: Read<"config"> | null;
  readonly qnh: Read<"qnh"> | null;
  readonly altitude: Read<"altitude"> | null;
  readonly isa: Read<"isa" | "oat"> | null;
  readonly speed: Read<"speed"> | null;
  readonly bank: Read<"bank"> | null;
  readonly path: Read<"path" | "load" | "gust" | "cg" | "power" | "decel"> | null;
  readonly load: Read<"path" | "load" | "gust" | "cg" | "power" | "decel"> | null;
  readonly cg: Read<"path" | "load" | "gust" | "cg" | "power" | "decel"> | null;
  readonly contamination: Read<"contamination"> | null;
  readonly engineOut: Read<"engine-out"> | null;
  readonly emergency: Read<"emergency"> | null;
  readonly claims: readonly Read<"claim">[];
  /** Clauses whose meaning this version does not compute. */
  readonly later: readonly PlacedClause[];
  /** Clauses that should have stated something and do not: in error, misplaced or given twice. */
  readonly spoiled: readonly PlacedClause[];
}

type Slot = Exclude<keyof Clauses, "aside" | "claims" | "later" | "spoiled">;

const slots: Partial<Record<ClauseBody["kind"], Slot>> = {
  fly: "fly",
  under: "under",
  rules: "rules",
  phase: "phase",
  weight: "weight",
  burn: "burn",
  "burn-rate": "burn",
  config: "config",
  qnh: "qnh",
  altitude: "altitude",
  isa: "isa",
  oat: "isa",
  speed: "speed",
  bank: "bank",
  path: "path",
  load: "load",
  cg: "cg",
  contamination: "contamination",
  "engine-out": "engineOut",
  emergency: "emergency",
};

const laterKinds = new Set<ClauseBody["kind"]>(["expect", "accept", "shear", "decel", "gust", "power"]);

/** Sorts a block's clauses by what they state, once for all evaluations of the block. */
export function sortClauses(block: Block): Clauses {
  const sorted: { -readonly [K in keyof Clauses]: Clauses[K] } = {
    fly: null,
    under: null,
    rules: null,
    aside: false,
    phase: null,
    weight: null,
    burn: null,
    config: null,
    qnh: null,
    altitude: null,
    isa: null,
    speed: null,
    bank: null,
    path: null,
    load: null,
    cg: null,
    contamination: null,
    engineOut: null,
    emergency: null,
    claims: none,
    later: none,
    spoiled: none,
  };
  for (const placed of block.clauses) {
    const body = placed.clause.body;
    if (!placed.counts || !body) {
      sorted.spoiled = [...sorted.spoiled, placed];
      continue;
    }
    if (laterKinds.has(body.kind)) {
      sorted.later = [...sorted.later, placed];
      continue;
    }
    if (isOpen(body)) sorted.later = [...sorted.later, placed];
    if (body.kind === "aside") sorted.aside = true;
    else if (body.kind === "claim") sorted.claims = [...sorted.claims, { placed, body }];
    else {
      const slot = slots[body.kind];
      if (slot) (sorted[slot] as Read<ClauseBody["kind"]> | null) = { placed, body };
    }
  }
  return sorted;
}

const none: readonly never[] = [];

/** True for a clause that asks for a value (`?`) or gives many (a sweep). */
export function isOpen(body: ClauseBody): boolean {
  switch (body.kind) {
    case "weight":
    case "altitude":
    case "isa":
    case "oat":
    case "path":
    case "load":
    case "cg":
      return body.value.kind !== "scalar";
    case "contamination":
    case "bank":
      return typeof body.value === "object" && "kind" in body.value && body.value.kind !== "scalar";
    case "speed":
      return isOpenSpeed(body.speed);
    default:
      return false;
  }
}

function isOpenSpeed(speed: BodyOf<"speed">["speed"]): boolean {
  switch (speed.kind) {
    case "unknown":
      return true;
    case "mach":
    case "airspeed":
      return speed.value.kind !== "scalar";
    case "multiple":
      return speed.factor.kind === "sweep";
    case "named":
      return false;
  }
}

/** The keyword a spoiled clause was, or was meant to be. */
export function intendedKeyword(placed: PlacedClause): Keyword | null {
  return placed.clause.keyword ?? placed.clause.meant;
}
