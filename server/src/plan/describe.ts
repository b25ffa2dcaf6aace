import type { Keyword, ResultName } from "../notation/vocabulary.ts";
import { absentChecks } from "./absentChecks.ts";
import { evaluateCorners } from "./corners.ts";
import { checksMade } from "./coverage.ts";
import { type Evaluated, evaluated, pointInputs } from "./evaluated.ts";
import type { Point, Ready, StatedPoint } from "./evaluateStated.ts";
import { referenceSpeeds } from "./figures.ts";
import { type FurtherFigures, furtherFigures } from "./further.ts";
import type { Origin } from "./origin.ts";
import type { Assumption, ClaimResult, PointResult, Solved, SweepResult, Withheld } from "./point.ts";
import { resultNames } from "./results.ts";
import type { Reviewed } from "./review.ts";
import type { RuleOutcome } from "./ruleChecks.ts";
import { originOf } from "./site.ts";
import { type CarriedKey, keywordOf } from "./state.ts";

/** What a point asked for and got, beside its own figures. */
export interface Open {
  readonly solved: Solved | null;
  readonly sweep: SweepResult | null;
}

/** Puts a point's result together. What only a hover or a table asks for is worked out when it is asked for. */
export function describePoint(
  stated: StatedPoint,
  claims: readonly ClaimResult[],
  reviewed: Reviewed,
  open: Open,
): PointResult {
  return new DescribedPoint(stated, claims, reviewed, open);
}

const noReferences = { v2min: null, vfto: null, vref: null };

class DescribedPoint implements PointResult {
  readonly #point: Point;
  readonly #ready: Ready | null;
  readonly #rules: RuleOutcome;
  readonly #reviewed: Reviewed;
  readonly #open: Open;
  #figures: Evaluated | null = null;
  #further: FurtherFigures | null = null;
  readonly claims: readonly ClaimResult[];
  readonly withheld: Withheld | null;

  constructor(stated: StatedPoint, claims: readonly ClaimResult[], reviewed: Reviewed, open: Open) {
    this.#point = stated.point;
    // The figures themselves are let go: see below.
    this.#ready = stated.evaluated?.ready ?? null;
    this.#rules = stated.rules;
    this.#reviewed = reviewed;
    this.#open = open;
    this.claims = claims;
    this.withheld = stated.withheld;
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
    return this.#rules.rows;
  }
  get rowsOff() {
    return this.#rules.off;
  }
  get bankLimit() {
    return this.#bankRow("must");
  }
  get bankAdvice() {
    return this.#bankRow("should");
  }
  get notEvaluated() {
    if (!this.#ready) return this.#rules.notEvaluated;
    const { card, configuration } = this.#ready;
    return [...this.#rules.notEvaluated, ...absentChecks(card, configuration)];
  }
  get heldChecks() {
    if (!this.#ready) return [];
    const missed = new Set(this.notEvaluated.flatMap(({ rule }) => rule.split(", ")));
    const found = new Set<string>(this.findings.map(({ code }) => code));
    // Past the stall nobody asks for its warning any more.
    if (found.has("stalled")) found.add("warning-in-turn");
    return checksMade(this.#point, this.#ready).filter((code) => !missed.has(code) && !found.has(code));
  }
  get further() {
    if (this.#evaluated) this.#further ??= furtherFigures(this.#evaluated, this.rows);
    return this.#further;
  }
  get findings() {
    return this.#reviewed.findings;
  }
  get accepted() {
    return this.#reviewed.accepted;
  }
  get expected() {
    return this.#reviewed.expected;
  }
  get solved() {
    return this.#open.solved;
  }
  get sweep() {
    return this.#open.sweep;
  }
  get assumed() {
    return assumptions(this.#point, this.#evaluated);
  }
  get inputs() {
    return inputOrigins(this.#point);
  }

  #bankRow(verb: "must" | "should") {
    return this.#rules.rows.find((one) => one.row.subject === "bank" && one.row.verb === verb) ?? null;
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
  if (!carried.power) assumed.push("power off");
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
  for (const keyword of ["speed", "bank", "path", "load", "gust", "shear", "decel"] as const) {
    const read = clauses[keyword];
    if (read) origins.set(keyword, originOf(site, read.placed));
  }
  return origins;
}
