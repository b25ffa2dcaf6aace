import { type ExtensionContext, Uri, workspace } from "vscode";
import { BrowserMessageReader, BrowserMessageWriter, LanguageClient } from "vscode-languageclient/browser";
import { type Contributed, clientOptions, start } from "./activate.ts";

let client: LanguageClient | undefined;
let worker: Worker | undefined;
/** Of the server's script, for every start. */
let script: string | undefined;

/** The browser's entry: the server is a worker, and sees the files that the client serves. */
export async function activate(context: ExtensionContext): Promise<Contributed> {
  const server = Uri.joinPath(context.extensionUri, "dist/server/main.web.js");
  const pages = Uri.joinPath(context.extensionUri, "dist/pages").toString();
  client = new LanguageClient(
    "plumbline",
    "Plumbline",
    async () => {
      // One that was stopped does not end by itself, and cannot be started again.
      worker?.terminate();
      script ??= await ownAddress(server);
      worker = new Worker(script);
      // The host wraps its workers, so the library would not know one when it sees it.
      return { reader: new BrowserMessageReader(worker), writer: new BrowserMessageWriter(worker) };
    },
    { ...clientOptions, initializationOptions: { ...clientOptions.initializationOptions, pages } },
  );
  return start(context, client);
}

export async function deactivate(): Promise<void> {
  if (client?.needsStop()) await client.stop();
  worker?.terminate();
}

/** An address within this page: a worker may not be started from wherever an extension lies. */
async function ownAddress(file: Uri): Promise<string> {
  const bytes = Uint8Array.from(await workspace.fs.readFile(file));
  return URL.createObjectURL(new Blob([bytes], { type: "text/javascript" }));
}
