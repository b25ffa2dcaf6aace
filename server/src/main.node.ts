import "./cli/smallYoungSpace.ts";
import { existsSync } from "node:fs";
import { join } from "node:path";
import { fileURLToPath, pathToFileURL } from "node:url";
import { createConnection } from "vscode-languageserver/node";
import { diskTree } from "./disk/diskTree.ts";
import type { Runtime } from "./lsp/runtime.ts";
import { startServer } from "./lsp/server.ts";
import { today } from "./lsp/today.ts";

/** The server's files lie in dist/server, the pages beside it. */
const pages = join(__dirname, "..", "pages");

const runtime: Runtime = {
  today,
  disk: {
    tree: diskTree,
    placeOf: (uri) => (uri.startsWith("file:") ? fileURLToPath(uri) : null),
    uriOf: (path) => pathToFileURL(path).href,
  },
  pageUri: (name) => (hasPages() ? pathToFileURL(join(pages, name)).href : null),
  soon: setImmediate,
  later(milliseconds, work) {
    const timer = setTimeout(work, milliseconds);
    return () => clearTimeout(timer);
  },
};

let known: boolean | undefined;

function hasPages(): boolean {
  known ??= existsSync(pages);
  return known;
}

startServer(createConnection(), runtime);
