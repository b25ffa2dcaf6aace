import { pathToFileURL } from "node:url";
import { afterEach, beforeEach, expect, it } from "vitest";
import type {
  SelectionRange,
  SemanticTokens,
  SignatureHelp,
  SymbolInformation,
  TextEdit,
} from "vscode-languageserver";
import { able, type Client, startClient } from "../support/lspClient.ts";
import { demoFolder } from "../support/sampleText.ts";

const demo = pathToFileURL(demoFolder).href.replace(/\/$/, "");
const uri = "untitled:Untitled-1";
const textDocument = { uri };
const at = (line: number, character: number) => ({ line, character });

let client: Client;

beforeEach(async () => {
  client = await startClient([demo], {
    ...able,
    textDocument: {
      ...able.textDocument,
      semanticTokens: {
        requests: { full: true, range: true },
        formats: ["relative"],
        tokenTypes: [],
        tokenModifiers: [],
      },
      signatureHelp: {
        signatureInformation: { parameterInformation: { labelOffsetSupport: true } },
      },
    },
  });
});

afterEach(async () => {
  expect(await client.stop()).toBe(0);
});

it("symbols are found in every folder, also in what nobody saved", async () => {
  client.open(uri, '| phase hold "Over the lake"');
  const find = (query: string) => client.request<SymbolInformation[]>("workspace/symbol", { query });
  expect((await find("over the lake")).map((one) => [one.name, one.location.uri])).toEqual([
    ["hold: Over the lake", uri],
  ]);
  const [flaps] = await find("flaps-15");
  expect(flaps).toMatchObject({
    containerName: "brambling-37",
    location: { uri: `${demo}/aeroplanes.plumb` },
  });
});

it("selections grow from each of several places", async () => {
  client.open(uri, "| weight 5 t; isa +6\r\n\r\n\u{1F6E9} prose");
  const [first, second] = await client.request<SelectionRange[]>("textDocument/selectionRange", {
    textDocument,
    positions: [at(0, 10), at(2, 5)],
  });
  expect(first?.range).toEqual({ start: at(0, 9), end: at(0, 10) });
  expect(first?.parent?.range).toEqual({ start: at(0, 9), end: at(0, 12) });
  expect(second?.range).toEqual({ start: at(2, 3), end: at(2, 8) });
});

it("colours are told for the note and for a range, by the legend", async () => {
  const { legend } = client.initialized.capabilities.semanticTokensProvider ?? {};
  client.open(uri, "Prose.\n\n| aircraft twite-4\n| config clean\n");
  const told = async (method: string, params: object) => {
    const { data } = await client.request<SemanticTokens>(method, {
      textDocument,
      ...params,
    });
    return Array.from({ length: data.length / 5 }, (_, i) => [
      ...data.slice(i * 5, i * 5 + 3),
      legend?.tokenTypes[data[i * 5 + 3] ?? -1],
      data[i * 5 + 4],
    ]);
  };
  expect(await told("textDocument/semanticTokens/full", {})).toEqual([
    [2, 2, 8, "keyword", 0],
    [0, 9, 7, "class", 1],
    [1, 2, 6, "keyword", 0],
    [0, 7, 5, "property", 1],
  ]);
  expect(
    await told("textDocument/semanticTokens/range", { range: { start: at(3, 0), end: at(3, 99) } }),
  ).toEqual([
    [3, 2, 6, "keyword", 0],
    [0, 7, 5, "property", 1],
  ]);
  expect(legend?.tokenModifiers).toEqual(["definition"]);
});

it("the arguments of a clause are told by their place, and by their text to a client that wants it so", async () => {
  const params = { textDocument, position: at(0, 12) };
  client.open(uri, "| weight 5 t +- 0.1 t");
  const byPlace = await client.request<SignatureHelp>("textDocument/signatureHelp", params);
  expect(byPlace).toMatchObject({
    activeParameter: 0,
    signatures: [{ label: "weight MASS [+- MASS]", parameters: [{ label: [7, 11] }, { label: [12, 21] }] }],
  });
  const plain = await startClient([], {});
  expect(plain.initialized.capabilities.semanticTokensProvider).toBeUndefined();
  plain.open(uri, "| weight 5 t +- 0.1 t");
  const byText = await plain.request<SignatureHelp>("textDocument/signatureHelp", params);
  expect(byText.signatures[0]?.parameters).toEqual([{ label: "MASS" }, { label: "[+- MASS]" }]);
  expect(await plain.stop()).toBe(0);
});

it("Enter lays out the line that was left", async () => {
  client.open(uri, "|  weight 5t");
  client.change(uri, 2, { range: { start: at(0, 12), end: at(0, 12) }, text: "\n| " });
  const edits = await client.request<TextEdit[]>("textDocument/onTypeFormatting", {
    textDocument,
    position: at(1, 2),
    ch: "\n",
    options: { tabSize: 2, insertSpaces: true },
  });
  expect(edits).toEqual([{ range: { start: at(0, 0), end: at(0, 12) }, newText: "| weight 5 t" }]);
});

it("lines are laid out in the range asked for alone", async () => {
  client.open(uri, "|  weight 5t\n|  isa   +6\n");
  const lay = (method: string, params: object) =>
    client.request<TextEdit[]>(method, {
      textDocument,
      options: { tabSize: 2, insertSpaces: true },
      ...params,
    });
  const [second] = await lay("textDocument/rangeFormatting", { range: { start: at(1, 0), end: at(1, 3) } });
  expect(second).toEqual({ range: { start: at(1, 0), end: at(1, 11) }, newText: "| isa +6" });
  expect(await lay("textDocument/formatting", {})).toHaveLength(2);
});
