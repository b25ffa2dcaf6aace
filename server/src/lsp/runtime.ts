import type { FileSource } from "./noteFiles.ts";

/** What the server needs of the machine it runs on. */
export interface Runtime {
  /** The day, `2026-03-01`. */
  today(): string;
  /** The machine's own files; null where it has none, as in a browser. */
  readonly disk: FileSource | null;
  /** Where a page ships, by its file name; null where the machine does not hold it. */
  pageUri(name: string): string | null;
  /** Does work after what lies in the event queue already. */
  soon(work: () => void): void;
  /** Does work after some milliseconds; what it gives takes that back. */
  later(milliseconds: number, work: () => void): () => void;
}
