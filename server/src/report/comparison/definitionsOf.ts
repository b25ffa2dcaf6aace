import type { Card } from "../../plan/card.ts";
import type { Limits } from "../../plan/limits.ts";
import type { Note } from "../../plan/note.ts";
import { type Part, partsOf } from "./parts.ts";

/** A card or limits as a revision of a note sees it. */
export interface Definition {
  readonly kind: "card" | "limits";
  readonly name: string;
  readonly uri: string;
  /** Line of the file, from 0. */
  readonly start: number;
  readonly lines: number;
  readonly parts: readonly Part[];
  /** The sets that limits take their rows from, in lower case. */
  readonly from: readonly string[];
}

/** The cards and limits that a note has in it or uses, and those that its limits are taken from. */
export function definitionsOf(note: Note): readonly Definition[] {
  const { cards, limits } = note.definitions;
  const from = limits.map((one) => ({ name: one.name, from: takenFrom(one) }));
  const used = withSources(namesUsed(note), from);
  const counts = (one: Card | Limits) => used.has(one.name.toLowerCase()) || one.origin.uri === note.uri;
  return [
    ...cards.filter(counts).map((card) => definition("card", card)),
    ...limits.filter(counts).map((one) => definition("limits", one)),
  ];
}

function definition(kind: Definition["kind"], { name, origin, block }: Card | Limits): Definition {
  return {
    kind,
    name,
    uri: origin.uri,
    start: block.start,
    lines: block.lines.length,
    parts: partsOf(block),
    from: takenFrom({ block }),
  };
}

/** Names of limits with those that their rows are taken from, at any remove, in lower case. */
export function withSources(
  names: Iterable<string>,
  limits: readonly Pick<Definition, "name" | "from">[],
): ReadonlySet<string> {
  const all = new Set(names);
  for (const name of all) {
    for (const one of limits)
      if (one.name.toLowerCase() === name) for (const source of one.from) all.add(source);
  }
  return all;
}

/** Names after `fly` and `under`, in lower case, whether there is such a definition or not. */
function namesUsed(note: Note): readonly string[] {
  return note.document.blocks.flatMap((block) =>
    block.clauses.flatMap(({ clause: { body } }) =>
      body?.kind === "fly" || body?.kind === "under" ? [body.name.text.toLowerCase()] : [],
    ),
  );
}

function takenFrom({ block }: Pick<Limits, "block">): readonly string[] {
  return block.clauses.flatMap(({ clause: { body } }) =>
    body?.kind === "limits" && body.from ? [body.from.text.toLowerCase()] : [],
  );
}
