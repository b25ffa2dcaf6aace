import { mkdirSync, mkdtempSync, renameSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { afterEach, beforeEach, describe, expect, it } from "vitest";
import type { WorkspaceDiagnosticReport } from "vscode-languageserver";
import { eventually } from "../support/eventually.ts";
import { type Client, startClient } from "../support/lspClient.ts";

const use =
  "| phase cruise; fly wheatear-9; weight 9 t; config clean; altitude 3000 ft; speed 150 kt; claim vs1g 90 kt\n";

function card(stall: number): string {
  return `| aircraft wheatear-9; basis vsr; reference 9 t\n| config clean stall ${stall} kt\n`;
}

let folder = "";
let client: Client;

beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), "plumbline-disk-"));
  mkdirSync(join(folder, ".git"));
});

afterEach(async () => {
  expect(await client.stop()).toBe(0);
  rmSync(folder, { recursive: true });
});

function write(name: string, text: string | Buffer): void {
  mkdirSync(join(folder, name, ".."), { recursive: true });
  writeFileSync(join(folder, name), text);
}

function uriOf(name: string): string {
  return pathToFileURL(join(folder, name)).href;
}

const kinds = { created: 1, changed: 2, deleted: 3 } as const;

async function tell(...changes: readonly (readonly [string, keyof typeof kinds])[]): Promise<void> {
  await client.connection.sendNotification("workspace/didChangeWatchedFiles", {
    changes: changes.map(([name, kind]) => ({ uri: uriOf(name), type: kinds[kind] })),
  });
}

async function codes(name = "note.plumb"): Promise<unknown[]> {
  return (await client.diagnostics(uriOf(name))).map((one) => one.code);
}

describe("notes on the disk", () => {
  it("are one with the editor's text, however the editor spells the path", async () => {
    write("cards (1).plumb", card(80));
    write("note.plumb", use);
    client = await startClient([pathToFileURL(folder).href]);
    expect(await codes()).toContain("claim-stale");
    const spelled = uriOf("cards (1).plumb").replace("(", "%28").replace(")", "%29");
    client.open(spelled, card(90));
    expect(await codes()).not.toContain("duplicate-name");
    expect(await codes()).not.toContain("claim-stale");
    await client.connection.sendNotification("textDocument/didClose", { textDocument: { uri: spelled } });
    await eventually(async () => expect(await codes()).toContain("claim-stale"));
  });

  it("that are ignored or belong to packages stay out when they come", async () => {
    write(".gitignore", "out/\n");
    write("cards.plumb", card(90));
    write("note.plumb", use);
    client = await startClient([pathToFileURL(folder).href]);
    expect(await codes()).not.toContain("claim-stale");
    write("out/copy.plumb", card(95));
    write("node_modules/some/copy.plumb", card(95));
    write("seen.plumb", "| weight 61.4\n");
    await tell(
      ["out/copy.plumb", "created"],
      ["node_modules/some/copy.plumb", "created"],
      ["seen.plumb", "created"],
    );
    // What came last is there, so what came before it was looked at.
    await eventually(async () => expect(await codes("seen.plumb")).toEqual(["missing-unit"]));
    expect(await codes()).not.toContain("duplicate-name");
  });

  it("go and come as a .gitignore says", async () => {
    write("cards.plumb", card(90));
    write("old/cards.plumb", card(80));
    write("note.plumb", use);
    client = await startClient([pathToFileURL(folder).href]);
    expect(await codes()).toContain("duplicate-name");
    write(".gitignore", "old/\n");
    await tell([".gitignore", "created"]);
    await eventually(async () => expect(await codes()).not.toContain("duplicate-name"));
    write(".gitignore", "");
    await tell([".gitignore", "changed"]);
    await eventually(async () => expect(await codes()).toContain("duplicate-name"));
  });

  it("go and come with their folder, of which alone a client tells", async () => {
    write("fleet/cards.plumb", card(90));
    write("note.plumb", use);
    client = await startClient([pathToFileURL(folder).href]);
    expect(await codes()).not.toContain("unknown-aircraft");
    renameSync(join(folder, "fleet"), join(folder, ".git", "fleet"));
    await tell(["fleet", "deleted"]);
    await eventually(async () => expect(await codes()).toContain("unknown-aircraft"));
    renameSync(join(folder, ".git", "fleet"), join(folder, "hangar.2"));
    await tell(["hangar.2", "created"]);
    await eventually(async () => expect(await codes()).not.toContain("unknown-aircraft"));
  });

  it("are read once they are mended", async () => {
    write("cards.plumb", Buffer.from([0x7c, 0x20, 0xff, 0xfe]));
    write("note.plumb", use);
    client = await startClient([pathToFileURL(folder).href]);
    expect(await codes()).toContain("unknown-aircraft");
    write("cards.plumb", card(90));
    await tell(["cards.plumb", "changed"]);
    await eventually(async () => expect(await codes()).not.toContain("unknown-aircraft"));
  });

  it("belong to the innermost folder of the window alone", async () => {
    write("cards.plumb", card(90));
    write("note.plumb", use);
    write("inner/cards.plumb", card(80));
    write("inner/note.plumb", use);
    const inner = { uri: uriOf("inner"), name: "inner" };
    client = await startClient([pathToFileURL(folder).href, inner.uri]);
    expect(await codes()).not.toContain("duplicate-name");
    expect(await codes()).not.toContain("claim-stale");
    expect(await codes("inner/note.plumb")).toContain("claim-stale");
    const report = await client.request<WorkspaceDiagnosticReport>("workspace/diagnostic", {
      previousResultIds: [],
    });
    expect(report.items.map(({ uri }) => uri).sort()).toEqual(
      ["cards.plumb", "inner/cards.plumb", "inner/note.plumb", "note.plumb"].map(uriOf),
    );
    const change = (added: readonly object[], removed: readonly object[]) =>
      client.connection.sendNotification("workspace/didChangeWorkspaceFolders", {
        event: { added, removed },
      });
    client.open(uriOf("inner/note.plumb"), use);
    await change([], [inner]);
    expect(await codes()).toContain("duplicate-name");
    expect(await codes("inner/note.plumb")).toContain("duplicate-name");
    await change([inner], []);
    expect(await codes()).not.toContain("duplicate-name");
    expect(await codes("inner/note.plumb")).toContain("claim-stale");
  });

  it("ask for no refresh when the editor saves what it has open", async () => {
    write("note.plumb", use);
    client = await startClient([pathToFileURL(folder).href]);
    const refreshes = () => client.received.filter((method) => method.endsWith("/refresh")).length;
    await eventually(() => expect(refreshes()).toBe(2));
    client.open(uriOf("note.plumb"), use);
    write("note.plumb", `${use}\n`);
    await tell(["note.plumb", "changed"]);
    write("other.plumb", "| weight 5 t\n");
    await tell(["other.plumb", "created"]);
    // The refresh of the other note comes after, so the first one would have been counted.
    await eventually(() => expect(refreshes()).toBe(4));
  });

  it("keep the editor's text when it is closed and opened again at once", async () => {
    write("note.plumb", "| weight 5 t\n");
    client = await startClient([pathToFileURL(folder).href]);
    const uri = uriOf("note.plumb");
    client.open(uri, "| weight 61.4\n");
    await client.connection.sendNotification("textDocument/didClose", { textDocument: { uri } });
    client.open(uri, "| weight 61,4 t\n");
    await tell(["note.plumb", "changed"]);
    expect(await codes()).toEqual(["ambiguous-number"]);
    expect(await codes()).toEqual(["ambiguous-number"]);
  });
});
