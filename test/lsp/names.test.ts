import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { afterEach, beforeEach, expect, it } from "vitest";
import type { DocumentHighlight, Location, WorkspaceEdit } from "vscode-languageserver";
import { able, type Client, startClient } from "../support/lspClient.ts";

const cards = "| aircraft twite-4; basis vsr; reference 4 t\n| config clean stall 80 kt\n";
const never = "\u{1F6E9}\n\n| fly twite-4; under common-practice\n";
const edited = "| fly Twite-4; config clean\n";
const at = (line: number, character: number) => ({ line, character });

let folder = "";
let client: Client | null = null;

beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), "plumbline-names-"));
  writeFileSync(join(folder, "cards.plumb"), cards);
  writeFileSync(join(folder, "never.plumb"), never);
});

afterEach(async () => {
  expect(await client?.stop()).toBe(0);
  rmSync(folder, { recursive: true });
});

const uriOf = (name: string) => pathToFileURL(join(folder, name)).href;

async function start(capabilities = able): Promise<Client> {
  client = await startClient([pathToFileURL(folder).href], capabilities);
  client.open(uriOf("edited.plumb"), `\n${edited}`);
  client.change(uriOf("edited.plumb"), 5, { range: { start: at(0, 0), end: at(1, 0) }, text: "" });
  return client;
}

const place = (name: string, line: number, from: number, to: number) => ({
  uri: uriOf(name),
  range: { start: at(line, from), end: at(line, to) },
});

const cursor = () => ({ textDocument: { uri: uriOf("edited.plumb") }, position: at(0, 8) });

it("references are found in notes that nobody opened, and marked in the one that is open", async () => {
  const running = await start();
  const find = (includeDeclaration: boolean) =>
    running.request<Location[]>("textDocument/references", { ...cursor(), context: { includeDeclaration } });
  const sorted = (places: Location[]) => places.toSorted((a, b) => a.uri.localeCompare(b.uri));
  const uses = [place("edited.plumb", 0, 6, 13), place("never.plumb", 2, 6, 13)];
  expect(sorted(await find(true))).toEqual([place("cards.plumb", 0, 11, 18), ...uses]);
  expect(sorted(await find(false))).toEqual(uses);
  expect(await running.request<DocumentHighlight[]>("textDocument/documentHighlight", cursor())).toEqual([
    { range: place("edited.plumb", 0, 6, 13).range, kind: 2 },
  ]);
  const builtIn = await running.request<Location[]>("textDocument/references", {
    textDocument: { uri: uriOf("never.plumb") },
    position: at(2, 22),
    context: { includeDeclaration: true },
  });
  expect(builtIn.map(({ uri }) => uri.split("/").pop())).toEqual(["never.plumb", "common-practice.plumb"]);
});

it("a renaming names the version of each text that it is for", async () => {
  const running = await start({
    ...able,
    textDocument: { ...able.textDocument, rename: { prepareSupport: true } },
    workspace: { ...able.workspace, workspaceEdit: { documentChanges: true } },
  });
  expect(running.initialized.capabilities.renameProvider).toEqual({ prepareProvider: true });
  expect(await running.request("textDocument/prepareRename", cursor())).toEqual({
    range: place("edited.plumb", 0, 6, 13).range,
    placeholder: "Twite-4",
  });
  const edit = await running.request<WorkspaceEdit>("textDocument/rename", {
    ...cursor(),
    newName: "linnet-2",
  });
  expect(edit.changes).toBeUndefined();
  const told = (edit.documentChanges ?? []).map((one) =>
    "textDocument" in one
      ? [one.textDocument.uri.split("/").pop(), one.textDocument.version, one.edits.length]
      : one.kind,
  );
  expect(told.sort()).toEqual([
    ["cards.plumb", null, 1],
    ["edited.plumb", 5, 1],
    ["never.plumb", null, 1],
  ]);
});

it("a renaming is told without versions to a client that knows none", async () => {
  const running = await start();
  expect(running.initialized.capabilities.renameProvider).toBe(true);
  const edit = await running.request<WorkspaceEdit>("textDocument/rename", {
    ...cursor(),
    newName: "linnet-2",
  });
  expect(edit.documentChanges).toBeUndefined();
  expect(edit.changes?.[uriOf("never.plumb")]).toEqual([
    { range: place("never.plumb", 2, 6, 13).range, newText: "linnet-2" },
  ]);
});

it("a renaming that cannot be says why", async () => {
  const running = await start();
  const refused = (method: string, params: object) =>
    running.request(method, params).then(
      (answer) => answer,
      (error: { code: number; message: string }) => error.message,
    );
  expect(await refused("textDocument/rename", { ...cursor(), newName: "two words" })).toContain("is no name");
  expect(
    await refused("textDocument/prepareRename", {
      textDocument: { uri: uriOf("never.plumb") },
      position: at(2, 22),
    }),
  ).toContain("keeps its name");
});
