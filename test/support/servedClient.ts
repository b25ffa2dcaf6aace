import type { Diagnostic, WorkspaceDiagnosticReport } from "vscode-languageserver";
import type { MessageConnection } from "vscode-languageserver/node";
import type {
  InitializationOptions,
  ListFilesAnswer,
  ListFilesParams,
  ReadFileAnswer,
  ReadFileParams,
} from "../../server/src/lsp/protocol.ts";
import { able } from "./lspClient.ts";

/** A server that runs, and what ends it. */
export interface Started {
  readonly connection: MessageConnection;
  end(): Promise<void>;
}

export interface ServedClient {
  /** What the server asked for or told, each with its parameters. */
  readonly received: { readonly method: string; readonly params: unknown }[];
  /** The files, by URI; whoever changes them tells the server by {@link tell}. */
  readonly files: Map<string, string>;
  open(uri: string, text: string): Promise<void>;
  tell(uri: string, kind: "created" | "changed" | "deleted"): Promise<void>;
  diagnostics(uri: string): Promise<Diagnostic[]>;
  codes(uri: string): Promise<unknown[]>;
  /** URIs of every note of the folder, sorted. */
  notes(): Promise<string[]>;
}

const standard: InitializationOptions = { answers: ["plumbline/listFiles", "plumbline/readFile"] };

/** A client without a disk: it answers from `files`, each at a URI below the folder. */
export async function servedClient(
  { connection }: Started,
  folder: string,
  files: Map<string, string>,
  initializationOptions: InitializationOptions = standard,
): Promise<ServedClient> {
  const received: { method: string; params: unknown }[] = [];
  const answers: Readonly<Record<string, (params: never) => unknown>> = {
    "plumbline/listFiles": ({ uri }: ListFilesParams) => list(files, uri),
    "plumbline/readFile": ({ uri, mostBytes }: ReadFileParams) => read(files, uri, mostBytes),
    "workspace/configuration": () => [null],
  };
  connection.onRequest((method: string, params: unknown) => {
    received.push({ method, params });
    return answers[method]?.(params as never) ?? null;
  });
  connection.onNotification((method: string, params: unknown) => void received.push({ method, params }));
  connection.listen();
  await connection.sendRequest("initialize", {
    processId: null,
    rootUri: null,
    workspaceFolders: [{ uri: folder, name: "folder" }],
    capabilities: able,
    initializationOptions,
  });
  await connection.sendNotification("initialized", {});
  const kinds = { created: 1, changed: 2, deleted: 3 } as const;
  const diagnostics = async (uri: string) =>
    (
      await connection.sendRequest<{ items: Diagnostic[] }>("textDocument/diagnostic", {
        textDocument: { uri },
      })
    ).items;
  return {
    received,
    files,
    open: (uri, text) =>
      connection.sendNotification("textDocument/didOpen", {
        textDocument: { uri, languageId: "plumb", version: 1, text },
      }),
    tell: (uri, kind) =>
      connection.sendNotification("workspace/didChangeWatchedFiles", {
        changes: [{ uri, type: kinds[kind] }],
      }),
    diagnostics,
    codes: async (uri) => (await diagnostics(uri)).map(({ code }) => code),
    async notes() {
      const report = await connection.sendRequest<WorkspaceDiagnosticReport>("workspace/diagnostic", {
        previousResultIds: [],
      });
      return report.items.map(({ uri }) => uri).sort();
    },
  };
}

function list(files: ReadonlyMap<string, string>, folder: string): ListFilesAnswer {
  const base = `${folder.replace(/\/$/, "")}/`;
  const entries = new Map<string, "file" | "folder">();
  for (const uri of files.keys()) {
    const [name = "", ...deeper] = uri.startsWith(base) ? uri.slice(base.length).split("/") : [];
    if (name) entries.set(decodeURIComponent(name), deeper.length > 0 ? "folder" : "file");
  }
  return entries.size > 0 ? [...entries].map(([name, kind]) => ({ name, kind })) : null;
}

function read(files: ReadonlyMap<string, string>, uri: string, mostBytes: number): ReadFileAnswer {
  const text = files.get(uri);
  if (text === undefined) return { kind: "unreadable", why: "FileNotFound" };
  if (mostBytes < text.length) return { kind: "too-large" };
  // A file of the tests that is not UTF-8 says so by what a decoder writes there.
  return { kind: text.includes("\uFFFD") ? "not-utf-8" : "text", text };
}
