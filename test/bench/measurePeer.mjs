import { generatePeerText } from "./generatePeerText.mjs";
import { initialize } from "./initialize.mjs";
import { median } from "./median.mjs";
import { startServer } from "./startServer.mjs";

/**
 * Median ms from an edit in the middle of a document of so many lines until its diagnostics are there, pulled
 * where the peer can be asked and awaited where it pushes them: `{ ms, found, how }`.
 */
export async function measurePeer({ path, format }, lines, repetitions) {
  const { text, edit } = generatePeerText(format, lines);
  const uri = `file:///bench/document.${format}`;
  const server = startServer(process.execPath, [path, "--stdio"]);
  try {
    const { capabilities } = await initialize(server);
    const pulls = capabilities.diagnosticProvider !== undefined;
    const next = pulls ? () => pull(server, uri) : () => pushed(server, uri);
    server.notify("textDocument/didOpen", { textDocument: { uri, languageId: format, version: 1, text } });
    let found = await next();
    const timings = [];
    let version = 1;
    for (let turn = -1; turn < repetitions; turn++) {
      for (const content of [edit.change, edit.back]) {
        const start = performance.now();
        server.notify("textDocument/didChange", {
          textDocument: { uri, version: ++version },
          contentChanges: [content],
        });
        found = await next();
        if (turn >= 0) timings.push(performance.now() - start);
      }
    }
    return { ms: median(timings), found, how: pulls ? "pulled" : "pushed" };
  } finally {
    await server.stop();
  }
}

async function pull(server, uri) {
  const { items } = await server.request("textDocument/diagnostic", { textDocument: { uri } });
  return items.length;
}

function pushed(server, uri) {
  return new Promise((resolve) => {
    server.on("textDocument/publishDiagnostics", (params) => {
      if (params.uri === uri) resolve(params.diagnostics.length);
    });
  });
}
