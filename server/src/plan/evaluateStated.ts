import type { PlacedClause } from "../notation/block.ts";
import type { Phase } from "../notation/vocabulary.ts";
import { airframeOf, cgFactorAt } from "./airframe.ts";
import type { Card, Configuration } from "./card.ts";
import { type Applied, applyClauses, codeAt, textCode } from "./carry.ts";
import { checkPoint } from "./checks.ts";
import { type Clauses, intendedKeyword } from "./clauses.ts";
import { commonPractice } from "./commonPractice.ts";
import type { Airframe, CornerProblem } from "./corner.ts";
import { type Corners, evaluateCorners } from "./corners.ts";
import type { Definitions } from "./definitions.ts";
import { type Evaluated, evaluated as evaluate, pointInputs } from "./evaluated.ts";
import { type Extras, readExtras } from "./extras.ts";
import type { Finding } from "./finding.ts";
import { configurationNamed, loadWithoutSpeed, readTurn, type TurnInputs } from "./inputs.ts";
import { findMissing } from "./missing.ts";
import { unknownConfiguration } from "./names.ts";
import { onePerCode } from "./onePerCode.ts";
import type { Origin } from "./origin.ts";
import type { Withheld } from "./point.ts";
import type { RuleOutcome } from "./ruleChecks.ts";
import { findingAt, originOf, type PlanSite, type Site } from "./site.ts";
import { type Air, airOf, isUnknown } from "./situation.ts";
import { type ResolvedSpeed, resolveSpeed, type SpeedSetting } from "./speed.ts";
import { exactly, type Spread } from "./spread.ts";
import type { AppliedLimits, Carried, CarriedKey, CarriedState, FlownSpeed, State } from "./state.ts";

/** What reached a point, and all that was read of it. */
export interface Point {
  readonly site: PlanSite;
  readonly clauses: Clauses;
  readonly phaseClause: PlacedClause;
  readonly phase: Phase | null;
  readonly applied: Applied;
  readonly limits: AppliedLimits;
}

/** What the figures are computed from, once everything is known. */
export interface Ready {
  readonly card: Card;
  readonly configuration: Configuration;
  readonly frame: Airframe;
  readonly turn: TurnInputs;
  readonly air: Air;
  readonly mass: Spread;
  readonly liftLoss: Spread;
  readonly cgFactor: Spread;
  readonly power: Spread | null;
  readonly extras: Extras;
  readonly speed: ResolvedSpeed;
}

/** What a point starts from. */
export interface Setting {
  readonly site: PlanSite;
  readonly definitions: Definitions;
  readonly before: State;
}

/** A point with one value for everything: its figures and what was found of them. */
export interface StatedPoint {
  readonly point: Point;
  readonly evaluated: Evaluated | null;
  readonly rules: RuleOutcome;
  readonly withheld: Withheld | null;
  /** One of a code; nothing is accepted or expected yet, and no claim is held. */
  readonly findings: readonly Finding[];
  readonly after: State;
}

/** Evaluates a point whose clauses each state one value. A clause that is still open gives none. */
export function evaluateStated({ site, definitions, before }: Setting, clauses: Clauses): StatedPoint {
  const applied = applyClauses(site, clauses, definitions, before);
  const findings: Finding[] = [...applied.findings];
  const phaseClause = clauses.phase?.placed ?? phaseOf(site);
  const point: Point = {
    site,
    clauses,
    phaseClause,
    phase: clauses.phase?.body.phase ?? null,
    applied,
    limits: applied.carried.limits?.value ?? { name: commonPractice().name, limits: commonPractice() },
  };
  const missing = findMissing(point, before, findings);
  const turn = readTurn(clauses, findings);
  const extras = readExtras(clauses, findings);
  const ready = prepare(point, turn, extras, findings);
  const withheld = ownError(point) ?? missing.withheld ?? ("withheld" in ready ? ready.withheld : null);
  const corners = !withheld && !("withheld" in ready) ? cornersOf(point, ready, findings) : null;
  const evaluated = corners && !("withheld" in ready) ? evaluate(point, ready, corners) : null;
  const stopped = evaluated ? null : (withheld ?? blame(site, phaseClause, findings));
  const rules = checkPoint(point, evaluated, findings);
  return {
    point,
    evaluated,
    rules,
    withheld: stopped,
    findings: onePerCode(findings),
    after: clauses.aside ? before : stateAfter(point, before, missing.told, evaluated, ready, findings),
  };
}

/** A point whose phase is not understood is still one; its block has the clause. */
function phaseOf(site: Site): PlacedClause {
  const { clauses } = site.block;
  return (clauses.find((placed) => intendedKeyword(placed) === "phase") ?? clauses[0]) as PlacedClause;
}

/** Clauses of the point itself that keep it from being computed when they are in error. */
const needed = new Set(["bank", "path", "load", "phase", "engine-out"]);

function ownError(point: Point): Withheld | null {
  const { site, clauses } = point;
  for (const placed of clauses.spoiled) {
    const keyword = placed.clause.keyword;
    if (keyword === null || needed.has(keyword)) {
      return { origin: originOf(site, placed), code: textCode(site, placed) ?? "unexpected-text" };
    }
  }
  return null;
}

/** Where no other reason is known, the point's own first error is it. */
function blame(site: Site, phaseClause: PlacedClause, findings: readonly Finding[]): Withheld {
  const finding = findings.find((one) => one.severity === "error" || one.severity === "warning");
  const origin: Origin = finding
    ? { uri: site.uri, block: site.anchor, line: finding.line, span: finding.span }
    : originOf(site, phaseClause);
  return { origin, code: finding?.code ?? "missing-value" };
}

const computedFrom: readonly CarriedKey[] = [
  "aircraft",
  "mass",
  "config",
  "altitude",
  "qnh",
  "deviation",
  "cg",
  "contamination",
  "engineOut",
];

/** Brings together what the figures need, or says what is in the way. */
function prepare(
  point: Point,
  turn: TurnInputs | null,
  extras: Extras,
  findings: Finding[],
): Ready | { readonly withheld: Withheld | null; readonly speed: ResolvedSpeed | null } {
  const { carried } = point.applied;
  const unknown = firstUnknown(carried);
  const card = carried.aircraft?.value?.card ?? null;
  const config = carried.config;
  const configuration = card && config?.value ? configurationNamed(card, config.value) : null;
  let withheld = unknown;
  if (card && config?.value && !configuration) {
    const placed = point.clauses.config?.placed ?? point.phaseClause;
    findings.push(unknownConfiguration(card, placed, config.value));
    withheld ??= { origin: originOf(point.site, placed), code: "unknown-config" };
  }
  const frame = card && configuration ? airframeOf(card, configuration) : null;
  if (card && configuration && !frame)
    withheld ??= { origin: configuration.origin, code: "broken-definition" };
  const air = airOf(carried);
  if (!air && carried.altitude?.value && !isUnknown(carried.qnh) && !isUnknown(carried.deviation)) {
    withheld ??= outsideAtmosphere(point, findings);
  }
  const cgFactor = card ? cgFactorAt(card, carried.cg?.value ?? null) : null;
  if (card && !cgFactor && !isUnknown(carried.cg)) withheld ??= outsideCg(point, card, findings);
  const mass = carried.mass?.value ?? null;
  const liftLoss = carried.contamination ? (carried.contamination.value?.loss ?? null) : exactly(0);
  const complete = card && configuration && frame && air && cgFactor && mass && liftLoss;
  const setting: SpeedSetting | null =
    complete && turn
      ? {
          card,
          configuration,
          frame,
          air,
          mass: mass.nominal,
          liftLoss: liftLoss.nominal,
          cgFactor: cgFactor.nominal,
          load: loadWithoutSpeed(turn),
        }
      : null;
  const speed = speedOf(point, setting, findings);
  if (!complete || !turn || !speed || withheld) return { withheld: withheld ?? unknownSpeed(carried), speed };
  const power = carried.power?.value ?? null;
  return { card, configuration, frame, turn, extras, air, mass, liftLoss, cgFactor, power, speed };
}

function firstUnknown(carried: CarriedState): Withheld | null {
  for (const key of computedFrom) {
    // A flight level does not lean on the qnh.
    if (key === "qnh" && carried.altitude?.value?.flightLevel) continue;
    const one: Carried<unknown> | undefined = carried[key];
    if (one && (one.value === null || one.unknown !== null)) {
      return { origin: one.origin, code: one.unknown ?? "missing-value" };
    }
  }
  return null;
}

function unknownSpeed(carried: CarriedState): Withheld | null {
  const speed = carried.speed;
  return speed && speed.value === null
    ? { origin: speed.origin, code: speed.unknown ?? "missing-value" }
    : null;
}

function speedOf(point: Point, setting: SpeedSetting | null, findings: Finding[]): ResolvedSpeed | null {
  const { clauses, applied } = point;
  if (clauses.speed) return resolveSpeed(clauses.speed, setting, findings);
  const flown = applied.carried.speed?.value;
  return flown ? { kind: flown.kind, value: flown.speed } : null;
}

function outsideAtmosphere(point: Point, findings: Finding[]): Withheld {
  const placed = point.clauses.altitude?.placed ?? point.phaseClause;
  findings.push(
    findingAt(
      "out-of-range",
      placed,
      "With this qnh and temperature the altitude lies outside -5000 ft to 20 000 m of pressure altitude, where the atmosphere is not modelled: check them.",
    ),
  );
  return { origin: originOf(point.site, placed), code: "out-of-range" };
}

function outsideCg(point: Point, card: Card, findings: Finding[]): Withheld {
  const placed = point.clauses.cg?.placed ?? point.phaseClause;
  const origin = originOf(point.site, placed);
  if (card.cgEffect && !card.cgEffect.value)
    return { origin: card.cgEffect.origin, code: "broken-definition" };
  findings.push(
    findingAt(
      "outside-table",
      placed,
      `The cg lies outside the cg-effect table of ${card.name}, which is never extrapolated: check it, or extend the table.`,
      card.cgEffect
        ? { related: [{ origin: card.cgEffect.origin, message: "The card's cg-effect table." }] }
        : {},
    ),
  );
  return { origin, code: "outside-table" };
}

function cornersOf(point: Point, ready: Ready, findings: Finding[]): Corners | null {
  const corners = evaluateCorners(ready.frame, pointInputs(ready));
  if (typeof corners !== "string") return corners;
  findings.push(cornerFinding(point, ready, corners));
  return null;
}

function cornerFinding(point: Point, ready: Ready, problem: CornerProblem): Finding {
  const { clauses, phaseClause } = point;
  const speedAt = clauses.speed?.placed ?? phaseClause;
  switch (problem) {
    case "atmosphere":
      return findingAt(
        "out-of-range",
        clauses.altitude?.placed ?? phaseClause,
        "With its tolerance the altitude or the temperature leaves the atmosphere that is modelled (-5000 ft to 20 000 m): check them.",
      );
    case "speed":
      return findingAt(
        "out-of-range",
        speedAt,
        "At this altitude the speed is not below the speed of sound, where nothing is computed: check it.",
      );
    case "ias":
      return findingAt(
        ready.frame.ias ? "outside-table" : "missing-value",
        speedAt,
        ready.frame.ias
          ? `The indicated speed lies outside the ias table of ${ready.configuration.name}, which is never extrapolated, or depends on a load that depends on it: state the calibrated speed.`
          : `${ready.card.name} has no ias table for ${ready.configuration.name}, so an indicated speed is not known: state the calibrated speed.`,
      );
    case "path":
      return findingAt(
        "out-of-range",
        clauses.path?.placed ?? phaseClause,
        "The path is steeper than the speed can fly: check it.",
      );
    case "bank":
      return findingAt(
        "missing-value",
        clauses.bank?.placed ?? phaseClause,
        "From 90° of bank no bank alone gives the load: state it with `load`.",
      );
  }
}

/** The state that goes on. The speed goes on as it was flown, never as the expression that gave it. */
function stateAfter(
  point: Point,
  before: State,
  told: State["told"],
  evaluated: Evaluated | null,
  ready: Ready | { readonly speed: ResolvedSpeed | null },
  findings: readonly Finding[],
): State {
  const { applied, clauses, phase, site } = point;
  let carried = applied.carried;
  if (clauses.speed) {
    const flown = flownSpeed(ready.speed, evaluated);
    const origin = originOf(site, clauses.speed.placed);
    const speed: Carried<FlownSpeed> = {
      value: flown,
      origin,
      unknown: flown ? null : codeAt(findings, clauses.speed.placed),
      phase,
    };
    carried = { ...carried, speed };
  }
  const landed = phase === "landing" || (phase !== "takeoff" && before.landed);
  // What a landing itself states is of the sector that ends there.
  const sinceLanding = landed && phase !== "landing" ? applied.sinceLanding : [];
  return { carried, landed, sinceLanding, told };
}

function flownSpeed(speed: ResolvedSpeed | null, evaluated: Evaluated | null): FlownSpeed | null {
  if (!speed) return null;
  if (speed.kind === "mach" || speed.kind === "cas") return { kind: speed.kind, speed: speed.value };
  return evaluated ? { kind: "cas", speed: evaluated.conditions.cas } : null;
}
