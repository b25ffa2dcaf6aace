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

/** The notes under files, folders and globs. A file that is named itself is read even where it is ignored. */
export async function discover(paths: readonly string[], cwd: string): Promise<Discovered> {
  const files = new Set<string>();
  const problems: string[] = [];
  for (const path of paths) {
    const absolute = resolve(cwd, path);
    const found = await stat(absolute).catch(() => null);
    if (found?.isDirectory()) for (const file of await walk(diskTree, absolute)) files.add(file);
    else if (found?.isFile()) files.add(absolute);
    else if (isDynamicPattern(path)) await addGlob(path, cwd, files, problems);
    else problems.push(`There is no file or folder ${path}.`);
  }
  return { files: [...files].sort(), problems };
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
