import { machFromCas } from "../flight/airspeed.ts";
import { bracketedRoot } from "../flight/root.ts";
import type { Table } from "../flight/table.ts";
import { type Airframe, type Corner, type CornerInput, corner } from "./corner.ts";

/** What varies along an edge, as far as the card's tables are concerned. */
export type Varied = "speed" | "altitude" | "deviation" | "mass" | "turn" | "wing";

/** A stretch between two corners that differ in one input alone. */
export interface Edge {
  readonly varied: Varied;
  readonly from: number;
  readonly to: number;
  readonly first: Corner;
  readonly last: Corner;
  at(value: number): CornerInput;
}

/** What enters a table, and the arguments at which that table bends. */
interface Entry {
  readonly arguments: readonly number[];
  of(corner: Corner): number;
}

/**
 * The corners along an edge at which one of the card's tables bends. Between two corners a figure has
 * its extreme at a corner only as long as no table bends in between: the load factors at the stall, at
 * the warning, at buffet onset and in a gust against the Mach number that is flown, also after a
 * sudden `loss` of airspeed; the stall speeds against their own Mach number; calibrated against
 * indicated airspeed.
 */
export function bends(frame: Airframe, edge: Edge, loss: number | null): readonly Corner[] {
  const { first, last } = edge;
  const found: Corner[] = [];
  const seen = new Set<string>();
  for (const entry of entriesAlong(frame, edge, loss)) {
    const [a, b] = [entry.of(first), entry.of(last)];
    // The stall and the 1-g stall are one in level flight, and so are those of a clean wing.
    if (seen.has(`${a} ${b}`)) continue;
    seen.add(`${a} ${b}`);
    for (const argument of entry.arguments) {
      if (!(Math.min(a, b) < argument && argument < Math.max(a, b))) continue;
      const one = cornerWhere(frame, edge, (at) => entry.of(at) - argument);
      if (one) found.push(one);
    }
  }
  return found;
}

function cornerWhere(frame: Airframe, edge: Edge, excess: (corner: Corner) => number): Corner | null {
  const cornerAt = (value: number) => corner(frame, edge.at(value), edge.first.air);
  const value = bracketedRoot(
    (at) => {
      const one = cornerAt(at);
      return typeof one === "string" ? Number.NaN : excess(one);
    },
    edge.from,
    edge.to,
  );
  const found = value === null ? "speed" : cornerAt(value);
  // A bend lies between corners that were evaluated; one that cannot be is no corner.
  return typeof found === "string" ? null : found;
}

function entriesAlong(frame: Airframe, { varied, first }: Edge, loss: number | null): readonly Entry[] {
  if (varied === "wing") return [];
  const { kind } = first.input.speed;
  // Mass and turn move the Mach number of an indicated speed alone, the temperature that of a true one.
  const movesMach =
    varied === "speed" || varied === "altitude" || (varied === "deviation" ? kind === "tas" : kind === "ias");
  return [
    ...(movesMach ? byMach(frame, flownSpeeds(frame, loss)) : []),
    ...(varied === "altitude" ? byMach(frame, stallSpeeds(frame)) : []),
    ...(varied === "deviation" ? [] : byIndication(frame)),
  ];
}

type Calibrated = (corner: Corner) => number;

function flownSpeeds({ warning }: Airframe, loss: number | null): readonly Calibrated[] {
  const speeds: readonly Calibrated[] = [(one) => one.cas, ...(loss === null ? [] : [slowedBy(loss)])];
  return warning === null ? speeds : speeds.flatMap((speed) => [speed, (one) => speed(one) / warning]);
}

function slowedBy(loss: number): Calibrated {
  return (one) => one.cas - loss;
}

function stallSpeeds({ warning }: Airframe): readonly Calibrated[] {
  return [
    (one) => one.stall,
    (one) => one.vs1g,
    ...(warning === null ? [] : [(one: Corner) => one.warning / warning]),
  ];
}

function byMach(frame: Airframe, speeds: readonly Calibrated[]): readonly Entry[] {
  const tables: readonly (Table | number | null | undefined)[] = [
    frame.lift.liftMach,
    frame.buffet?.table,
    frame.wing?.slope,
  ];
  const machs = new Set(tables.flatMap((one) => (typeof one === "object" ? (one?.arguments ?? []) : [])));
  if (machs.size === 0) return [];
  return speeds.map((speed) => ({
    arguments: [...machs],
    of: (one) => machFromCas(speed(one), one.air) ?? Number.NaN,
  }));
}

/** The table is entered at V / sqrt(n m / m_ref). */
function byIndication({ ias, lift }: Airframe): readonly Entry[] {
  if (!ias) return [];
  const of = (one: Corner) => one.cas / Math.sqrt((one.load * one.input.mass) / lift.referenceMass);
  return [{ arguments: ias.values, of }];
}
