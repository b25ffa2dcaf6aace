import type { Quantity } from "../notation/tree.ts";
import type { Read } from "./clauses.ts";
import type { Point } from "./evaluateStated.ts";
import { type FigureRule, figureRules } from "./figureRules.ts";
import type { Acceptance, Finding } from "./finding.ts";
import type { FindingCode } from "./findings.ts";
import { formatWritten, writtenFigure } from "./format.ts";
import { measure } from "./quantity.ts";
import { ALLOWANCE } from "./rules.ts";
import { findingAt, listed, originOf } from "./site.ts";

/** Findings without a figure that can be taken all the same. */
const takenWithoutFigure = new Set<FindingCode>([
  "warning-in-turn",
  "buffet-in-turn",
  "stall-before-warning",
  "stalled",
  "gust-over-stall",
  "carried-over",
  "reference-config",
  "load-below-bank",
  "turn-into-dead-engine",
  "over-holding-speed",
]);

/** True for what an `accept` may name at a point of this phase. */
export function isAcceptable(code: FindingCode, phase: Point["phase"]): boolean {
  if (code === "stalled") return phase === "manoeuvre";
  return takenWithoutFigure.has(code) || figureRules[code] !== undefined;
}

interface Accept {
  readonly read: Read<"accept">;
  readonly acceptance: Acceptance;
  /** SI; null for a code that has no figure. */
  readonly to: number | null;
}

/**
 * Marks the findings that the point accepts, and tells of every `accept` that takes nothing: refused,
 * past its date, or with nothing to take. Without figures nothing can be taken yet.
 */
export function applyAccepts(
  point: Point,
  found: readonly Finding[],
  hasFigures: boolean,
): { readonly findings: readonly Finding[]; readonly told: readonly Finding[] } {
  const { accepts } = point.clauses;
  if (accepts.length === 0) return { findings: found, told: [] };
  const findings = [...found];
  const told: Finding[] = [];
  for (const read of accepts) {
    const accept = readAccept(point, read, told);
    if (!accept || !hasFigures) continue;
    const at = findings.findIndex((one) => one.code === accept.acceptance.code);
    const finding = findings[at];
    if (finding) findings[at] = take(point, finding, accept);
    else told.push(unused(accept));
  }
  return { findings, told };
}

/** The clause as it counts; null with a finding where it does not. */
function readAccept(point: Point, read: Read<"accept">, told: Finding[]): Accept | null {
  const { placed, body } = read;
  const code = body.code as FindingCode;
  const refuse = (message: string) => {
    told.push(findingAt("accept-refused", placed, message));
    return null;
  };
  if (!isAcceptable(code, point.phase)) return refuse(refusal(code));
  if (body.until && body.until.text < point.site.today) {
    told.push(
      findingAt(
        "accept-expired",
        placed,
        `What is accepted here held until ${body.until.text}, and today is ${point.site.today}: check it again, then write a new date or take the clause out.`,
      ),
    );
    return null;
  }
  if (!body.because?.text.trim())
    return refuse("Write the reason between the quotation marks: without one nothing is accepted.");
  const rule = figureRules[code];
  const problem = rule
    ? figureProblem(rule, body.to)
    : body.to
      ? `${code} has no figure: leave out \`to\`.`
      : null;
  if (problem) return refuse(problem);
  const acceptance: Acceptance = {
    code,
    to: body.to ? formatWritten(body.to, "accept") : null,
    because: body.because?.text ?? "",
    by: body.by?.text.trim() || null,
    until: body.until?.text ?? null,
  };
  return { read, acceptance, to: rule && body.to ? measure(body.to, rule.what).value : null };
}

function refusal(code: FindingCode): string {
  if (code === "stalled")
    return "A stall is accepted in `manoeuvre` alone, where it is the exercise: fly faster, bank less or fly lighter.";
  return `\`${code}\` cannot be accepted, for it says that the point is wrong, unsafe beyond a margin, or was not checked: mend what it tells of.`;
}

function figureProblem(rule: FigureRule, to: Quantity | null): string | null {
  const units = rule.units.filter((unit) => unit !== null && unit !== "deg");
  const inUnits = units.length > 0 ? ` in ${listed(units.slice(0, 2)).replace(" and ", " or ")}` : "";
  if (!to) return `What is accepted here has a figure: write \`to\` and how far it may go${inUnits}.`;
  if (!rule.units.includes(to.unit))
    return `The figure that is accepted here is written${inUnits || " as a plain number"}.`;
  return measure(to, rule.what).problem;
}

function isCovered({ to, acceptance }: Accept, { figure }: Finding): boolean {
  if (to === null) return true;
  const rule = figureRules[acceptance.code];
  if (figure === undefined || !rule) return false;
  const slack = Math.abs(to) * ALLOWANCE;
  return rule.worse === "more" ? figure <= to + slack : to - slack <= figure;
}

function take(point: Point, finding: Finding, accept: Accept): Finding {
  const { acceptance, read } = accept;
  const clause = { origin: originOf(point.site, read.placed), message: "It is accepted here." };
  if (!isCovered(accept, finding)) {
    const rule = figureRules[finding.code];
    const now =
      rule && finding.figure !== undefined ? `, and it is ${writtenFigure(rule, finding.figure)} now` : "";
    return {
      ...finding,
      message: `${finding.message} It is accepted to ${acceptance.to} only${now}.`,
      related: [...finding.related, clause],
    };
  }
  const by = acceptance.by ? ` by ${acceptance.by}` : "";
  const until = acceptance.until ? ` until ${acceptance.until}` : "";
  const to = acceptance.to ? ` to ${acceptance.to}` : "";
  return {
    ...finding,
    severity: "information",
    message: `Accepted${to}${by}${until} ("${acceptance.because}"): ${finding.message}`,
    related: [...finding.related, clause],
    accepted: acceptance,
  };
}

function unused({ read, acceptance }: Accept): Finding {
  return findingAt(
    "accept-unused",
    read.placed,
    `There is no ${acceptance.code} here to accept: take the clause out, or check whether the point is still the one that was signed.`,
    {
      fixes: [
        {
          title: "Take the clause out",
          edits: [{ line: read.placed.line, ...read.placed.clause.span, newText: "" }],
        },
      ],
    },
  );
}
