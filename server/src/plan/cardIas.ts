import { calibratedFromIndicated } from "../flight/ias.ts";
import type { Table } from "../flight/table.ts";
import type { PlacedClause } from "../notation/block.ts";
import type { Quantity } from "../notation/tree.ts";
import type { Stated } from "./card.ts";
import type { Lowering } from "./lowering.ts";
import { findingAt } from "./site.ts";

/** The calibrated stall speed of one that a card states as indicated: at 1 g and the reference mass, where the table holds. */
export function calibratedStall(
  lowering: Lowering,
  placed: PlacedClause,
  written: Quantity,
  indicated: number,
  ias: Stated<Table> | null,
  referenceMass: number | null,
): number | null {
  if (ias && (ias.value === null || referenceMass === null)) return null;
  const calibrated =
    ias?.value && referenceMass !== null
      ? calibratedFromIndicated(ias.value, indicated, 1, referenceMass, referenceMass)
      : null;
  if (calibrated !== null) return calibrated;
  lowering.findings.push(
    findingAt(
      ias ? "outside-table" : "missing-value",
      placed,
      ias
        ? "The indicated stall speed lies outside the configuration's ias table, which is never extrapolated: extend the table."
        : "An indicated stall speed needs the configuration's ias table: write it with `ias`, or the calibrated speed.",
      { span: written.span, severity: "error" },
    ),
  );
  return null;
}
