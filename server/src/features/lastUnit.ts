import type { Clause, Quantity } from "../notation/tree.ts";
import type { Keyword, Unit } from "../notation/vocabulary.ts";
import type { Note } from "../plan/note.ts";

/** So many blocks are looked back through: further away nobody remembers the unit either. */
const BLOCKS = 300;

/** The unit that the author last gave a quantity of this keyword, up to a line; null where none is needed or known. */
export function lastUnit(note: Note, line: number, keyword: Keyword): Unit | null {
  const { blocks } = note.document;
  let index = blocks.length;
  let low = 0;
  while (low < index) {
    const middle = (low + index) >> 1;
    if ((blocks[middle]?.start ?? 0) <= line) low = middle + 1;
    else index = middle;
  }
  for (let i = index - 1; Math.max(0, index - BLOCKS) <= i; i--) {
    for (const { clause } of blocks[i]?.clauses.toReversed() ?? []) {
      const unit = clause.keyword === keyword && !clause.faulty ? quantityOf(clause)?.unit : null;
      if (unit) return unit;
    }
  }
  return null;
}

/** The quantity of a clause that needs a unit and takes nothing else. */
function quantityOf({ body }: Clause): Quantity | null {
  switch (body?.kind) {
    case "weight":
    case "altitude":
    case "oat":
    case "path":
    case "cg":
      return body.value.kind === "scalar" ? body.value.quantity : null;
    case "burn":
      return body.amount.quantity;
    case "qnh":
      return body.value;
    case "reference":
      return body.mass;
    case "vmo":
    case "vmca":
    case "vne":
    case "vno":
      return body.speed;
    case "ceiling":
      return body.altitude;
    default:
      return null;
  }
}
