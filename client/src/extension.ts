import type { ExtensionContext } from "vscode";
import { LanguageClient, TransportKind } from "vscode-languageclient/node";
import { type Contributed, clientOptions, start } from "./activate.ts";

let client: LanguageClient | undefined;

/** The desktop's entry: the server is a process of its own, spoken to over IPC. */
export async function activate(context: ExtensionContext): Promise<Contributed> {
  const server = {
    module: context.asAbsolutePath("dist/server/main.node.cjs"),
    transport: TransportKind.ipc,
  };
  client = new LanguageClient(
    "plumbline",
    "Plumbline",
    // The second is taken while the extension itself is being debugged.
    { run: server, debug: { ...server, options: { execArgv: ["--nolazy", "--inspect=6009"] } } },
    clientOptions,
  );
  return start(context, client);
}

export async function deactivate(): Promise<void> {
  if (client?.needsStop()) await client.stop();
}
