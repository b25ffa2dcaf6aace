import type { Block } from "../notation/block.ts";
import type { Clauses } from "./clauses.ts";
import type { Definitions } from "./definitions.ts";
import { evaluatePoint } from "./evaluatePoint.ts";
import { evaluateSetting } from "./evaluateSetting.ts";
import type { Finding } from "./finding.ts";
import { catalogue } from "./findings.ts";
import type { BlockResult } from "./note.ts";
import type { PlanSite } from "./site.ts";
import type { State } from "./state.ts";

/** Evaluates a point or a setting from the state that reaches it. */
export function evaluateBlock(
  site: PlanSite,
  clauses: Clauses,
  definitions: Definitions,
  before: State,
): Extract<BlockResult, { kind: "point" | "setting" }> {
  const { block } = site;
  const written = textFindings(block);
  if (block.kind === "setting") {
    const { after, findings } = evaluateSetting(site, clauses, definitions, before);
    return {
      kind: "setting",
      block,
      after,
      findings: written.length > 0 ? [...written, ...findings] : findings,
    };
  }
  const { point, after } = evaluatePoint(site, clauses, definitions, before);
  const findings = written.length > 0 ? [...written, ...point.findings] : point.findings;
  return { kind: "point", block, point, after, findings };
}

const noFindings: readonly Finding[] = [];

/** The findings of the text, with the catalogue's severity. */
export function textFindings(block: Block): readonly Finding[] {
  if (block.findings.length === 0) return noFindings;
  return block.findings.map((one) => ({
    code: one.code,
    severity: catalogue[one.code].severity,
    line: one.line,
    span: one.span,
    message: one.message,
    related: [],
    fixes: one.fixes,
  }));
}
