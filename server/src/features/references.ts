import type { Note } from "../plan/note.ts";
import { lineOf } from "../plan/origin.ts";
import { type NameUse, nameUses, thingAt } from "./nameUses.ts";

/**
 * Every place where the card, the limits, the configuration or the contaminant under the cursor is
 * named, in all notes of the folder. The built-in limits are given in a note that is nobody's.
 */
export function references(
  note: Note,
  notes: readonly Note[],
  line: number,
  character: number,
  definitions: boolean,
): readonly NameUse[] {
  const thing = thingAt(note, line, character);
  if (!thing) return [];
  const uses = nameUses(notes, thing);
  if (!definitions) return uses.filter((one) => !one.defines);
  return thing.kind === "limits" ? [...uses, ...builtIn(note, thing.name)] : uses;
}

function builtIn(note: Note, name: string): readonly NameUse[] {
  const found = note.definitions.limitsNamed(name);
  if (found.kind !== "found" || !found.definition.builtIn) return [];
  const { origin } = found.definition;
  return [{ uri: origin.uri, line: lineOf(origin), span: origin.span, defines: true }];
}

/** The same within one note, for marking all of them while the cursor stands on one. */
export function highlights(note: Note, line: number, character: number): readonly NameUse[] {
  const thing = thingAt(note, line, character);
  return thing ? nameUses([note], thing) : [];
}
