import {
  type Connection,
  FileChangeType,
  type InitializeParams,
  type InitializeResult,
  MessageType,
  ShowMessageNotification,
} from "vscode-languageserver";
import { type Answering, answerRequests } from "./answers.ts";
import { capabilities } from "./capabilities.ts";
import { type Client, clientOf } from "./client.ts";
import { configurationDiagnostics } from "./configurationDiagnostics.ts";
import { Pusher } from "./diagnostics.ts";
import { guardWith } from "./guard.ts";
import { answerNameRequests } from "./nameAnswers.ts";
import { noteFiles } from "./noteFiles.ts";
import { patience } from "./patience.ts";
import { figuresChangedNotification, statusRequest } from "./protocol.ts";
import { readingProgress } from "./readingProgress.ts";
import { registerWhatIsOffered } from "./registration.ts";
import type { Runtime } from "./runtime.ts";
import { servedFiles } from "./servedFiles.ts";
import { readSettings, type Settings, standardSettings } from "./settings.ts";
import { answerShownRequests } from "./shownRequests.ts";
import { StatusTeller } from "./statusTeller.ts";
import { type FileChange, flavourOpened, Workspace } from "./workspace.ts";
import { answerWritingRequests } from "./writingAnswers.ts";

const fileChanges: Readonly<Record<FileChangeType, FileChange["kind"]>> = {
  [FileChangeType.Created]: "created",
  [FileChangeType.Changed]: "changed",
  [FileChangeType.Deleted]: "deleted",
};

/** Starts the language server on a connection. It answers at once; only new findings may wait, where a setting says so. */
export function startServer(connection: Connection, runtime: Runtime): void {
  const guard = guardWith(connection);
  const served = servedFiles(connection, () => client.servesFiles);
  const files = noteFiles(runtime.disk ? [runtime.disk, served] : [served]);
  const workspace = new Workspace(
    files,
    runtime.today,
    (message) => connection.console.warn(message),
    configurationDiagnostics(connection),
  );
  const pageUri = (name: string) => runtime.pageUri(name) ?? (client.pages && `${client.pages}/${name}`);
  const calm = patience(() => paceFor(client, settings), runtime.later, diagnosticsChanged);
  const pusher = new Pusher(connection, workspace, pageUri, calm, () => ready, runtime.soon);
  let reading = false;
  const status = new StatusTeller({
    connection,
    guard,
    workspace,
    reading: () => reading,
    hears: () => client.hearsStatus,
    soon: runtime.soon,
  });
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
      guard.start();
      return { capabilities: capabilities(client), serverInfo: { name: "plumbline" } };
    }),
  );

  connection.onShutdown(() => guard.end());

  connection.onInitialized(
    guard.hearing("initialized", async () => {
      ready = fromDisk("folders", () => readingProgress(connection, client, guard, readFolders));
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

  /** Tells meanwhile that notes are being read. */
  async function whileReading(work: () => Promise<unknown>): Promise<void> {
    reading = true;
    status.allChanged();
    try {
      await work();
    } finally {
      reading = false;
    }
  }

  async function readFolders(): Promise<void> {
    await whileReading(() => Promise.all(client.folders.map((uri) => workspace.addFolder(uri))));
  }

  const foldersChanged = guard.hearing(
    "workspace folders",
    async ({ added, removed }: Record<"added" | "removed", readonly { readonly uri: string }[]>) => {
      ready = fromDisk("folders", () =>
        whileReading(async () => {
          for (const { uri } of removed) await workspace.removeFolder(uri);
          for (const { uri } of added) await workspace.addFolder(uri);
        }),
      );
      await ready;
      calm.othersChanged();
      everythingChanged();
    },
  );

  async function updateSettings(): Promise<void> {
    if (!client.asksConfiguration) return;
    await guard.asking("configuration", async () => {
      takeSettings(await connection.workspace.getConfiguration("plumbline"));
    });
  }

  function takeSettings(raw: unknown): void {
    const before = settings.problems.join(" ");
    settings = readSettings(raw);
    workspace.severities = settings.severity;
    calm.settingsChanged();
    const problems = settings.problems.join(" ");
    if (problems === "" || problems === before) return;
    void guard.asking("message", () =>
      connection.sendNotification(ShowMessageNotification.type, {
        type: MessageType.Warning,
        message: problems,
      }),
    );
  }

  function diagnosticsChanged(): void {
    if (!client.pulls) pusher.pushAll();
    else if (client.refreshesDiagnostics) {
      void guard.asking("refresh of diagnostics", () => connection.languages.diagnostics.refresh());
    }
  }

  /** Asks for a refresh where something other than a note's own text changed. */
  function everythingChanged(): void {
    status.allChanged();
    diagnosticsChanged();
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
      else takeSettings((pushed as { plumbline?: unknown } | null)?.plumbline);
      everythingChanged();
    }),
  );

  connection.onDidOpenTextDocument(
    guard.hearing("open", ({ textDocument: { uri, languageId, text, version } }) => {
      const before = workspace.folderOf(uri)?.definitionsVersion;
      workspace.open(uri, text, flavourOpened(uri, languageId), version);
      afterChange(uri, before);
    }),
  );

  connection.onDidChangeTextDocument(
    guard.hearing("change", ({ textDocument: { uri, version }, contentChanges }) => {
      const before = workspace.folderOf(uri)?.definitionsVersion;
      calm.editing(uri, () => workspace.note(uri)?.findings() ?? []);
      workspace.change(uri, contentChanges, version ?? 0);
      afterChange(uri, before);
    }),
  );

  connection.onDidSaveTextDocument(guard.hearing("save", ({ textDocument: { uri } }) => calm.saved(uri)));

  connection.onDidCloseTextDocument(
    guard.hearing("close", async ({ textDocument: { uri } }) => {
      workspace.close(uri);
      calm.closed(uri);
      status.changed(uri);
      if (!client.pulls) pusher.clear(uri);
      await takeIn([{ uri, kind: "closed" }]);
    }),
  );

  /** The note's own text is asked for by the client; others only where a definition they may use changed. */
  function afterChange(uri: string, before: number | undefined): void {
    const now = workspace.folderOf(uri)?.definitionsVersion;
    if (before !== undefined && now !== before) everythingChanged();
    else {
      status.changed(uri);
      if (!client.pulls) pusher.push(uri);
    }
  }

  connection.onDidChangeWatchedFiles(
    guard.hearing("watched files", ({ changes }) =>
      takeIn(changes.map(({ uri, type }) => ({ uri, kind: fileChanges[type] }))),
    ),
  );

  // Beside the watched files, since many clients tell these and watch nothing: what is told twice changes nothing.
  connection.workspace.onDidCreateFiles(
    guard.hearing("created files", ({ files }) => takeIn(files.map(({ uri }) => ({ uri, kind: "created" })))),
  );
  connection.workspace.onDidDeleteFiles(
    guard.hearing("deleted files", ({ files }) => takeIn(files.map(({ uri }) => ({ uri, kind: "deleted" })))),
  );
  connection.workspace.onDidRenameFiles(
    guard.hearing("renamed files", ({ files }) =>
      takeIn(
        files.flatMap(({ oldUri, newUri }) => [
          { uri: oldUri, kind: "deleted" },
          { uri: newUri, kind: "created" },
        ]),
      ),
    ),
  );

  async function takeIn(changes: readonly FileChange[]): Promise<void> {
    let changed = false;
    await fromDisk("files", async () => {
      changed = await workspace.filesChanged(changes);
    });
    if (!changed) return;
    calm.othersChanged();
    everythingChanged();
  }

  const answering: Answering = {
    workspace,
    pageUri,
    soon: runtime.soon,
    patience: calm,
    client: () => client,
    settings: async () => {
      await configured;
      return settings;
    },
    ready: () => ready,
  };
  connection.onRequest(
    statusRequest,
    guard.answering("status", () => status.status()),
  );
  answerRequests(connection, guard, answering);
  answerNameRequests(connection, guard, answering);
  answerWritingRequests(connection, guard, answering);
  answerShownRequests(connection, guard, { workspace, ready: () => ready });
  connection.listen();
}

/** How long new findings may wait; null where the client could never show what waited. */
function paceFor(client: Client, { diagnostics }: Settings): Settings["diagnostics"] | null {
  if (client.pulls && !client.refreshesDiagnostics) return null;
  return client.tellsSaves ? diagnostics : { ...diagnostics, run: "onType" };
}
