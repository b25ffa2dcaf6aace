import { buffetAltitude, buffetMachs } from "../flight/buffet.ts";
import { secondsTo } from "../flight/deceleration.ts";
import { interpolate } from "../flight/table.ts";
import type { Subject } from "../notation/vocabulary.ts";
import { approachCategories, type Categories } from "./categories.ts";
import type { Corner } from "./corner.ts";
import { type Corners, spreadOf } from "./corners.ts";
import type { Evaluated } from "./evaluated.ts";
import type { HeldRow } from "./point.ts";
import type { Spread } from "./spread.ts";

/** Figures beside the results that a claim can name, SI; null where they are not asked for or not known. */
export interface FurtherFigures {
  /** Between these Mach numbers the load flown gives no buffet. An end is NaN where a corner has none. */
  readonly lowBuffetMach: Spread | null;
  readonly highBuffetMach: Spread | null;
  /** Up to this pressure altitude, wings level, `buffetLoadKept` is carried without buffet. Ends as above. */
  readonly buffetAltitude: Spread | null;
  readonly buffetLoadKept: number;
  /** Load factor in the gust upwards and downwards. */
  readonly gustUp: Spread | null;
  readonly gustDown: Spread | null;
  /** After the sudden loss of airspeed. */
  readonly afterShear: { readonly [K in "ratio" | "margin" | "overshoot"]: Spread | null } | null;
  /** In the turn; no rule uses it. */
  readonly powerOnStall: Spread | null;
  readonly secondsToWarning: Spread | null;
  readonly secondsToStall: Spread | null;
  readonly categories: Categories | null;
}

/** Advisory practice to 14 CFR 25.251(e), which gives no figure: what the buffet altitude keeps where no row says more. */
const USUAL_BUFFET_LOAD = 1.3;

export function furtherFigures(evaluated: Evaluated, rows: readonly HeldRow[]): FurtherFigures {
  const { ready, corners } = evaluated;
  const { card, configuration, extras } = ready;
  const kept = buffetLoadKept(rows);
  const { decel } = extras;
  return {
    ...buffetEnds(evaluated, kept),
    gustUp: gustSpread(evaluated, 1),
    gustDown: gustSpread(evaluated, -1),
    afterShear: evaluated.sheared && {
      ratio: spreadOf(evaluated.sheared, (corner) => corner.ratio),
      margin: spreadOf(evaluated.sheared, (corner) => corner.margin),
      overshoot: spreadOf(evaluated.sheared, (corner) => corner.overshoot),
    },
    powerOnStall: powerOnStall(evaluated),
    secondsToWarning: decel && timing(corners, decel, (corner) => corner.warning),
    secondsToStall: decel && timing(corners, decel, (corner) => corner.stall),
    categories: approachCategories(card, configuration),
  };
}

function buffetLoadKept(rows: readonly HeldRow[]): number {
  const bounds = rows.flatMap(({ row, bound }) =>
    row.subject === ("buffet" satisfies Subject) && !row.afterShear ? [bound] : [],
  );
  return bounds.length > 0 ? Math.max(...bounds) : USUAL_BUFFET_LOAD;
}

function buffetEnds({ ready, corners }: Evaluated, kept: number) {
  const { buffet } = ready.frame;
  const unknown = { lowBuffetMach: null, highBuffetMach: null, buffetAltitude: null, buffetLoadKept: kept };
  if (!buffet || 0 < ready.liftLoss.high || corners.all.some((one) => !(0 < one.load))) return unknown;
  const { table, wingArea } = buffet;
  const ceiling = ready.card.ceiling?.value ?? Number.POSITIVE_INFINITY;
  const machs = (one: Corner) => buffetMachs(table, one.input.mass, wingArea, one.load, one.air);
  const highest = (one: Corner) => buffetAltitude(table, one.input.mass, wingArea, one.mach, kept);
  return {
    lowBuffetMach: ends(corners, (one) => machs(one).low),
    highBuffetMach: ends(corners, (one) => machs(one).high),
    buffetAltitude: ends(corners, (one) => {
      const altitude = highest(one);
      return altitude === null ? null : Math.min(altitude, ceiling);
    }),
    buffetLoadKept: kept,
  };
}

/** A figure with its ends, which are NaN where a corner lacks it: its nominal value is then all that is known. */
function ends(corners: Corners, figure: (corner: Corner) => number | null): Spread | null {
  const nominal = figure(corners.nominal);
  if (nominal === null) return null;
  const all = corners.all.map((one) => figure(one) ?? Number.NaN);
  return { nominal, low: Math.min(...all), high: Math.max(...all) };
}

/** The load factor in a gust; a gust with a tolerance is strongest at its high end. */
export function gustSpread({ ready, corners }: Evaluated, way: 1 | -1): Spread | null {
  const { gust } = ready.extras;
  if (!gust) return null;
  const at = (strength: number) =>
    spreadOf(corners, (corner) => corner.load + way * corner.gustLoad(strength));
  const nominal = at(gust.nominal);
  const weak = at(gust.low);
  const strong = at(gust.high);
  if (!nominal || !weak || !strong) return null;
  return {
    nominal: nominal.nominal,
    low: Math.min(weak.low, strong.low),
    high: Math.max(weak.high, strong.high),
  };
}

function timing(corners: Corners, decel: Spread, onset: (corner: Corner) => number): Spread | null {
  const at = (rate: number) => spreadOf(corners, (corner) => secondsTo(corner.cas, onset(corner), rate));
  const nominal = at(decel.nominal);
  const slow = at(decel.low);
  const fast = at(decel.high);
  if (!nominal || !slow || !fast) return null;
  return { nominal: nominal.nominal, low: fast.low, high: slow.high };
}

function powerOnStall({ ready, corners }: Evaluated): Spread | null {
  const table = ready.card.powerEffect?.value;
  const { power } = ready;
  if (!table || !power) return null;
  const nominal = interpolate(table, power.nominal);
  const ends = [power.low, power.high].map((share) => interpolate(table, share));
  const [low, high] = ends;
  if (nominal === null || low == null || high == null) return null;
  const inside = table.values.filter((_, i) => {
    const share = table.arguments[i] as number;
    return power.low < share && share < power.high;
  });
  const at = (factor: number) => spreadOf(corners, (corner) => corner.stallWith(factor));
  const [middle, least, most] = [
    at(nominal),
    at(Math.min(low, high, ...inside)),
    at(Math.max(low, high, ...inside)),
  ];
  return middle && least && most && { nominal: middle.nominal, low: least.low, high: most.high };
}
