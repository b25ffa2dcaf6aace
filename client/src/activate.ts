import { type ExtensionContext, workspace } from "vscode";
import type { BaseLanguageClient, LanguageClientOptions } from "vscode-languageclient";
import { registerCommands } from "./commands.ts";
import { offerComparisons } from "./comparisons.ts";
import { servedRequests, serveFiles } from "./serveFiles.ts";
import { showStatus } from "./status.ts";

/**
 * What the server is asked about. It registers the file watching and the settings it needs by itself,
 * as it does in any other editor, so neither stands here.
 */
export const clientOptions: LanguageClientOptions = {
  documentSelector: schemes().flatMap((scheme) => [
    { scheme, language: "plumb" },
    { scheme, language: "markdown" },
  ]),
  // The library's own choice is to ask only when a note is opened.
  diagnosticPullOptions: { onChange: true },
  outputChannelName: "Plumbline",
  initializationOptions: { answers: servedRequests },
};

/** Registers the commands first, so that they answer even where the server does not start. */
export async function start(context: ExtensionContext, client: BaseLanguageClient): Promise<void> {
  registerCommands({ extension: context, client, comparisons: offerComparisons(context) });
  serveFiles(client);
  showStatus(context, client);
  try {
    await client.start();
  } catch {
    // The client has shown and logged the reason; thrown on, it would take the commands away too.
  }
}

/**
 * Files, and whatever the window's folders are made of. Not every scheme there is: an older revision
 * beside a note would be checked without the cards of its folder.
 */
function schemes(): readonly string[] {
  const folders = workspace.workspaceFolders?.map(({ uri }) => uri.scheme) ?? [];
  return [...new Set(["file", "untitled", "vscode-remote", "vscode-vfs", ...folders])];
}
