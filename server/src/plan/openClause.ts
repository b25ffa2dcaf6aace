import type { PlacedClause } from "../notation/block.ts";
import type { ClauseBody, Quantity, Speed, Sweep, Tolerance, Unknown, Value } from "../notation/tree.ts";
import type { Unit } from "../notation/vocabulary.ts";
import type { Clauses, Read, Slot } from "./clauses.ts";

/** A clause without one value of its own: it asks for one (`?`), or runs through many (a sweep). */
export interface OpenClause {
  readonly placed: PlacedClause;
  readonly slot: Slot;
  readonly body: ClauseBody;
  readonly value: Sweep | Unknown;
}

/** The open value of a clause; null where it states one value. */
export function openIn(placed: PlacedClause, body: ClauseBody, slot: Slot): OpenClause | null {
  const value = openValue(body);
  return value && { placed, slot, body, value };
}

function openValue(body: ClauseBody): Sweep | Unknown | null {
  switch (body.kind) {
    case "weight":
    case "altitude":
    case "isa":
    case "oat":
    case "path":
    case "load":
    case "cg":
    case "gust":
    case "power":
    case "decel":
      return unlessScalar(body.value);
    case "contamination":
    case "bank":
      return typeof body.value === "object" && "kind" in body.value ? unlessScalar(body.value) : null;
    case "speed":
      return openSpeed(body.speed);
    default:
      return null;
  }
}

function unlessScalar(value: Value | Unknown): Sweep | Unknown | null {
  return value.kind === "scalar" ? null : value;
}

function openSpeed(speed: Speed): Sweep | Unknown | null {
  switch (speed.kind) {
    case "unknown":
      return speed;
    case "mach":
    case "airspeed":
      return unlessScalar(speed.value);
    case "multiple":
      return speed.factor.kind === "sweep" ? speed.factor : null;
    case "named":
      return null;
  }
}

/** A figure as an author would write it. */
export interface Written {
  readonly value: number;
  readonly unit: Unit | null;
  readonly decimals: number;
  /** What a speed is that its figure and unit do not say: "M", "tas", "vs1g". */
  readonly of?: string | undefined;
}

/** What the figure of an open speed is of; undefined for a calibrated speed, and for what is none. */
export function figureOf({ body }: OpenClause): string | undefined {
  if (body.kind !== "speed") return undefined;
  switch (body.speed.kind) {
    case "mach":
      return "M";
    case "airspeed":
      return body.speed.type === "cas" ? undefined : body.speed.type;
    case "multiple":
      return body.speed.of;
    default:
      return undefined;
  }
}

/** The same clauses with a value where one was open, as if the author had written it. */
export function closed(clauses: Clauses, open: OpenClause, written: Written): Clauses {
  const { placed, slot, body, value } = open;
  const quantity: Quantity = {
    kind: "quantity",
    value: written.value,
    unit: written.unit,
    decimals: written.decimals,
    signed: false,
    span: value.span,
    numberSpan: value.span,
  };
  const tolerance = value.kind === "unknown" ? value.tolerance : null;
  const read: Read<ClauseBody["kind"]> = { placed, body: bodyWith(body, quantity, tolerance) };
  return { ...clauses, [slot]: read, [value.kind]: null };
}

function bodyWith(body: ClauseBody, quantity: Quantity, tolerance: Tolerance | null): ClauseBody {
  const value: Value = { kind: "scalar", quantity, tolerance, span: quantity.span };
  if (body.kind === "speed") return { ...body, speed: speedWith(body.speed, quantity, value) };
  return { ...body, value } as ClauseBody;
}

function speedWith(speed: Speed, quantity: Quantity, value: Value): Speed {
  switch (speed.kind) {
    case "unknown":
      return { kind: "airspeed", type: "cas", value, span: speed.span };
    case "multiple":
      return { ...speed, factor: quantity };
    case "mach":
    case "airspeed":
      return { ...speed, value };
    case "named":
      return speed;
  }
}
