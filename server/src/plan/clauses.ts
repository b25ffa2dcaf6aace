import type { Block, PlacedClause } from "../notation/block.ts";
import type { BodyOf, ClauseBody } from "../notation/tree.ts";
import type { Keyword } from "../notation/vocabulary.ts";
import { type OpenClause, openIn } from "./openClause.ts";

/** A clause that counts, with its body at hand. */
export interface Read<K extends ClauseBody["kind"]> {
  readonly placed: PlacedClause;
  readonly body: BodyOf<K>;
}

/** A clause that states one value and nothing else. */
export type ReadValue = Read<"path" | "load" | "gust" | "cg" | "power" | "decel">;

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
  readonly path: ReadValue | null;
  readonly load: ReadValue | null;
  readonly gust: ReadValue | null;
  readonly shear: Read<"shear"> | null;
  readonly decel: ReadValue | null;
  readonly cg: ReadValue | null;
  readonly power: ReadValue | null;
  readonly contamination: Read<"contamination"> | null;
  readonly engineOut: Read<"engine-out"> | null;
  readonly emergency: Read<"emergency"> | null;
  readonly claims: readonly Read<"claim">[];
  readonly expects: readonly Read<"expect">[];
  readonly accepts: readonly Read<"accept">[];
  /** The clause whose value is sought (`?`), and the one whose value is varied. */
  readonly unknown: OpenClause | null;
  readonly sweep: OpenClause | null;
  /** Clauses that should have stated something and do not: in error, misplaced or given twice. */
  readonly spoiled: readonly PlacedClause[];
}

export type Slot = Exclude<
  keyof Clauses,
  "aside" | "claims" | "expects" | "accepts" | "unknown" | "sweep" | "spoiled"
>;

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
  gust: "gust",
  shear: "shear",
  decel: "decel",
  cg: "cg",
  power: "power",
  contamination: "contamination",
  "engine-out": "engineOut",
  emergency: "emergency",
};

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
    gust: null,
    shear: null,
    decel: null,
    cg: null,
    power: null,
    contamination: null,
    engineOut: null,
    emergency: null,
    claims: none,
    expects: none,
    accepts: none,
    unknown: null,
    sweep: null,
    spoiled: none,
  };
  for (const placed of block.clauses) {
    const body = placed.clause.body;
    if (!placed.counts || !body) {
      sorted.spoiled = [...sorted.spoiled, placed];
      continue;
    }
    if (body.kind === "aside") sorted.aside = true;
    else if (body.kind === "claim") sorted.claims = [...sorted.claims, { placed, body }];
    else if (body.kind === "expect") sorted.expects = [...sorted.expects, { placed, body }];
    else if (body.kind === "accept") sorted.accepts = [...sorted.accepts, { placed, body }];
    else {
      const slot = slots[body.kind];
      if (!slot) continue;
      (sorted[slot] as Read<ClauseBody["kind"]> | null) = { placed, body };
      const open = openIn(placed, body, slot);
      if (open) sorted[open.value.kind] = open;
    }
  }
  return sorted;
}

const none: readonly never[] = [];

/** The keyword a spoiled clause was, or was meant to be. */
export function intendedKeyword(placed: PlacedClause): Keyword | null {
  return placed.clause.keyword ?? placed.clause.meant;
}
