import { loadFactor, pathFromGradient } from "../flight/turn.ts";
import type { PlacedClause } from "../notation/block.ts";
import type { Card, Configuration } from "./card.ts";
import { spreadIn } from "./carry.ts";
import type { Clauses } from "./clauses.ts";
import type { PathInput } from "./corner.ts";
import type { Finding } from "./finding.ts";
import { findingAt } from "./site.ts";
import { exactly, type Spread } from "./spread.ts";

/** What a point says of its turn; none of it carries on. */
export interface TurnInputs {
  readonly bank: Spread | "rate-one";
  readonly bankSide: "left" | "right" | null;
  readonly path: { readonly kind: PathInput["kind"]; readonly value: Spread };
  readonly load: Spread | null;
}

/**
 * Reads bank, path and load. Null where one of them gives no value: nothing is taken in its stead.
 * Not stated at all, wings level and level flight are taken and listed as assumed.
 */
export function readTurn(clauses: Clauses, findings: Finding[]): TurnInputs | null {
  const bank = readBank(clauses, findings);
  const path = readPath(clauses, findings);
  const load = clauses.load
    ? spreadIn({ findings }, clauses.load.placed, clauses.load.body.value, "load")
    : undefined;
  if (bank === null || path === null || load === null) return null;
  const turn: TurnInputs = {
    bank,
    bankSide: clauses.bank?.body.side ?? null,
    path,
    load: load ?? null,
  };
  return needsLoad(turn, clauses, findings) ? null : turn;
}

function readBank(clauses: Clauses, findings: Finding[]): Spread | "rate-one" | null {
  if (!clauses.bank) return exactly(0);
  const { placed, body } = clauses.bank;
  if (body.value === "rate-one") return "rate-one";
  const bank = spreadIn({ findings }, placed, body.value, "bank");
  // A tolerance about wings level banks either way; the load is the same.
  return bank && bank.low < 0
    ? { nominal: bank.nominal, low: 0, high: Math.max(bank.high, -bank.low) }
    : bank;
}

function readPath(clauses: Clauses, findings: Finding[]): TurnInputs["path"] | null {
  if (!clauses.path) return { kind: "angle", value: exactly(0) };
  const { placed, body } = clauses.path;
  if (body.value.kind !== "scalar") return null;
  switch (body.value.quantity.unit) {
    case "deg": {
      const value = spreadIn({ findings }, placed, body.value, "pathAngle");
      return value && { kind: "angle", value };
    }
    case "ft/min": {
      const value = spreadIn({ findings }, placed, body.value, "verticalSpeed");
      return value && { kind: "vertical-speed", value };
    }
    default: {
      const value = spreadIn({ findings }, placed, body.value, "gradient");
      return value && { kind: "gradient", value };
    }
  }
}

/** From 90 degrees of bank no steady level turn exists: the load must be stated. */
function needsLoad(turn: TurnInputs, clauses: Clauses, findings: Finding[]): boolean {
  if (turn.load || turn.bank === "rate-one" || !clauses.bank) return false;
  if (turn.bank.high < Math.PI / 2) return false;
  findings.push(
    findingAt(
      "missing-value",
      clauses.bank.placed,
      "From 90° of bank no bank alone gives the load: state it with `load`.",
      {
        fixes: [loadFix(clauses.bank.placed)],
      },
    ),
  );
  return true;
}

function loadFix(placed: PlacedClause) {
  const at = placed.clause.span.end;
  return { title: "Write load", edits: [{ line: placed.line, start: at, end: at, newText: "; load " }] };
}

/** The nominal load where it does not depend on the speed; null where it does. */
export function loadWithoutSpeed(turn: TurnInputs): number | null {
  if (turn.load) return turn.load.nominal;
  if (turn.bank === "rate-one" || turn.path.kind === "vertical-speed") return null;
  const path =
    turn.path.kind === "angle" ? turn.path.value.nominal : pathFromGradient(turn.path.value.nominal);
  return path === null ? null : loadFactor(turn.bank.nominal, path);
}

/** The name as the card spells it. */
export function configurationNamed(card: Card, name: string): Configuration | null {
  const wanted = name.toLowerCase();
  return card.configurations.find((one) => one.name.toLowerCase() === wanted) ?? null;
}
