import { FOOT, fromSI, type UnitName } from "../flight/units.ts";
import type { Unknown } from "../notation/tree.ts";
import type { Keyword, Unit } from "../notation/vocabulary.ts";
import type { Clauses } from "./clauses.ts";
import { evaluateStated, type Setting } from "./evaluateStated.ts";
import type { OpenClause, Written } from "./openClause.ts";
import type { Solved } from "./point.ts";

/** The values that a `?` may be given, by index, and the order in which they are tried. */
export interface Grid {
  readonly what: Solved["what"];
  readonly keyword: Keyword;
  readonly unit: Unit | null;
  readonly shownUnit: Solved["unit"];
  readonly decimals: number;
  /** The end that is asked for; from there to `to` by `step`, which is 1 or -1. */
  readonly from: number;
  readonly to: number;
  readonly step: 1 | -1;
  value(index: number): number;
  written(index: number): Written;
}

/** Below this reference mass a weight is solved to the kilogram, else to 100 kg. */
const LIGHT = 5700;

export function gridOf(setting: Setting, clauses: Clauses, open: OpenClause): Grid {
  const { unit } = open.value as Unknown;
  switch (open.slot) {
    case "bank":
      // From 90 degrees on no bank alone gives the load.
      return grid({ what: "bank", shownUnit: "deg", unit: null, from: clauses.load ? 180 : 89, to: 0 });
    case "speed":
      return open.body.kind === "speed" && open.body.speed.kind === "mach"
        ? grid({ what: "speed", shownUnit: "M", unit: null, from: 1, to: 999, decimals: 3 })
        : grid(speedGrid(unit ?? "kt"));
    case "weight":
      return weightGrid(setting, clauses, unit);
    default:
      return altitudeGrid(setting, clauses, unit ?? "ft");
  }
}

type Plan = Pick<Grid, "what" | "shownUnit" | "unit" | "from" | "to"> & {
  readonly decimals?: number;
  /** How many units one step is, where it is not 10^-decimals. */
  readonly size?: number;
};

function grid({ what, shownUnit, unit, from, to, decimals = 0, size = 10 ** -decimals }: Plan): Grid {
  // As the text would be read: 56.4, never 56.400000000000006.
  const value = (index: number) => Number((index * size).toFixed(decimals));
  return {
    what,
    keyword: what,
    shownUnit,
    unit,
    decimals,
    from,
    to,
    step: from < to ? 1 : -1,
    value,
    written: (index) => ({ value: value(index), unit, decimals, of: shownUnit === "M" ? "M" : undefined }),
  };
}

function speedGrid(unit: Unit): Plan {
  const fastest = fromSI((661 * 1852) / 3600, unit as UnitName);
  return { what: "speed", shownUnit: unit, unit, from: 1, to: Math.floor(fastest) };
}

/** 100 kg, or 1 kg, in the unit that is asked for: the nearest round step of it. */
const weightSteps: Readonly<
  Record<string, { readonly heavy: number; readonly light: number; readonly decimals: number }>
> = {
  t: { heavy: 0.1, light: 0.001, decimals: 3 },
  kg: { heavy: 100, light: 1, decimals: 0 },
  lb: { heavy: 200, light: 2, decimals: 0 },
  N: { heavy: 1000, light: 10, decimals: 0 },
  kN: { heavy: 1, light: 0.01, decimals: 2 },
};

function weightGrid(setting: Setting, clauses: Clauses, asked: Unit | null): Grid {
  const card = flownCard(setting, clauses);
  const reference = card?.referenceMass?.value ?? null;
  const light = reference !== null && reference < LIGHT;
  const unit = asked ?? (light ? "kg" : "t");
  const steps = weightSteps[unit] as (typeof weightSteps)[string];
  const size = light ? steps.light : steps.heavy;
  const decimals = size === 0.1 ? 1 : light ? steps.decimals : 0;
  const masses = card?.mass?.value;
  // Without masses on the card, four times the reference is heavier than any aeroplane of its kind.
  const greatest = masses?.high ?? 4 * (reference ?? 1000);
  const least = masses?.low ?? 50;
  const index = (kg: number) => fromSI(kg, unit as UnitName) / size;
  return grid({
    what: "weight",
    shownUnit: unit,
    unit,
    from: Math.floor(index(greatest) + 1e-9),
    to: Math.ceil(index(least) - 1e-9),
    decimals,
    size,
  });
}

const LOWEST = -5000 * FOOT;
const HIGHEST = 20_000;
/** An altitude on the lowest qnh lies this far from its pressure altitude. */
const QNH_SHIFT = 5000 * FOOT;

function altitudeGrid(setting: Setting, clauses: Clauses, unit: Unit): Grid {
  const ceiling = flownCard(setting, clauses)?.ceiling?.value ?? null;
  const highest = ceiling === null ? HIGHEST : Math.min(HIGHEST, ceiling + QNH_SHIFT);
  const size = unit === "m" ? 50 : 100;
  const index = (metres: number) => fromSI(metres, unit as UnitName) / size;
  return grid({
    what: "altitude",
    shownUnit: unit,
    unit,
    from: Math.floor(index(highest) + 1e-9),
    to: Math.ceil(index(LOWEST) - 1e-9),
    size,
  });
}

function flownCard(setting: Setting, clauses: Clauses) {
  return evaluateStated(setting, clauses).point.applied.carried.aircraft?.value?.card ?? null;
}
