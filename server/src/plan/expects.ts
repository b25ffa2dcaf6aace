import { isAcceptable } from "./accepts.ts";
import type { Point } from "./evaluateStated.ts";
import type { Finding } from "./finding.ts";
import type { FindingCode } from "./findings.ts";
import type { Expectation } from "./point.ts";
import { findingAt } from "./site.ts";

/** Findings beyond those that can be accepted which an exercise may be about. */
const exercised = new Set<FindingCode>([
  "no-level-flight",
  "over-load-limit",
  "over-vne",
  "contaminated-takeoff",
  "stalled",
  "no-solution",
]);

export interface Expected {
  readonly findings: readonly Finding[];
  readonly told: readonly Finding[];
  readonly expected: readonly Expectation[];
}

/** Holds what an exercise expects against what came: the finding must come, or must not. */
export function applyExpects(point: Point, found: readonly Finding[], hasFigures: boolean): Expected {
  const { expects } = point.clauses;
  if (expects.length === 0) return { findings: found, told: [], expected: [] };
  const findings = [...found];
  const told: Finding[] = [];
  const expected = expects.map(({ placed, body }): Expectation => {
    const code = body.code as FindingCode;
    const fail = (message: string, of?: Finding) =>
      told.push({
        ...findingAt("not-as-expected", placed, message),
        ...(of?.mentions ? { mentions: of.mentions } : {}),
      });
    if (!body.not && !canCome(code)) {
      fail(
        `\`${code}\` cannot be expected, for it says that the note or the point was not checked: take the clause out and mend what it tells of.`,
      );
      return { code, not: false, came: null };
    }
    const at = findings.findIndex((one) => one.code === code);
    const finding = findings[at];
    if (!finding && !hasFigures) return { code, not: body.not, came: null };
    if (!body.not && finding) {
      findings[at] = {
        ...finding,
        severity: "information",
        message: `As expected: ${finding.message}`,
        expected: true,
      };
    } else if (!body.not) {
      fail(
        `Expected here is ${code}, and it does not come: change the point so that it does, or take the clause out.`,
      );
    } else if (finding) {
      fail(`Expected here is no ${code}, and it comes: ${finding.message}`, finding);
    }
    return { code, not: body.not, came: finding !== undefined };
  });
  return { findings, told, expected };
}

/** True for what an exercise may be about. */
export function canCome(code: FindingCode): boolean {
  return isAcceptable(code, "manoeuvre") || exercised.has(code);
}
