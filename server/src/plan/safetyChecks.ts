import type { Table } from "../flight/table.ts";
import { loadFactor } from "../flight/turn.ts";
import type { ResultName } from "../notation/vocabulary.ts";
import { type Checking, carriedFrom, clauseFor, exerciseSeverity, leastAt, tell } from "./checks.ts";
import type { Corner } from "./corner.ts";
import type { Evaluated } from "./evaluated.ts";
import {
  formatBank,
  formatDistinct,
  formatLoad,
  formatMach,
  formatPercent,
  formatResultValue,
  formatSpeed,
} from "./format.ts";
import type { NotEvaluated } from "./point.ts";
import { ALLOWANCE } from "./rules.ts";
import { findingAt, oneStepLower } from "./site.ts";

/** The wing's own limits: stall, warning and buffet, at the worst corner. What could not be held is given back. */
export function checkSafety(checking: Checking): readonly NotEvaluated[] {
  const { evaluated } = checking;
  if (!checkLift(checking)) return notHeld(evaluated, everyCheck, "stall-load");
  const stalled = checkStalled(checking);
  if (!stalled) {
    checkWarning(checking);
    checkStalledAfterShear(checking);
  }
  checkStallBeforeWarning(checking);
  checkUnloading(checking);
  return [...loadsUnknown(evaluated), ...checkBuffet(checking)];
}

const everyCheck = "no-level-flight, stalled, warning-in-turn, stall-before-warning, buffet-in-turn";

function notHeld(evaluated: Evaluated, rule: string, result: ResultName): readonly NotEvaluated[] {
  return [{ rule, why: evaluated.absent(result) ?? "It is not known here." }];
}

/** Pushed over, the wing may stall upside down, of which the card says nothing; nor is a stall speed computed then. */
function loadsUnknown(evaluated: Evaluated): readonly NotEvaluated[] {
  const { corners, ready } = evaluated;
  const negative = corners.all.some((one) => one.load < 0);
  const unwarned = ready.frame.warning !== null && corners.all.some((one) => Number.isNaN(one.warning));
  return [
    ...(negative ? notHeld(evaluated, "stalled", "stall") : []),
    ...(unwarned ? notHeld(evaluated, "warning-in-turn, stall-before-warning", "warning") : []),
  ];
}

/** False where the wing's lift is not known here, or carries the load at no speed. */
function checkLift(checking: Checking): boolean {
  const { point, evaluated } = checking;
  const { corners, ready } = evaluated;
  const related = carriedFrom(point, ["mass", "altitude"]);
  const never = corners.all.find(
    (one) => one.stallKind === "no-level-flight" || one.vs1gKind === "no-level-flight",
  );
  if (never) {
    const turning = never.vs1gKind !== "no-level-flight";
    checking.findings.push(
      findingAt(
        "no-level-flight",
        turning ? clauseFor(point, "bank") : clauseFor(point, "altitude"),
        turning
          ? `At this weight and altitude the wing carries the load factor ${formatLoad(never.load)} at no speed: bank less, fly lower or lighter.`
          : "At this weight and altitude the wing carries the aeroplane at no speed: fly lower or lighter.",
        { related },
      ),
    );
    return !Number.isNaN(never.stallLoad);
  }
  const outside = corners.all.some(
    (one) =>
      one.stallKind === "outside-table" || one.vs1gKind === "outside-table" || Number.isNaN(one.stallLoad),
  );
  if (outside) {
    const table = ready.configuration.liftMach;
    checking.findings.push(
      findingAt(
        "outside-table",
        clauseFor(point, "speed"),
        `Here the lift-mach table of ${ready.configuration.name} ends before the Mach number that is needed, and it is never extrapolated, so what depends on it is not known: check speed and altitude, or extend the table.`,
        {
          related: [
            ...carriedFrom(point, ["speed", "altitude"]),
            ...(table ? [{ origin: table.origin, message: "The card's lift-mach table." }] : []),
          ],
        },
      ),
    );
  }
  return corners.all.every((one) => !Number.isNaN(one.stallLoad));
}

/** As the result is written everywhere: what the wing carries is cut, its warning is rounded up. */
function result(name: ResultName): (value: number, more: number) => string {
  return (value, more) => formatResultValue(name, value, more);
}

function isStalled(corner: Corner): boolean {
  return corner.stallLoad < corner.load * (1 - ALLOWANCE);
}

function checkStalled(checking: Checking): boolean {
  const { point, evaluated } = checking;
  const { corners } = evaluated;
  const worst = leastAt(corners.all, (one) => one.stallLoad - one.load);
  if (!isStalled(worst)) return false;
  const lead = isStalled(corners.nominal) ? "Stalled: " : "Stalled at the worst of the tolerances: ";
  const [has, needs] = formatDistinct(worst.stallLoad, worst.load, result("stall-load"), formatLoad);
  const past = worst.carriesMoreSlower;
  const stall = Number.isNaN(worst.stall) || worst.stall === 0 ? "" : formatResultValue("stall", worst.stall);
  const speed = past
    ? `, for at ${formatMach(worst.mach)} it carries less than slower`
    : stall && `; the stall comes at ${stall}`;
  tell(
    checking,
    "stalled",
    clauseFor(point, "speed"),
    `${lead}at ${formatSpeed(worst.cas)} the wing carries ${has} g and the point needs ${needs} g${speed}. Fly ${past ? "slower or lower" : "faster"}, bank less or fly lighter.`,
    {
      severity: exerciseSeverity(point, "stalled"),
      related: carriedFrom(point, ["speed", "mass", "config"]),
    },
  );
  return true;
}

/** The shear is what may come, not what is flown: one step lower than a stall in the state that is. */
function checkStalledAfterShear(checking: Checking): void {
  const { point, evaluated } = checking;
  const { shear } = evaluated.ready.extras;
  if (shear === null) return;
  const lost = formatSpeed(shear);
  const at = point.clauses.shear?.placed ?? point.phaseClause;
  const details = {
    severity: oneStepLower(exerciseSeverity(point, "stalled")),
    related: carriedFrom(point, ["speed", "mass", "config"]),
  };
  const way = "fly faster, bank less or fly lighter.";
  if (!evaluated.sheared) {
    tell(checking, "stalled", at, `After the shear of ${lost} no airspeed is left: ${way}`, details);
    return;
  }
  const worst = leastAt(evaluated.sheared.all, (one) => one.stallLoad - one.load);
  if (!isStalled(worst)) return;
  const [has, needs] = formatDistinct(worst.stallLoad, worst.load, result("stall-load"), formatLoad);
  tell(
    checking,
    "stalled",
    at,
    `After the shear of ${lost} it is stalled: at ${formatSpeed(worst.cas)} the wing carries ${has} g and the point needs ${needs} g: ${way}`,
    details,
  );
}

function isWarned(corner: Corner): boolean {
  return corner.cas <= corner.warning * (1 + ALLOWANCE);
}

function checkWarning(checking: Checking): void {
  const { point, evaluated } = checking;
  const { corners, ready } = evaluated;
  if (ready.frame.warning === null) return;
  const worst = leastAt(corners.all, (one) => one.cas - one.warning);
  if (!isWarned(worst)) return;
  const lead = isWarned(corners.nominal) ? "" : "With the tolerances, ";
  const flown = formatSpeed(worst.cas);
  const warning = formatResultValue("warning", worst.warning);
  const text =
    flown === warning
      ? `The warning comes at the ${flown} that are flown`
      : `The warning comes at ${warning} and ${flown} is flown`;
  tell(
    checking,
    "warning-in-turn",
    clauseFor(point, "speed"),
    `${lead ? lead + text.charAt(0).toLowerCase() + text.slice(1) : text}, at a load factor of ${formatLoad(worst.load)}: fly faster or bank less.`,
    {
      severity: exerciseSeverity(point, "warning-in-turn"),
      related: carriedFrom(point, ["speed", "mass", "config"]),
    },
  );
}

/** A sensor does not know that the wing is dirty: the stall may come first, or with no warning at all. */
function checkStallBeforeWarning(checking: Checking): void {
  const { point, evaluated } = checking;
  const { corners } = evaluated;
  const worst = leastAt(corners.all, (one) => one.warning - one.stall);
  if (!(worst.warning <= worst.stall * (1 + ALLOWANCE)) || worst.stall === 0) return;
  const { liftLoss } = worst.input;
  const lead = 0 < liftLoss ? `With ${formatPercent(liftLoss)} of the maximum lift lost, the` : "The";
  tell(
    checking,
    "stall-before-warning",
    clauseFor(point, "contamination"),
    `${lead} ${bothSpeeds(worst.stall, worst.warning)}: do not rely on the warning, and fly faster.`,
    { related: carriedFrom(point, ["contamination"]) },
  );
}

/** A warning that comes no sooner than the stall never reads as coming sooner, which it may where it is rounded up. */
function bothSpeeds(stall: number, warning: number): string {
  const rounded = formatDistinct(stall, warning, result("stall"), result("warning"));
  const flips = Number.parseFloat(rounded[0]) < Number.parseFloat(rounded[1]);
  const [one, other] = flips ? formatDistinct(stall, warning, result("stall")) : rounded;
  return one === other
    ? `stall and its warning both come at ${formatSpeed(stall)}, too late`
    : `stall comes at ${one} and the warning at ${other}, too late`;
}

function checkBuffet(checking: Checking): readonly NotEvaluated[] {
  const { point, evaluated } = checking;
  const { corners, ready } = evaluated;
  if (!ready.frame.buffet) return [];
  const skipped = buffetUnknown(checking, ready.frame.buffet.table);
  if (corners.all.every((one) => Number.isNaN(one.buffetLoad))) return skipped;
  const known = corners.all.filter((one) => !Number.isNaN(one.buffetLoad));
  const worst = leastAt(known, (one) => one.buffetLoad - one.load);
  if (!(worst.buffetLoad < worst.load * (1 - ALLOWANCE))) return skipped;
  const [onset, load] = formatDistinct(worst.buffetLoad, worst.load, result("buffet-load"), formatLoad);
  tell(
    checking,
    "buffet-in-turn",
    clauseFor(point, "bank"),
    `Buffet begins at a load factor of ${onset} and ${load} is flown: bank less, fly lower or lighter.`,
    {
      severity: exerciseSeverity(point, "buffet-in-turn"),
      related: carriedFrom(point, ["altitude", "mass"]),
    },
  );
  return skipped;
}

/**
 * Beyond the table's last Mach number nobody knows where buffet begins, and that is told. Below its
 * first the wing stalls before it buffets, which is checked; there it is only listed.
 */
function buffetUnknown(checking: Checking, table: Table): readonly NotEvaluated[] {
  const { point, evaluated } = checking;
  const { corners, ready } = evaluated;
  if (!corners.all.some((one) => Number.isNaN(one.buffetLoad))) return [];
  const why =
    evaluated.absent("buffet-load") ?? "The card's buffet table does not reach all of the tolerances.";
  const last = table.arguments[table.arguments.length - 1] ?? Number.NaN;
  const beyond = corners.all.some((one) => Number.isNaN(one.buffetLoad) && last < one.mach);
  if (beyond && ready.liftLoss.high === 0) {
    const related = ready.configuration.buffet
      ? [{ origin: ready.configuration.buffet.origin, message: "The card's buffet table." }]
      : [];
    tell(
      checking,
      "not-evaluated",
      point.phaseClause,
      `Whether the turn buffets could not be checked. ${why}`,
      { severity: "warning", related: [...related, ...carriedFrom(point, ["speed", "altitude"])] },
    );
  }
  return [{ rule: "buffet-in-turn", why }];
}

/** A stated load below what the bank needs in steady flight is a push-over; outside an exercise that is seldom meant. */
function checkUnloading(checking: Checking): void {
  const { point, evaluated } = checking;
  const { load } = point.clauses;
  const { nominal } = evaluated.corners;
  if (!load || !evaluated.conditions.loadStated || !(nominal.bank < Math.PI / 2)) return;
  const steady = loadFactor(nominal.bank, nominal.path);
  if (steady === null || !(nominal.load < steady * (1 - ALLOWANCE))) return;
  const [flown, needed] = formatDistinct(nominal.load, steady, formatLoad);
  tell(
    checking,
    "load-below-bank",
    load.placed,
    `The load factor ${flown} is less than the ${needed} that a steady turn at ${formatBank(nominal.bank)} of bank needs, so the path curves down: check the load.`,
    point.phase === "manoeuvre" ? { severity: "information" } : {},
  );
}
