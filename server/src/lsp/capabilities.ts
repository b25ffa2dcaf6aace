import {
  CodeActionKind,
  FileOperationPatternKind,
  type FileOperationRegistrationOptions,
  type ServerCapabilities,
  TextDocumentSyncKind,
} from "vscode-languageserver";
import type { Client } from "./client.ts";
import { FIX_ALL } from "./convert.ts";
import { legend } from "./semanticLegend.ts";

/** Notes, and folders that may hold some. */
const noteFiles: FileOperationRegistrationOptions = {
  filters: [
    { pattern: { glob: "**/*.{plumb,md,markdown}", matches: FileOperationPatternKind.file } },
    { pattern: { glob: "**", matches: FileOperationPatternKind.folder } },
  ],
};

/** What the server says it can do, to this client. */
export function capabilities(client: Client): ServerCapabilities {
  return {
    positionEncoding: "utf-16",
    textDocumentSync: { openClose: true, change: TextDocumentSyncKind.Incremental, save: true },
    ...(client.pulls
      ? {
          diagnosticProvider: {
            identifier: "plumbline",
            interFileDependencies: true,
            workspaceDiagnostics: true,
          },
        }
      : {}),
    inlayHintProvider: { resolveProvider: true },
    hoverProvider: true,
    completionProvider: { triggerCharacters: ["|", ";", " "] },
    definitionProvider: true,
    referencesProvider: true,
    documentHighlightProvider: true,
    renameProvider: client.preparesRename ? { prepareProvider: true } : true,
    codeActionProvider: {
      codeActionKinds: [CodeActionKind.QuickFix, CodeActionKind.RefactorRewrite, FIX_ALL],
    },
    documentSymbolProvider: true,
    workspaceSymbolProvider: true,
    selectionRangeProvider: true,
    signatureHelpProvider: { triggerCharacters: [" "], retriggerCharacters: [","] },
    ...(client.coloursNotes ? { semanticTokensProvider: { legend, full: true, range: true } } : {}),
    foldingRangeProvider: true,
    documentFormattingProvider: true,
    documentRangeFormattingProvider: true,
    documentOnTypeFormattingProvider: { firstTriggerCharacter: "\n" },
    workspace: {
      workspaceFolders: { supported: true, changeNotifications: client.changesFolders },
      ...(client.tellsFileOperations
        ? { fileOperations: { didCreate: noteFiles, didRename: noteFiles, didDelete: noteFiles } }
        : {}),
    },
  };
}
