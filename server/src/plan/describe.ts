import type { Keyword, ResultName } from "../notation/vocabulary.ts";
import { whyAbsent } from "./absent.ts";
import { absentChecks } from "./absentChecks.ts";
import type { Held } from "./checks.ts";
import { conditionsOf } from "./conditions.ts";
import { type Corners, evaluateCorners, type PointInputs } from "./corners.ts";
import type { Point, Ready } from "./evaluatePoint.ts";
import { type References, type Results, referenceSpeeds, referencesOf, resultsOf } from "./figures.ts";
import type { Finding } from "./finding.ts";
import type { Origin } from "./origin.ts";
import type { Assumption, Conditions, PointResult, Withheld } from "./point.ts";
import { resultNames } from "./results.ts";
import { originOf } from "./site.ts";
import { type CarriedKey, keywordOf } from "./state.ts";

/** A point whose figures could be computed. */
export interface Evaluated {
  readonly ready: Ready;
  readonly corners: Corners;
  readonly conditions: Conditions;
  readonly results: Results;
  references(): References;
  /** Why a result is not known, as a sentence; null where it is. */
  absent(name: ResultName | "ias"): string | null;
}

export function evaluated(point: Point, ready: Ready, corners: Corners): Evaluated {
  return new EvaluatedPoint(point, ready, corners);
}

class EvaluatedPoint implements Evaluated {
  readonly #point: Point;
  readonly ready: Ready;
  readonly corners: Corners;
  #conditions: Conditions | null = null;
  #results: Results | null = null;
  #references: References | null = null;

  constructor(point: Point, ready: Ready, corners: Corners) {
    this.#point = point;
    this.ready = ready;
    this.corners = corners;
  }

  get conditions(): Conditions {
    this.#conditions ??= conditionsOf(this.#point, this.ready, this.corners);
    return this.#conditions;
  }

  get results(): Results {
    this.#results ??= resultsOf(this.corners, () => this.references());
    return this.#results;
  }

  references(): References {
    this.#references ??= referencesOf(this.ready);
    return this.#references;
  }

  absent(name: ResultName | "ias"): string | null {
    return whyAbsent(this, name);
  }
}

/** The inputs of a point's corners. */
export function pointInputs(ready: Ready): PointInputs {
  return {
    mass: ready.mass,
    pressureAltitude: ready.air.pressureAltitude,
    deviation: ready.air.deviation,
    air: ready.air.nominal,
    speed: ready.speed,
    bank: ready.turn.bank,
    path: ready.turn.path,
    load: ready.turn.load,
    liftLoss: ready.liftLoss,
    cgFactor: ready.cgFactor,
  };
}

/** Puts a point's result together. What only a hover or a table asks for is worked out when it is asked for. */
export function describePoint(
  point: Point,
  ready: Ready | null,
  held: Held,
  withheld: Withheld | null,
  findings: readonly Finding[],
): PointResult {
  return new DescribedPoint(point, ready, held, withheld, findings);
}

const noReferences = { v2min: null, vfto: null, vref: null };

class DescribedPoint implements PointResult {
  readonly #point: Point;
  readonly #ready: Ready | null;
  #figures: Evaluated | null = null;
  readonly #held: Held;
  readonly withheld: Withheld | null;
  readonly findings: readonly Finding[];

  constructor(
    point: Point,
    ready: Ready | null,
    held: Held,
    withheld: Withheld | null,
    findings: readonly Finding[],
  ) {
    this.#point = point;
    this.#ready = ready;
    this.#held = held;
    this.withheld = withheld;
    this.findings = findings;
  }

  /**
   * The figures, worked out again when somebody first looks at the point: kept for every point of a
   * long note they would cost more memory and time than they take to compute.
   */
  get #evaluated(): Evaluated | null {
    if (!this.#figures && this.#ready) {
      const corners = evaluateCorners(this.#ready.frame, pointInputs(this.#ready));
      // The same inputs gave corners before, so they do again.
      if (typeof corners !== "string") this.#figures = evaluated(this.#point, this.#ready, corners);
    }
    return this.#figures;
  }

  get block() {
    return this.#point.site.block;
  }
  get phase() {
    return this.#point.phase;
  }
  get title() {
    return this.#point.clauses.phase?.body.title?.text ?? null;
  }
  get aside() {
    return this.#point.clauses.aside;
  }
  get emergency() {
    return this.#point.clauses.emergency !== null;
  }
  get aircraft() {
    return this.#point.applied.carried.aircraft?.value?.name ?? null;
  }
  get card() {
    return this.#point.applied.carried.aircraft?.value?.card ?? null;
  }
  get configuration() {
    return this.#evaluated?.ready.configuration ?? null;
  }
  get limitsName() {
    return this.#point.limits.name;
  }
  get limits() {
    return this.#point.limits.limits;
  }
  get rules() {
    return this.#point.applied.carried.rules?.value ?? null;
  }
  get conditions() {
    return this.#evaluated?.conditions ?? null;
  }
  get results() {
    return this.#evaluated?.results ?? null;
  }
  get reference() {
    return this.#evaluated ? referenceSpeeds(this.#evaluated.references()) : noReferences;
  }
  get absent() {
    const reasons: Partial<Record<ResultName | "ias", string>> = {};
    if (!this.#evaluated) return reasons;
    for (const name of everyResult) {
      const why = this.#evaluated.absent(name);
      if (why !== null) reasons[name] = why;
    }
    return reasons;
  }
  get rows() {
    return this.#held.rows;
  }
  get rowsOff() {
    return this.#held.off;
  }
  get bankLimit() {
    return this.#bankRow("must");
  }
  get bankAdvice() {
    return this.#bankRow("should");
  }
  get claims() {
    return this.#held.claims;
  }
  get notEvaluated() {
    if (!this.#evaluated) return this.#held.notEvaluated;
    const { card, configuration } = this.#evaluated.ready;
    return [...this.#held.notEvaluated, ...absentChecks(card, configuration)];
  }
  get assumed() {
    return assumptions(this.#point, this.#evaluated);
  }
  get inputs() {
    return inputOrigins(this.#point);
  }

  #bankRow(verb: "must" | "should") {
    return this.#held.rows.find((one) => one.row.subject === "bank" && one.row.verb === verb) ?? null;
  }
}

const everyResult: readonly (ResultName | "ias")[] = [...resultNames, "ias"];

/** What was taken without being stated, in the order it is read out. */
function assumptions(point: Point, evaluated: Evaluated | null): readonly Assumption[] {
  const { clauses, applied } = point;
  const { carried } = applied;
  const assumed: Assumption[] = [];
  if (!clauses.bank) assumed.push("wings level");
  if (!clauses.path) assumed.push("level flight");
  if (!carried.deviation) assumed.push("ISA");
  if (!carried.contamination) assumed.push("no contamination");
  if (!carried.cg && carried.aircraft?.value?.card?.cgEffect) assumed.push("worst cg");
  assumed.push("power off");
  if (!carried.engineOut) assumed.push("all engines");
  const altitude = carried.altitude?.value;
  if (evaluated && altitude && !altitude.flightLevel && !carried.qnh) assumed.push("pressure altitude");
  return assumed;
}

/** Where each input in force was written. */
function inputOrigins(point: Point): ReadonlyMap<Keyword, Origin> {
  const { applied, clauses, site } = point;
  const origins = new Map<Keyword, Origin>();
  for (const key of Object.keys(keywordOf) as CarriedKey[]) {
    const carried = applied.carried[key];
    if (carried) origins.set(keywordOf[key], carried.origin);
  }
  for (const keyword of ["speed", "bank", "path", "load"] as const) {
    const read = clauses[keyword];
    if (read) origins.set(keyword, originOf(site, read.placed));
  }
  return origins;
}
