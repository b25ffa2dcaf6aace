import type { Ignore } from "ignore";
import type { FileTree } from "./fileTree.ts";
import { patterns } from "./patterns.ts";
import { MOST_BYTES } from "./readNote.ts";

/** A folder and the `.gitignore` rules that hold in it. */
export interface RuledFolder {
  readonly place: string;
  /** The names that lead here from the folder that holds `.git`. */
  readonly steps: readonly string[];
  readonly rules: readonly Rules[];
}

interface Rules {
  /** So many of the steps lead to the folder of the file. */
  readonly depth: number;
  readonly matcher: Ignore;
}

/** A folder under the `.gitignore` files of its parents, up to the one that holds `.git`. */
export async function ruledFolder(tree: FileTree, folder: string): Promise<RuledFolder> {
  const steps: string[] = [];
  let top = folder;
  while (!(await tree.holds(top, ".git"))) {
    const parent = tree.parent(top);
    // Outside of Git a parent's file says nothing.
    if (parent === null) return { place: folder, steps: [], rules: [] };
    steps.unshift(parent.name);
    top = parent.folder;
  }
  let at: RuledFolder = { place: top, steps: [], rules: [] };
  for (const step of steps) at = below(tree, await withOwnRules(tree, at), step);
  // As it was named: what is found in it is spoken of so.
  return { ...at, place: folder };
}

export function below(tree: FileTree, folder: RuledFolder, name: string): RuledFolder {
  return { ...folder, place: tree.child(folder.place, name), steps: [...folder.steps, name] };
}

/** The folder, its own `.gitignore` read as well. */
export async function withOwnRules(tree: FileTree, folder: RuledFolder): Promise<RuledFolder> {
  const read = await tree.read(tree.child(folder.place, ".gitignore"), MOST_BYTES);
  if (!("text" in read)) return folder;
  const own = { depth: folder.steps.length, matcher: patterns(read.text) };
  return { ...folder, rules: [...folder.rules, own] };
}

/** True where the rules leave out what the folder holds by this name. The rules nearest to it decide, as Git has it. */
export function leavesOut({ steps, rules }: RuledFolder, name: string, isFolder: boolean): boolean {
  let ignored = false;
  for (const { depth, matcher } of rules) {
    const inside = [...steps.slice(depth), name].join("/");
    const { ignored: yes, unignored } = matcher.test(isFolder ? `${inside}/` : inside);
    if (yes) ignored = true;
    else if (unignored) ignored = false;
  }
  return ignored;
}
