import type { PlacedClause } from "../notation/block.ts";
import type { Span } from "../notation/span.ts";
import type { Name } from "../notation/tree.ts";
import type { Card } from "../plan/card.ts";
import type { Limits } from "../plan/limits.ts";
import type { BlockResult, Note } from "../plan/note.ts";
import type { Origin } from "../plan/origin.ts";

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
  const body = placed.clause.body;
  if (!body) return null;
  const under = (name: Name | null | undefined) =>
    name && name.span.start <= character && character <= name.span.end ? name : null;
  switch (body.kind) {
    case "fly":
    case "aircraft":
      return namedCard(note, under(body.name));
    case "under":
      return namedLimits(note, under(body.name));
    case "limits":
      return namedLimits(note, under(body.name) ?? under(body.from));
    case "config":
      return namedConfiguration(cardInUse(result), under(body.name));
    case "lift-mach":
    case "buffet":
    case "ias":
    case "published":
      return namedConfiguration(cardInUse(result), under(body.config));
    case "contamination":
      return typeof body.value === "object" && "text" in body.value
        ? namedContaminant(cardInUse(result), under(body.value))
        : null;
    case "contaminant":
      return namedContaminant(cardInUse(result), under(body.name));
    default:
      return null;
  }
}

function namedCard(note: Note, name: Name | null): Target | null {
  const found = name && note.definitions.card(name.text);
  return name && found?.kind === "found"
    ? { span: name.span, definition: found.definition, origin: found.definition.origin }
    : null;
}

function namedLimits(note: Note, name: Name | null): Target | null {
  const found = name && note.definitions.limitsNamed(name.text);
  return name && found?.kind === "found"
    ? { span: name.span, definition: found.definition, origin: found.definition.origin }
    : null;
}

function namedConfiguration(card: Card | null, name: Name | null): Target | null {
  const found =
    name && card?.configurations.find((one) => one.name.toLowerCase() === name.text.toLowerCase());
  return card && found ? { span: name.span, definition: card, origin: found.origin } : null;
}

function namedContaminant(card: Card | null, name: Name | null): Target | null {
  const found = name && card?.contaminants.find((one) => one.name.toLowerCase() === name.text.toLowerCase());
  return card && found ? { span: name.span, definition: card, origin: found.origin } : null;
}
