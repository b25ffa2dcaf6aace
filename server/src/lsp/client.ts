import type { InitializeParams } from "vscode-languageserver";
import { type InitializationOptions, listFilesRequest, readFileRequest } from "./protocol.ts";

/** What the client said it can do. Nothing else is asked of it. */
export interface Client {
  /** URIs of its folders at the start. */
  readonly folders: readonly string[];
  /** It asks for diagnostics; else they are sent. */
  readonly pulls: boolean;
  readonly refreshesDiagnostics: boolean;
  readonly refreshesHints: boolean;
  /** It tells when a note is saved. */
  readonly tellsSaves: boolean;
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
  /** It asks, before it asks for a new name, whether there can be one. */
  readonly preparesRename: boolean;
  /** It takes edits with the version of the text that they are for, and refuses them for any other. */
  readonly versionsEdits: boolean;
  /** It finds an argument in a signature by its place there; else by its text. */
  readonly placesArguments: boolean;
  readonly coloursNotes: boolean;
  /** It lists and reads files for a server that cannot see them. */
  readonly servesFiles: boolean;
  /** URI of the folder that holds the pages, where it knows one. */
  readonly pages: string | null;
  /** It tells which files its user renamed, created and deleted, watching or not. */
  readonly tellsFileOperations: boolean;
  /** It shows that something is going on when the server asks for it. */
  readonly showsProgress: boolean;
  /** It shows how much is checked, and wants to hear of every change. */
  readonly hearsStatus: boolean;
}

export function clientOf({
  capabilities,
  workspaceFolders,
  rootUri,
  initializationOptions,
}: InitializeParams): Client {
  const { workspace, textDocument, window } = capabilities;
  const lazily = textDocument?.inlayHint?.resolveSupport?.properties ?? [];
  const folders = workspaceFolders?.map(({ uri }) => uri) ?? (rootUri ? [rootUri] : []);
  const { answers, pages } = optionsOf(initializationOptions);
  return {
    folders,
    pulls: textDocument?.diagnostic !== undefined,
    refreshesDiagnostics: workspace?.diagnostics?.refreshSupport === true,
    refreshesHints: workspace?.inlayHint?.refreshSupport === true,
    tellsSaves: textDocument?.synchronization?.didSave === true,
    watches: workspace?.didChangeWatchedFiles?.dynamicRegistration === true,
    asksConfiguration: workspace?.configuration === true,
    registersConfiguration: workspace?.didChangeConfiguration?.dynamicRegistration === true,
    changesFolders: workspace?.workspaceFolders === true,
    snippets: textDocument?.completion?.completionItem?.snippetSupport === true,
    resolvesHints: ["label.tooltip", "label.location"].every((one) => lazily.includes(one)),
    hearsFigures: capabilities.experimental?.plumbline?.figuresChanged === true,
    nestsSymbols: textDocument?.documentSymbol?.hierarchicalDocumentSymbolSupport === true,
    preparesRename: textDocument?.rename?.prepareSupport === true,
    tellsFileOperations: workspace?.fileOperations?.didRename === true,
    showsProgress: window?.workDoneProgress === true,
    hearsStatus: capabilities.experimental?.plumbline?.statusChanged === true,
    placesArguments:
      textDocument?.signatureHelp?.signatureInformation?.parameterInformation?.labelOffsetSupport === true,
    coloursNotes: textDocument?.semanticTokens?.formats.includes("relative") === true,
    versionsEdits: workspace?.workspaceEdit?.documentChanges === true,
    servesFiles: [listFilesRequest, readFileRequest].every((one) => answers.includes(one)),
    pages,
  };
}

/** Options come from whoever starts the server, so nothing is taken for granted. */
function optionsOf(raw: unknown): { readonly answers: readonly unknown[]; readonly pages: string | null } {
  const { answers, pages } = (raw ?? {}) as { [Name in keyof InitializationOptions]: unknown };
  return {
    answers: Array.isArray(answers) ? answers : [],
    pages: typeof pages === "string" ? pages.replace(/\/$/, "") : null,
  };
}
