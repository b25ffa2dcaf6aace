import { type ExtensionContext, Uri, workspace } from "vscode";
import { BrowserMessageReader, BrowserMessageWriter, LanguageClient } from "vscode-languageclient/browser";
import { clientOptions, start } from "./activate.ts";

let client: LanguageClient | undefined;
let worker: Worker | undefined;

/** The browser's entry: the server is a worker, and sees the files that the client serves. */
export async function activate(context: ExtensionContext): Promise<void> {
  const server = Uri.joinPath(context.extensionUri, "dist/server/main.web.js");
  const pages = Uri.joinPath(context.extensionUri, "dist/pages").toString();
  client = new LanguageClient(
    "plumbline",
    "Plumbline",
    async () => {
      // One that was stopped does not end by itself, and cannot be started again.
      worker?.terminate();
      worker = await startWorker(server);
      // The host wraps its workers, so the library would not know one when it sees it.
      return { reader: new BrowserMessageReader(worker), writer: new BrowserMessageWriter(worker) };
    },
    { ...clientOptions, initializationOptions: { ...clientOptions.initializationOptions, pages } },
  );
  await start(context, client);
}

export async function deactivate(): Promise<void> {
  if (client?.needsStop()) await client.stop();
  worker?.terminate();
}

/** Reads the script first: a worker may not be started from wherever an extension lies. */
async function startWorker(script: Uri): Promise<Worker> {
  const bytes = Uint8Array.from(await workspace.fs.readFile(script));
  const address = URL.createObjectURL(new Blob([bytes], { type: "text/javascript" }));
  return new Worker(address);
}
