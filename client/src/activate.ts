import type { ExtensionContext } from "vscode";
import type { BaseLanguageClient, LanguageClientOptions, StaticFeature } from "vscode-languageclient";
import { registerCommands } from "./commands.ts";
import { hintsOfNotes } from "./hintsOfNotes.ts";
import { extendMarkdownIt, type PreviewParser } from "./markdownPreview.ts";
import { noteFigures } from "./noteFigures.ts";

/**
 * What the server is asked about. It registers the file watching and the settings it needs by itself,
 * as it does in any other editor, so neither stands here.
 */
export const clientOptions: LanguageClientOptions = {
  documentSelector: ["file", "untitled"].flatMap((scheme) => [
    { scheme, language: "plumb" },
    { scheme, language: "markdown" },
  ]),
  // The library's own choice is to ask only when a note is opened.
  diagnosticPullOptions: { onChange: true },
  outputChannelName: "Plumbline",
};

/** What the editor's Markdown preview takes from the extension. */
export interface Contributed {
  extendMarkdownIt<P extends PreviewParser>(parser: P): P;
}

/** Registers the commands first, so that they answer even where the server does not start. */
export async function start(context: ExtensionContext, client: BaseLanguageClient): Promise<Contributed> {
  registerCommands({ extension: context, client, hintsOfNotes: hintsOfNotes(context, client) });
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

/** Tells the server that somebody here draws figures. */
const hearsFigures: StaticFeature = {
  fillClientCapabilities(capabilities) {
    capabilities.experimental = { ...capabilities.experimental, plumbline: { figuresChanged: true } };
  },
  initialize() {},
  getState: () => ({ kind: "static" }),
  clear() {},
};
