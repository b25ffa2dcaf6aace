import { isUtf8 } from "node:buffer";
import { readdir, readFile, stat } from "node:fs/promises";
import { basename, dirname, join } from "node:path";
import type { FileTree } from "../files/fileTree.ts";

/** Every file that is being read is held open, and a system lets a program hold few. */
const READ_AT_ONCE = 32;
let reading = 0;
const waiting: (() => void)[] = [];

/** Does the work once few enough others are at it. */
async function inTurn<T>(work: () => Promise<T>): Promise<T> {
  if (READ_AT_ONCE <= reading) await new Promise<void>((resolve) => waiting.push(resolve));
  else reading++;
  try {
    return await work();
  } finally {
    const next = waiting.shift();
    // Who waited takes the place over.
    if (next) next();
    else reading--;
  }
}

/** The disk of this machine, by absolute paths. */
export const diskTree: FileTree = {
  async entries(folder) {
    const entries = await readdir(folder, { withFileTypes: true }).catch(() => null);
    if (!entries) return null;
    return entries.map((entry) => ({
      name: entry.name,
      kind: entry.isDirectory() ? "folder" : entry.isFile() ? "file" : "other",
    }));
  },
  async holds(folder, name) {
    return (await stat(join(folder, name)).catch(() => null)) !== null;
  },
  async read(file, mostBytes) {
    try {
      if (mostBytes < (await stat(file)).size) return { kind: "too-large" };
      const bytes = await inTurn(() => readFile(file));
      return { kind: isUtf8(bytes) ? "text" : "not-utf-8", text: bytes.toString("utf8") };
    } catch (error) {
      return { kind: "unreadable", why: (error as NodeJS.ErrnoException).code ?? "unknown error" };
    }
  },
  child: join,
  parent(folder) {
    const above = dirname(folder);
    return above === folder ? null : { folder: above, name: basename(folder) };
  },
};
