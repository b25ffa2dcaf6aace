import { Cursor } from "../notation/cursor.ts";
import { parseLine } from "../notation/parseLine.ts";
import type { Span } from "../notation/span.ts";
import { readName } from "../notation/words.ts";
import { BUILT_IN_NAME } from "../plan/builtIn.ts";
import type { Definitions } from "../plan/definitions.ts";
import { fileName } from "../plan/fileName.ts";
import type { Note } from "../plan/note.ts";
import { namesIn } from "./namesIn.ts";
import { type NamedThing, type NameUse, nameUses, thingAt } from "./nameUses.ts";

/** Why nothing is renamed: one plain sentence with what to do instead. */
export interface Refusal {
  readonly refusal: string;
}

/** The name that would be renamed. */
export interface Renamable {
  readonly line: number;
  readonly span: Span;
  readonly name: string;
}

export interface Renaming {
  readonly newName: string;
  /** Each of these places is given the new name. */
  readonly places: readonly NameUse[];
}

/** Tells, before a new name is asked for, whether the name under the cursor can have one. */
export function prepareRename(note: Note, line: number, character: number): Renamable | Refusal {
  const thing = thingAt(note, line, character);
  if (!thing) {
    return {
      refusal:
        "Only the name of a card, of limits, of a configuration or of a contaminant is renamed: put the cursor on one.",
    };
  }
  const refusal = whyNot(note.definitions, thing);
  return refusal ? { refusal } : { line, span: thing.span, name: thing.name };
}

/** Gives a card, limits, a configuration or a contaminant another name wherever the folder's notes name it. */
export function rename(
  note: Note,
  notes: readonly Note[],
  line: number,
  character: number,
  newName: string,
): Renaming | Refusal {
  const prepared = prepareRename(note, line, character);
  if ("refusal" in prepared) return prepared;
  const thing = thingAt(note, line, character) as NamedThing;
  const wanted = newName.trim();
  const refusal = isName(wanted)
    ? whyTaken(note.definitions, thing, wanted)
    : `\`${wanted}\` is no name: write letters, digits and hyphens without blanks, as in flaps-5.`;
  if (refusal) return { refusal };
  const places = nameUses(notes, thing);
  const unread = places.find((place) => !readsBack(notes, place, thing, wanted));
  return unread
    ? {
        refusal: `\`${wanted}\` would be read as something else in ${fileName(unread.uri)}, line ${unread.line + 1}: choose a name that begins with a letter and is no word of the notation.`,
      }
    : { newName: wanted, places };
}

/** Why the thing itself cannot be renamed; null where it can. */
function whyNot(definitions: Definitions, thing: NamedThing): string | null {
  const { kind, name, card } = thing;
  if (kind === "limits" && name.toLowerCase() === BUILT_IN_NAME) {
    return `${BUILT_IN_NAME} is built in and keeps its name: write limits of your own that take its rows with \`from ${BUILT_IN_NAME}\`.`;
  }
  if (kind === "card" || kind === "limits") {
    const found = kind === "card" ? definitions.card(name) : definitions.limitsNamed(name);
    if (found.kind === "found") return null;
    return found.kind === "twice"
      ? `${name} is given ${found.places.length} times in this folder, so it is not known which of them is meant here: change one of them by hand first.`
      : `${kind === "card" ? "No card" : "No limits"} in this folder ${kind === "card" ? "is" : "are"} called ${name}, so there is nothing to rename.`;
  }
  if (card === null) {
    return `No line up to here says which aeroplane flies, so it is not known whose ${kind} ${name} is: write \`fly\` before it.`;
  }
  const owner = definitions.card(card);
  if (owner.kind === "twice") {
    return `There are ${owner.places.length} cards ${card} in this folder, so it is not known which of them is meant: rename one of the cards by hand first.`;
  }
  return partsOf(definitions, thing).some((part) => part === name.toLowerCase())
    ? null
    : `${card} has no ${kind} ${name}, so there is nothing to rename.`;
}

/** Names of the same kind in the thing's card, in lower case. */
function partsOf(definitions: Definitions, { kind, card }: NamedThing): readonly string[] {
  const owner = card === null ? null : definitions.card(card);
  if (owner?.kind !== "found") return [];
  const { configurations, contaminants } = owner.definition;
  return (kind === "configuration" ? configurations : contaminants).map((one) => one.name.toLowerCase());
}

function isName(text: string): boolean {
  return readName(new Cursor(text, false))?.span.end === text.length;
}

/** Why the new name is another's already; null where it is free, or is the old one in other letters. */
function whyTaken(definitions: Definitions, thing: NamedThing, wanted: string): string | null {
  const { kind, name, card } = thing;
  if (wanted.toLowerCase() === name.toLowerCase()) return null;
  if (kind === "card" || kind === "limits") {
    const found = kind === "card" ? definitions.card(wanted) : definitions.limitsNamed(wanted);
    if (found.kind === "missing") return null;
    return wanted.toLowerCase() === BUILT_IN_NAME && kind === "limits"
      ? `${BUILT_IN_NAME} is the name of the built-in limits: choose another.`
      : `This folder has ${kind === "card" ? "a card" : "limits"} called ${wanted} already: choose another name.`;
  }
  return partsOf(definitions, thing).includes(wanted.toLowerCase())
    ? `${card} has a ${kind} ${wanted} already: choose another name.`
    : null;
}

/** True where the line, with the new name in it, names the thing by it. */
function readsBack(
  notes: readonly Note[],
  { uri, line, span }: NameUse,
  thing: NamedThing,
  wanted: string,
): boolean {
  const document = notes.find((one) => one.uri === uri)?.document;
  const block = document?.blockAt(line);
  if (!document || !block) return false;
  const text = document.lineText(line);
  const { clauses } = parseLine(text.slice(0, span.start) + wanted + text.slice(span.end));
  return clauses.some((clause) =>
    namesIn({ line, clause, counts: true }, block).some(
      ({ kind, name }) => kind === thing.kind && name.span.start === span.start && name.text === wanted,
    ),
  );
}
