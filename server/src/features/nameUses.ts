import type { Block } from "../notation/block.ts";
import type { Span } from "../notation/span.ts";
import type { BlockResult, Note } from "../plan/note.ts";
import { blockAt } from "./blocksBetween.ts";
import { clauseAt } from "./hover.ts";
import { type NameKind, namesIn, type WrittenName } from "./namesIn.ts";
import { cardInUse, nameAt } from "./target.ts";

/** What a name stands for: two names without regard to case are one, and a card's parts are its own. */
export interface NamedThing {
  readonly kind: NameKind;
  /** As it is written where the cursor stands. */
  readonly name: string;
  readonly span: Span;
  /** The card of a configuration or a contaminant; null for cards and limits, and where no card is known. */
  readonly card: string | null;
}

/** A place where a thing's name is written. */
export interface NameUse {
  readonly uri: string;
  readonly line: number;
  readonly span: Span;
  readonly defines: boolean;
}

/** What the name under the cursor stands for, whether the folder has such a thing or not; null where no name is. */
export function thingAt(note: Note, line: number, character: number): NamedThing | null {
  const result = blockAt(note, line);
  const placed = result && clauseAt(result, line, character);
  const written = placed && nameAt(result, placed, character);
  if (!written) return null;
  const { kind, name } = written;
  const card = kind === "card" || kind === "limits" ? null : (cardInUse(result)?.name ?? null);
  return { kind, name: name.text, span: name.span, card };
}

/** Every place in the notes where the thing's name is written, in the order of notes and lines. */
export function nameUses(notes: readonly Note[], thing: NamedThing): readonly NameUse[] {
  return notes.flatMap((note) => usesIn(note, thing));
}

function usesIn(note: Note, thing: NamedThing): readonly NameUse[] {
  return blocksOf(note, thing).flatMap((block) =>
    block.clauses.flatMap((placed) =>
      namesIn(placed, block)
        .filter((written) => isNameOf(written, thing))
        .map(({ name: { span }, defines }) => ({
          uri: note.uri,
          line: block.start + placed.line,
          span,
          defines,
        })),
    ),
  );
}

/** The blocks where the thing may be named; only for a card's parts is the note evaluated. */
function blocksOf(note: Note, { kind, card }: NamedThing): readonly Block[] {
  if (kind === "card" || kind === "limits") return note.document.blocks;
  const ofCard = (result: BlockResult) => card !== null && isSame(cardInUse(result)?.name ?? "", card);
  return note
    .results()
    .filter(ofCard)
    .map(({ block }) => block);
}

function isNameOf({ kind, name }: WrittenName, thing: NamedThing): boolean {
  return kind === thing.kind && isSame(name.text, thing.name);
}

function isSame(a: string, b: string): boolean {
  return a.toLowerCase() === b.toLowerCase();
}
