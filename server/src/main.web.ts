import { BrowserMessageReader, BrowserMessageWriter, createConnection } from "vscode-languageserver/browser";
import { startServer } from "./lsp/server.ts";
import { today } from "./lsp/today.ts";

declare const self: DedicatedWorkerGlobalScope;

/** The server in a worker of the browser: it sees no files but those that the client serves. */
startServer(createConnection(new BrowserMessageReader(self), new BrowserMessageWriter(self)), {
  today,
  disk: null,
  pageUri: () => null,
  // The library takes each message in by such a timer; what is quicker would overtake those that wait.
  soon: (work) => setTimeout(work, 0),
  later(milliseconds, work) {
    const timer = setTimeout(work, milliseconds);
    return () => clearTimeout(timer);
  },
});
