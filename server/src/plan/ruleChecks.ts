import type { ResultName, Subject } from "../notation/vocabulary.ts";
import { checkBounds } from "./boundChecks.ts";
import { type Checking, carriedFrom, clauseFor, leastAt, tell } from "./checks.ts";
import type { Corners } from "./corners.ts";
import type { FindingCode } from "./findings.ts";
import {
  formatBank,
  formatBound,
  formatDistinct,
  formatLoad,
  formatRadius,
  formatResultValue,
  formatSpeed,
} from "./format.ts";
import type { Row } from "./limits.ts";
import type { HeldRow } from "./point.ts";
import { ratioFix } from "./ratioFix.ts";
import { atMost, holdRow, strictest, warningHasCome } from "./rules.ts";
import { type RowGroup, rowsInForce } from "./selectRows.ts";
import { oneStepLower } from "./site.ts";

export interface RuleOutcome {
  /** The strictest row of each verb and subject in force. */
  readonly rows: readonly HeldRow[];
  /** Rows that `none` switched off. */
  readonly off: readonly Row[];
  readonly notEvaluated: readonly { readonly rule: string; readonly why: string }[];
}

/** Holds the point against the rows of its limits that apply here. */
export function checkRules(checking: Checking): RuleOutcome {
  const { point, evaluated } = checking;
  const { limits, name } = point.limits;
  if (!limits) {
    return {
      rows: [],
      off: [],
      notEvaluated: [{ rule: `limits ${name}`, why: "They cannot be used, so no row is held." }],
    };
  }
  if (!point.phase) return { rows: [], off: [], notEvaluated: [] };
  const { conditions, ready, corners } = evaluated;
  const selected = rowsInForce(limits, {
    phase: point.phase,
    emergency: point.clauses.emergency !== null,
    rules: point.applied.carried.rules?.value ?? null,
    engineOut: conditions.engineOut !== null,
    shear: point.clauses.shear !== null,
    altitude: conditions.altitude,
    pressureAltitude: conditions.pressureAltitude,
  });
  const basis = ready.card.basis?.value;
  const vsFactor = basis?.kind === "vs" ? basis.factor : null;
  const held: Held[] = [];
  const notEvaluated = limits.lost.map((rule) => ({ rule, why: "The row is in error, so it is not held." }));
  for (const group of selected.groups) {
    const flown = group.afterShear ? evaluated.sheared : corners;
    if (!flown) {
      const row = group.rows[0] as Row;
      const why = "Of the speed nothing is left after the shear.";
      notEvaluated.push({ rule: row.text, why });
      tellNotEvaluated(checking, row, why);
      continue;
    }
    if (notApplicable(group, flown)) continue;
    const one = strictest(group.rows.map((row) => holdRow(row, { corners: flown, vsFactor })));
    if (one) held.push({ ...one, corners: flown });
  }
  const bankBroken = (verb: Row["verb"]) =>
    held.find(({ row, holds }) => row.verb === verb && row.subject === "bank" && holds === false) ?? null;
  const advice = bankBroken("must") && bankBroken("should");
  for (const one of held) {
    // Who banks less for the limit meets the advice on the way: its figure stands in the same sentence.
    if (one.holds === false && one !== advice) tellBroken(checking, one, advice);
    else if (one.holds === null) {
      const why = evaluated.absent(resultOf[one.row.subject]) ?? "It is not known here.";
      notEvaluated.push({ rule: one.row.text, why });
      tellNotEvaluated(checking, one.row, why);
    }
  }
  notEvaluated.push(...checkBounds(checking, limits, selected));
  const rows = held.map(({ corners: _, ...row }) => row);
  return { rows, off: selected.off, notEvaluated };
}

/** A row with the corners it was held at, which after a shear are others. */
interface Held extends HeldRow {
  readonly corners: Corners;
}

const resultOf: Readonly<Record<Subject, ResultName>> = {
  bank: "load",
  load: "load",
  radius: "radius",
  ratio: "ratio",
  margin: "margin",
  overshoot: "overshoot",
  buffet: "buffet-load",
};

/** Wings level there is no turn to be wide; without a load there is no stall to keep a margin to. */
function notApplicable({ subject, afterShear }: RowGroup, corners: Corners): boolean {
  if (subject === "radius") return corners.all.every((one) => one.bank === 0);
  if (subject === "margin") return corners.all.every((one) => one.stall === 0);
  // As flown, a warning that has come is told as an error of its own; after a shear the row alone tells it.
  return subject === "overshoot" && !afterShear && warningHasCome(corners);
}

const codes: Readonly<Record<Subject, FindingCode>> = {
  bank: "bank-over-limit",
  load: "load-over-rule",
  radius: "radius-over-rule",
  ratio: "ratio-short",
  margin: "margin-short",
  overshoot: "overshoot-short",
  buffet: "buffet-short",
};

/** The finding that tells of a broken row. */
export function ruleCode({ subject, verb }: Row): FindingCode {
  return subject === "bank" && verb === "should" ? "bank-over-advice" : codes[subject];
}

function severityOf(checking: Checking, row: Row) {
  const severity = row.verb === "must" ? "error" : "warning";
  return checking.point.clauses.emergency && row.verb === "should" ? oneStepLower(severity) : severity;
}

function tellBroken(checking: Checking, held: Held, advice: Held | null): void {
  const { point } = checking;
  const { row } = held;
  const code = ruleCode(row);
  const keyword =
    row.subject === "bank" || row.subject === "radius" || row.subject === "overshoot"
      ? "bank"
      : row.subject === "load"
        ? "load"
        : "speed";
  const fix = row.subject === "ratio" ? ratioFix(checking, held, held.corners) : null;
  tell(checking, code, clauseFor(point, keyword), message(checking, held, advice), {
    severity: severityOf(checking, row),
    rule: row.text,
    ...(held.figure === null ? {} : { figure: held.figure }),
    related: [
      ...carriedFrom(point, keyword === "speed" ? ["speed", "mass", "config"] : ["mass"]),
      { origin: row.origin, message: `The row: ${row.text}${row.remark ? ` (${row.remark})` : ""}` },
    ],
    fixes: fix ? [fix] : [],
  });
}

function message(checking: Checking, held: Held, advice: Held | null): string {
  const { point } = checking;
  const { row, bound, corners } = held;
  const figure = held.figure ?? Number.NaN;
  const rule = `${point.limits.name} ${row.verb === "must" ? "allows" : "advises"} in ${point.phase}`;
  const asks = (least: string) =>
    `${point.limits.name} ${row.verb === "must" ? "requires" : "advises"} ${least} in ${point.phase}`;
  const lead = leadOf(checking, held, corners);
  switch (row.subject) {
    case "bank": {
      const [flown, most] = formatDistinct(figure, bound, formatBank, boundOf(row));
      const why = held.byRateOne ? ", the bank for rate one" : "";
      // Advice that allows more than the limit has nothing to add.
      const advised = advice && advice.bound < bound ? boundOf(advice.row)(advice.bound, 0) : null;
      const too = advised ? ` and the ${advised} that it advises` : "";
      // With a tolerance of its own the bank to write is less than the bound.
      const varies = corners.all.some((one) => one.bank !== corners.nominal.bank);
      const way = varies ? "bank less" : `bank ${advised ?? most} or less`;
      return `${lead}Bank ${flown} exceeds the ${most} that ${rule}${why}${too}: ${way}${warningAt(checking)}.`;
    }
    case "load": {
      const [flown, most] = formatDistinct(figure, bound, formatLoad, boundOf(row));
      return `${lead}The load factor ${flown} exceeds the ${most} that ${rule}: bank or pull less.`;
    }
    case "radius": {
      const [flown, most] = formatDistinct(figure, bound, formatRadius, boundOf(row));
      return `${lead}The turn's radius ${flown} exceeds the ${most} that ${rule}: fly slower or bank more.`;
    }
    case "ratio": {
      const of = checking.evaluated.ready.card.basis?.value?.kind === "vs" && row.vs !== null ? "vs" : "vs1g";
      const [flown, least] = formatDistinct(figure, bound, left("ratio"), boundOf(row));
      return `${lead}The speed is ${flown} times ${of} and ${asks(least)}: fly ${knotsMissing(checking, held, corners)} faster, or lighter.`;
    }
    case "margin": {
      const [flown, least] = formatDistinct(figure, bound, left("margin"), boundOf(row));
      return `${lead}The margin over the stall is ${flown} and ${asks(least)}: fly faster or bank less.`;
    }
    case "overshoot": {
      const [over, least] = formatDistinct(figure, bound, left("overshoot"), boundOf(row));
      const way = leastAt(corners.all, (one) => one.overshoot).carriesMoreSlower
        ? "slower or lower"
        : "faster";
      if (!(0 <= figure))
        return `${lead}The warning comes before this bank is reached, and ${asks(`${least} of bank beyond it`)}: bank less or fly ${way}.`;
      return `${lead}Only ${over} of bank are left to the warning and ${asks(least)}: bank less or fly ${way}.`;
    }
    case "buffet": {
      const [onset, least] = formatDistinct(figure, bound, left("buffet-load"), boundOf(row));
      return `${lead}Buffet begins at a load factor of ${onset} and ${asks(least)}: fly lower or lighter.`;
    }
  }
}

/** Writes a figure of which less is worse: what is left is cut. */
function left(name: ResultName): (value: number, more: number) => string {
  return (value, more) => formatResultValue(name, value, more);
}

/** Writes the bound of a row. */
export function boundOf({ subject }: Row): (bound: number, more: number) => string {
  const name = subject === "buffet" ? "buffet-load" : subject;
  return (bound, more) => formatBound(name, bound, atMost(subject) ? "down" : "up", more);
}

/** "After the shear of 10 kt, with the tolerances: ", where each applies. */
function leadOf(checking: Checking, held: HeldRow, corners: Corners): string {
  const shear = checking.evaluated.ready.extras.shear ?? Number.NaN;
  const after = held.row.afterShear ? `after the shear of ${formatSpeed(shear)}` : "";
  const tolerances = byTolerancesAlone(checking, held, corners) ? "with the tolerances" : "";
  const lead = [after, tolerances].filter(Boolean).join(", ");
  return lead === "" ? "" : `${lead.charAt(0).toUpperCase()}${lead.slice(1)}: `;
}

/** True where the nominal figure alone would keep the row. */
function byTolerancesAlone({ evaluated }: Checking, held: HeldRow, corners: Corners): boolean {
  if (corners.all.length === 1) return false;
  const basis = evaluated.ready.card.basis?.value;
  const alone = holdRow(held.row, {
    corners: { nominal: corners.nominal, all: [corners.nominal] },
    vsFactor: basis?.kind === "vs" ? basis.factor : null,
  });
  return alone.holds === true;
}

function warningAt({ evaluated }: Checking): string {
  const { nominal } = evaluated.corners;
  const at = evaluated.results["warning-bank"];
  const stall = evaluated.results["stall-bank"];
  const speed = formatSpeed(nominal.cas);
  if (at) return `; at ${speed} the warning would come at ${formatResultValue("warning-bank", at.low)}`;
  if (stall) return `; at ${speed} the stall would come at ${formatResultValue("stall-bank", stall.low)}`;
  return "";
}

/** The knots that the ratio lacks, rounded up. */
function knotsMissing({ evaluated }: Checking, held: HeldRow, corners: Corners): string {
  const { ready } = evaluated;
  const basis = ready.card.basis?.value;
  const factor = basis?.kind === "vs" && held.row.vs !== null ? basis.factor : 1;
  let missing = 0;
  for (const one of corners.all) missing = Math.max(missing, held.bound * one.vs1g * factor - one.cas);
  return formatSpeed(missing, 0, { rounding: "up" });
}

function tellNotEvaluated(checking: Checking, row: Row, why: string): void {
  const { point } = checking;
  tell(
    checking,
    "not-evaluated",
    point.phaseClause,
    `The row \`${row.text}\` of ${point.limits.name} could not be held against this point. ${why} State what it needs, or switch the row off with \`none\`.`,
    {
      severity: severityOf(checking, row),
      rule: `${row.text} (not evaluated)`,
      related: [{ origin: row.origin, message: `The row: ${row.text}` }],
    },
  );
}
