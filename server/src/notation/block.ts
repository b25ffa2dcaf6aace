import type { TextFinding } from "./finding.ts";
import type { BarLine, Clause } from "./tree.ts";

export type BlockKind = "card" | "limits" | "point" | "setting";

/** A clause with the line of its block that it stands on, counted from 0. */
export interface PlacedClause {
  readonly line: number;
  readonly clause: Clause;
  /**
   * False where the clause gives no value: it is faulty, stands in a block of another kind, or is
   * given twice.
   */
  readonly counts: boolean;
}

/**
 * Consecutive bar lines. All but `start` depends on the text of these lines alone, so that a block
 * is reused, the same object, while its lines stay the same.
 */
export interface Block {
  readonly kind: BlockKind;
  readonly lines: readonly BarLine[];
  readonly clauses: readonly PlacedClause[];
  /** All findings of the block's text, its lines' own included; `line` counts from the block's first line. */
  readonly findings: readonly TextFinding[];
  /** Line of the document, from 0. The document alone writes it, as lines above come and go. */
  start: number;
}
