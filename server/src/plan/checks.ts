import type { PlacedClause } from "../notation/block.ts";
import type { Keyword } from "../notation/vocabulary.ts";
import type { Corner } from "./corner.ts";
import type { Evaluated } from "./evaluated.ts";
import type { Point } from "./evaluateStated.ts";
import { checkDeceleration, checkHolding } from "./exerciseChecks.ts";
import type { Finding, Related, Severity } from "./finding.ts";
import { catalogue, type FindingCode } from "./findings.ts";
import { checkGust } from "./gustChecks.ts";
import { checkAirframeLimits } from "./limitChecks.ts";
import type { Origin } from "./origin.ts";
import { checkRules, type RuleOutcome } from "./ruleChecks.ts";
import { checkSafety } from "./safetyChecks.ts";
import { type Details, findingAt, oneStepLower } from "./site.ts";
import { type CarriedKey, keywordOf } from "./state.ts";
import { checkState } from "./stateChecks.ts";

/** Everything a check reads, and where it puts what it finds. */
export interface Checking {
  readonly point: Point;
  readonly evaluated: Evaluated;
  readonly findings: Finding[];
}

/** Holds a point against its checks and its limits. A point without figures is held against what needs none. */
export function checkPoint(point: Point, evaluated: Evaluated | null, findings: Finding[]): RuleOutcome {
  checkState(point, findings);
  if (!evaluated) return { rows: [], off: [], notEvaluated: [] };
  const checking: Checking = { point, evaluated, findings };
  const skipped = checkAirframeLimits(checking);
  skipped.push(...checkSafety(checking));
  skipped.push(...checkGust(checking));
  checkDeceleration(checking);
  checkHolding(checking);
  const rules = checkRules(checking);
  return skipped.length > 0 ? { ...rules, notEvaluated: [...rules.notEvaluated, ...skipped] } : rules;
}

/** Where the quantity is stated: its clause in this block, else the phase clause. */
export function clauseFor(point: Point, keyword: Keyword): PlacedClause {
  const { clauses, phaseClause } = point;
  switch (keyword) {
    case "weight":
      return (clauses.weight ?? clauses.burn)?.placed ?? phaseClause;
    case "config":
      return clauses.config?.placed ?? phaseClause;
    case "altitude":
      return clauses.altitude?.placed ?? phaseClause;
    case "speed":
      return clauses.speed?.placed ?? phaseClause;
    case "bank":
      return clauses.bank?.placed ?? phaseClause;
    case "load":
      return (clauses.load ?? clauses.bank)?.placed ?? phaseClause;
    case "gust":
      return clauses.gust?.placed ?? phaseClause;
    case "contamination":
      return clauses.contamination?.placed ?? phaseClause;
    default:
      return phaseClause;
  }
}

/** The line a carried quantity came from, where this block does not state it. */
export function carriedFrom(point: Point, keys: readonly CarriedKey[]): Related[] {
  const related: Related[] = [];
  for (const key of keys) {
    // The block's own speed is applied only after the point: until then the state holds the one before it.
    if (key === "speed" && point.clauses.speed) continue;
    const origin: Origin | undefined = point.applied.carried[key]?.origin;
    if (origin && origin.block !== point.site.anchor) {
      related.push({ origin, message: `The ${keywordOf[key]} was stated here.` });
    }
  }
  return related;
}

/** A finding of the plan at the clause that states the quantity. */
export function tell(
  { findings }: Pick<Checking, "findings">,
  code: FindingCode,
  at: PlacedClause,
  message: string,
  details: Details = {},
): void {
  findings.push(findingAt(code, at, message, details));
}

/** In `manoeuvre` the stall is the exercise: what warns of it is one step lower. */
export function exerciseSeverity(point: Point, code: FindingCode): Severity {
  const { severity } = catalogue[code];
  return point.phase === "manoeuvre" ? oneStepLower(severity) : severity;
}

/** The corner where a figure is least, among those where it is known. */
export function leastAt(corners: readonly Corner[], figure: (corner: Corner) => number): Corner {
  let found = corners[0] as Corner;
  for (const one of corners) {
    if (figure(one) < figure(found) || Number.isNaN(figure(found))) found = one;
  }
  return found;
}

/** "With its tolerance", where the nominal figure alone would pass. */
export function byTolerance(nominalPasses: boolean): string {
  return nominalPasses ? "With the tolerances, " : "";
}

/** A sentence begins with a capital also where something stands before it. */
export function sentence(before: string, text: string): string {
  return before ? before + text.charAt(0).toLowerCase() + text.slice(1) : text;
}
