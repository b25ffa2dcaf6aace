import { casFromMach, machFromCas } from "../flight/airspeed.ts";
import { fromSI, type UnitName } from "../flight/units.ts";
import type { StatedPoint } from "./evaluateStated.ts";
import type { HeldRow } from "./point.ts";
import type { Grid } from "./solveGrid.ts";

/** Indices beyond which no speed can keep everything; they bound the search, never the answer. */
export interface Window {
  readonly low: number;
  readonly high: number;
}

/**
 * What a speed must at least be and may at most be, by what does not change with the speed: the 1-g stall
 * times the ratio that is asked for, and the card's greatest speeds, at the nominal inputs. A step more
 * is left on either side. Where the note accepts anything the search is not narrowed.
 */
export function speedWindow(grid: Grid, probe: StatedPoint): Window | null {
  const { evaluated, point, rules } = probe;
  if (!evaluated || point.clauses.accepts.length > 0) return null;
  const { nominal } = evaluated.corners;
  const { card, configuration } = evaluated.ready;
  const basis = card.basis?.value;
  const least = rules.rows.map((held) =>
    leastBy(held, nominal.vs1g, basis?.kind === "vs" ? basis.factor : 1),
  );
  // With the load stated or from the bank alone, the stall in the turn does not change with the speed either.
  const { bank, path } = evaluated.ready.turn;
  if (bank !== "rate-one" && path.kind !== "vertical-speed") least.push(nominal.stall);
  const stated = [card.vmo, card.vne, configuration.vfe].flatMap((one) =>
    one?.value && !one.value.ias ? [one.value.speed] : [],
  );
  const byMach = card.mmo?.value ? casFromMach(card.mmo.value, nominal.air) : null;
  const most = [...stated, ...(byMach === null ? [] : [byMach])];
  const index = (cas: number) => {
    const value =
      grid.shownUnit === "M" ? machFromCas(cas, nominal.air) : fromSI(cas, grid.shownUnit as UnitName);
    return value === null ? Number.NaN : value / (grid.value(1) - grid.value(0));
  };
  const low = Math.floor(index(Math.max(0, ...least.filter(Number.isFinite)))) - 1;
  const high = Math.ceil(index(Math.min(...most))) + 1;
  return {
    low: Number.isFinite(low) ? Math.max(low, grid.from) : grid.from,
    high: most.length > 0 && Number.isFinite(high) ? Math.min(high, grid.to) : grid.to,
  };
}

function leastBy({ row, bound }: HeldRow, vs1g: number, vsFactor: number): number {
  if (row.subject !== "ratio" || row.afterShear) return 0;
  return bound * vs1g * (row.vs === null ? 1 : vsFactor);
}
