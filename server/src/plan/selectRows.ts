import type { Phase, Subject } from "../notation/vocabulary.ts";
import type { Level, Limits, Row } from "./limits.ts";
import { conditionsKey } from "./lowerLimits.ts";
import type { Spread } from "./spread.ts";

/** What decides which rows apply. */
export interface Situation {
  readonly phase: Phase;
  readonly emergency: boolean;
  /** Null where no rules are stated: rows for either then hold. */
  readonly rules: "ifr" | "vfr" | null;
  readonly engineOut: boolean;
  readonly shear: boolean;
  /** As stated, m. */
  readonly altitude: Spread;
  readonly pressureAltitude: Spread;
}

/** Rows of one verb and subject that all hold; the strictest counts, which the figures decide. */
export interface RowGroup {
  readonly verb: "must" | "should";
  readonly subject: Subject;
  readonly afterShear: boolean;
  readonly rows: readonly Row[];
}

export interface Selection {
  readonly groups: readonly RowGroup[];
  /** Rows that `none` switched off here. */
  readonly off: readonly Row[];
}

/**
 * The rows in force. First the rows that do not apply drop out; of the rest, one that names the phase
 * replaces the `any` rows of the same verb, subject and conditions, and an `emergency` row replaces
 * both; `none` then switches its own off.
 */
export function rowsInForce(limits: Limits, situation: Situation): Selection {
  const slots = new Map<string, { rank: number; rows: Row[] }>();
  for (const { row, key } of keyed(limits)) {
    const rank = rankOf(row, situation);
    if (rank === 0 || !applies(row, situation)) continue;
    const slot = slots.get(key);
    if (!slot || slot.rank < rank) slots.set(key, { rank, rows: [row] });
    else if (slot.rank === rank) slot.rows.push(row);
  }
  const groups = new Map<string, { verb: Row["verb"]; subject: Subject; afterShear: boolean; rows: Row[] }>();
  const off: Row[] = [];
  for (const { rows } of slots.values()) {
    for (const row of rows) {
      if (row.value === null) {
        off.push(row);
        continue;
      }
      const name = `${row.verb} ${row.subject} ${row.afterShear}`;
      const group = groups.get(name);
      if (group) group.rows.push(row);
      else
        groups.set(name, { verb: row.verb, subject: row.subject, afterShear: row.afterShear, rows: [row] });
    }
  }
  return { groups: [...groups.values()], off };
}

/** The key of a row: verb, subject and conditions, which do not change while the limits do not. */
const keys = new WeakMap<Limits, readonly { readonly row: Row; readonly key: string }[]>();

function keyed(limits: Limits) {
  let known = keys.get(limits);
  if (!known) {
    known = limits.rows.map((row) => ({ row, key: `${row.verb} ${row.subject} ${conditionsKey(row)}` }));
    keys.set(limits, known);
  }
  return known;
}

/** How closely a row names the point: 3 the emergency, 2 the phase, 1 any, 0 not at all. */
function rankOf(row: Row, { phase, emergency }: Situation): number {
  if (emergency && row.phases.includes("emergency")) return 3;
  if (row.phases.includes(phase)) return 2;
  return row.phases.includes("any") ? 1 : 0;
}

function applies(row: Row, situation: Situation): boolean {
  if (row.afterShear && !situation.shear) return false;
  for (const when of row.when) {
    if (when === "engine-out" ? !situation.engineOut : situation.rules !== null && situation.rules !== when)
      return false;
  }
  return row.levels.every((level) => reaches(level, situation));
}

/** True where any altitude of the tolerance lies beyond the level, which itself is excluded. */
function reaches({ kind, altitude, flightLevel }: Level, situation: Situation): boolean {
  const flown = flightLevel ? situation.pressureAltitude : situation.altitude;
  const allowance = 1e-6;
  return kind === "above" ? altitude + allowance < flown.high : flown.low < altitude - allowance;
}
