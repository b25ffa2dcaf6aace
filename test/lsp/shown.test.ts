import { readFileSync } from "node:fs";
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { afterEach, describe, expect, it } from "vitest";
import type { InlayHint } from "vscode-languageserver";
import type { FencesAnswer } from "../../server/src/lsp/protocol.ts";
import { eventually } from "../support/eventually.ts";
import { able, type Client, startClient } from "../support/lspClient.ts";
import { demoFolder } from "../support/sampleText.ts";

const demo = pathToFileURL(demoFolder).href.replace(/\/$/, "");
const briefing = `${demo}/contingency-briefing.md`;
const text = readFileSync(join(demoFolder, "contingency-briefing.md"), "utf8");
const textDocument = { uri: briefing };

const running: Client[] = [];

async function start(capabilities = able): Promise<Client> {
  const client = await startClient([demo], capabilities);
  running.push(client);
  return client;
}

afterEach(async () => {
  for (const client of running.splice(0)) expect(await client.stop()).toBe(0);
});

const fencesOf = (client: Client) => client.request<FencesAnswer>("plumbline/fences", { textDocument });

describe("what is ready to be shown", () => {
  it("is of the text that its version names, and nothing for a note that is not open", async () => {
    const client = await start();
    expect(await fencesOf(client)).toBeNull();
    client.open(briefing, text, "markdown");
    const first = await fencesOf(client);
    expect(first?.version).toBe(1);
    expect(first?.fences.map(({ rows }) => rows.length)).toEqual([2, 1]);
    client.change(briefing, 2, { text: text.replace("900 kg", "400 kg") });
    const second = await fencesOf(client);
    expect(second?.version).toBe(2);
    expect(second?.fences[0]).toEqual(first?.fences[0]);
    expect(second?.fences[1]?.rows).not.toEqual(first?.fences[1]?.rows);
  });

  it("is told to have changed with a card, to a client that wants to hear it and no other", async () => {
    const hearing = await start({ ...able, experimental: { plumbline: { figuresChanged: true } } });
    const deaf = await start();
    const told = (client: Client) =>
      client.received.filter((method) => method === "plumbline/figuresChanged").length;
    for (const client of [hearing, deaf]) client.open(briefing, text, "markdown");
    const before = await fencesOf(hearing);
    await eventually(() => expect(told(hearing)).toBeGreaterThan(0));
    const atFirst = told(hearing);
    const card = `${demo}/aeroplanes.plumb`;
    const cardText = readFileSync(join(demoFolder, "aeroplanes.plumb"), "utf8");
    for (const client of [hearing, deaf]) client.open(card, cardText.replace("stall 117 kt", "stall 121 kt"));
    await eventually(() => expect(told(hearing)).toBeGreaterThan(atFirst));
    const after = await fencesOf(hearing);
    expect(after?.version).toBe(before?.version);
    expect(after?.fences).not.toEqual(before?.fences);
    expect(await fencesOf(deaf)).toEqual(after);
    expect(told(deaf)).toBe(0);
  });

  it("is a sentence for a line, and lines to copy", async () => {
    const client = await start();
    client.open(briefing, text, "markdown");
    const line = text.split("\n").findIndex((one) => one.includes("After de-icing"));
    expect(await client.request("plumbline/readLine", { textDocument, line })).toMatch(
      /^Line \d+, takeoff, After de-icing; phase: margin \d\.\d\d, .* warning \d+ kt\.$/,
    );
    const copied = await client.request("plumbline/copyWithValues", {
      textDocument,
      from: line,
      to: line,
      form: "text",
    });
    expect(copied).toMatch(/^\| phase takeoff "After de-icing" ≈ margin /);
    const unknown = { uri: `${demo}/none.plumb` };
    expect(await client.request("plumbline/readLine", { textDocument: unknown, line: 0 })).toBeNull();
  });

  it("is of the kinds that the settings name", async () => {
    const client = await start();
    const uri = `${demo}/winter-shuttle.plumb`;
    client.settings = { hints: { kinds: ["banks"] } };
    await client.connection.sendNotification("workspace/didChangeConfiguration", { settings: null });
    client.open(uri, readFileSync(join(demoFolder, "winter-shuttle.plumb"), "utf8"));
    const hints = await client.request<InlayHint[]>("textDocument/inlayHint", {
      textDocument: { uri },
      range: { start: { line: 0, character: 0 }, end: { line: 100, character: 0 } },
    });
    expect(hints.length).toBeGreaterThan(3);
    for (const { label } of hints) expect(JSON.stringify(label)).toMatch(/≈ (?:warning|stall) at/);
  });
});
