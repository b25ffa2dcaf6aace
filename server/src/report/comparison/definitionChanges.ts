import type { Definition } from "./definitionsOf.ts";
import { type PartChange, partChanges } from "./partChanges.ts";

/** A card or limits that is another one now; null on the side where there is none. */
export interface DefinitionChange {
  readonly old: Definition | null;
  readonly new: Definition | null;
  readonly parts: readonly PartChange[];
}

/** What changed in the cards and limits that the revisions use, wherever they are written. */
export function definitionChanges(
  olds: readonly Definition[],
  news: readonly Definition[],
): readonly DefinitionChange[] {
  const left = [...news];
  const pairs = olds.map((one) => {
    const at = left.findIndex((other) => key(other) === key(one));
    return { old: one, new: at < 0 ? null : (left.splice(at, 1)[0] ?? null) };
  });
  return [...pairs, ...left.map((one) => ({ old: null, new: one }))]
    .map(
      (pair): DefinitionChange => ({
        ...pair,
        parts: partChanges(pair.old?.parts ?? [], pair.new?.parts ?? []),
      }),
    )
    .filter((change) => change.parts.length > 0);
}

function key({ kind, name }: Definition): string {
  return `${kind} ${name.toLowerCase()}`;
}
