import type { Block, PlacedClause } from "../notation/block.ts";
import type { ClauseBody, Name } from "../notation/tree.ts";

/** What a name can name. Each kind has names of its own: a card and limits may be called alike. */
export type NameKind = "card" | "limits" | "configuration" | "contaminant";

/** A name in a clause, and what it is the name of. */
export interface WrittenName {
  readonly kind: NameKind;
  readonly name: Name;
  /** True where the name is given to something, false where it is used. */
  readonly defines: boolean;
}

const none: readonly WrittenName[] = [];

/** The names that a clause gives or uses, in the order they stand in. */
export function namesIn({ clause }: PlacedClause, block: Block): readonly WrittenName[] {
  return clause.body ? namesOf(clause.body, block.kind === "card") : none;
}

function namesOf(body: ClauseBody, inCard: boolean): readonly WrittenName[] {
  switch (body.kind) {
    case "fly":
      return one("card", body.name, false);
    case "aircraft":
      return one("card", body.name, true);
    case "under":
      return one("limits", body.name, false);
    case "limits":
      return [...one("limits", body.name, true), ...(body.from ? one("limits", body.from, false) : none)];
    case "config":
      return one("configuration", body.name, inCard);
    case "lift-mach":
    case "buffet":
    case "ias":
    case "published":
      return one("configuration", body.config, false);
    case "contamination":
      return typeof body.value === "object" && "text" in body.value
        ? one("contaminant", body.value, false)
        : none;
    case "contaminant":
      return one("contaminant", body.name, inCard);
    default:
      return none;
  }
}

function one(kind: NameKind, name: Name, defines: boolean): readonly WrittenName[] {
  return [{ kind, name, defines }];
}
