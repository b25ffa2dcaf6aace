import { spawnSync } from "node:child_process";
import { cpSync, mkdirSync, mkdtempSync, rmSync, statSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath, pathToFileURL } from "node:url";
import { afterEach, beforeEach, describe, expect, it } from "vitest";
import type { Diagnostic, WorkspaceDiagnosticReport } from "vscode-languageserver";
import { MOST_BYTES } from "../../server/src/files/readNote.ts";
import { eventually } from "../support/eventually.ts";
import { able, type Client, startClient } from "../support/lspClient.ts";
import { demoFolder } from "../support/sampleText.ts";

const cli = fileURLToPath(new URL("../../dist/server/cli.cjs", import.meta.url));
const card = "| aircraft wheatear-9; basis vsr; reference 9 t\n| config clean stall 95 kt\n";
const plan = (bank: number) =>
  `| limits own\n| must any bank 30\n| should any bank 20; must any margin none\n\n| fly wheatear-9; under own; weight 8 t; config clean; altitude FL100; speed 180 kt\n\n| phase cruise; bank ${bank}\n`;

let folder = "";
let client: Client | null = null;

beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), "plumbline-configuration-"));
  mkdirSync(join(folder, ".git"));
});

afterEach(async () => {
  if (client) expect(await client.stop()).toBe(0);
  client = null;
  rmSync(folder, { recursive: true });
});

function write(name: string, text: string | Buffer): void {
  mkdirSync(join(folder, name, ".."), { recursive: true });
  writeFileSync(join(folder, name), text);
}

const uriOf = (name: string) => pathToFileURL(join(folder, name)).href;

async function start(settings: unknown = {}, capabilities = able): Promise<Client> {
  client = await startClient([pathToFileURL(folder).href], capabilities);
  client.settings = settings;
  await client.connection.sendNotification("workspace/didChangeConfiguration", {
    settings: { plumbline: settings },
  });
  // At the start and after the change: what is sent from now on finds the settings in force.
  const { received } = client;
  await eventually(() =>
    expect(received.filter((method) => method === "workspace/configuration")).toHaveLength(2),
  );
  return client;
}

interface Told {
  readonly path: string;
  readonly line: number;
  readonly column: number;
  readonly code: unknown;
  readonly severity: unknown;
  readonly message: string;
}

const severities = ["", "error", "warning", "information", "hint"];

/** Everything that the editor's Problems list would hold. */
async function inEditor(client: Client): Promise<readonly Told[]> {
  const report = await client.request<WorkspaceDiagnosticReport>("workspace/diagnostic", {
    previousResultIds: [],
  });
  return report.items.flatMap((item) =>
    item.kind === "full"
      ? item.items.map((one) => ({
          path: decodeURIComponent(item.uri).slice(decodeURIComponent(pathToFileURL(folder).href).length + 1),
          line: one.range.start.line + 1,
          column: one.range.start.character + 1,
          code: one.code,
          severity: severities[one.severity ?? 0],
          message: String(one.message),
        }))
      : [],
  );
}

/** Everything that `plumbline check` finds, in the same words. */
function onCommandLine(): readonly Told[] {
  const { stdout } = spawnSync(process.execPath, [cli, "check", "--format", "json"], {
    cwd: folder,
    encoding: "utf8",
  });
  const { files } = JSON.parse(stdout) as {
    files: { path: string; findings: (Told & { line: number })[] }[];
  };
  return files.flatMap(({ path, findings }) =>
    findings.map(({ line, column, code, severity, message }) => ({
      path,
      line,
      column,
      code,
      severity,
      message,
    })),
  );
}

const changedOnDisk = (client: Client, name: string, type: number) =>
  client.connection.sendNotification("workspace/didChangeWatchedFiles", {
    changes: [{ uri: uriOf(name), type }],
  });

const inOrder = (told: readonly Told[]) => told.map((one) => JSON.stringify(one)).sort();

describe("the editor and the command line", () => {
  it("tell the same of a folder with a configuration, ignored and excluded notes, Markdown, CRLF and a note as large as any may be", async () => {
    cpSync(demoFolder, join(folder, "demo"), { recursive: true });
    write(
      "plumbline.json",
      '{ "severity": { "bank-over-advice": "error", "claim-stale": "error" }, "exclude": ["drafts/", "*.old.plumb"] }',
    );
    write("drafts/draft.plumb", "| weight 5\n");
    write("plans/first.old.plumb", "| weight 5\n");
    write("plans/second.plumb", "| fly brambling-37; weight 61.4\r\n\r\n| phase cruise\r\n");
    write(
      "plans/third.plumb",
      "| fly brambling-37; rules ifr; weight 56 t; config clean; altitude FL100; speed 220 kt\n\n| phase cruise; bank 28\n",
    );
    write("plans/.gitignore", "private/\n");
    write("plans/private/own.plumb", "| weight 5\n");
    write(
      "plans/briefing.md",
      "# Plan\n\n| a | b |\n| --- | --- |\n\n```plumb\n| weight 5\n```\n\n````\n| weight 5\n````\n",
    );
    write("node_modules/some/note.plumb", "| weight 5\n");
    write("plans/Größe 1.plumb", "| weight 5\n");
    const fence = "```plumb\n| weight 5\n```\n";
    write("largest.md", fence + "prose\n".repeat(MOST_BYTES / 6).slice(fence.length));
    expect(statSync(join(folder, "largest.md")).size).toBeLessThanOrEqual(MOST_BYTES);
    expect(statSync(join(folder, "largest.md")).size).toBeGreaterThan(MOST_BYTES - 10);
    const told = inOrder(await inEditor(await start()));
    expect(told).toEqual(inOrder(onCommandLine()));
    expect(told.length).toBeGreaterThan(10);
    expect(
      told.filter((one) => one.includes("draft") || one.includes("old") || one.includes("private")),
    ).toEqual([]);
    expect(told.filter((one) => one.includes('"bank-over-advice","severity":"error"'))).toHaveLength(1);
    expect(told.filter((one) => one.includes("largest.md"))).toHaveLength(1);
  });

  it("both say that a larger note is not read, and whose configuration that is not UTF-8", async () => {
    write("cards.plumb", card);
    write("huge.md", `\`\`\`plumb\n| weight 5\n\`\`\`\n${"x".repeat(MOST_BYTES)}`);
    const logged: string[] = [];
    const first = await startClient([pathToFileURL(folder).href]);
    client = first;
    first.connection.onNotification("window/logMessage", ({ message }: { message: string }) => {
      logged.push(message);
    });
    expect((await inEditor(first)).filter(({ path }) => path === "huge.md")).toEqual([]);
    await eventually(() => expect(logged.join()).toContain("huge.md is larger than 4 MB"));
    const check = () => spawnSync(process.execPath, [cli, "check"], { cwd: folder, encoding: "utf8" });
    expect(check()).toMatchObject({ status: 2, stderr: expect.stringContaining("larger than 4 MB") });
    rmSync(join(folder, "huge.md"));
    write("plumbline.json", Buffer.from([0x7b, 0xff, 0x7d]));
    await changedOnDisk(first, "plumbline.json", 1);
    await eventually(() =>
      expect(first.pushed.get(uriOf("plumbline.json"))?.[0]?.message).toContain("is not UTF-8"),
    );
    expect(check()).toMatchObject({ status: 2, stderr: expect.stringContaining("is not UTF-8") });
    write("plumbline.json", "{}");
    await changedOnDisk(first, "plumbline.json", 2);
    await eventually(() => expect(first.pushed.get(uriOf("plumbline.json"))).toEqual([]));
  });

  it("leave out a note that is excluded, also after the editor had it open", async () => {
    write("cards.plumb", card);
    write("plan.plumb", plan(35));
    write("old/cards.plumb", card);
    write("plumbline.json", '{ "exclude": ["old/"] }');
    const client = await start();
    const all = async () => inOrder(await inEditor(client));
    expect(await all()).toEqual(inOrder(onCommandLine()));
    client.open(uriOf("old/cards.plumb"), card);
    await eventually(async () => expect((await all()).join()).toContain("duplicate-name"));
    await client.connection.sendNotification("textDocument/didClose", {
      textDocument: { uri: uriOf("old/cards.plumb") },
    });
    await eventually(async () => expect(await all()).toEqual(inOrder(onCommandLine())));
  });
});

describe("plumbline.json", () => {
  it("wins over settings, and both are taken up while the editor runs", async () => {
    write("cards.plumb", card);
    write("plan.plumb", plan(25));
    const client = await start();
    const severity = async () =>
      (await client.diagnostics(uriOf("plan.plumb"))).map((one) => severities[one.severity ?? 0]);
    expect(await severity()).toEqual(["warning"]);
    client.settings = { severity: { "bank-over-advice": "information" } };
    await client.connection.sendNotification("workspace/didChangeConfiguration", {
      settings: { plumbline: client.settings },
    });
    await eventually(async () => expect(await severity()).toEqual(["information"]));
    write("plumbline.json", '{ "severity": { "bank-over-advice": "error" } }');
    const changed = (type: number) => changedOnDisk(client, "plumbline.json", type);
    await changed(1);
    await eventually(async () => expect(await severity()).toEqual(["error"]));
    write("plumbline.json", '{ "exclude": ["plan.plumb"] }');
    await changed(2);
    await eventually(async () =>
      expect((await inEditor(client)).map(({ path }) => path)).not.toContain("plan.plumb"),
    );
    rmSync(join(folder, "plumbline.json"));
    await changed(3);
    await eventually(async () => expect(await severity()).toEqual(["information"]));
  });

  it("with a mistake in it is told beside its line, and lowers nothing", async () => {
    write("cards.plumb", card);
    write("plan.plumb", plan(25));
    write(
      "plumbline.json",
      '{\n  "severity": { "bank-over-advice": "information", "bank-over-advise": "error" }\n}',
    );
    const client = await start();
    await eventually(() => expect(client.pushed.get(uriOf("plumbline.json"))).toHaveLength(1));
    const [problem] = client.pushed.get(uriOf("plumbline.json")) as Diagnostic[];
    expect(problem?.range.start).toEqual({ line: 1, character: 51 });
    expect((await client.diagnostics(uriOf("plan.plumb"))).map((one) => one.severity)).toEqual([2]);
    expect(spawnSync(process.execPath, [cli, "check"], { cwd: folder, encoding: "utf8" })).toMatchObject({
      status: 2,
      stderr: expect.stringContaining(
        'plumbline.json:2:52  "bank-over-advise" is not the code of a finding; did you mean "bank-over-advice"?',
      ),
    });
  });

  it("is told no more once its folder leaves the window", async () => {
    write("plumbline.json", "[]");
    const client = await start();
    await eventually(() => expect(client.pushed.get(uriOf("plumbline.json"))).toHaveLength(1));
    await client.connection.sendNotification("workspace/didChangeWorkspaceFolders", {
      event: { added: [], removed: [{ uri: pathToFileURL(folder).href, name: "notes" }] },
    });
    await eventually(() => expect(client.pushed.get(uriOf("plumbline.json"))).toEqual([]));
  });

  it("says what makes the command line fail, unless an option does", () => {
    write("cards.plumb", card);
    write("plan.plumb", plan(25));
    const status = (...args: string[]) =>
      spawnSync(process.execPath, [cli, "check", ...args], { cwd: folder }).status;
    expect(status()).toBe(0);
    write("plumbline.json", '{ "failOn": "warning" }');
    expect(status()).toBe(1);
    expect(status("--fail-on", "error")).toBe(0);
  });

  it("of a folder that is checked from outside is told not to hold, and how it does", () => {
    write("cards.plumb", card);
    write("plans/plan.plumb", plan(25));
    write("plans/plumbline.json", '{ "failOn": "warning" }');
    const check = (...args: string[]) =>
      spawnSync(process.execPath, [cli, "check", "plans", ...args], { cwd: folder, encoding: "utf8" });
    const says = "plans/plumbline.json does not hold here; with --root plans it does.\n";
    expect(check()).toMatchObject({ status: 0, stderr: expect.stringContaining(says) });
    expect(check("--quiet")).toMatchObject({ status: 0, stderr: "" });
    const { status, stderr } = check("--root", "plans");
    expect([status, stderr.includes(says)]).toEqual([1, false]);
    write("plumbline.json", '{ "exclude": ["plans"] }');
    expect(check()).toMatchObject({
      status: 2,
      stderr: expect.stringContaining("There is no note in plans, beside what plumbline.json leaves out"),
    });
  });
});

describe("the setting of severities", () => {
  it("with a mistake in it is told once in a message, and the rest of it holds", async () => {
    const client = await start();
    const shown: string[] = [];
    client.connection.onNotification("window/showMessage", ({ message }: { message: string }) => {
      shown.push(message);
    });
    write("cards.plumb", card);
    const uri = "untitled:Untitled-1";
    client.open(uri, `${card}\n${plan(25)}`);
    client.settings = {
      severity: { "bank-over-advise": "error", "bank-over-advice": "error", stalled: "warning" },
    };
    for (let i = 0; i < 2; i++)
      await client.connection.sendNotification("workspace/didChangeConfiguration", {
        settings: { plumbline: client.settings },
      });
    await eventually(async () =>
      expect((await client.diagnostics(uri)).map((one) => one.severity)).toEqual([1]),
    );
    expect(shown).toEqual([
      'plumbline.severity: "bank-over-advise" is not the code of a finding; did you mean "bank-over-advice"? plumbline.severity: stalled is an error, and an error is never lowered: write "error", or take it out.',
    ]);
  });
});

describe("new findings", () => {
  const uri = "untitled:Untitled-1";
  const text = (bank: number, more = "") => `${card}\n${plan(bank)}${more}`;
  const codes = async (client: Client) => (await client.diagnostics(uri)).map((one) => one.code);

  it("wait for the save where that is asked for; what is mended goes at once, what stays says what is true now", async () => {
    const client = await start({ diagnostics: { run: "onSave" } });
    client.open(uri, text(35));
    expect(await codes(client)).toEqual(["bank-over-limit"]);
    client.change(uri, 2, { text: text(25) });
    expect(await codes(client)).toEqual(["bank-over-advice"]);
    client.change(uri, 3, { text: text(36, "\n| phase climb; bank 25\n") });
    expect(await codes(client)).toEqual(["bank-over-limit"]);
    expect((await client.diagnostics(uri))[0]?.message).toContain("Bank 36°");
    await client.connection.sendNotification("textDocument/didSave", { textDocument: { uri } });
    await eventually(async () =>
      expect(await codes(client)).toEqual(["bank-over-limit", "bank-over-advice"]),
    );
    expect(client.received).toContain("workspace/diagnostic/refresh");
  });

  it("wait for the delay, and then the client is asked to look again", async () => {
    const client = await start({ diagnostics: { delay: 400 } });
    client.open(uri, text(20));
    expect(await codes(client)).toEqual([]);
    const asked = () => client.received.filter((one) => one === "workspace/diagnostic/refresh").length;
    const before = asked();
    client.change(uri, 2, { text: text(25) });
    expect(await codes(client)).toEqual([]);
    await eventually(async () => expect(await codes(client)).toEqual(["bank-over-advice"]));
    expect(asked()).toBeGreaterThan(before);
  });

  it("do not wait where the client could not be asked to look again", async () => {
    const client = await start(
      { diagnostics: { run: "onSave" } },
      { ...able, workspace: { ...able.workspace, diagnostics: {} } },
    );
    client.open(uri, text(20));
    client.change(uri, 2, { text: text(25) });
    expect(await codes(client)).toEqual(["bank-over-advice"]);
  });

  it("are pushed after the save to a client that cannot ask", async () => {
    const { diagnostic: _, ...textDocument } = able.textDocument ?? {};
    const client = await start({ diagnostics: { run: "onSave" } }, { ...able, textDocument });
    const more = "\n| phase climb; bank 25\n";
    client.open(uri, text(35, more));
    await eventually(() => expect(client.pushed.get(uri)).toHaveLength(2));
    client.change(uri, 2, { text: text(35) });
    await eventually(() => expect(client.pushed.get(uri)).toHaveLength(1));
    client.change(uri, 3, { text: text(35, more) });
    await client.connection.sendNotification("textDocument/didSave", { textDocument: { uri } });
    await eventually(() => expect(client.pushed.get(uri)).toHaveLength(2));
  });

  it("wait in the other notes too while a card is written, and are shown everywhere once it is saved", async () => {
    write("cards.plumb", card);
    write("plan.plumb", plan(20));
    const client = await start({ diagnostics: { run: "onSave" } });
    const cards = uriOf("cards.plumb");
    client.open(cards, card);
    const told = async () => (await inEditor(client)).map(({ code }) => code);
    expect(await told()).toEqual([]);
    client.change(cards, 2, { text: card.replace("95 kt", "195 kt") });
    // The note on the disk is told what the folder is, whoever has a card open.
    expect(await told()).toEqual([]);
    await client.connection.sendNotification("textDocument/didSave", { textDocument: { uri: cards } });
    await eventually(async () => expect(await told()).toContain("stalled"));
    client.change(cards, 3, { text: card });
    expect(await told()).toEqual([]);
  });

  it("that the first text had are shown, though it was edited before anybody asked", async () => {
    const client = await start({ diagnostics: { run: "onSave" } });
    client.open(uri, text(25));
    client.change(uri, 2, { text: text(26) });
    client.change(uri, 3, { text: text(27, "\n| phase climb; bank 25\n") });
    expect(await codes(client)).toEqual(["bank-over-advice"]);
  });

  it("wait no more once the settings say so", async () => {
    const client = await start({ diagnostics: { run: "onSave" } });
    client.open(uri, text(20));
    client.change(uri, 2, { text: text(25) });
    expect(await codes(client)).toEqual([]);
    client.settings = {};
    await client.connection.sendNotification("workspace/didChangeConfiguration", {
      settings: { plumbline: {} },
    });
    await eventually(async () => expect(await codes(client)).toEqual(["bank-over-advice"]));
  });

  it("do not wait for a save of which the client does not tell", async () => {
    const { synchronization: _, ...textDocument } = able.textDocument ?? {};
    const client = await start({ diagnostics: { run: "onSave" } }, { ...able, textDocument });
    client.open(uri, text(20));
    client.change(uri, 2, { text: text(25) });
    expect(await codes(client)).toEqual(["bank-over-advice"]);
  });
});
