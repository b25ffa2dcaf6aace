import type { InitializeParams } from "vscode-languageserver";

/** What the client said it can do. Nothing else is asked of it. */
export interface Client {
  /** URIs of its folders at the start. */
  readonly folders: readonly string[];
  /** It asks for diagnostics; else they are sent. */
  readonly pulls: boolean;
  readonly refreshesDiagnostics: boolean;
  readonly refreshesHints: boolean;
  readonly watches: boolean;
  readonly asksConfiguration: boolean;
  readonly registersConfiguration: boolean;
  readonly changesFolders: boolean;
  readonly snippets: boolean;
  /** It asks for tooltips and places of a hint when it shows them; else they are sent with the hint. */
  readonly resolvesHints: boolean;
  /** It draws figures of its own accord, and wants to hear when they may be others now. */
  readonly hearsFigures: boolean;
  /** It shows an outline as a tree; else it gets a list. */
  readonly nestsSymbols: boolean;
}

export function clientOf({ capabilities, workspaceFolders, rootUri }: InitializeParams): Client {
  const { workspace, textDocument } = capabilities;
  const lazily = textDocument?.inlayHint?.resolveSupport?.properties ?? [];
  const folders = workspaceFolders?.map(({ uri }) => uri) ?? (rootUri ? [rootUri] : []);
  return {
    folders,
    pulls: textDocument?.diagnostic !== undefined,
    refreshesDiagnostics: workspace?.diagnostics?.refreshSupport === true,
    refreshesHints: workspace?.inlayHint?.refreshSupport === true,
    watches: workspace?.didChangeWatchedFiles?.dynamicRegistration === true,
    asksConfiguration: workspace?.configuration === true,
    registersConfiguration: workspace?.didChangeConfiguration?.dynamicRegistration === true,
    changesFolders: workspace?.workspaceFolders === true,
    snippets: textDocument?.completion?.completionItem?.snippetSupport === true,
    resolvesHints: ["label.tooltip", "label.location"].every((one) => lazily.includes(one)),
    hearsFigures: capabilities.experimental?.plumbline?.figuresChanged === true,
    nestsSymbols: textDocument?.documentSymbol?.hierarchicalDocumentSymbolSupport === true,
  };
}
