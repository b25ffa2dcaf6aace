import type { Block, PlacedClause } from "../notation/block.ts";
import type { BodyOf, ClauseBody, Quantity, Range } from "../notation/tree.ts";
import type { CardSpeed, Interval, Source } from "./card.ts";
import type { Finding } from "./finding.ts";
import type { Origin } from "./origin.ts";
import { type Measured, measure } from "./quantity.ts";
import { findingAt, type Site } from "./site.ts";

export type Of<K extends ClauseBody["kind"]> = BodyOf<K>;

/** What the steps below share while one card is read. */
export interface Lowering {
  readonly site: Site;
  readonly findings: Finding[];
}

/** The clauses of one kind that count. */
export function all<K extends ClauseBody["kind"]>(
  block: Block,
  kind: K,
): { placed: PlacedClause; body: Of<K> }[] {
  return block.clauses.flatMap((placed) => {
    const body = placed.clause.body;
    return placed.counts && body?.kind === kind ? [{ placed, body: body as Of<K> }] : [];
  });
}

/** The SI value of a quantity; out of its range it is told and gives none. */
export function value(
  lowering: Lowering,
  placed: PlacedClause,
  quantity: Quantity,
  what: Measured,
): number | null {
  const measured = measure(quantity, what);
  if (measured.problem === null) return measured.value;
  lowering.findings.push(findingAt("out-of-range", placed, measured.problem, { span: quantity.span }));
  return null;
}

/** The code of the finding at a clause that gives no value. A clause given twice is told at its second place alone. */
export function codeAtClause(block: Block, findings: readonly Finding[], { line, span }: Origin): string {
  const own = [...block.findings, ...findings].find(
    (one) => one.line === line && span.start <= one.span.start && one.span.start <= span.end,
  );
  return own?.code ?? "duplicate-clause";
}

export function interval(
  lowering: Lowering,
  placed: PlacedClause,
  range: Range,
  what: Measured,
): Interval | null {
  const low = value(lowering, placed, range.from, what);
  const high = value(lowering, placed, range.to, what);
  if (low === null || high === null) return null;
  if (low < high) return { low, high };
  lowering.findings.push(
    findingAt(
      "out-of-range",
      placed,
      "A range goes from the lower figure to the higher one: turn them round.",
      { span: range.span },
    ),
  );
  return null;
}

export function cardSpeed(
  lowering: Lowering,
  placed: PlacedClause,
  quantity: Quantity,
  ias: boolean,
  hasTable: boolean,
): CardSpeed | null {
  const speed = value(lowering, placed, quantity, "speed");
  if (speed === null) return null;
  if (!ias || hasTable) return { speed, ias };
  lowering.findings.push(
    findingAt(
      "missing-value",
      placed,
      "An indicated speed needs an ias table in this card: write one with `ias`, or the calibrated speed.",
      { span: quantity.span },
    ),
  );
  return null;
}

export function lowerSource(block: Block): Source | null {
  const source = all(block, "source")[0];
  if (!source) return null;
  const { title, issue, from } = source.body;
  return { title: title.text, issue: issue?.text ?? null, from: from?.text ?? null };
}
