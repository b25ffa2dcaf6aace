import type { Block, PlacedClause } from "../notation/block.ts";
import type { BodyOf, RowCondition } from "../notation/tree.ts";
import type { Subject } from "../notation/vocabulary.ts";
import { BUILT_IN_NAME, BUILT_IN_URI } from "./builtIn.ts";
import type { Source } from "./card.ts";
import type { Finding } from "./finding.ts";
import type { Level, Limits, Row } from "./limits.ts";
import { lowerSource } from "./lowering.ts";
import type { Origin } from "./origin.ts";
import { type Measured, measure } from "./quantity.ts";
import { findingAt, originOf, type Site } from "./site.ts";

/** Limits as they are written, before the rows of `from` are taken in. */
export interface LimitsDraft {
  readonly name: string;
  readonly title: string | null;
  readonly origin: Origin;
  readonly block: Block;
  readonly source: Source | null;
  readonly from: { readonly name: string; readonly placed: PlacedClause; readonly origin: Origin } | null;
  readonly withheld: Limits["withheld"];
  readonly rows: readonly Row[];
  readonly findings: readonly Finding[];
}

/** Reads limits, in SI. A row in error is not held, and said so where the limits are used. */
export function lowerLimits(block: Block, uri: string): LimitsDraft {
  const site: Site = { uri, block, anchor: block };
  const findings: Finding[] = [];
  const head = block.clauses[0] as PlacedClause;
  const body = head.clause.body?.kind === "limits" ? head.clause.body : null;
  const origin: Origin = { ...originOf(site, head), span: body?.name.span ?? head.clause.span };
  const name = body?.name.text ?? "";
  const rows = block.clauses.flatMap((placed) => {
    const row = placed.clause.body;
    if (!placed.counts || row?.kind !== "row") return [];
    const lowered = lowerRow(site, placed, row, name, findings);
    return lowered ? [lowered] : [];
  });
  if (name.toLowerCase() === BUILT_IN_NAME && uri !== BUILT_IN_URI) {
    findings.push(
      findingAt(
        "duplicate-name",
        head,
        `${BUILT_IN_NAME} is the name of the built-in limits: give these another name; \`from ${BUILT_IN_NAME}\` takes its rows.`,
        { span: origin.span },
      ),
    );
  }
  const unknown = block.clauses.find((placed) => placed.clause.keyword === null);
  return {
    name,
    title: body?.title?.text ?? null,
    origin,
    block,
    source: lowerSource(block),
    from: body?.from
      ? { name: body.from.text, placed: head, origin: { ...origin, span: body.from.span } }
      : null,
    withheld: unknown
      ? { origin: originOf(site, unknown), code: "unknown-keyword" }
      : body
        ? null
        : { origin, code: "missing-argument" },
    rows,
    findings,
  };
}

const measuredAs: Readonly<Record<Subject, Measured>> = {
  bank: "bank",
  load: "load",
  radius: "radius",
  ratio: "factor",
  margin: "factor",
  overshoot: "bank",
  buffet: "factor",
};

function lowerRow(
  site: Site,
  placed: PlacedClause,
  body: BodyOf<"row">,
  limitsName: string,
  findings: Finding[],
): Row | null {
  const inside = (quantity: Parameters<typeof measure>[0], what: Measured): number | null => {
    const { value, problem } = measure(quantity, what);
    if (problem === null) return value;
    findings.push(findingAt("out-of-range", placed, problem, { span: quantity.span }));
    return null;
  };
  const value = body.value ? inside(body.value, measuredAs[body.subject]) : null;
  const vs = body.vs ? inside(body.vs, "factor") : null;
  const levels: Level[] = [];
  for (const condition of body.conditions) {
    if (condition.kind !== "above" && condition.kind !== "below") continue;
    const altitude = inside(condition.level, "altitude");
    if (altitude === null) return null;
    levels.push({ kind: condition.kind, altitude, flightLevel: condition.level.unit === "FL" });
  }
  if ((body.value && value === null) || (body.vs && vs === null)) return null;
  const { text, remark } = quoted(site.block, placed);
  return {
    verb: body.verb,
    phases: body.phases,
    subject: body.subject,
    value,
    vs,
    rateOne: body.rateOne,
    levels,
    when: body.conditions.flatMap((one) => (isWhen(one) ? [one.kind] : [])),
    afterShear: body.conditions.some((one) => one.kind === "after-shear"),
    text,
    remark,
    limitsName,
    origin: originOf(site, placed),
  };
}

function isWhen(condition: RowCondition): condition is Extract<
  RowCondition,
  { kind: "ifr" | "vfr" | "engine-out" | "after-shear" }
> & {
  kind: "ifr" | "vfr" | "engine-out";
} {
  return condition.kind === "ifr" || condition.kind === "vfr" || condition.kind === "engine-out";
}

/** The row as messages quote it, with single blanks and no remark; and the remark behind it, which names its source. */
function quoted(block: Block, { line, clause }: PlacedClause): { text: string; remark: string | null } {
  const whole = block.lines[line]?.text ?? "";
  const text = whole
    .slice(clause.span.start, clause.span.end)
    .replace(/\([^()]*\)/g, " ")
    .replace(/\s+/g, " ")
    .trim();
  const behind = /^\s*\((.*?)\)\s*(;|$)/.exec(whole.slice(clause.span.end));
  return { text, remark: behind?.[1]?.trim() ?? null };
}

/** The limits with the rows of `from` taken first; a row here replaces a taken one of the same verb, phases, subject and conditions. */
export function resolveLimits(draft: LimitsDraft, drafts: readonly LimitsDraft[]): Limits {
  return resolve(draft, drafts, []);
}

function resolve(draft: LimitsDraft, drafts: readonly LimitsDraft[], chain: readonly LimitsDraft[]): Limits {
  const { name, title, origin, block, source } = draft;
  const base = { name, title, origin, block, source, builtIn: origin.uri === BUILT_IN_URI };
  if (!draft.from || draft.withheld)
    return { ...base, withheld: draft.withheld, rows: draft.rows, findings: draft.findings };
  const taken = takenFrom(draft, drafts, chain);
  if ("finding" in taken) {
    const withheld = { origin: draft.from.origin, code: taken.finding.code };
    return { ...base, withheld, rows: [], findings: [...draft.findings, taken.finding] };
  }
  const own = new Set(draft.rows.map(rowKey));
  return {
    ...base,
    withheld: null,
    rows: [...taken.rows.filter((row) => !own.has(rowKey(row))), ...draft.rows],
    findings: draft.findings,
  };
}

function takenFrom(
  draft: LimitsDraft,
  drafts: readonly LimitsDraft[],
  chain: readonly LimitsDraft[],
): { rows: readonly Row[] } | { finding: Finding } {
  const from = draft.from as NonNullable<LimitsDraft["from"]>;
  const tell = (code: "unknown-limits" | "duplicate-name" | "broken-definition", message: string) => ({
    finding: findingAt(code, from.placed, message, { span: from.origin.span }),
  });
  const wanted = from.name.toLowerCase();
  const found = drafts.filter((one) => one.name.toLowerCase() === wanted);
  const first = found[0];
  if (!first)
    return tell(
      "unknown-limits",
      `No limits in this folder are called ${from.name}, so none of these rows is held: check the name after \`from\`.`,
    );
  if (found.length > 1)
    return tell(
      "duplicate-name",
      `${from.name} is the name of ${found.length} sets of limits, so none of these rows is held: keep one, or rename the others.`,
    );
  if (first === draft || chain.includes(first))
    return tell(
      "broken-definition",
      `${draft.name} takes its rows from ${from.name}, which takes them from ${draft.name}: let one of them stand by itself.`,
    );
  const limits = resolve(first, drafts, [...chain, draft]);
  if (limits.withheld)
    return tell(
      "broken-definition",
      `${from.name} has an error, so its rows cannot be taken and none of these is held: mend it first.`,
    );
  return { rows: limits.rows };
}

/** Rows of one key are about the same thing. */
function rowKey(row: Row): string {
  return [row.verb, [...row.phases].sort().join(","), row.subject, conditionsKey(row)].join("|");
}

/** The conditions of a row, in one spelling. */
export function conditionsKey(row: Row): string {
  const levels = row.levels
    .map((one) => `${one.kind} ${one.flightLevel ? "FL" : "alt"} ${one.altitude}`)
    .sort();
  return [...levels, ...[...row.when].sort(), row.afterShear ? "after shear" : ""].join(",");
}
