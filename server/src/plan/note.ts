import type { Block } from "../notation/block.ts";
import type { Document, Flavour, Position } from "../notation/document.ts";
import type { Card } from "./card.ts";
import type { Definitions } from "./definitions.ts";
import type { Finding } from "./finding.ts";
import type { Limits } from "./limits.ts";
import type { PointResult } from "./point.ts";
import type { State } from "./state.ts";

/** What one block came to. */
export type BlockResult =
  | {
      readonly kind: "point";
      readonly block: Block;
      readonly point: PointResult;
      readonly after: State;
      readonly findings: readonly Finding[];
    }
  | {
      readonly kind: "setting";
      readonly block: Block;
      readonly after: State;
      readonly findings: readonly Finding[];
    }
  | {
      readonly kind: "card";
      readonly block: Block;
      readonly card: Card;
      readonly findings: readonly Finding[];
    }
  | {
      readonly kind: "limits";
      readonly block: Block;
      readonly limits: Limits;
      readonly findings: readonly Finding[];
    };

/** A finding with its line in the file, from 0. */
export interface PlacedFinding {
  readonly line: number;
  readonly finding: Finding;
}

/** A note that is kept up to date as it is edited. */
export interface Note {
  readonly uri: string;
  readonly flavour: Flavour;
  readonly document: Document;
  edit(start: Position, end: Position, newText: string): void;
  /** The result of every block, in the order of the lines. */
  results(): readonly BlockResult[];
  resultOf(block: Block): BlockResult;
  /** Every finding of the note, in the order of the lines. */
  findings(): readonly PlacedFinding[];
  readonly definitions: Definitions;
}
