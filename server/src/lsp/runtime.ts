/** What the server needs of the machine it runs on. */
export interface Runtime {
  /** The day, `2026-03-01`. */
  today(): string;
  /** The notes below a folder, as URIs. */
  listNotes(folderUri: string): Promise<readonly string[]>;
  isFolder(uri: string): Promise<boolean>;
  /** The text of a note; null where it cannot be read, which is logged. */
  readNote(uri: string, log: (message: string) => void): Promise<string | null>;
  /** Where a page ships, by its file name; null where none does. */
  pageUri(name: string): string | null;
}
