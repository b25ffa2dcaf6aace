import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { describe, expect, it } from "vitest";
import type { Diagnostic, InlayHint, SymbolInformation } from "vscode-languageserver";
import { CancellationTokenSource } from "vscode-languageserver/node";
import { eventually } from "../support/eventually.ts";
import { able, startClient } from "../support/lspClient.ts";
import { demoFiles, demoFolder } from "../support/sampleText.ts";

const untitled = "untitled:Untitled-1";
const demo = pathToFileURL(demoFolder).href.replace(/\/$/, "");
const steep = `${demo}/steep-turns.plumb`;
const steepText = demoFiles.find((one) => one.name === "steep-turns.plumb")?.text ?? "";
const whole = { start: { line: 0, character: 0 }, end: { line: 1000, character: 0 } };

describe("clients of every kind", () => {
  it("that refuse whatever is asked of them are answered all the same", async () => {
    const client = await startClient([], able, () => {
      throw new Error("refused");
    });
    client.open(untitled, "| weight 61.4");
    expect((await client.diagnostics(untitled)).map((one) => one.code)).toEqual(["missing-unit"]);
    await eventually(() => expect(client.received).toContain("workspace/inlayHint/refresh"));
    expect((await client.diagnostics(untitled)).map((one) => one.code)).toEqual(["missing-unit"]);
    expect(await client.stop()).toBe(0);
  });

  it("that never say their settings get diagnostics all the same", async () => {
    const client = await startClient([], able, () => new Promise(() => undefined));
    client.open(untitled, "| weight 61.4");
    expect((await client.diagnostics(untitled)).map((one) => one.code)).toEqual(["missing-unit"]);
    expect(await client.stop()).toBe(0);
  });

  it("that do not resolve hints get their tooltips at once, and a list for an outline", async () => {
    const client = await startClient([demo], { textDocument: { diagnostic: {}, inlayHint: {} } });
    client.open(steep, steepText);
    const textDocument = { uri: steep };
    const hints = await client.request<InlayHint[]>("textDocument/inlayHint", { textDocument, range: whole });
    expect(JSON.stringify(hints[0]?.label)).toContain("tooltip");
    const symbols = await client.request<SymbolInformation[]>("textDocument/documentSymbol", {
      textDocument,
    });
    expect(symbols.map((one) => one.name)).toContain("manoeuvre: Entry");
    expect(symbols.every((one) => one.location.uri === steep)).toBe(true);
    expect(client.received.filter((method) => method.startsWith("client/"))).toEqual([]);
    expect(await client.stop()).toBe(0);
  });

  it("are given a hint's tooltip only for the figure that they show", async () => {
    const client = await startClient([demo]);
    client.open(steep, steepText);
    const textDocument = { uri: steep };
    const hints = await client.request<InlayHint[]>("textDocument/inlayHint", { textDocument, range: whole });
    const shown = hints.find((one) => JSON.stringify(one.label).includes("margin")) as InlayHint;
    client.change(steep, 2, { text: steepText.replace("weight 690 kg", "weight 600 kg") });
    expect(await client.request("inlayHint/resolve", shown)).toEqual(shown);
    expect(await client.stop()).toBe(0);
  });

  it("that are sent diagnostics get them once for a burst, and none of a card that is not read yet", async () => {
    const folder = mkdtempSync(join(tmpdir(), "plumbline-push-"));
    try {
      for (let i = 0; i < 40; i++) writeFileSync(join(folder, `${i}.md`), "Prose.\n".repeat(500));
      writeFileSync(
        join(folder, "cards.plumb"),
        "| aircraft wheatear-9; basis vsr; reference 9 t\n| config clean stall 90 kt\n",
      );
      const client = await startClient([pathToFileURL(folder).href], {});
      const pushed: { version?: number; diagnostics: Diagnostic[] }[] = [];
      client.connection.onNotification("textDocument/publishDiagnostics", (params) => {
        pushed.push(params);
      });
      const uri = pathToFileURL(join(folder, "note.plumb")).href;
      client.open(uri, "| phase cruise; fly wheatear-9\n");
      await eventually(() => expect(pushed.length).toBeGreaterThan(0));
      expect(pushed.flatMap((one) => one.diagnostics.map(({ code }) => code))).not.toContain(
        "unknown-aircraft",
      );
      pushed.length = 0;
      const start = { line: 0, character: 0 };
      client.notifyTogether(
        "textDocument/didChange",
        Array.from({ length: 10 }, (_, i) => ({
          textDocument: { uri, version: i + 2 },
          contentChanges: [{ range: { start, end: start }, text: " " }],
        })),
      );
      await eventually(() => expect(pushed.map((one) => one.version)).toContain(11));
      expect(pushed.map((one) => one.version)).toEqual([11]);
      expect(await client.stop()).toBe(0);
    } finally {
      rmSync(folder, { recursive: true });
    }
  });

  it("that call a note by a name of their own have its bar lines checked, and no fence is asked for", async () => {
    const client = await startClient();
    const findings = async (uri: string, languageId: string) => {
      client.open(uri, "| weight 61.4\n", languageId);
      return (await client.diagnostics(uri)).map((one) => one.code);
    };
    for (const [i, name] of ["plaintext", "text", "markdown", "plumb", ""].entries()) {
      expect(await findings(`file:///invented/${i}.plumb`, name), name).toEqual(["missing-unit"]);
    }
    expect(await findings("file:///invented/table.md", "markdown")).toEqual([]);
    expect(await client.stop()).toBe(0);
  });

  it("that cancel a request are told so, and answered the next", async () => {
    const client = await startClient([demo]);
    client.open(steep, steepText);
    const cancelled = new CancellationTokenSource();
    const answer = client.connection
      .sendRequest("textDocument/diagnostic", { textDocument: { uri: steep } }, cancelled.token)
      .catch((error: { code: number }) => error.code);
    cancelled.cancel();
    // -32800: the request was cancelled.
    expect(await answer).toBe(-32800);
    expect((await client.diagnostics(steep)).length).toBeGreaterThan(0);
    expect(await client.stop()).toBe(0);
  });

  it("that start a server again get the same answers", async () => {
    const said: unknown[] = [];
    for (let i = 0; i < 2; i++) {
      const client = await startClient([demo]);
      client.open(steep, steepText);
      said.push(await client.diagnostics(steep));
      expect(await client.stop()).toBe(0);
    }
    expect(said[1]).toEqual(said[0]);
    expect(said[0]).not.toEqual([]);
  });

  it("see what was typed in pieces as they would see it whole", async () => {
    const client = await startClient([demo]);
    const lines = ["\u{1F6E9} 東京 prose", '| phase hold "🛩 東京"; bank 25° left', "| weight 61.4", ""];
    const text = lines.join("\r\n");
    client.open(untitled, "");
    let typed = "";
    let version = 1;
    // In UTF-16 code units, so that an emoji is for a moment half of itself.
    for (const unit of text.split("")) {
      const before = typed.split("\r\n");
      const half = typed.endsWith("\r");
      const at = half
        ? { line: before.length, character: 0 }
        : { line: before.length - 1, character: before[before.length - 1]?.length ?? 0 };
      client.change(untitled, ++version, { range: { start: at, end: at }, text: unit });
      typed += unit;
    }
    const inPieces = await client.diagnostics(untitled);
    client.open("untitled:Untitled-2", text);
    expect(inPieces).toEqual(await client.diagnostics("untitled:Untitled-2"));
    expect(inPieces.map((one) => one.code)).toContain("missing-unit");
    expect(await client.stop()).toBe(0);
  });
});
