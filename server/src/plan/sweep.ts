import { fromSI, toSI, type UnitName } from "../flight/units.ts";
import type { PlacedClause } from "../notation/block.ts";
import type { Quantity, Sweep } from "../notation/tree.ts";
import type { Keyword } from "../notation/vocabulary.ts";
import { blocks } from "./blocking.ts";
import type { Clauses } from "./clauses.ts";
import { describePoint } from "./describe.ts";
import { evaluateStated, type Setting, type StatedPoint } from "./evaluateStated.ts";
import type { Finding } from "./finding.ts";
import { formatSpoken } from "./format.ts";
import { together, toldApart } from "./onePerCode.ts";
import { closed, figureOf, type OpenClause, type Written } from "./openClause.ts";
import type { PointResult, Solved, SweepRow } from "./point.ts";
import { review } from "./review.ts";
import { settle } from "./settle.ts";
import { findingAt, listed, originOf } from "./site.ts";
import { solve, type Work } from "./solve.ts";
import type { State } from "./state.ts";
import { withUnknown } from "./unknownState.ts";

/** The most values of a sweep. */
const MOST_VALUES = 500;

/**
 * The most corners of trials that the `?` of one point's rows may take, a few seconds' work: an editor must
 * not stand still for a table that nobody asked to be this large.
 */
const MOST_WORK = 200_000;

interface Row {
  readonly written: Written;
  readonly stated: StatedPoint;
  readonly solved: Solved | null;
}

/** Evaluates a point at each value of its sweep. Its own figures are those of the first row that breaks a rule. */
export function evaluateSweep(
  setting: Setting,
  clauses: Clauses,
  open: OpenClause,
): { readonly point: PointResult; readonly after: State } {
  const values = sweepValues(open.value as Sweep, figureOf(open));
  if (typeof values === "string") return withoutValues(setting, clauses, open, values);
  const work: Work = { left: MOST_WORK };
  const rows: Row[] = [];
  for (const written of values) {
    rows.push(evaluateRow(setting, closed(clauses, open, written), written, work));
    if (work.left < 0)
      return withoutValues(setting, closed(clauses, open, written), open, tooMuch(rows.length));
  }
  const what = open.placed.clause.keyword as Keyword;
  const breaking = rows.findIndex(({ stated }) => breaksSomething(stated));
  const shown = breaking < 0 ? tightest(rows) : breaking;
  const { stated, solved } = rows[shown] as Row;
  const swept: StatedPoint = { ...stated, findings: findingsOf(rows, what) };
  const point = settle(swept, {
    solved,
    sweep: { what, open, shown, breaks: 0 <= breaking, rows: rows.map((row) => describedRow(row)) },
  });
  return { point, after: clauses.aside ? setting.before : withoutSwept(stated.after, setting, open) };
}

function tooMuch(values: number): string {
  return `With these tolerances a value cannot be sought at every value of the sweep: after ${values} it would take too long. Take a larger step, or leave tolerances out.`;
}

function evaluateRow(setting: Setting, clauses: Clauses, written: Written, work: Work): Row {
  if (!clauses.unknown) return { written, stated: evaluateStated(setting, clauses), solved: null };
  return { written, ...solve(setting, clauses, clauses.unknown, work) };
}

function describedRow({ written, stated, solved }: Row): SweepRow {
  const reviewed = review(stated.point, stated.findings, stated.evaluated !== null);
  const own = new Set(stated.findings.map((one) => one.code));
  // What the point as a whole accepts in vain or expects is told once, at the point.
  const findings = reviewed.findings.filter((one) => own.has(one.code));
  return { written, point: describePoint(stated, [], { ...reviewed, findings }, { solved, sweep: null }) };
}

function breaksSomething({ point, findings, evaluated }: StatedPoint): boolean {
  return !evaluated || review(point, findings, true).findings.some(blocks);
}

/** The row with the least margin, where none breaks anything. */
function tightest(rows: readonly Row[]): number {
  let found = 0;
  let least = Number.POSITIVE_INFINITY;
  for (const [i, { stated }] of rows.entries()) {
    const margin = stated.evaluated?.results.margin?.low ?? Number.POSITIVE_INFINITY;
    if (margin < least) {
      least = margin;
      found = i;
    }
  }
  return found;
}

/** The findings of all rows, one of a code: that of the first row, with the values at which the others have it too. */
function findingsOf(rows: readonly Row[], what: Keyword): readonly Finding[] {
  const cases = new Map<string, { finding: Finding; own: string; values: Written[] }>();
  for (const { stated, written } of rows) {
    for (const finding of stated.findings) {
      const key = toldApart.has(finding.code)
        ? `${finding.code} ${finding.line} ${finding.span.start}`
        : finding.code;
      const known = cases.get(key);
      if (!known) cases.set(key, { finding, own: finding.message, values: [written] });
      else {
        const one = together(known.finding, finding, "");
        // Fixes and related lines are those of the first row: each row would say them again.
        known.finding = { ...one, related: known.finding.related, fixes: known.finding.fixes };
        known.values.push(written);
      }
    }
  }
  return [...cases.values()].map(({ finding, own, values }) => ({
    ...finding,
    message: values.length === rows.length ? atEvery(own, values, what) : atSome(own, values, rows, what),
  }));
}

function atEvery(message: string, values: readonly Written[], what: Keyword): string {
  return `At every value of the sweep; at ${valueText(values[0] as Written, what)}: ${message}`;
}

function atSome(message: string, values: readonly Written[], rows: readonly Row[], what: Keyword): string {
  const [first, ...others] = values as [Written, ...Written[]];
  const lead = `At ${valueText(first, what)}: ${message}`;
  if (others.length === 0) return lead;
  if (others.length <= 3)
    return `${lead} So it is at ${listed(others.map((one) => formatSpoken(one, what)))} too.`;
  return `${lead} So it is at ${values.length} of the ${rows.length} values.`;
}

/** "bank 45", "weight 56.4 t", "speed M 0.74". */
export function valueText(written: Written, what: Keyword): string {
  return `${what} ${formatSpoken(written, what)}`;
}

/** The values, the end always among them; or what is wrong, as a sentence. */
function sweepValues({ from, to, by }: Sweep, of: string | undefined): readonly Written[] | string {
  const decimals = Math.max(...[from, to, by].map((one) => one.decimals));
  const end = inUnitOf(from, to);
  const step = inUnitOf(from, by);
  if (end === null || step === null)
    return "Give the first value, the last and the step of a sweep in one unit.";
  const distance = end - from.value;
  if (step === 0 || (distance !== 0 && step < 0 !== distance < 0 && step < 0))
    return "The step of a sweep leads from the first value to the last: write how far apart the values are.";
  const size = Math.abs(step) * Math.sign(distance);
  const count = distance === 0 ? 0 : Math.floor(distance / size + 1e-9);
  const values: number[] = [];
  if (MOST_VALUES < count + 1)
    return `A sweep has at most ${MOST_VALUES} values and this one has ${count + 1}: take a larger step.`;
  // A step or an end in another unit is seldom a round figure in that of the first value.
  const more = from.unit === to.unit && from.unit === by.unit ? 0 : 6;
  const tidy = (value: number) => Number(value.toFixed(Math.min(decimals + more, 12)));
  for (let i = 0; i <= count; i++) values.push(tidy(from.value + i * size));
  if (values[values.length - 1] !== tidy(end)) values.push(tidy(end));
  return values.map((value) => ({
    value,
    unit: from.unit,
    decimals: more === 0 ? decimals : Math.max(decimals, decimalsOf(value)),
    of,
  }));
}

/** How many decimals it takes to write a value that {@link sweepValues} has rounded. */
function decimalsOf(value: number): number {
  return String(value).split(".")[1]?.length ?? 0;
}

function inUnitOf(from: Quantity, other: Quantity): number | null {
  if (from.unit === other.unit) return other.value;
  // The zeros of the two temperature scales differ.
  if (from.unit === null || other.unit === null || from.unit === "C" || from.unit === "K") return null;
  return fromSI(toSI(other.value, other.unit as UnitName), from.unit as UnitName);
}

function withoutValues(
  setting: Setting,
  clauses: Clauses,
  open: OpenClause,
  message: string,
): { readonly point: PointResult; readonly after: State } {
  const stated = evaluateStated(setting, clauses);
  const finding = findingAt("out-of-range", open.placed, message, { span: open.value.span });
  const withheld = { origin: originOf(setting.site, open.placed), code: finding.code };
  const point = settle(
    { ...stated, evaluated: null, withheld, findings: [...stated.findings, finding] },
    { solved: null, sweep: null },
  );
  return { point, after: clauses.aside ? setting.before : withoutSwept(stated.after, setting, open) };
}

/** A swept value does not go on: nobody can tell which of them was flown. */
function withoutSwept(after: State, { site }: Setting, { slot, placed }: OpenClause): State {
  return withUnknown(after, slot, {
    value: null,
    origin: originOf(site, placed as PlacedClause),
    unknown: "missing-value",
    phase: null,
    swept: true,
  });
}
