import { formatSpoken } from "../plan/format.ts";
import type { Solved, SolvedEnd, SweepResult } from "../plan/point.ts";

/** "41, bound by should any overshoot 15". */
export function solvedText({ what, best, written, blockedBy }: Solved): string {
  if (!best || !written) return `none: ${blockedBy}`;
  return `${formatSpoken(written, what)}, bound by ${boundText(best)}`;
}

/** The other end of the values that keep everything: "down to 118 kt, bound by ratio…". */
export function otherEndText(solved: Solved): string | null {
  const other = solved.other();
  if (!other || !solved.best || !solved.written) return null;
  const way = other.value < solved.best.value ? "down to" : "up to";
  return `${way} ${formatSpoken({ ...solved.written, value: other.value }, solved.what)}, bound by ${boundText(other)}`;
}

function boundText({ boundBy }: SolvedEnd): string {
  return boundBy === "out-of-range" || boundBy === "missing-value" ? "what the value can be" : boundBy;
}

/** "breaks at 45 (warning-in-turn)", or that every value keeps every rule. */
export function sweepText({ what, rows, shown, breaks }: SweepResult): string {
  const row = rows[shown];
  if (!breaks || !row) return `all ${rows.length} values keep every rule`;
  const codes = row.point.withheld
    ? [row.point.withheld.code]
    : row.point.findings.filter((one) => one.severity !== "information").map((one) => one.code);
  const why = [...new Set(codes)].join(", ") || row.point.findings.map((one) => one.code).join(", ");
  return `breaks at ${formatSpoken(row.written, what)} (${why})`;
}
