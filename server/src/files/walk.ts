import type { FileTree } from "./fileTree.ts";
import { isNoteFile } from "./isNoteFile.ts";
import { below, leavesOut, type RuledFolder, ruledFolder, withOwnRules } from "./ruledFolder.ts";

/**
 * Every note below a folder, sorted. `.git` and `node_modules` are never entered; what `.gitignore`
 * files leave out, there and in the folders above, is not read.
 *
 * @param unreadable told the folders that are there and cannot be looked into
 */
export async function walk(
  tree: FileTree,
  folder: string,
  unreadable: (folder: string) => void,
): Promise<readonly string[]> {
  const found: string[] = [];
  await enter(tree, await ruledFolder(tree, folder), found, unreadable);
  return found.sort();
}

/** The notes of a folder itself, without those of the folders in it. */
export async function notesIn(tree: FileTree, folder: string): Promise<readonly string[]> {
  const found: string[] = [];
  await take(tree, await ruledFolder(tree, folder), found, () => undefined);
  return found.sort();
}

async function enter(
  tree: FileTree,
  above: RuledFolder,
  found: string[],
  unreadable: (folder: string) => void,
): Promise<void> {
  const inner = await take(tree, above, found, unreadable);
  // Side by side: a tree that is far away answers each question late.
  await Promise.all(inner.map((one) => enter(tree, one, found, unreadable)));
}

/** Takes in the notes of a folder itself, and gives the folders in it that may hold more. */
async function take(
  tree: FileTree,
  above: RuledFolder,
  found: string[],
  unreadable: (folder: string) => void,
): Promise<readonly RuledFolder[]> {
  const entries = await tree.entries(above.place);
  if (entries === null) {
    // A folder that went while others were looked through is no more.
    const parent = tree.parent(above.place);
    if (parent && (await tree.holds(parent.folder, parent.name))) unreadable(above.place);
    return [];
  }
  const folder = entries.some(({ name }) => name === ".gitignore") ? await withOwnRules(tree, above) : above;
  const inner: RuledFolder[] = [];
  for (const { name, kind } of entries) {
    if (kind === "folder") {
      if (name === ".git" || name === "node_modules" || leavesOut(folder, name, true)) continue;
      inner.push(below(tree, folder, name));
    } else if (kind === "file" && isNoteFile(name) && !leavesOut(folder, name, false)) {
      found.push(tree.child(folder.place, name));
    }
  }
  return inner;
}
