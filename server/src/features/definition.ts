import type { Note } from "../plan/note.ts";
import type { Origin } from "../plan/origin.ts";
import { blockAt } from "./blocksBetween.ts";
import { clauseAt } from "./hover.ts";
import { targetAt } from "./target.ts";

/** Where the card, the limits, the configuration or the contaminant under the cursor is defined. */
export function definition(note: Note, line: number, character: number): Origin | null {
  const result = blockAt(note, line);
  const placed = result && clauseAt(result, line, character);
  return placed ? (targetAt(note, result, placed, character)?.origin ?? null) : null;
}
