import { existsSync, readFileSync, writeFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import type { ClientCapabilities } from "vscode-languageserver";
import { eventually } from "../support/eventually.ts";
import { startClient } from "../support/lspClient.ts";

/**
 * What clients with few capabilities send, and what they are answered, kept as files. A changed answer
 * shows here before it surprises an editor that nobody of us has at hand.
 *
 *     UPDATE_TRANSCRIPTS=1 npx vitest run test/lsp/transcripts.test.ts
 */
const clients: Readonly<Record<string, ClientCapabilities>> = {
  "nothing-at-all": {},
  "pushed-and-plain": {
    textDocument: {
      completion: { completionItem: { snippetSupport: false } },
      documentSymbol: {},
      hover: {},
      codeAction: {},
    },
  },
  "pulls-without-registration": {
    textDocument: { diagnostic: { dynamicRegistration: false }, inlayHint: { dynamicRegistration: false } },
    workspace: { configuration: true, diagnostics: { refreshSupport: false } },
  },
  "asked-for-no-configuration": {
    textDocument: {
      diagnostic: {},
      inlayHint: {},
      rename: { prepareSupport: false },
      semanticTokens: { requests: {}, formats: ["relative"], tokenTypes: [], tokenModifiers: [] },
    },
    workspace: { inlayHint: { refreshSupport: false } },
  },
};

const uri = "untitled:Untitled-1";
const text = `| aircraft wheatear-9; basis vsr; reference 9 t; warning 1.05
| config clean stall 95 kt

| limits own
| must any bank 30

| fly wheatear-9; under own; weight 8 t; config clean; altitude FL100; speed 180 kt

| phase cruise "Größe 🛩"; bank 35; claim stall 80 kt
| path 2
`;
const textDocument = { uri };
const position = { line: 8, character: 28 };
const range = { start: { line: 0, character: 0 }, end: { line: 10, character: 0 } };

const asked: readonly (readonly [string, object])[] = [
  ["textDocument/hover", { textDocument, position }],
  ["textDocument/completion", { textDocument, position: { line: 6, character: 6 } }],
  ["textDocument/definition", { textDocument, position: { line: 6, character: 8 } }],
  [
    "textDocument/references",
    { textDocument, position: { line: 6, character: 8 }, context: { includeDeclaration: true } },
  ],
  ["textDocument/rename", { textDocument, position: { line: 6, character: 8 }, newName: "wheatear-10" }],
  ["textDocument/codeAction", { textDocument, range, context: { diagnostics: [] } }],
  ["textDocument/documentSymbol", { textDocument }],
  ["textDocument/foldingRange", { textDocument }],
  ["textDocument/formatting", { textDocument, options: { tabSize: 2, insertSpaces: true } }],
  ["textDocument/inlayHint", { textDocument, range }],
];

/** Paths of this machine are no part of a transcript. */
const withoutPaths = (value: unknown): unknown =>
  JSON.parse(JSON.stringify(value).replaceAll(/"file:[^"]*\/pages\//g, '"file:///pages/'));

async function transcript(capabilities: ClientCapabilities): Promise<unknown> {
  const client = await startClient([], capabilities);
  client.open(uri, text);
  const pulls = capabilities.textDocument?.diagnostic !== undefined;
  let findings: unknown;
  if (pulls) findings = await client.diagnostics(uri);
  else {
    await eventually(() => expect(client.pushed.get(uri)?.length).toBeGreaterThan(0));
    findings = client.pushed.get(uri);
  }
  const answers: Record<string, unknown> = {};
  for (const [method, params] of asked)
    answers[method] = await client
      .request(method, params)
      .catch((error: { code: number; message: string }) => ({
        refused: error.code,
        message: error.message,
      }));
  const askedOfClient = [
    ...new Set(client.received.filter((method) => method !== "textDocument/publishDiagnostics")),
  ].sort();
  expect(await client.stop()).toBe(0);
  return withoutPaths({ capabilities: client.initialized.capabilities, findings, answers, askedOfClient });
}

describe("a client", () => {
  it.each(Object.keys(clients))("that says %s is answered as it is kept", async (name) => {
    const path = new URL(`transcripts/${name}.json`, import.meta.url);
    const now = await transcript(clients[name] as ClientCapabilities);
    if (process.env.UPDATE_TRANSCRIPTS || !existsSync(path)) {
      if (!process.env.UPDATE_TRANSCRIPTS)
        expect.fail(`${name} has no transcript: run with UPDATE_TRANSCRIPTS=1.`);
      writeFileSync(path, `${JSON.stringify(now, null, 2)}\n`);
    }
    expect(now).toEqual(JSON.parse(readFileSync(path, "utf8")));
  });

  it("is asked for nothing that it did not say it can", () => {
    const asks = (name: string) =>
      JSON.parse(readFileSync(new URL(`transcripts/${name}.json`, import.meta.url), "utf8")).askedOfClient;
    expect(asks("nothing-at-all")).toEqual([]);
    expect(asks("pulls-without-registration")).toEqual(["workspace/configuration"]);
    expect(asks("asked-for-no-configuration")).toEqual([]);
  });
});
