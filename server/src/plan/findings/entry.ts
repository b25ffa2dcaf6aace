import type { Severity } from "../finding.ts";

/** What the catalogue says of one finding. */
export interface FindingEntry {
  /** The usual severity; the situation may move it by a step. */
  readonly severity: Severity;
  /** A few plain words. */
  readonly title: string;
  /** What it means, why it matters and what to do, with the source of the rule where there is one. */
  readonly explanation: string;
  /** A note that gives the finding. */
  readonly breaks: string;
  /** The same note, mended. */
  readonly keeps: string;
  readonly since: string;
}

export function entry(
  severity: Severity,
  title: string,
  explanation: string,
  breaks: string,
  keeps: string,
): FindingEntry {
  return { severity, title, explanation, breaks, keeps, since: "0.1.0" };
}

/** The card that the examples fly. */
export const wheatear = `| aircraft wheatear-9 "invented for the examples"
| basis vsr; reference 9 t; mass 5 t to 9 t; warning 1.05
| config clean stall 95 kt, load -1 to 3
| config flaps stall 80 kt, load 0 to 2, vfe 150 kt, takeoff, landing
`;

const cruising = "| fly wheatear-9; weight 8 t; config clean; altitude FL100; speed 180 kt\n";

/** The example's card and setting, then the point. */
export function flown(point: string, more = ""): string {
  return `${wheatear}${more}\n${cruising}\n${point}\n`;
}

/** The same under limits that add one row to the built-in ones. */
export function ruled(row: string, point: string, more = ""): string {
  return `${wheatear}${more}\n| limits own-rules, from common-practice\n| ${row}\n\n| under own-rules\n${cruising}\n${point}\n`;
}

/** A point in cruise under limits that hold these rows alone. */
export function limited(...rows: readonly string[]): string {
  const limits = ["| limits own-rules", ...rows.map((row) => `| ${row}`)].join("\n");
  return `${wheatear}\n${limits}\n\n| under own-rules\n${cruising}\n| phase cruise; bank 20\n`;
}
