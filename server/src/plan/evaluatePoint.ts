import type { Clauses } from "./clauses.ts";
import type { Definitions } from "./definitions.ts";
import type { Open } from "./describe.ts";
import { evaluateStated, type Setting } from "./evaluateStated.ts";
import type { PointResult } from "./point.ts";
import { settle } from "./settle.ts";
import type { PlanSite } from "./site.ts";
import { solve } from "./solve.ts";
import type { State } from "./state.ts";
import { evaluateSweep } from "./sweep.ts";

/** One point: its figures, its findings, and the state that later points start from. */
export function evaluatePoint(
  site: PlanSite,
  clauses: Clauses,
  definitions: Definitions,
  before: State,
): { readonly point: PointResult; readonly after: State } {
  const setting: Setting = { site, definitions, before };
  if (clauses.sweep) return evaluateSweep(setting, clauses, clauses.sweep);
  if (clauses.unknown) {
    const { stated, solved } = solve(setting, clauses, clauses.unknown);
    return { point: settle(stated, { solved, sweep: null }), after: stated.after };
  }
  const stated = evaluateStated(setting, clauses);
  return { point: settle(stated, notOpen), after: stated.after };
}

const notOpen: Open = { solved: null, sweep: null };
