import { mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { afterEach, describe, expect, it } from "vitest";
import type {
  CodeAction,
  CompletionItem,
  FoldingRange,
  Hover,
  InlayHint,
  Location,
  TextEdit,
  WorkspaceDiagnosticReport,
} from "vscode-languageserver";
import type { CompareParams } from "../../server/src/lsp/protocol.ts";
import { createFolder } from "../../server/src/plan/createFolder.ts";
import { fileJson } from "../../server/src/report/pointsJson.ts";
import { eventually } from "../support/eventually.ts";
import { type Client, startClient } from "../support/lspClient.ts";
import { demoFiles, demoFolder } from "../support/sampleText.ts";

const demo = pathToFileURL(demoFolder).href.replace(/\/$/, "");
const shuttle = `${demo}/winter-shuttle.plumb`;
const shuttleText = readFileSync(join(demoFolder, "winter-shuttle.plumb"), "utf8");
const whole = { start: { line: 0, character: 0 }, end: { line: 1000, character: 0 } };

const running: Client[] = [];

async function start(...args: Parameters<typeof startClient>): Promise<Client> {
  const client = await startClient(...args);
  running.push(client);
  return client;
}

afterEach(async () => {
  for (const client of running.splice(0)) expect(await client.stop()).toBe(0);
});

/** The place just behind a text in the note. */
function after(text: string, part: string) {
  const before = text.slice(0, text.indexOf(part) + part.length).split("\n");
  return { line: before.length - 1, character: before[before.length - 1]?.length ?? 0 };
}

describe("the server over stdio", () => {
  it("answers diagnostics for the demo that are the command line's", async () => {
    const client = await start([demo]);
    client.open(shuttle, shuttleText);
    const folder = createFolder({ today: "2026-12-01" });
    for (const { name, text, flavour } of demoFiles) folder.open(`${demo}/${name}`, text, flavour);
    const note = folder.note(shuttle);
    const wanted = note
      ? fileJson(note, "").findings.map((one) => [one.line, one.column, one.code, one.message])
      : [];
    const found = await client.diagnostics(shuttle);
    expect(
      found.map((one) => [one.range.start.line + 1, one.range.start.character + 1, one.code, one.message]),
    ).toEqual(wanted);
    expect(found.every((one) => one.codeDescription?.href.endsWith(`/pages/${one.code}.md`))).toBe(true);
    expect(
      found.some((one) =>
        one.relatedInformation?.some((related) => related.location.uri === `${demo}/limits.plumb`),
      ),
    ).toBe(true);
  });

  it("answers hints, and resolves their tooltips and places", async () => {
    const client = await start([demo]);
    client.open(shuttle, shuttleText);
    const hints = await client.request<InlayHint[]>("textDocument/inlayHint", {
      textDocument: { uri: shuttle },
      range: whole,
    });
    const label = (hint: InlayHint) =>
      typeof hint.label === "string" ? hint.label : hint.label.map((part) => part.value).join("");
    expect(hints.length).toBeGreaterThan(15);
    expect(hints.every((hint) => label(hint).startsWith("≈ "))).toBe(true);
    const resolved = await client.request<InlayHint>("inlayHint/resolve", hints[0] as InlayHint);
    expect(label(resolved)).toBe(label(hints[0] as InlayHint));
    expect(JSON.stringify(resolved.label)).toContain("aeroplanes.plumb");
    const refreshes = () =>
      client.received.filter((method) => method === "workspace/inlayHint/refresh").length;
    await eventually(() => expect(refreshes()).toBe(1));
    client.settings = { hints: { level: "off" } };
    await client.connection.sendNotification("workspace/didChangeConfiguration", { settings: null });
    await eventually(() => expect(refreshes()).toBe(2));
    expect(
      await client.request("textDocument/inlayHint", { textDocument: { uri: shuttle }, range: whole }),
    ).toEqual([]);
  });

  it("answers hover, definition, completion, symbols, folding, formatting and points", async () => {
    const client = await start([demo]);
    client.open(shuttle, shuttleText);
    const textDocument = { uri: shuttle };
    const hover = await client.request<Hover>("textDocument/hover", {
      textDocument,
      position: after(shuttleText, "bank 32"),
    });
    expect(JSON.stringify(hover.contents)).toMatch(/warning-bank \d+°/);
    const place = await client.request<Location>("textDocument/definition", {
      textDocument,
      position: after(shuttleText, "brambling"),
    });
    expect(place.uri).toBe(`${demo}/aeroplanes.plumb`);
    const items = await client.request<CompletionItem[]>("textDocument/completion", {
      textDocument,
      position: after(shuttleText, "config "),
    });
    expect(items.map((item) => item.label)).toEqual(["clean", "flaps-5", "flaps-15", "flaps-30"]);
    expect(
      await client.request("textDocument/completion", {
        textDocument,
        position: after(shuttleText, "Last-minute fig"),
      }),
    ).toEqual([]);
    const symbols = await client.request<{ name: string }[]>("textDocument/documentSymbol", { textDocument });
    expect(symbols.map((one) => one.name)).toContain("departure: Noise turn");
    const folds = await client.request<FoldingRange[]>("textDocument/foldingRange", { textDocument });
    expect(folds[0]).toEqual({ startLine: 5, endLine: 6 });
    expect(
      await client.request<TextEdit[]>("textDocument/formatting", {
        textDocument,
        options: { tabSize: 2, insertSpaces: true },
      }),
    ).toEqual([]);
    const points = await client.request<{ points: { phase: string }[] }>("plumbline/points", {
      textDocument,
    });
    expect(points.points.map((one) => one.phase)).toContain("cruise");
  });

  it("compares a note with an older text of it, and with its cards as they were", async () => {
    const client = await start([demo]);
    client.open(shuttle, shuttleText);
    const compared = (oldText: string, others: CompareParams["others"] = []) =>
      client.request<{ same: boolean; markdown: string }>("plumbline/compare", {
        textDocument: { uri: shuttle },
        oldText,
        oldName: "winter-shuttle.plumb, last commit",
        others,
      } satisfies CompareParams);
    const same = await compared(shuttleText);
    expect(same.same).toBe(true);
    expect(same.markdown).toContain("not approved data");
    const edited = await compared(shuttleText.replace("bank 32 left", "bank 28 left"));
    expect(edited.markdown).toContain(
      "# winter-shuttle.plumb, last commit compared with winter-shuttle.plumb",
    );
    expect(edited.markdown).toMatch(/\| bank \(line \d+\) \| bank 28 left \| bank 32 left \|/);
    expect(edited.markdown).toMatch(/^- new, error: Bank 32°/m);
    const uri = `${demo}/aeroplanes.plumb`;
    const cards = readFileSync(join(demoFolder, "aeroplanes.plumb"), "utf8");
    const old = await compared(shuttleText, [{ uri, text: cards.replace("stall 127 kt", "stall 125 kt") }]);
    expect(old.markdown).toContain("The card brambling-37 has changed (aeroplanes.plumb, line 7)");
    expect(old.markdown).toContain('Noise turn", line 21: not edited; the card brambling-37 changed');
    const without = await compared(shuttleText, [{ uri, text: null }]);
    expect(without.markdown).toContain("The card brambling-37 is new");
  });

  it("compares nothing that it does not know", async () => {
    const client = await start();
    const textDocument = { uri: "file:///nowhere/note.plumb" };
    expect(
      await client.request("plumbline/compare", { textDocument, oldText: "", oldName: "", others: [] }),
    ).toBeNull();
  });

  it("opens the built-in limits from their name", async () => {
    const client = await start();
    const uri = "untitled:Untitled-1";
    client.open(uri, "| under common-practice");
    const place = await client.request<Location>("textDocument/definition", {
      textDocument: { uri },
      position: { line: 0, character: 10 },
    });
    expect(place.uri).toMatch(/\/pages\/common-practice\.plumb$/);
    const lines = readFileSync(new URL(place.uri), "utf8").split("\n");
    expect(lines[place.range.start.line]).toContain("| limits common-practice");
  });

  it("keeps UTF-16 positions through °, emoji, CJK, tabs and CRLF", async () => {
    const client = await start();
    const uri = "untitled:Untitled-1";
    const first = '| phase hold "🛩 東京"; bank 25° left; weight 61.4';
    client.open(uri, `\u{1F6E9} prose\r\n\t${first}\r\n`);
    const found = (await client.diagnostics(uri)).find((one) => one.code === "missing-unit");
    const at = `\t${first}`.indexOf("61.4");
    expect(found?.range).toEqual({ start: { line: 1, character: at }, end: { line: 1, character: at + 4 } });
    client.change(uri, 2, {
      range: { start: { line: 1, character: at }, end: { line: 1, character: at + 4 } },
      text: "61,4 🛩",
    });
    expect((await client.diagnostics(uri)).map((one) => one.code)).toContain("ambiguous-number");
    client.change(
      uri,
      3,
      { range: { start: { line: 0, character: 0 }, end: { line: 1, character: 0 } }, text: "" },
      { text: "| weight 5 t" },
    );
    expect((await client.diagnostics(uri)).map((one) => one.code)).toEqual([]);
  });

  it("offers quick fixes that belong to their diagnostic", async () => {
    const client = await start();
    const uri = "untitled:Untitled-1";
    client.open(uri, "| weight 61.4");
    const diagnostics = await client.diagnostics(uri);
    const actions = await client.request<CodeAction[]>("textDocument/codeAction", {
      textDocument: { uri },
      range: diagnostics[0]?.range,
      context: { diagnostics },
    });
    expect(actions.map((action) => action.title).slice(0, 3)).toEqual([
      "Write 61.4 t",
      "Write 61.4 kg",
      "Write 61.4 lb",
    ]);
    expect(actions[0]?.diagnostics).toEqual(diagnostics);
    expect(actions[0]?.edit?.changes?.[uri]).toEqual([
      { range: { start: { line: 0, character: 13 }, end: { line: 0, character: 13 } }, newText: " t" },
    ]);
  });

  it("pushes to a client that cannot pull, and never does both", async () => {
    const client = await start([demo], { textDocument: {} });
    expect(client.initialized.capabilities.diagnosticProvider).toBeUndefined();
    client.open(shuttle, shuttleText);
    await eventually(() =>
      expect(client.pushed.get(shuttle)?.map((one) => one.code)).toContain("bank-over-limit"),
    );
    client.change(shuttle, 2, { text: "| weight 61.4" });
    await eventually(() =>
      expect(client.pushed.get(shuttle)?.map((one) => one.code)).toEqual(["missing-unit"]),
    );
    await client.connection.sendNotification("textDocument/didClose", { textDocument: { uri: shuttle } });
    await eventually(() => expect(client.pushed.get(shuttle)).toEqual([]));
    expect(client.received).not.toContain("client/registerCapability");
    const pulling = await start([demo]);
    pulling.open(shuttle, shuttleText);
    await pulling.diagnostics(shuttle);
    expect(pulling.received).not.toContain("textDocument/publishDiagnostics");
  });

  it("answers a burst for its last text, and drops what was overtaken", async () => {
    const client = await start();
    const uri = "untitled:Untitled-1";
    client.open(uri, "| weight 5");
    const asked: Promise<unknown>[] = [];
    for (let i = 0; i < 10; i++) {
      client.change(uri, i + 2, {
        range: { start: { line: 0, character: 10 + i }, end: { line: 0, character: 10 + i } },
        text: "1",
      });
      asked.push(client.diagnostics(uri).catch((error: { code: number }) => error.code));
    }
    const answers = await Promise.all(asked);
    const last = answers[answers.length - 1] as { message: string }[];
    expect(last[0]?.message).toContain("51111111111");
    // -32802: the server cancelled it.
    for (const answer of answers.slice(0, -1)) expect(answer === -32802 || Array.isArray(answer)).toBe(true);
  });

  it("outlives what is malformed, unknown, cancelled or out of order", async () => {
    const client = await start([demo]);
    const uri = "file:///nowhere/never-opened.plumb";
    expect(await client.diagnostics(uri)).toEqual([]);
    expect(
      await client.request("textDocument/hover", {
        textDocument: { uri },
        position: { line: 5, character: 5 },
      }),
    ).toBeNull();
    client.change(uri, 7, { text: "| phase hold" });
    await client.connection.sendNotification("textDocument/didClose", { textDocument: { uri } });
    for (const [method, params] of [
      ["textDocument/hover", {}],
      ["textDocument/inlayHint", { textDocument: { uri: shuttle } }],
      ["textDocument/completion", { textDocument: null, position: null }],
      ["textDocument/codeAction", { textDocument: { uri: shuttle }, range: null, context: null }],
      ["plumbline/points", {}],
      ["textDocument/nonsense", {}],
      ["inlayHint/resolve", {}],
    ] as const) {
      await client.request(method, params).then(
        () => undefined,
        (error: { code: number; message: string }) => expect(error.message.length).toBeGreaterThan(5),
      );
    }
    await client.connection.sendNotification("textDocument/didChange", {
      textDocument: {},
      contentChanges: null,
    });
    await client.connection.sendNotification("textDocument/didOpen", {});
    client.open(shuttle, shuttleText);
    expect((await client.diagnostics(shuttle)).length).toBeGreaterThan(0);
  });

  it("tells all notes of the folder, and only what changed the next time", async () => {
    const client = await start([demo]);
    const report = await client.request<WorkspaceDiagnosticReport>("workspace/diagnostic", {
      previousResultIds: [],
    });
    expect(report.items.map((item) => item.uri).sort()).toEqual(
      demoFiles.map(({ name }) => `${demo}/${name}`),
    );
    const previousResultIds = report.items.map((item) => ({ uri: item.uri, value: item.resultId as string }));
    const again = await client.request<WorkspaceDiagnosticReport>("workspace/diagnostic", {
      previousResultIds,
    });
    expect(again.items.every((item) => item.kind === "unchanged")).toBe(true);
  });

  it("sees files come, change and go, each folder its own", async () => {
    const one = mkdtempSync(join(tmpdir(), "plumbline-one-"));
    const two = mkdtempSync(join(tmpdir(), "plumbline-two-"));
    try {
      const uriOf = (folder: string, name: string) => pathToFileURL(join(folder, name)).href;
      const card = (stall: number) =>
        `| aircraft wheatear-9; basis vsr; reference 9 t\n| config clean stall ${stall} kt\n`;
      writeFileSync(join(one, "cards.plumb"), card(90));
      writeFileSync(join(two, "cards.plumb"), card(95));
      const client = await start([pathToFileURL(one).href, pathToFileURL(two).href]);
      const text =
        "| phase cruise; fly wheatear-9; weight 9 t; config clean; altitude 3000 ft; speed 150 kt; claim vs1g 90 kt\n";
      const note = uriOf(one, "note.plumb");
      const other = uriOf(two, "note.plumb");
      client.open(note, text);
      client.open(other, text);
      const codes = async (uri: string) => (await client.diagnostics(uri)).map((found) => found.code);
      expect(await codes(note)).not.toContain("claim-stale");
      expect(await codes(other)).toContain("claim-stale");
      const refreshes = () =>
        client.received.filter((method) => method === "workspace/diagnostic/refresh").length;
      await eventually(() => expect(refreshes()).toBeGreaterThan(0));
      const before = refreshes();
      writeFileSync(join(one, "cards.plumb"), card(95));
      const changed = (uri: string, type: number) =>
        client.connection.sendNotification("workspace/didChangeWatchedFiles", { changes: [{ uri, type }] });
      await changed(uriOf(one, "cards.plumb"), 2);
      await eventually(() => expect(refreshes()).toBeGreaterThan(before));
      expect(await codes(note)).toContain("claim-stale");
      await changed(uriOf(two, "cards.plumb"), 3);
      expect(await codes(other)).toContain("unknown-aircraft");
      expect(await codes(note)).not.toContain("unknown-aircraft");
    } finally {
      rmSync(one, { recursive: true });
      rmSync(two, { recursive: true });
    }
  });

  it("says so when a file of the folder is not UTF-8, and reads the others", async () => {
    const folder = mkdtempSync(join(tmpdir(), "plumbline-bytes-"));
    try {
      writeFileSync(join(folder, "broken.plumb"), Buffer.from([0x7c, 0x20, 0xff, 0xfe]));
      writeFileSync(join(folder, "good.plumb"), "| weight 5");
      const client = await start([pathToFileURL(folder).href]);
      const report = await client.request<WorkspaceDiagnosticReport>("workspace/diagnostic", {
        previousResultIds: [],
      });
      expect(report.items.map((item) => item.uri.split("/").pop())).toEqual(["good.plumb"]);
      expect(client.received).toContain("window/logMessage");
    } finally {
      rmSync(folder, { recursive: true });
    }
  });
});
