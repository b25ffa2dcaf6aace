import type { PlacedClause } from "../notation/block.ts";
import type { Span } from "../notation/span.ts";
import type { Name } from "../notation/tree.ts";
import type { Card } from "../plan/card.ts";
import type { Lookup } from "../plan/definitions.ts";
import type { Limits } from "../plan/limits.ts";
import type { BlockResult, Note } from "../plan/note.ts";
import type { Origin } from "../plan/origin.ts";
import { namesIn, type WrittenName } from "./namesIn.ts";

/** A name in the text, and what it names. */
export interface Target {
  readonly span: Span;
  readonly definition: Card | Limits;
  /** Where the very thing is written: the card, the configuration's line, the contaminant's clause. */
  readonly origin: Origin;
}

/** The card in use at a block: a card's own, else the one that the state carries. */
export function cardInUse(result: BlockResult): Card | null {
  switch (result.kind) {
    case "card":
      return result.card;
    case "point":
      return result.point.card;
    case "setting":
      return result.after.carried.aircraft?.value?.card ?? null;
    case "limits":
      return null;
  }
}

/** What the name under the cursor names; null where no name stands there, or nothing is called so. */
export function targetAt(
  note: Note,
  result: BlockResult,
  placed: PlacedClause,
  character: number,
): Target | null {
  const written = nameAt(result, placed, character);
  return written && targetOf(note, result, written);
}

/** The name under the cursor, whether something is called so or not. */
export function nameAt(result: BlockResult, placed: PlacedClause, character: number): WrittenName | null {
  const under = ({ name: { span } }: WrittenName) => span.start <= character && character <= span.end;
  return namesIn(placed, result.block).find(under) ?? null;
}

function targetOf(note: Note, result: BlockResult, { kind, name }: WrittenName): Target | null {
  switch (kind) {
    case "card":
      return found(name, note.definitions.card(name.text));
    case "limits":
      return found(name, note.definitions.limitsNamed(name.text));
    case "configuration":
      return partOf(cardInUse(result), "configurations", name);
    case "contaminant":
      return partOf(cardInUse(result), "contaminants", name);
  }
}

function found(name: Name, lookup: Lookup<Card | Limits>): Target | null {
  if (lookup.kind !== "found") return null;
  const { definition } = lookup;
  return { span: name.span, definition, origin: definition.origin };
}

function partOf(card: Card | null, parts: "configurations" | "contaminants", name: Name): Target | null {
  const part = card?.[parts].find((one) => one.name.toLowerCase() === name.text.toLowerCase());
  return card && part ? { span: name.span, definition: card, origin: part.origin } : null;
}
