import {
  type CancellationToken,
  CodeActionKind,
  type Connection,
  DidChangeConfigurationNotification,
  DidChangeWatchedFilesNotification,
  DocumentDiagnosticReportKind,
  FileChangeType,
  type InitializeParams,
  type InitializeResult,
  type InlayHint,
  LSPErrorCodes,
  ResponseError,
  TextDocumentSyncKind,
} from "vscode-languageserver";
import { codeActions } from "../features/codeActions.ts";
import { completion } from "../features/completion.ts";
import { definition } from "../features/definition.ts";
import { documentSymbols } from "../features/documentSymbols.ts";
import { folding } from "../features/folding.ts";
import { formatting } from "../features/formatting.ts";
import { hover } from "../features/hover.ts";
import { inlayHints } from "../features/inlayHints.ts";
import { fileJson } from "../report/pointsJson.ts";
import { type Client, clientOf } from "./client.ts";
import {
  codeActionOf,
  completionOf,
  foldOf,
  type HintData,
  hintOf,
  hoverOf,
  lineEditOf,
  locationOf,
  resolvedHint,
  symbolOf,
} from "./convert.ts";
import { diagnosticsOf, Pusher, workspaceReport } from "./diagnostics.ts";
import { guardWith } from "./guard.ts";
import { type PointsAnswer, type PointsParams, pointsRequest } from "./protocol.ts";
import type { Runtime } from "./runtime.ts";
import { readSettings, type Settings, standardSettings } from "./settings.ts";
import { flavourOf, Workspace } from "./workspace.ts";

/** Starts the language server on a connection. It answers at once and has no timer of its own. */
export function startServer(connection: Connection, runtime: Runtime): void {
  const guard = guardWith(connection);
  const workspace = new Workspace(runtime, (message) => connection.console.warn(message));
  const pageUri = (name: string) => runtime.pageUri(name);
  const pusher = new Pusher(connection, workspace, pageUri);
  let client: Client = clientOf({ processId: null, rootUri: null, capabilities: {} });
  let settings: Settings = standardSettings;
  let starting: readonly string[] = [];
  // Answers wait until the folders' cards are known: a note never shows a card as missing that is only not read yet.
  let ready: Promise<unknown> = Promise.resolve();

  connection.onInitialize((params: InitializeParams): InitializeResult => {
    client = clientOf(params);
    starting = client.folders;
    return { capabilities: capabilities(client), serverInfo: { name: "plumbline" } };
  });

  connection.onInitialized(
    guard("initialized", async () => {
      ready = Promise.all([...starting.map((uri) => workspace.addFolder(uri)), updateSettings()]);
      await registerWhatIsOffered();
      await ready;
      everythingChanged();
    }),
  );

  async function registerWhatIsOffered(): Promise<void> {
    if (client.watches) {
      const globs = ["**/*.plumb", "**/*.md", "**/*.markdown", "**/.gitignore"];
      await connection.client.register(DidChangeWatchedFilesNotification.type, {
        watchers: globs.map((globPattern) => ({ globPattern })),
      });
    }
    if (client.registersConfiguration) {
      await connection.client.register(DidChangeConfigurationNotification.type, { section: "plumbline" });
    }
    if (client.changesFolders) {
      connection.workspace.onDidChangeWorkspaceFolders(
        guard("workspace folders", async ({ added, removed }) => {
          for (const { uri } of removed) workspace.removeFolder(uri);
          ready = Promise.all(added.map(({ uri }) => workspace.addFolder(uri)));
          await ready;
          everythingChanged();
        }),
      );
    }
  }

  async function updateSettings(): Promise<void> {
    settings = client.asksConfiguration
      ? readSettings(await connection.workspace.getConfiguration("plumbline"))
      : settings;
  }

  /** Asks for a refresh where something other than a note's own text changed. */
  function everythingChanged(): void {
    if (client.pulls) {
      if (client.refreshesDiagnostics) connection.languages.diagnostics.refresh();
    } else pusher.pushAll();
    if (client.refreshesHints) void connection.languages.inlayHint.refresh();
  }

  connection.onDidChangeConfiguration(
    guard("configuration", async ({ settings: pushed }) => {
      if (client.asksConfiguration) await updateSettings();
      else settings = readSettings((pushed as { plumbline?: unknown } | null)?.plumbline);
      everythingChanged();
    }),
  );

  connection.onDidOpenTextDocument(
    guard("open", ({ textDocument: { uri, languageId, text, version } }) => {
      const before = workspace.find(uri)?.folder.definitionsVersion;
      workspace.open(
        uri,
        text,
        languageId === "markdown" ? "markdown" : languageId === "plumb" ? "plumb" : flavourOf(uri),
        version,
      );
      afterChange(uri, before);
    }),
  );

  connection.onDidChangeTextDocument(
    guard("change", ({ textDocument: { uri, version }, contentChanges }) => {
      const before = workspace.find(uri)?.folder.definitionsVersion;
      workspace.change(uri, contentChanges, version ?? 0);
      afterChange(uri, before);
    }),
  );

  connection.onDidCloseTextDocument(
    guard("close", async ({ textDocument: { uri } }) => {
      const folder = workspace.find(uri)?.folder;
      const before = folder?.definitionsVersion;
      await workspace.close(uri);
      if (!client.pulls) pusher.clear(uri);
      if (folder && folder.definitionsVersion !== before) everythingChanged();
    }),
  );

  /** The note's own text is asked for by the client; others only where a definition they may use changed. */
  function afterChange(uri: string, before: number | undefined): void {
    const now = workspace.find(uri)?.folder.definitionsVersion;
    if (before !== undefined && now !== before) everythingChanged();
    else if (!client.pulls) pusher.push(uri);
  }

  connection.onDidChangeWatchedFiles(
    guard("watched files", async ({ changes }) => {
      for (const { uri, type } of changes) {
        if (uri.endsWith("/.gitignore")) continue;
        if (type === FileChangeType.Deleted) workspace.removed(uri);
        else await workspace.refresh(uri);
      }
      everythingChanged();
    }),
  );

  /** The note, once the folders are read. Null for a text that nobody opened. */
  async function noteOf(uri: string) {
    await ready;
    return workspace.find(uri)?.note ?? null;
  }

  /** Lets waiting changes in, and gives up where the text was overtaken: a burst is answered for its last text. */
  async function settled(uri: string, token: CancellationToken): Promise<void> {
    const version = workspace.openNotes.get(uri)?.version;
    for (let turn = 0; turn < 3; turn++) await new Promise((resolve) => setImmediate(resolve));
    if (token.isCancellationRequested) throw new ResponseError(LSPErrorCodes.RequestCancelled, "Cancelled.");
    if (workspace.openNotes.get(uri)?.version !== version) {
      throw new ResponseError(LSPErrorCodes.ContentModified, "The text has changed since.");
    }
  }

  connection.languages.diagnostics.on(
    guard("diagnostic", async ({ textDocument: { uri } }, token) => {
      await settled(uri, token).catch((error) => {
        if (error instanceof ResponseError && error.code === LSPErrorCodes.ContentModified) {
          throw new ResponseError(LSPErrorCodes.ServerCancelled, "The text has changed since.", {
            retriggerRequest: false,
          });
        }
        throw error;
      });
      const note = await noteOf(uri);
      return { kind: DocumentDiagnosticReportKind.Full, items: note ? diagnosticsOf(note, pageUri) : [] };
    }),
  );

  connection.languages.diagnostics.onWorkspace(
    guard("workspace diagnostic", async ({ previousResultIds }, token) => {
      await ready;
      return workspaceReport(workspace, previousResultIds, pageUri, token);
    }),
  );

  connection.languages.inlayHint.on(
    guard("inlay hint", async ({ textDocument: { uri }, range }, token) => {
      await settled(uri, token);
      const note = await noteOf(uri);
      if (!note) return [];
      return inlayHints(note, range.start.line, range.end.line, settings.hints).map((hint) =>
        hintOf(hint, uri),
      );
    }),
  );

  connection.languages.inlayHint.resolve(
    guard("resolve a hint", async (plain: InlayHint) => {
      const note = await noteOf((plain.data as HintData | undefined)?.uri ?? "");
      const { line, character } = plain.position;
      const hint =
        note && inlayHints(note, line, line, settings.hints).find((one) => one.character === character);
      return hint ? resolvedHint(plain, hint, pageUri) : plain;
    }),
  );

  connection.onHover(
    guard("hover", async ({ textDocument: { uri }, position }) => {
      const note = await noteOf(uri);
      const found = note && hover(note, position.line, position.character);
      return found ? hoverOf(found) : null;
    }),
  );

  connection.onCompletion(
    guard("completion", async ({ textDocument: { uri }, position }) => {
      const note = await noteOf(uri);
      const items = note ? completion(note, position.line, position.character) : [];
      return items.map((item) => completionOf(item, position.line, client.snippets));
    }),
  );

  connection.onDefinition(
    guard("definition", async ({ textDocument: { uri }, position }) => {
      const note = await noteOf(uri);
      const origin = note && definition(note, position.line, position.character);
      return origin ? locationOf(origin, pageUri) : null;
    }),
  );

  connection.onCodeAction(
    guard("code action", async ({ textDocument: { uri }, range, context }) => {
      const note = await noteOf(uri);
      if (
        !note ||
        (context.only &&
          !context.only.some((kind) => kind === "" || CodeActionKind.QuickFix.startsWith(kind)))
      )
        return [];
      return codeActions(note, range.start.line, range.end.line).map((action) =>
        codeActionOf(action, uri, context.diagnostics),
      );
    }),
  );

  connection.onDocumentSymbol(
    guard("document symbol", async ({ textDocument: { uri } }) => {
      const note = await noteOf(uri);
      return note ? documentSymbols(note).map((symbol) => symbolOf(symbol, note)) : [];
    }),
  );

  connection.onFoldingRanges(
    guard("folding range", async ({ textDocument: { uri } }) => {
      const note = await noteOf(uri);
      return note ? folding(note).map(foldOf) : [];
    }),
  );

  connection.onDocumentFormatting(
    guard("formatting", async ({ textDocument: { uri } }) => {
      const note = await noteOf(uri);
      return note
        ? formatting(note, 0, note.document.lineCount - 1).map((edit) => lineEditOf(edit, note))
        : [];
    }),
  );

  connection.onDocumentRangeFormatting(
    guard("range formatting", async ({ textDocument: { uri }, range }) => {
      const note = await noteOf(uri);
      return note
        ? formatting(note, range.start.line, range.end.line).map((edit) => lineEditOf(edit, note))
        : [];
    }),
  );

  connection.onRequest(
    pointsRequest,
    guard("points", async ({ textDocument }: PointsParams): Promise<PointsAnswer> => {
      const note = await noteOf(textDocument.uri);
      return note ? fileJson(note, textDocument.uri) : null;
    }),
  );

  connection.listen();
}

function capabilities(client: Client): InitializeResult["capabilities"] {
  return {
    positionEncoding: "utf-16",
    textDocumentSync: { openClose: true, change: TextDocumentSyncKind.Incremental },
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
    codeActionProvider: { codeActionKinds: [CodeActionKind.QuickFix] },
    documentSymbolProvider: true,
    foldingRangeProvider: true,
    documentFormattingProvider: true,
    documentRangeFormattingProvider: true,
    workspace: { workspaceFolders: { supported: true, changeNotifications: client.changesFolders } },
  };
}
