import type { Flavour } from "../notation/document.ts";
import type { Definitions } from "./definitions.ts";
import type { Note } from "./note.ts";

/**
 * The notes of one workspace folder, which see each other's cards and limits. The boundary that the
 * language server and the command line both stand on.
 */
export interface Folder {
  /** The day the notes are read on, `2026-03-01`. */
  readonly today: string;
  /** Adds a file or replaces its text. */
  open(uri: string, text: string, flavour: Flavour): Note;
  remove(uri: string): void;
  note(uri: string): Note | null;
  readonly notes: readonly Note[];
  definitions(): Definitions;
  /** Grows whenever a card or limits changed, so that what depends on other files knows to ask again. */
  readonly definitionsVersion: number;
}
