import type { Flavour } from "../notation/document.ts";
import type { Definitions } from "./definitions.ts";
import type { Note } from "./note.ts";
import type { Severities } from "./severities.ts";

/**
 * The notes of one workspace folder, which see each other's cards and limits. The boundary that the
 * language server and the command line both stand on.
 */
export interface Folder {
  /** The day the notes are read on, `2026-03-01`. */
  readonly today: string;
  /** What codes are made of here; it changes what is shown, and no figure. */
  severities: Severities;
  /** Adds a file or replaces its text. */
  open(uri: string, text: string, flavour: Flavour): Note;
  remove(uri: string): void;
  note(uri: string): Note | null;
  readonly notes: readonly Note[];
  definitions(): Definitions;
  /** Grows whenever a card or limits changed, so that what depends on other files knows to ask again. */
  readonly definitionsVersion: number;
}
