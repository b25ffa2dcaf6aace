import type { FileTree } from "./fileTree.ts";

/** Files larger than this are no notes, and are said so where they are named. */
export const MOST_BYTES = 4 * 1024 * 1024;

export type ReadNote = { readonly text: string } | { readonly problem: string };

/** The text of a note. A file that is too large or not UTF-8 is said so, and never read as something else. */
export async function readNote(tree: FileTree, file: string): Promise<ReadNote> {
  const read = await tree.read(file, MOST_BYTES);
  switch (read.kind) {
    case "text":
      return { text: read.text };
    case "too-large":
      return { problem: `${file} is larger than 4 MB, so it is not read: split it.` };
    case "not-utf-8":
      return { problem: `${file} is not UTF-8, so it is not read: save it as UTF-8.` };
    case "unreadable":
      return { problem: `${file} cannot be read (${read.why}).` };
  }
}
