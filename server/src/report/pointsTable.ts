import type { ResultName } from "../notation/vocabulary.ts";
import {
  formatAltitude,
  formatBank,
  formatFlightLevel,
  formatMass,
  formatResult,
  formatSpeed,
  formatSpoken,
} from "../plan/format.ts";
import type { Note } from "../plan/note.ts";
import { lineOf } from "../plan/origin.ts";
import type { PointResult, Solved } from "../plan/point.ts";
import { plainMarkdown } from "./plainMarkdown.ts";

/** One row of the points table, ready to be laid out. */
export type TableRow = readonly string[];

export const tableHead: TableRow = [
  "line",
  "phase",
  "weight",
  "config",
  "altitude",
  "speed",
  "bank",
  "vs1g",
  "stall",
  "warning",
  "ratio",
  "margin",
  "load",
  "warning at",
  "stall at",
  "bounded by",
];

/** The table of a note's points: the last column, what bounds a value that was sought, only where one was. */
export function pointsTable(note: Note): { readonly head: TableRow; readonly rows: readonly TableRow[] } {
  const rows = tableRows(note);
  if (rows.some((row) => row[tableHead.length - 1] !== "")) return { head: tableHead, rows };
  return { head: tableHead.slice(0, -1), rows: rows.map((row) => row.slice(0, -1)) };
}

/** The points of a note with the figures a briefing needs, each as the one formatter writes it. */
export function tableRows(note: Note): readonly TableRow[] {
  return note.results().flatMap((result) => (result.kind === "point" ? pointRows(result.point) : []));
}

/** One row for a point, or one for each value of its sweep. */
export function pointRows(point: PointResult): readonly TableRow[] {
  const { sweep } = point;
  if (!sweep) return [row(point, point.solved)];
  return sweep.rows.map((one) =>
    row(one.point, one.point.solved, `${sweep.what} ${formatSpoken(one.written, sweep.what)}`),
  );
}

function row(point: PointResult, solved: Solved | null, varied = ""): TableRow {
  const line = String(point.block.start + 1);
  const marks = [
    varied,
    solved?.written ? `${solved.what} ${formatSpoken(solved.written, solved.what)} found` : "",
    point.aside ? "aside" : "",
  ].filter(Boolean);
  const phase = [
    point.phase ?? "?",
    point.title ? ` "${point.title}"` : "",
    marks.length > 0 ? ` (${marks.join("; ")})` : "",
  ].join("");
  const { conditions } = point;
  if (!conditions) {
    const why = point.withheld
      ? `no figures: ${point.withheld.code}, line ${lineOf(point.withheld.origin) + 1}`
      : "no figures";
    return [line, phase, why, ...tableHead.slice(3).map(() => "")];
  }
  const result = (name: ResultName) => {
    const spread = point.results?.[name];
    return spread ? formatResult(name, spread) : "-";
  };
  const reference = point.card?.referenceMass?.value ?? conditions.mass.nominal;
  return [
    line,
    phase,
    formatMass(conditions.mass.nominal, reference),
    point.configuration?.name ?? "",
    conditions.flightLevel
      ? formatFlightLevel(conditions.altitude.nominal)
      : formatAltitude(conditions.altitude.nominal),
    formatSpeed(conditions.cas.nominal),
    `${formatBank(conditions.bank.nominal)}${conditions.bankSide ? ` ${conditions.bankSide}` : ""}`,
    result("vs1g"),
    result("stall"),
    result("warning"),
    result("ratio"),
    result("margin"),
    result("load"),
    result("warning-bank"),
    result("stall-bank"),
    solved?.best?.boundBy ?? "",
  ];
}

/** Columns padded to their widest cell, two blanks between them. */
export function plainTable(rows: readonly TableRow[], head: TableRow): string {
  const all = [head, ...rows];
  const widths = head.map((_, column) => Math.max(...all.map((one) => one[column]?.length ?? 0)));
  return all
    .map((one) =>
      one
        .map((text, column) => text.padEnd(widths[column] ?? 0))
        .join("  ")
        .trimEnd(),
    )
    .map((text) => `${text}\n`)
    .join("");
}

/** The same rows as a Markdown table, in which no mark of an author's text means anything. */
export function markdownTable(rows: readonly TableRow[], head: TableRow): string {
  const line = (cells: readonly string[]) => `| ${cells.join(" | ")} |\n`;
  return line(head) + line(head.map(() => "---")) + rows.map((row) => line(row.map(plainMarkdown))).join("");
}
