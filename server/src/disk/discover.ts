import { stat } from "node:fs/promises";
import { relative, resolve, sep } from "node:path";
import { isDynamicPattern } from "tinyglobby";
import { isNoteFile } from "../files/isNoteFile.ts";
import { below, leavesOut, type RuledFolder, ruledFolder, withOwnRules } from "../files/ruledFolder.ts";
import { walk } from "../files/walk.ts";
import { diskTree } from "./diskTree.ts";

export interface Discovered {
  /** Absolute paths, sorted, each once. */
  readonly files: readonly string[];
  /** What was named and cannot be read, as sentences. */
  readonly problems: readonly string[];
}

/**
 * The notes under files, folders and globs. A file that is named itself is read even where it is ignored
 * or left out.
 *
 * @param isLeftOut told absolute paths
 */
export async function discover(
  paths: readonly string[],
  cwd: string,
  isLeftOut: (file: string) => boolean = () => false,
): Promise<Discovered> {
  const found = new Set<string>();
  const named = new Set<string>();
  const problems: string[] = [];
  const unreadable = (folder: string) =>
    problems.push(`The folder ${folder} cannot be looked into, so nothing in it is checked.`);
  for (const path of paths) {
    const absolute = resolve(cwd, path);
    const there = await stat(absolute).catch(() => null);
    if (there?.isDirectory()) for (const file of await walk(diskTree, absolute, unreadable)) found.add(file);
    else if (there?.isFile()) named.add(absolute);
    else if (isDynamicPattern(path)) await addGlob(path, cwd, found, problems);
    else problems.push(`There is no file or folder ${path}.`);
  }
  const files = [...found].filter((file) => !isLeftOut(file));
  return { files: [...new Set([...files, ...named])].sort(), problems };
}

async function addGlob(pattern: string, cwd: string, files: Set<string>, problems: string[]): Promise<void> {
  const { glob } = await import("tinyglobby");
  const matched = await glob(pattern, {
    cwd,
    absolute: true,
    ignore: ["**/node_modules/**", "**/.git/**"],
    expandDirectories: false,
  });
  const notes = matched.filter(isNoteFile).map((path) => resolve(path));
  if (notes.length === 0) problems.push(`No note matches ${pattern}.`);
  const folder = await ruledFolder(diskTree, resolve(cwd));
  for (const file of notes) if (!(await isIgnored(file, folder))) files.add(file);
}

async function isIgnored(file: string, from: RuledFolder): Promise<boolean> {
  const steps = relative(from.place, file).split(sep).filter(Boolean);
  if (steps[0] === "..") return false;
  let at = from;
  for (const [i, step] of steps.entries()) {
    at = await withOwnRules(diskTree, at);
    if (leavesOut(at, step, i < steps.length - 1)) return true;
    at = below(diskTree, at, step);
  }
  return false;
}
