import type { Subject } from "../notation/vocabulary.ts";
import type { Corner } from "./corner.ts";
import { type Corners, spreadOf } from "./corners.ts";
import type { Row } from "./limits.ts";
import type { HeldRow } from "./point.ts";

/** True for the subjects that a row bounds from above. */
export function atMost(subject: Subject): boolean {
  return subject === "bank" || subject === "load" || subject === "radius";
}

/** A comparison lets a figure through that misses its bound by no more than rounding can. */
export const ALLOWANCE = 1e-9;

/** What a row is held against here. */
export interface RowSituation {
  readonly corners: Corners;
  /** vs / vs1g where the card is on the `vs` basis, else null. */
  readonly vsFactor: number | null;
}

/** Holds one row against the point. `figure` is null where it cannot be known. */
export function holdRow(row: Row, situation: RowSituation): HeldRow {
  const bound = boundOf(row, situation);
  const figure = figureOf(row, situation);
  if (bound === null || figure === null) {
    // Once the warning has come no bank is left: that needs no figure to fall short of the row.
    const short = bound !== null && row.subject === "overshoot" && warningHasCome(situation.corners);
    const holds = short ? false : null;
    return { row, bound: bound?.value ?? Number.NaN, figure: null, holds, byRateOne: false };
  }
  return {
    row,
    bound: bound.value,
    figure,
    holds: keeps(row, bound.value, figure),
    byRateOne: bound.byRateOne,
  };
}

/** True where, at some corner, the warning has come already with the wings level, so that no bank is left to it. */
export function warningHasCome({ all }: Corners): boolean {
  return all.some((one) => one.cas <= one.warning && Number.isNaN(one.warningBank));
}

function keeps(row: Row, bound: number, figure: number): boolean {
  return atMost(row.subject) ? figure <= bound * (1 + ALLOWANCE) : bound * (1 - ALLOWANCE) <= figure;
}

/**
 * The bound in force. `or rate-one` is a ceiling: whichever bank is less, at the corner where the
 * bank flown is furthest above it.
 */
function boundOf(
  row: Row,
  { corners, vsFactor }: RowSituation,
): { value: number; byRateOne: boolean } | null {
  if (row.value === null) return null;
  if (vsFactor !== null && row.vs !== null) return { value: row.vs, byRateOne: false };
  if (!row.rateOne) return { value: row.value, byRateOne: false };
  const worst = worstForRateOne(corners, row.value);
  return worst.rateOneBank < row.value
    ? { value: worst.rateOneBank, byRateOne: true }
    : { value: row.value, byRateOne: false };
}

function worstForRateOne(corners: Corners, value: number): Corner {
  let worst = corners.nominal;
  const excess = (corner: Corner) => corner.bank - Math.min(value, corner.rateOneBank);
  for (const corner of corners.all) if (excess(worst) < excess(corner)) worst = corner;
  return worst;
}

/** The figure of a row's subject at its worst corner. */
function figureOf(row: Row, { corners, vsFactor }: RowSituation): number | null {
  switch (row.subject) {
    case "bank":
      return row.rateOne && row.value !== null
        ? worstForRateOne(corners, row.value).bank
        : (spreadOf(corners, (corner) => corner.bank)?.high ?? null);
    case "load":
      return spreadOf(corners, (corner) => corner.load)?.high ?? null;
    case "radius":
      return spreadOf(corners, (corner) => corner.radius)?.high ?? null;
    case "ratio": {
      const ratio = spreadOf(corners, (corner) => corner.ratio)?.low ?? null;
      return ratio !== null && vsFactor !== null && row.vs !== null ? ratio / vsFactor : ratio;
    }
    case "margin":
      return spreadOf(corners, (corner) => corner.margin)?.low ?? null;
    case "overshoot":
      return spreadOf(corners, (corner) => corner.overshoot)?.low ?? null;
    case "buffet":
      return spreadOf(corners, (corner) => corner.buffetLoad)?.low ?? null;
  }
}

/** The strictest of several rows of one subject: the first broken one, else the one that is kept most narrowly. */
export function strictest(rows: readonly HeldRow[]): HeldRow | null {
  let found: HeldRow | null = null;
  for (const one of rows) {
    if (found === null || stricter(one, found)) found = one;
  }
  return found;
}

function stricter(one: HeldRow, other: HeldRow): boolean {
  if (one.holds !== other.holds) return one.holds === false || (one.holds === null && other.holds === true);
  if (atMost(one.row.subject)) return one.bound < other.bound;
  // One row may ask a ratio to vs and another to vs1g: each figure is in the measure of its own bound.
  const share = ({ figure, bound }: HeldRow) => (figure ?? 1) / bound;
  return one.row.subject === "ratio" ? share(one) < share(other) : other.bound < one.bound;
}
