import { applyAccepts } from "./accepts.ts";
import type { Point } from "./evaluateStated.ts";
import { applyExpects } from "./expects.ts";
import type { Acceptance, Finding } from "./finding.ts";
import type { Expectation } from "./point.ts";

export interface Reviewed {
  readonly findings: readonly Finding[];
  readonly accepted: readonly Acceptance[];
  readonly expected: readonly Expectation[];
}

/** What a point found, with what its note accepts and expects of it. */
export function review(point: Point, found: readonly Finding[], hasFigures: boolean): Reviewed {
  const { accepts, expects } = point.clauses;
  if (accepts.length + expects.length === 0) return { findings: found, accepted: none, expected: none };
  const taken = applyAccepts(point, found, hasFigures);
  const { findings, told, expected } = applyExpects(point, taken.findings, hasFigures);
  return {
    findings: [...findings, ...taken.told, ...told],
    accepted: findings.flatMap((one) => one.accepted ?? []),
    expected,
  };
}

const none: readonly never[] = [];
