import type { Block, PlacedClause } from "../notation/block.ts";
import { nearestWord } from "../notation/spelling.ts";
import type { BarLine, BodyOf, RowCondition } from "../notation/tree.ts";
import type { Subject } from "../notation/vocabulary.ts";
import { BUILT_IN_NAME, BUILT_IN_URI } from "./builtIn.ts";
import type { Source } from "./card.ts";
import type { Finding } from "./finding.ts";
import type { Level, Limits, Row } from "./limits.ts";
import { codeAtClause, lowerSource } from "./lowering.ts";
import type { Origin } from "./origin.ts";
import { type Measured, measure } from "./quantity.ts";
import { type Details, findingAt, originOf, type Site } from "./site.ts";

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
  readonly lost: readonly string[];
  readonly findings: readonly Finding[];
}

/**
 * Reads limits, in SI. A row in error is not held, and said so where the limits are used; an error in
 * the first clause withholds them all, for `from` may have been meant there.
 */
export function lowerLimits(block: Block, uri: string): LimitsDraft {
  const site: Site = { uri, block, anchor: block };
  const findings: Finding[] = [];
  const head = block.clauses[0] as PlacedClause;
  const body = head.clause.body?.kind === "limits" ? head.clause.body : null;
  const origin: Origin = { ...originOf(site, head), span: body?.name.span ?? head.clause.span };
  const name = body?.name.text ?? "";
  const rows: Row[] = [];
  const lost: string[] = [];
  for (const placed of block.clauses) {
    const { keyword, body: row } = placed.clause;
    if (keyword !== "must" && keyword !== "should") continue;
    const lowered = placed.counts && row?.kind === "row" ? lowerRow(site, placed, row, name, findings) : null;
    if (lowered) rows.push(lowered);
    else lost.push(quoted(block, placed).text);
  }
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
  if (body && !body.from && rows.length === 0 && lost.length === 0) findings.push(noRows(block, head, name));
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
      : head.counts && body
        ? null
        : { origin, code: codeAtClause(block, findings, originOf(site, head)) },
    rows,
    lost,
    findings,
  };
}

function noRows(block: Block, head: PlacedClause, name: string): Finding {
  const { end } = head.clause.span;
  // Behind a title that is not closed nothing can be written.
  const sound = !block.findings.some(({ line }) => line === head.line);
  return findingAt(
    "unbounded",
    head,
    `${name} has no row, so it limits nothing: write one below, as in \`must any bank\` and its figure, or take those of ${BUILT_IN_NAME} with \`, from ${BUILT_IN_NAME}\`.`,
    {
      fixes: sound
        ? [
            {
              title: `Take the rows of ${BUILT_IN_NAME}`,
              edits: [{ line: head.line, start: end, end, newText: `, from ${BUILT_IN_NAME}` }],
            },
          ]
        : [],
    },
  );
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
  const { text: whole, tokens } = block.lines[line] as BarLine;
  let text = "";
  const remarks: string[] = [];
  for (const { kind, start, end } of tokens) {
    if (start < clause.span.start) continue;
    if (start < clause.span.end) text += kind === "remark" ? " " : whole.slice(start, end);
    else if (kind === "remark")
      remarks.push(
        whole
          .slice(start + 1, end)
          .replace(/\)$/, "")
          .trim(),
      );
    else if (kind !== "blank") break;
  }
  return { text: text.replace(/\s+/g, " ").trim(), remark: remarks.join("; ") || null };
}

/** The limits with the rows of `from` taken first; a row here replaces a taken one of the same verb, phases, subject and conditions. */
export function resolveLimits(draft: LimitsDraft, drafts: readonly LimitsDraft[]): Limits {
  const { name, title, origin, block, source } = draft;
  const base = { name, title, origin, block, source, builtIn: origin.uri === BUILT_IN_URI };
  if (!draft.from || draft.withheld)
    return {
      ...base,
      withheld: draft.withheld,
      rows: draft.rows,
      lost: draft.lost,
      findings: draft.findings,
    };
  const taken = takenFrom(draft, drafts);
  if ("finding" in taken) {
    const withheld = { origin: draft.from.origin, code: taken.finding.code };
    return { ...base, withheld, rows: [], lost: [], findings: [...draft.findings, taken.finding] };
  }
  const own = new Set(draft.rows.map(rowKey));
  return {
    ...base,
    withheld: null,
    rows: [...taken.rows.filter((row) => !own.has(rowKey(row))), ...draft.rows],
    lost: [...taken.lost, ...draft.lost],
    findings: draft.findings,
  };
}

function takenFrom(
  draft: LimitsDraft,
  drafts: readonly LimitsDraft[],
): Pick<Limits, "rows" | "lost"> | { finding: Finding } {
  const from = draft.from as NonNullable<LimitsDraft["from"]>;
  const tell = (
    code: "unknown-limits" | "duplicate-name" | "broken-definition",
    message: string,
    details: Details = {},
  ) => ({
    finding: findingAt(code, from.placed, message, { span: from.origin.span, ...details }),
  });
  const found = namedBy(from.name, drafts);
  const first = found[0];
  if (!first) {
    const others = drafts.filter((one) => one !== draft).map((one) => one.name);
    const nearest = nearestWord(from.name, others);
    return tell(
      "unknown-limits",
      `No limits in this folder are called ${from.name}, so none of these rows is held: ${nearest ? `did you mean ${nearest}?` : "check the name after `from`."}`,
      nearest
        ? {
            fixes: [
              {
                title: `Write ${nearest}`,
                preferred: true,
                edits: [{ line: from.placed.line, ...from.origin.span, newText: nearest }],
              },
            ],
          }
        : {},
    );
  }
  if (found.length > 1)
    return tell(
      "duplicate-name",
      `${from.name} is the name of ${found.length} sets of limits, so none of these rows is held: keep one, or rename the others.`,
    );
  if (leadsBack(draft, drafts))
    return tell(
      "broken-definition",
      first === draft
        ? `${draft.name} takes its rows from itself, so none of them is held: name other limits, or leave \`from\` out.`
        : `${draft.name} takes its rows from ${from.name}, which leads back to ${draft.name}, so none of them is held: let one of them stand by itself.`,
      // Nothing else is wrong here, and limits that hold nothing must not pass for kept ones.
      { severity: "error" },
    );
  const limits = resolveLimits(first, drafts);
  if (limits.withheld)
    return tell(
      "broken-definition",
      `${from.name} has an error, so its rows cannot be taken and none of these is held: mend it first.`,
    );
  return limits;
}

function namedBy(name: string, drafts: readonly LimitsDraft[]): readonly LimitsDraft[] {
  const wanted = name.toLowerCase();
  return drafts.filter((one) => one.name.toLowerCase() === wanted);
}

/** True where limits take their rows, through others or at once, from themselves. */
function leadsBack(draft: LimitsDraft, drafts: readonly LimitsDraft[]): boolean {
  const seen = new Set<LimitsDraft>();
  let at: LimitsDraft | undefined = draft;
  while (at?.from && !seen.has(at)) {
    seen.add(at);
    at = namedBy(at.from.name, drafts)[0];
  }
  return at === draft && seen.size > 0;
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
