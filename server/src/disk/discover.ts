import { readdir, readFile, stat } from "node:fs/promises";
import { join, relative, resolve, sep } from "node:path";
import ignore, { type Ignore } from "ignore";
import { isDynamicPattern } from "tinyglobby";

/** Files larger than this are no notes, and are said so where they are named. */
export const MOST_BYTES = 4 * 1024 * 1024;

export interface Discovered {
  /** Absolute paths, sorted, each once. */
  readonly files: readonly string[];
  /** What was named and cannot be read, as sentences. */
  readonly problems: readonly string[];
}

/** True for the files that may hold notation. */
export function isNoteFile(path: string): boolean {
  return /\.(plumb|md|markdown)$/i.test(path);
}

/**
 * The notes under files, folders and globs. `.git` and `node_modules` are never entered, what
 * `.gitignore` files leave out is not read; a file that is named itself is read all the same.
 */
export async function discover(paths: readonly string[], cwd: string): Promise<Discovered> {
  const files = new Set<string>();
  const problems: string[] = [];
  for (const path of paths) {
    const absolute = resolve(cwd, path);
    const found = await stat(absolute).catch(() => null);
    if (found?.isDirectory()) for (const file of await walk(absolute)) files.add(file);
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
  const rules = await rulesAbove(cwd);
  for (const file of notes) if (!(await isIgnored(file, cwd, rules))) files.add(file);
}

interface Rules {
  readonly folder: string;
  readonly matcher: Ignore;
}

/** Every note below a folder. */
export async function walk(folder: string): Promise<readonly string[]> {
  const found: string[] = [];
  await enter(folder, await rulesAbove(folder), found);
  return found.sort();
}

/** The notes of a folder itself, without those of the folders in it. */
export async function notesIn(folder: string): Promise<readonly string[]> {
  const found: string[] = [];
  await enter(folder, await rulesAbove(folder), found, false);
  return found.sort();
}

async function enter(folder: string, above: readonly Rules[], found: string[], below = true): Promise<void> {
  const entries = await readdir(folder, { withFileTypes: true }).catch(() => []);
  const own = entries.some((entry) => entry.name === ".gitignore") ? await rulesOf(folder) : null;
  const rules = own ? [...above, own] : above;
  for (const entry of entries) {
    const path = join(folder, entry.name);
    if (entry.isDirectory()) {
      if (!below || entry.name === ".git" || entry.name === "node_modules") continue;
      if (!matches(rules, path, true)) await enter(path, rules, found);
    } else if (entry.isFile() && isNoteFile(entry.name) && !matches(rules, path, false)) found.push(path);
  }
}

/** The `.gitignore` files of a folder's parents, up to the one that holds `.git`. */
async function rulesAbove(folder: string): Promise<readonly Rules[]> {
  const rules: Rules[] = [];
  let current = resolve(folder);
  for (;;) {
    if (await stat(join(current, ".git")).catch(() => null)) break;
    const parent = resolve(current, "..");
    if (parent === current) return [];
    current = parent;
  }
  const top = current;
  const steps = relative(top, resolve(folder)).split(sep).filter(Boolean);
  let at = top;
  for (const step of steps) {
    const own = await rulesOf(at);
    if (own) rules.push(own);
    at = join(at, step);
  }
  return rules;
}

async function rulesOf(folder: string): Promise<Rules | null> {
  const text = await readFile(join(folder, ".gitignore"), "utf8").catch(() => null);
  return text === null ? null : { folder, matcher: ignore().add(text) };
}

/** The rules nearest to the path decide, as Git has it. */
function matches(rules: readonly Rules[], path: string, directory: boolean): boolean {
  let ignored = false;
  for (const { folder, matcher } of rules) {
    const inside = relative(folder, path).split(sep).join("/");
    if (!inside || inside.startsWith("..")) continue;
    const { ignored: yes, unignored } = matcher.test(directory ? `${inside}/` : inside);
    if (yes) ignored = true;
    else if (unignored) ignored = false;
  }
  return ignored;
}

async function isIgnored(file: string, cwd: string, above: readonly Rules[]): Promise<boolean> {
  const rules = [...above];
  let at = resolve(cwd);
  const steps = relative(at, file).split(sep).filter(Boolean);
  if (steps[0] === "..") return false;
  for (const [i, step] of steps.entries()) {
    const own = await rulesOf(at);
    if (own) rules.push(own);
    at = join(at, step);
    if (matches(rules, at, i < steps.length - 1)) return true;
  }
  return false;
}

export type ReadNote = { readonly text: string } | { readonly problem: string };

/** The text of a note. A file that is too large or not UTF-8 is said so, and never read as something else. */
export async function readNote(path: string): Promise<ReadNote> {
  try {
    const { size } = await stat(path);
    if (MOST_BYTES < size) return { problem: `${path} is larger than 4 MB, so it is not read: split it.` };
    const bytes = await readFile(path);
    return { text: new TextDecoder("utf-8", { fatal: true, ignoreBOM: true }).decode(bytes) };
  } catch (error) {
    if (error instanceof TypeError)
      return { problem: `${path} is not UTF-8, so it is not read: save it as UTF-8.` };
    const code = (error as NodeJS.ErrnoException).code ?? "unknown error";
    return { problem: `${path} cannot be read (${code}).` };
  }
}
