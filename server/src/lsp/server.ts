import {
  type Connection,
  FileChangeType,
  type InitializeParams,
  type InitializeResult,
} from "vscode-languageserver";
import { answerRequests } from "./answers.ts";
import { capabilities } from "./capabilities.ts";
import { type Client, clientOf } from "./client.ts";
import { Pusher } from "./diagnostics.ts";
import { guardWith } from "./guard.ts";
import { figuresChangedNotification } from "./protocol.ts";
import { registerWhatIsOffered } from "./registration.ts";
import type { Runtime } from "./runtime.ts";
import { readSettings, type Settings, standardSettings } from "./settings.ts";
import { answerShownRequests } from "./shownRequests.ts";
import { type FileChange, flavourOf, Workspace } from "./workspace.ts";

const fileChanges: Readonly<Record<FileChangeType, FileChange["kind"]>> = {
  [FileChangeType.Created]: "created",
  [FileChangeType.Changed]: "changed",
  [FileChangeType.Deleted]: "deleted",
};

/** Starts the language server on a connection. It answers at once and has no timer of its own. */
export function startServer(connection: Connection, runtime: Runtime): void {
  const guard = guardWith(connection);
  const workspace = new Workspace(runtime, (message) => connection.console.warn(message));
  const pageUri = (name: string) => runtime.pageUri(name);
  const pusher = new Pusher(connection, workspace, pageUri, () => ready);
  let client: Client = clientOf({ processId: null, rootUri: null, capabilities: {} });
  let settings: Settings = standardSettings;
  /** What is read from the disk, one after the other, so that an older text never comes after a newer one. */
  let disk: Promise<void> = Promise.resolve();
  // Answers wait until the folders' cards are known: a note never shows a card as missing that is only not read yet.
  let ready: Promise<void> = disk;
  /** Hints alone wait for the settings. */
  let configured: Promise<void> = disk;

  connection.onInitialize(
    guard.answering("initialize", (params: InitializeParams): InitializeResult => {
      client = clientOf(params);
      return { capabilities: capabilities(client), serverInfo: { name: "plumbline" } };
    }),
  );

  connection.onInitialized(
    guard.hearing("initialized", async () => {
      ready = fromDisk("folders", () => Promise.all(client.folders.map((uri) => workspace.addFolder(uri))));
      configured = updateSettings();
      if (client.changesFolders) connection.workspace.onDidChangeWorkspaceFolders(foldersChanged);
      await registerWhatIsOffered(connection, client, guard);
      await ready;
      await configured;
      everythingChanged();
    }),
  );

  function fromDisk(name: string, work: () => Promise<unknown>): Promise<void> {
    disk = disk.then(guard.hearing(name, async () => void (await work())));
    return disk;
  }

  const foldersChanged = guard.hearing(
    "workspace folders",
    async ({ added, removed }: Record<"added" | "removed", readonly { readonly uri: string }[]>) => {
      ready = fromDisk("folders", async () => {
        for (const { uri } of removed) await workspace.removeFolder(uri);
        for (const { uri } of added) await workspace.addFolder(uri);
      });
      await ready;
      everythingChanged();
    },
  );

  async function updateSettings(): Promise<void> {
    if (!client.asksConfiguration) return;
    await guard.asking("configuration", async () => {
      settings = readSettings(await connection.workspace.getConfiguration("plumbline"));
    });
  }

  /** Asks for a refresh where something other than a note's own text changed. */
  function everythingChanged(): void {
    if (!client.pulls) pusher.pushAll();
    else if (client.refreshesDiagnostics) {
      void guard.asking("refresh of diagnostics", () => connection.languages.diagnostics.refresh());
    }
    if (client.refreshesHints) {
      void guard.asking("refresh of hints", () => connection.languages.inlayHint.refresh());
    }
    if (client.hearsFigures) {
      void guard.asking("change of figures", () => connection.sendNotification(figuresChangedNotification));
    }
  }

  connection.onDidChangeConfiguration(
    guard.hearing("configuration", async ({ settings: pushed }) => {
      if (client.asksConfiguration) await updateSettings();
      else settings = readSettings((pushed as { plumbline?: unknown } | null)?.plumbline);
      everythingChanged();
    }),
  );

  connection.onDidOpenTextDocument(
    guard.hearing("open", ({ textDocument: { uri, languageId, text, version } }) => {
      const before = workspace.folderOf(uri)?.definitionsVersion;
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
    guard.hearing("change", ({ textDocument: { uri, version }, contentChanges }) => {
      const before = workspace.folderOf(uri)?.definitionsVersion;
      workspace.change(uri, contentChanges, version ?? 0);
      afterChange(uri, before);
    }),
  );

  connection.onDidCloseTextDocument(
    guard.hearing("close", async ({ textDocument: { uri } }) => {
      workspace.close(uri);
      if (!client.pulls) pusher.clear(uri);
      await takeIn([{ uri, kind: "changed" }]);
    }),
  );

  /** The note's own text is asked for by the client; others only where a definition they may use changed. */
  function afterChange(uri: string, before: number | undefined): void {
    const now = workspace.folderOf(uri)?.definitionsVersion;
    if (before !== undefined && now !== before) everythingChanged();
    else if (!client.pulls) pusher.push(uri);
  }

  connection.onDidChangeWatchedFiles(
    guard.hearing("watched files", ({ changes }) =>
      takeIn(changes.map(({ uri, type }) => ({ uri, kind: fileChanges[type] }))),
    ),
  );

  async function takeIn(changes: readonly FileChange[]): Promise<void> {
    let changed = false;
    await fromDisk("files", async () => {
      changed = await workspace.filesChanged(changes);
    });
    if (changed) everythingChanged();
  }

  answerRequests(connection, guard, {
    workspace,
    pageUri,
    client: () => client,
    settings: async () => {
      await configured;
      return settings;
    },
    ready: () => ready,
  });
  answerShownRequests(connection, guard, { workspace, ready: () => ready });
  connection.listen();
}
