import type { FindingCode } from "../plan/findings.ts";
import type { Note } from "../plan/note.ts";
import type { HeldRow, PointResult } from "../plan/point.ts";
import { ruleCode } from "../plan/ruleChecks.ts";
import { rowFigureInUnit } from "./rowFigure.ts";

/** A rule or a check that a point was held against, and kept. */
export interface PassedJson {
  readonly line: number;
  readonly endLine: number;
  readonly phase: string | null;
  readonly title: string | null;
  /** The value of a sweep at which it was held; null for a point without one. */
  readonly at: number | null;
  /** A row of the limits as it is written, or the code of a check. */
  readonly rule: string;
  readonly kind: "row" | "check";
  /** The finding that would have told of it. */
  readonly code: FindingCode;
  /** The figure at its worst and its bound, in the row's unit; null for a check. */
  readonly figure: number | null;
  readonly bound: number | null;
  readonly unit: string | null;
}

/** What was checked and held, point by point: the other half of the findings. */
export function passedJson(note: Note): readonly PassedJson[] {
  return note.results().flatMap((result) => {
    if (result.kind !== "point") return [];
    const { sweep } = result.point;
    if (!sweep) return passedBy(result.point, null);
    return sweep.rows.flatMap(({ written, point }) => passedBy(point, written.value));
  });
}

function passedBy(point: PointResult, at: number | null): readonly PassedJson[] {
  const { block, phase, title } = point;
  const place = { line: block.start + 1, endLine: block.start + block.lines.length, phase, title, at };
  const rows = point.rows.filter((held) => held.holds === true);
  return [
    ...rows.map(
      (held): PassedJson => ({
        ...place,
        rule: held.row.text,
        kind: "row",
        code: ruleCode(held.row),
        ...figures(held),
      }),
    ),
    ...point.heldChecks.map(
      (code): PassedJson => ({
        ...place,
        rule: code,
        kind: "check",
        code,
        figure: null,
        bound: null,
        unit: null,
      }),
    ),
  ];
}

function figures({ row, figure, bound }: HeldRow) {
  const { value, unit } = rowFigureInUnit(row.subject, figure ?? Number.NaN);
  return { figure: value, bound: rowFigureInUnit(row.subject, bound).value, unit };
}
