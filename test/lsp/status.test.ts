import { mkdtempSync, renameSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { afterEach, beforeEach, describe, expect, it } from "vitest";
import type {
  Diagnostic,
  Location,
  WorkDoneProgressBegin,
  WorkspaceDiagnosticReport,
  WorkspaceEdit,
} from "vscode-languageserver";
import { CancellationTokenSource, ProgressType } from "vscode-languageserver/node";
import type { Status } from "../../server/src/lsp/protocol.ts";
import { eventually } from "../support/eventually.ts";
import { able, type Client, startClient } from "../support/lspClient.ts";

const card = (stall: number) =>
  `| aircraft wheatear-9; basis vsr; reference 9 t\n| config clean stall ${stall} kt\n`;
const use =
  "| phase cruise; fly wheatear-9; weight 9 t; config clean; altitude 3000 ft; speed 150 kt; claim vs1g 90 kt\n";
const none = { notes: 0, points: 0, errors: 0, warnings: 0, checking: false };

let folders: string[] = [];
const running: Client[] = [];

beforeEach(() => {
  folders = ["one", "two"].map((name) => mkdtempSync(join(tmpdir(), `plumbline-${name}-`)));
});

afterEach(async () => {
  for (const client of running.splice(0)) expect(await client.stop()).toBe(0);
  for (const folder of folders) rmSync(folder, { recursive: true });
});

const write = (folder: number, name: string, text: string) =>
  writeFileSync(join(folders[folder] ?? "", name), text);
const uriOf = (folder: number, name: string) => pathToFileURL(join(folders[folder] ?? "", name)).href;

async function start(capabilities = able, count = 1): Promise<Client> {
  const client = await startClient(
    folders.slice(0, count).map((folder) => pathToFileURL(folder).href),
    capabilities,
  );
  running.push(client);
  return client;
}

const codes = async (client: Client, uri: string) => (await client.diagnostics(uri)).map((one) => one.code);

describe("the status", () => {
  const hearing = { ...able, experimental: { plumbline: { statusChanged: true } } };

  it("is told at every change to a client that wants it", async () => {
    write(0, "cards.plumb", card(90));
    write(0, "never.plumb", `${use}\n${use}`);
    const told: Status[] = [];
    const client = await start(hearing);
    client.connection.onNotification("plumbline/statusChanged", (status: Status) => {
      told.push(status);
    });
    const last = () => told.at(-1);
    const uri = "untitled:Untitled-1";
    client.open(uri, "| phase hold; weight 5");
    // The missing unit is an error; what the point lacks is told too.
    await eventually(() => expect(last()).toMatchObject({ notes: 3, points: 3, checking: false }));
    const before = last() as Status;
    expect(before.errors).toBeGreaterThan(0);
    expect(await client.request("plumbline/status", {})).toEqual(before);
    client.change(uri, 2, { text: "Prose." });
    await eventually(() =>
      expect(last()).toEqual({ ...none, notes: 3, points: 2, warnings: last()?.warnings }),
    );
    // A definition that another note uses: the note that nobody opened is counted again.
    client.open(uriOf(0, "cards.plumb"), card(90).replace("stall 90 kt", "stall 90"));
    await eventually(() => expect(last()?.errors).toBeGreaterThan(0));
    await client.connection.sendNotification("textDocument/didClose", { textDocument: { uri } });
    await eventually(() => expect(last()).toMatchObject({ notes: 2, checking: false }));
  });

  it("is the Problems list's count", async () => {
    write(0, "cards.plumb", card(95));
    write(0, "note.plumb", `${use}\n| phase hold; weight 5\n`);
    const client = await start();
    const { items } = await client.request<WorkspaceDiagnosticReport>("workspace/diagnostic", {
      previousResultIds: [],
    });
    const found = items.flatMap((item) => ("items" in item ? item.items : []) as Diagnostic[]);
    const count = (severity: number) => found.filter((one) => one.severity === severity).length;
    expect(await client.request("plumbline/status", {})).toEqual({
      notes: 2,
      points: 2,
      errors: count(1),
      warnings: count(2),
      checking: false,
    });
    expect(count(1)).toBeGreaterThan(0);
    expect(client.received).not.toContain("plumbline/statusChanged");
  });

  it("of nothing is nothing", async () => {
    const client = await startClient();
    running.push(client);
    expect(await client.request("plumbline/status", {})).toEqual(none);
  });
});

describe("the check of all notes", () => {
  const progress = new ProgressType<unknown>();

  it("is told in pieces to a client that takes them, with how far it is", async () => {
    for (let i = 0; i < 70; i++) write(0, `${i}.plumb`, `| weight ${i}\n`);
    const client = await start();
    const pieces: WorkspaceDiagnosticReport[] = [];
    const told: { kind: string; percentage?: number }[] = [];
    client.connection.onProgress(progress, "pieces", (piece) => {
      pieces.push(piece as WorkspaceDiagnosticReport);
    });
    client.connection.onProgress(progress, "work", (value) => {
      told.push(value as WorkDoneProgressBegin);
    });
    const rest = await client.request<WorkspaceDiagnosticReport>("workspace/diagnostic", {
      previousResultIds: [{ uri: uriOf(0, "gone.plumb"), value: "1" }],
      partialResultToken: "pieces",
      workDoneToken: "work",
    });
    expect(rest).toEqual({ items: [] });
    const items = pieces.flatMap((piece) => piece.items);
    expect(new Set(items.map(({ uri }) => uri)).size).toBe(71);
    expect(items.find(({ uri }) => uri === uriOf(0, "gone.plumb"))).toMatchObject({ items: [] });
    expect(items.filter((item) => "items" in item && 0 < item.items.length)).toHaveLength(70);
    expect(pieces.length).toBeGreaterThan(2);
    expect(told[0]).toMatchObject({ kind: "begin", percentage: 0 });
    expect(told.at(-1)).toEqual({ kind: "end" });
    const percentages = told.flatMap(({ percentage }) => percentage ?? []);
    expect(percentages).toEqual(percentages.toSorted((a, b) => a - b));
    expect(percentages.length).toBeGreaterThan(2);
    // The same in one piece.
    const whole = await client.request<WorkspaceDiagnosticReport>("workspace/diagnostic", {
      previousResultIds: [],
    });
    const byUri = (all: typeof items) => all.toSorted((a, b) => a.uri.localeCompare(b.uri));
    expect(byUri(items.filter(({ uri }) => uri !== uriOf(0, "gone.plumb")))).toEqual(byUri(whole.items));
  });

  it("can be cancelled between two notes, and ends its progress then", async () => {
    for (let i = 0; i < 200; i++) write(0, `${i}.plumb`, `| weight ${i}\n`);
    const client = await start();
    const told: { kind: string }[] = [];
    const cancel = new CancellationTokenSource();
    client.connection.onProgress(progress, "work", (value) => {
      told.push(value as WorkDoneProgressBegin);
      cancel.cancel();
    });
    const answer = await client.connection
      .sendRequest("workspace/diagnostic", { previousResultIds: [], workDoneToken: "work" }, cancel.token)
      .catch((error: { code: number }) => error.code);
    expect(answer).toBe(-32800);
    await eventually(() => expect(told.at(-1)).toEqual({ kind: "end" }));
    expect(await codes(client, uriOf(0, "7.plumb"))).toEqual(["missing-unit"]);
  });

  it("is preceded by a sign that the folder is read, where the client shows one", async () => {
    write(0, "cards.plumb", card(90));
    const client = await start({ ...able, window: { workDoneProgress: true } });
    await eventually(() => expect(client.received).toContain("window/workDoneProgress/create"));
    const plain = await start();
    await plain.request("plumbline/status", {});
    expect(plain.received).not.toContain("window/workDoneProgress/create");
  });
});

describe("files", () => {
  it("that the user renames or deletes are known without any watching", async () => {
    write(0, "cards.plumb", card(90));
    write(0, "note.plumb", use);
    const client = await start({
      textDocument: { diagnostic: {} },
      workspace: { fileOperations: { didCreate: true, didDelete: true, didRename: true } },
    });
    expect(client.initialized.capabilities.workspace?.fileOperations?.didRename).toBeDefined();
    const tell = (method: string, files: object[]) =>
      client.connection.sendNotification(`workspace/${method}`, { files });
    client.open(uriOf(0, "note.plumb"), use);
    expect(await codes(client, uriOf(0, "note.plumb"))).not.toContain("unknown-aircraft");
    renameSync(join(folders[0] ?? "", "cards.plumb"), join(folders[0] ?? "", "fleet.plumb"));
    await tell("didRenameFiles", [{ oldUri: uriOf(0, "cards.plumb"), newUri: uriOf(0, "fleet.plumb") }]);
    const find = () =>
      client.request<Location[]>("textDocument/references", {
        textDocument: { uri: uriOf(0, "note.plumb") },
        position: { line: 0, character: 22 },
        context: { includeDeclaration: true },
      });
    await eventually(async () =>
      expect((await find()).map(({ uri }) => uri).sort()).toEqual([
        uriOf(0, "fleet.plumb"),
        uriOf(0, "note.plumb"),
      ]),
    );
    expect(await codes(client, uriOf(0, "note.plumb"))).not.toContain("duplicate-name");
    rmSync(join(folders[0] ?? "", "fleet.plumb"));
    await tell("didDeleteFiles", [{ uri: uriOf(0, "fleet.plumb") }]);
    await eventually(async () =>
      expect(await codes(client, uriOf(0, "note.plumb"))).toContain("unknown-aircraft"),
    );
    write(0, "again.plumb", card(90));
    await tell("didCreateFiles", [{ uri: uriOf(0, "again.plumb") }]);
    await eventually(async () =>
      expect(await codes(client, uriOf(0, "note.plumb"))).not.toContain("unknown-aircraft"),
    );
    expect(client.received.filter((method) => method.startsWith("client/"))).toEqual([]);
  });

  it("that are renamed are told once where they are watched as well", async () => {
    write(0, "cards.plumb", card(90));
    write(0, "note.plumb", use);
    const client = await start({
      ...able,
      workspace: { ...able.workspace, fileOperations: { didRename: true } },
    });
    await codes(client, uriOf(0, "note.plumb"));
    renameSync(join(folders[0] ?? "", "cards.plumb"), join(folders[0] ?? "", "fleet.plumb"));
    await client.connection.sendNotification("workspace/didChangeWatchedFiles", {
      changes: [
        { uri: uriOf(0, "fleet.plumb"), type: 1 },
        { uri: uriOf(0, "cards.plumb"), type: 3 },
      ],
    });
    await client.connection.sendNotification("workspace/didRenameFiles", {
      files: [{ oldUri: uriOf(0, "cards.plumb"), newUri: uriOf(0, "fleet.plumb") }],
    });
    await eventually(async () =>
      expect(await client.request<Status>("plumbline/status", {})).toMatchObject({ notes: 2, errors: 0 }),
    );
    expect(await codes(client, uriOf(0, "note.plumb"))).toEqual(
      expect.not.arrayContaining(["duplicate-name", "unknown-aircraft"]),
    );
  });

  it("of two folders name the cards of their own folder, and a renaming stays in it", async () => {
    for (const folder of [0, 1]) {
      write(folder, "cards.plumb", card(folder === 0 ? 90 : 95));
      write(folder, "note.plumb", use);
    }
    const client = await start(able, 2);
    expect(await codes(client, uriOf(0, "note.plumb"))).not.toContain("claim-stale");
    expect(await codes(client, uriOf(1, "note.plumb"))).toContain("claim-stale");
    const place = {
      textDocument: { uri: uriOf(1, "note.plumb") },
      position: { line: 0, character: 22 },
    };
    const own = [uriOf(1, "cards.plumb"), uriOf(1, "note.plumb")];
    const found = await client.request<Location[]>("textDocument/references", {
      ...place,
      context: { includeDeclaration: true },
    });
    expect(found.map(({ uri }) => uri).sort()).toEqual(own);
    const edit = await client.request<WorkspaceEdit>("textDocument/rename", {
      ...place,
      newName: "linnet-2",
    });
    expect(Object.keys(edit.changes ?? {}).sort()).toEqual(own);
    const definition = await client.request<Location>("textDocument/definition", place);
    expect(definition.uri).toBe(uriOf(1, "cards.plumb"));
    expect(await client.request<unknown[]>("workspace/symbol", { query: "wheatear-9" })).toHaveLength(2);
  });
});
