import { spawn } from "node:child_process";
import { fileURLToPath } from "node:url";
import type { ClientCapabilities, Diagnostic, InitializeResult } from "vscode-languageserver";
import {
  createMessageConnection,
  type MessageConnection,
  StreamMessageReader,
  StreamMessageWriter,
} from "vscode-languageserver/node";

export const serverPath = fileURLToPath(new URL("../../dist/server/main.node.cjs", import.meta.url));

/** What a client with every capability says. */
export const able: ClientCapabilities = {
  textDocument: {
    synchronization: { didSave: true },
    diagnostic: {},
    inlayHint: { resolveSupport: { properties: ["tooltip", "label.tooltip", "label.location"] } },
    completion: { completionItem: { snippetSupport: true } },
    documentSymbol: { hierarchicalDocumentSymbolSupport: true },
  },
  workspace: {
    configuration: true,
    workspaceFolders: true,
    diagnostics: { refreshSupport: true },
    inlayHint: { refreshSupport: true },
    didChangeWatchedFiles: { dynamicRegistration: true },
    didChangeConfiguration: { dynamicRegistration: true },
  },
};

export interface Client {
  readonly connection: MessageConnection;
  readonly initialized: InitializeResult;
  /** Methods of everything the server asked or told, in order. */
  readonly received: string[];
  /** The last diagnostics pushed, by URI. */
  readonly pushed: Map<string, Diagnostic[]>;
  /** What the server is told its settings are. */
  settings: unknown;
  open(uri: string, text: string, languageId?: string): void;
  change(uri: string, version: number, ...changes: readonly object[]): void;
  request<T>(method: string, params: object): Promise<T>;
  diagnostics(uri: string): Promise<Diagnostic[]>;
  /** Writes notifications in one piece, so that the server finds them all in its queue. */
  notifyTogether(method: string, params: readonly object[]): void;
  stop(): Promise<number | null>;
}

/** Runs the built server over standard input and output, and says nothing to it yet. */
export function runServer() {
  const child = spawn(process.execPath, [serverPath, "--stdio"], { stdio: ["pipe", "pipe", "inherit"] });
  const ended = new Promise<number | null>((done) => child.once("exit", done));
  const connection = createMessageConnection(
    new StreamMessageReader(child.stdout),
    new StreamMessageWriter(child.stdin),
  );
  return { child, connection, ended };
}

/**
 * Starts the built server over standard input and output, as any editor does. `answer` replaces what
 * the client says to the server's own requests.
 */
export async function startClient(
  folders: readonly string[] = [],
  capabilities: ClientCapabilities = able,
  answer: ((method: string) => unknown) | null = null,
): Promise<Client> {
  const { child, connection, ended } = runServer();
  const received: string[] = [];
  const pushed = new Map<string, Diagnostic[]>();
  const client = { settings: null as unknown };
  connection.onRequest((method: string, params: unknown) => {
    received.push(method);
    if (answer) return answer(method);
    if (method === "workspace/configuration")
      return (params as { items: unknown[] }).items.map(() => client.settings);
    return null;
  });
  connection.onNotification((method: string, params: unknown) => {
    received.push(method);
    if (method === "textDocument/publishDiagnostics") {
      const { uri, diagnostics } = params as { uri: string; diagnostics: Diagnostic[] };
      pushed.set(uri, diagnostics);
    }
  });
  connection.listen();
  const initialized = await connection.sendRequest<InitializeResult>("initialize", {
    processId: process.pid,
    rootUri: null,
    workspaceFolders: folders.map((uri) => ({ uri, name: uri })),
    capabilities,
  });
  await connection.sendNotification("initialized", {});
  return Object.assign(client, {
    connection,
    initialized,
    received,
    pushed,
    open(uri: string, text: string, languageId = "plumb") {
      void connection.sendNotification("textDocument/didOpen", {
        textDocument: { uri, languageId, version: 1, text },
      });
    },
    change(uri: string, version: number, ...contentChanges: readonly object[]) {
      void connection.sendNotification("textDocument/didChange", {
        textDocument: { uri, version },
        contentChanges,
      });
    },
    request: <T>(method: string, params: object) => connection.sendRequest<T>(method, params),
    async diagnostics(uri: string) {
      const report = await connection.sendRequest<{ items: Diagnostic[] }>("textDocument/diagnostic", {
        textDocument: { uri },
      });
      return report.items;
    },
    notifyTogether(method: string, params: readonly object[]) {
      const messages = params.map((one) => JSON.stringify({ jsonrpc: "2.0", method, params: one }));
      child.stdin.write(
        messages.map((text) => `Content-Length: ${Buffer.byteLength(text)}\r\n\r\n${text}`).join(""),
      );
    },
    async stop() {
      await connection.sendRequest("shutdown");
      await connection.sendNotification("exit");
      return ended;
    },
  });
}
