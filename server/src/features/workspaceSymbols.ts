import type { Note } from "../plan/note.ts";
import { documentSymbols, type OutlineEntry } from "./documentSymbols.ts";

/** An entry of the outline of one of many notes. */
export interface FoundSymbol {
  readonly uri: string;
  readonly entry: OutlineEntry;
  /** The card of a configuration; null for all others. */
  readonly container: string | null;
}

/** So many are told, the likest first: who looks for one of more types another letter. */
const MOST = 1000;

/**
 * The points, cards, configurations and limits whose name has the letters of the query in their order,
 * without regard to case and blanks; those that have them in one piece come first. All, for an empty query.
 */
export function workspaceSymbols(notes: readonly Note[], query: string): readonly FoundSymbol[] {
  const wanted = query.toLowerCase().replace(/\s+/g, "");
  return notes
    .flatMap(symbolsOf)
    .map((symbol) => ({ symbol, rank: rankOf(symbol.entry.name, wanted) }))
    .filter(({ rank }) => rank < Number.POSITIVE_INFINITY)
    .sort((a, b) => a.rank - b.rank)
    .slice(0, MOST)
    .map(({ symbol }) => symbol);
}

function symbolsOf(note: Note): readonly FoundSymbol[] {
  return documentSymbols(note)
    .filter(({ kind }) => kind !== "setting")
    .flatMap((entry) => [
      { uri: note.uri, entry, container: null },
      ...entry.children.map((child) => ({ uri: note.uri, entry: child, container: entry.name })),
    ]);
}

/** 0 where the name begins so, 1 where it holds the query, 2 where its letters are strewn, infinite where they are not there. */
function rankOf(name: string, wanted: string): number {
  const letters = name.toLowerCase().replace(/\s+/g, "");
  const at = letters.indexOf(wanted);
  if (at >= 0) return at === 0 ? 0 : 1;
  let next = 0;
  for (const letter of wanted) {
    next = letters.indexOf(letter, next) + 1;
    if (next === 0) return Number.POSITIVE_INFINITY;
  }
  return 2;
}
