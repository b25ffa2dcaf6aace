import { type Checking, carriedFrom, clauseFor, leastAt, tell } from "./checks.ts";
import type { Corner } from "./corner.ts";
import type { Evaluated } from "./evaluated.ts";
import { formatDistinct, formatGust, formatLoad, formatResultValue } from "./format.ts";
import type { NotEvaluated } from "./point.ts";
import { ALLOWANCE } from "./rules.ts";

/** The load factors in a stated gust against the stall, buffet onset and the limit load factors; what could not be held. */
export function checkGust(checking: Checking): readonly NotEvaluated[] {
  const { point, evaluated } = checking;
  const { gust } = evaluated.ready.extras;
  if (!gust || !point.clauses.gust) return [];
  if (evaluated.corners.all.some((one) => Number.isNaN(one.gustLoad(gust.high)))) {
    return [{ rule: "gust-over-stall", why: gustUnknown(checking) }];
  }
  const up = (one: Corner) => one.load + one.gustLoad(gust.high);
  againstLift(
    checking,
    "the wing stalls",
    "stall-load",
    (one) => one.stallLoad,
    up,
    (one) =>
      one.carriesMoreSlower
        ? "fly slower, lower, lighter, or bank less"
        : "fly faster, lighter, or bank less",
  );
  againstLift(
    checking,
    "buffet begins",
    "buffet-load",
    (one) => one.buffetLoad,
    up,
    () => "fly lower, lighter, or bank less",
  );
  againstLimits(checking, up, (one) => one.load - one.gustLoad(gust.high));
  return liftUnknown(evaluated);
}

/** Where the wing stalls or buffets is not known at every corner, so that the gust is held against a part of it. */
function liftUnknown(evaluated: Evaluated): readonly NotEvaluated[] {
  const { corners, ready } = evaluated;
  const lacks = (figure: (corner: Corner) => number) => corners.all.some((one) => Number.isNaN(figure(one)));
  const stall = lacks((one) => one.stallLoad);
  const buffet = ready.frame.buffet !== null && lacks((one) => one.buffetLoad);
  if (!stall && !buffet) return [];
  const why = evaluated.absent(stall ? "stall-load" : "buffet-load") ?? "It is not known here.";
  return [{ rule: "gust-over-stall", why }];
}

/** A gust is asked for, so that what it needs is missing here. Gives the reason back. */
function gustUnknown(checking: Checking): string {
  const { point, evaluated } = checking;
  const { card, configuration, frame } = evaluated.ready;
  const at = clauseFor(point, "gust");
  if (!frame.wing) {
    const why = card.wing
      ? "states no chord or lift-curve slope with its `wing`"
      : "states no `wing` (area, chord and lift-curve slope)";
    const message = `The load in a gust is not known: the card ${card.name} ${why}.`;
    tell(checking, "missing-value", at, message, {
      related: [{ origin: card.wing?.origin ?? card.origin, message: `The card ${card.name}.` }],
    });
    return message;
  }
  const why =
    typeof frame.wing.slope === "number"
      ? "one lift-curve slope holds up to M 0.4: give a table of it against Mach number"
      : "the table of the lift-curve slope does not reach this Mach number, and it is never extrapolated";
  const message = `The load in a gust is not known in ${configuration.name} here: ${why}.`;
  tell(checking, "outside-table", at, message, {
    related: card.wing ? [{ origin: card.wing.origin, message: "The card states the wing here." }] : [],
  });
  return message;
}

function againstLift(
  checking: Checking,
  what: string,
  name: "stall-load" | "buffet-load",
  carried: (corner: Corner) => number,
  up: (corner: Corner) => number,
  wayOut: (corner: Corner) => string,
): void {
  const { point, evaluated } = checking;
  const worst = leastAt(evaluated.corners.all, (one) => carried(one) - up(one));
  if (!(carried(worst) < up(worst) * (1 - ALLOWANCE))) return;
  const [onset, load] = formatDistinct(
    carried(worst),
    up(worst),
    (value, more) => formatResultValue(name, value, more),
    formatLoad,
  );
  tell(
    checking,
    "gust-over-stall",
    clauseFor(point, "gust"),
    `In the gust of ${strength(checking)} the load factor reaches ${load} and ${what} at ${onset}: ${wayOut(worst)}.`,
    { related: carriedFrom(point, ["speed", "mass", "altitude"]) },
  );
}

function againstLimits(
  checking: Checking,
  up: (corner: Corner) => number,
  down: (corner: Corner) => number,
): void {
  const { point, evaluated } = checking;
  const limit = evaluated.ready.configuration.load;
  if (!limit?.value) return;
  const { low, high } = limit.value;
  const { all } = evaluated.corners;
  const most = Math.max(...all.map(up));
  const least = Math.min(...all.map(down));
  const related = [
    ...carriedFrom(point, ["speed", "mass"]),
    { origin: limit.origin, message: "The card states the load factors here." },
  ];
  const at = clauseFor(point, "gust");
  if (high + Math.abs(high) * ALLOWANCE < most) {
    const [load, bound] = formatDistinct(most, high, formatLoad);
    const text = `In the gust of ${strength(checking)} the load factor reaches ${load}, beyond the limit ${bound} of ${evaluated.ready.configuration.name}: fly slower, or bank less.`;
    tell(checking, "gust-over-stall", at, text, { related });
  }
  if (least < low - Math.abs(low) * ALLOWANCE) {
    const [load, bound] = formatDistinct(least, low, formatLoad);
    const text = `In the gust of ${strength(checking)} downwards the load factor falls to ${load}, beyond the limit ${bound} of ${evaluated.ready.configuration.name}: fly slower.`;
    tell(checking, "gust-over-stall", at, text, { related });
  }
}

function strength({ evaluated }: Checking): string {
  return formatGust(evaluated.ready.extras.gust?.high ?? Number.NaN);
}
