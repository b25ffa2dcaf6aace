import type { FileTree } from "../files/fileTree.ts";
import type { ReadNote } from "../files/readNote.ts";

/** Files that have URIs. */
export interface FileSource {
  readonly tree: FileTree;
  /** The place in the tree; null for the URI of a file that is elsewhere. */
  placeOf(uri: string): string | null;
  uriOf(place: string): string;
}

/** The notes of folders, by URI. */
export interface NoteFiles {
  /** The notes below a folder. A folder in it that cannot be looked into is logged. */
  listNotes(folderUri: string, log: (message: string) => void): Promise<readonly string[]>;
  isFolder(uri: string): Promise<boolean>;
  /** Reads a file in a folder; null where the folder holds none of that name. */
  readIn(folderUri: string, name: string): Promise<ReadNote | null>;
  /** The text of a note; null where it cannot be read, which is logged. */
  readNote(uri: string, log: (message: string) => void): Promise<string | null>;
}

/** Looks for each note in the first source that knows its URI. What reads files is loaded when it is used. */
export function noteFiles(sources: readonly FileSource[]): NoteFiles {
  function found(uri: string): { readonly source: FileSource; readonly place: string } | null {
    for (const source of sources) {
      const place = source.placeOf(uri);
      if (place !== null) return { source, place };
    }
    return null;
  }

  return {
    async listNotes(folderUri, log) {
      const folder = found(folderUri);
      if (!folder) return [];
      const { walk } = await import("../files/walk.ts");
      const { source, place } = folder;
      const unreadable = (one: string) => log(`${one} cannot be looked into, so nothing in it is checked.`);
      return (await walk(source.tree, place, unreadable)).map(source.uriOf);
    },
    async isFolder(uri) {
      const folder = found(uri);
      return folder !== null && (await folder.source.tree.entries(folder.place)) !== null;
    },
    async readIn(folderUri, name) {
      const folder = found(folderUri);
      if (!folder) return null;
      const { tree } = folder.source;
      if (!(await tree.holds(folder.place, name))) return null;
      const { readNote } = await import("../files/readNote.ts");
      return readNote(tree, tree.child(folder.place, name));
    },
    async readNote(uri, log) {
      const file = found(uri);
      if (!file) return null;
      const { readNote } = await import("../files/readNote.ts");
      const read = await readNote(file.source.tree, file.place);
      if ("text" in read) return read.text;
      log(read.problem);
      return null;
    },
  };
}
