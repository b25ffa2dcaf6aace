import "./cli/smallYoungSpace.ts";
import { existsSync } from "node:fs";
import { stat } from "node:fs/promises";
import { join } from "node:path";
import { fileURLToPath, pathToFileURL } from "node:url";
import { createConnection } from "vscode-languageserver/node";
import type { Runtime } from "./lsp/runtime.ts";
import { startServer } from "./lsp/server.ts";

/** The server's files lie in dist/server, the pages beside it. */
const pages = join(__dirname, "..", "pages");

const runtime: Runtime = {
  today() {
    const now = new Date();
    const two = (value: number) => String(value).padStart(2, "0");
    return `${now.getFullYear()}-${two(now.getMonth() + 1)}-${two(now.getDate())}`;
  },
  async listNotes(folderUri) {
    if (!folderUri.startsWith("file:")) return [];
    const { walk } = await import("./disk/discover.ts");
    return (await walk(fileURLToPath(folderUri))).map((path) => pathToFileURL(path).href);
  },
  async isFolder(uri) {
    if (!uri.startsWith("file:")) return false;
    const found = await stat(fileURLToPath(uri)).catch(() => null);
    return found?.isDirectory() === true;
  },
  async readNote(uri, log) {
    if (!uri.startsWith("file:")) return null;
    const { readNote } = await import("./disk/discover.ts");
    const read = await readNote(fileURLToPath(uri));
    if ("text" in read) return read.text;
    log(read.problem);
    return null;
  },
  pageUri: (name) => (hasPages() ? pathToFileURL(join(pages, name)).href : null),
};

let known: boolean | undefined;

function hasPages(): boolean {
  known ??= existsSync(pages);
  return known;
}

startServer(createConnection(), runtime);
