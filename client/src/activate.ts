import { type ExtensionContext, workspace } from "vscode";
import type { BaseLanguageClient, LanguageClientOptions, StaticFeature } from "vscode-languageclient";
import { registerCommands } from "./commands.ts";
import { offerComparisons } from "./comparisons.ts";
import { hintsOfNotes } from "./hintsOfNotes.ts";
import { extendMarkdownIt, type PreviewParser } from "./markdownPreview.ts";
import { noteFigures } from "./noteFigures.ts";
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

/** What the editor's Markdown preview takes from the extension. */
export interface Contributed {
  extendMarkdownIt<P extends PreviewParser>(parser: P): P;
}

/** Registers the commands first, so that they answer even where the server does not start. */
export async function start(context: ExtensionContext, client: BaseLanguageClient): Promise<Contributed> {
  registerCommands({
    extension: context,
    client,
    comparisons: offerComparisons(context),
    hintsOfNotes: hintsOfNotes(context, client),
  });
  serveFiles(client);
  showStatus(context, client);
  client.registerFeature(hearsFigures);
  const figures = noteFigures(client);
  context.subscriptions.push(figures);
  try {
    await client.start();
  } catch {
    // The client has shown and logged the reason; thrown on, it would take the commands away too.
  }
  return { extendMarkdownIt: (parser) => extendMarkdownIt(parser, figures.figuresOf) };
}

/**
 * Files, and whatever the window's folders are made of. Not every scheme there is: an older revision
 * beside a note would be checked without the cards of its folder.
 */
function schemes(): readonly string[] {
  const folders = workspace.workspaceFolders?.map(({ uri }) => uri.scheme) ?? [];
  return [...new Set(["file", "untitled", "vscode-remote", "vscode-vfs", ...folders])];
}

/** Tells the server that somebody here draws figures. */
const hearsFigures: StaticFeature = {
  fillClientCapabilities(capabilities) {
    const { plumbline, ...others } = capabilities.experimental ?? {};
    capabilities.experimental = { ...others, plumbline: { ...plumbline, figuresChanged: true } };
  },
  initialize() {},
  getState: () => ({ kind: "static" }),
  clear() {},
};
