import type { Lift } from "../flight/stall.ts";
import { interpolate } from "../flight/table.ts";
import type { Card, Configuration } from "./card.ts";
import type { Airframe } from "./corner.ts";
import { exactly, type Spread } from "./spread.ts";

const frames = new WeakMap<Configuration, Airframe>();

/**
 * What the physics needs of a card in one configuration. Null where a clause that the stall speed
 * depends on is absent or in error: nothing may be computed then.
 */
export function airframeOf(card: Card, configuration: Configuration): Airframe | null {
  const known = frames.get(configuration);
  if (known) return known;
  const lift = liftOf(card, configuration);
  if (!lift) return null;
  const buffet = configuration.buffet?.value;
  const wing = card.wing?.value;
  const frame: Airframe = {
    lift,
    warning: card.warning?.value ?? null,
    ias: configuration.ias?.value ?? null,
    buffet: buffet && wing ? { table: buffet, wingArea: wing.area } : null,
    wing:
      wing && wing.chord !== null && wing.slope !== null
        ? { area: wing.area, chord: wing.chord, slope: wing.slope }
        : null,
  };
  frames.set(configuration, frame);
  return frame;
}

function liftOf(card: Card, configuration: Configuration): Lift | null {
  const referenceMass = card.referenceMass?.value;
  const { stallSpeed, liftMach } = configuration;
  if (card.withheld || !card.basis?.value || !referenceMass || stallSpeed === null) return null;
  if (liftMach && !liftMach.value) return null;
  return { stallSpeed, referenceMass, liftMach: liftMach?.value ?? null };
}

/** Largest and smallest cg factor of the card; 1 where it has no table; null where the table is in error. */
export function cgFactorRange(card: Card): { readonly least: number; readonly most: number } | null {
  if (!card.cgEffect) return { least: 1, most: 1 };
  const table = card.cgEffect.value;
  if (!table) return null;
  return { least: Math.min(...table.values), most: Math.max(...table.values) };
}

/**
 * The cg factor at a stated cg; the largest of the table where none is stated. Null outside the
 * table or where it is in error. Between the corners of a cg tolerance the table's bends count too.
 */
export function cgFactorAt(card: Card, cg: Spread | null): Spread | null {
  const range = cgFactorRange(card);
  if (!range) return null;
  const table = card.cgEffect?.value;
  if (!table) return exactly(1);
  if (!cg) return exactly(range.most);
  const nominal = interpolate(table, cg.nominal);
  const low = interpolate(table, cg.low);
  const high = interpolate(table, cg.high);
  if (nominal === null || low === null || high === null) return null;
  const within = table.values.filter((_, i) => {
    const at = table.arguments[i];
    return at !== undefined && cg.low < at && at < cg.high;
  });
  return { nominal, low: Math.min(low, high, ...within), high: Math.max(low, high, ...within) };
}
