/**
 * Files in folders, whatever holds them: the disk of this machine, or a client that has none to offer.
 * A place is a path or a URI, as the tree has it.
 */
export interface FileTree {
  /** What a folder holds itself; null where it is no folder or cannot be read. */
  entries(folder: string): Promise<readonly Entry[] | null>;
  /** True where the folder holds something of this name. */
  holds(folder: string, name: string): Promise<boolean>;
  /** Reads a file of `mostBytes` at most. */
  read(file: string, mostBytes: number): Promise<ReadFile>;
  child(folder: string, name: string): string;
  /** The folder that holds this one, and this one's name in it; null for the topmost. */
  parent(folder: string): { readonly folder: string; readonly name: string } | null;
}

/** Links and devices are `other`: they are never followed. */
export interface Entry {
  readonly name: string;
  readonly kind: "file" | "folder" | "other";
}

export type ReadFile =
  | { readonly kind: "text"; readonly text: string }
  /** In the text U+FFFD stands for what is not UTF-8. */
  | { readonly kind: "not-utf-8"; readonly text: string }
  | { readonly kind: "too-large" }
  | { readonly kind: "unreadable"; readonly why: string };
