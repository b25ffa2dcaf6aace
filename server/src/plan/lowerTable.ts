import type { Table } from "../flight/table.ts";
import type { PlacedClause } from "../notation/block.ts";
import type { PairTable, Quantity } from "../notation/tree.ts";
import type { Lowering } from "./lowering.ts";
import { type Measured, measure } from "./quantity.ts";
import { findingAt } from "./site.ts";

/** What the two columns of a table measure. `rising` asks the values to rise too, so that it can be read both ways. */
export interface PairKinds {
  readonly argument: Measured | "machFromZero";
  readonly value: Measured;
  readonly unit: "rising" | null;
}

/** A table in SI. Null, after a finding, where a pair is out of range or the arguments do not rise. */
export function lowerTable(
  lowering: Lowering,
  placed: PlacedClause,
  table: PairTable,
  kinds: PairKinds,
): Table | null {
  const bad = (message: string, span = table.span) => {
    lowering.findings.push(findingAt("bad-table", placed, message, { span }));
    return null;
  };
  if (table.pairs.length < 2)
    return bad("A table needs two pairs or more, since nothing is extrapolated: add a pair after a comma.");
  const xs: number[] = [];
  const values: number[] = [];
  for (const pair of table.pairs) {
    const x = convert(lowering, placed, pair.argument, kinds.argument);
    const y = convert(lowering, placed, pair.value, kinds.value);
    if (x === null || y === null) return null;
    const last = xs.length - 1;
    if (last >= 0 && !((xs[last] as number) < x)) {
      return bad(
        "The first number of each pair must be greater than the one before it: put the pairs in order.",
        pair.span,
      );
    }
    if (kinds.unit === "rising" && last >= 0 && !((values[last] as number) < y)) {
      return bad(
        "Both columns of this table must rise, for it is read both ways: check the pair.",
        pair.span,
      );
    }
    xs.push(x);
    values.push(y);
  }
  return { arguments: xs, values };
}

function convert(
  lowering: Lowering,
  placed: PlacedClause,
  quantity: Quantity,
  what: PairKinds["argument"],
): number | null {
  // A table against Mach number may begin at 0, where no aeroplane flies.
  if (what === "machFromZero") return quantity.value === 0 ? 0 : convert(lowering, placed, quantity, "mach");
  const { value, problem } = measure(quantity, what);
  if (problem === null) return value;
  lowering.findings.push(findingAt("out-of-range", placed, problem, { span: quantity.span }));
  return null;
}
