import { readFileSync } from "node:fs";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { ClientCapabilities, ServerCapabilities } from "vscode-languageserver";
import { CancellationTokenSource } from "vscode-languageserver/node";
import { able, type Client, runServer, startClient } from "../support/lspClient.ts";

const uri = "untitled:Untitled-1";
const text =
  "| aircraft twite-4; basis vsr; reference 4 t\n| config clean stall 80 kt\n\n| fly twite-4; weight 61.4\n";
const textDocument = { uri };
const position = { line: 3, character: 8 };
const range = { start: { line: 0, character: 0 }, end: { line: 3, character: 20 } };
const options = { tabSize: 2, insertSpaces: true };

interface Request {
  readonly method: string;
  readonly params: Readonly<Record<string, unknown>>;
  /** Parts that it can do without. */
  readonly spare?: readonly string[];
  /** What the server says of it when it starts; null for what it says nothing of. */
  readonly told: keyof ServerCapabilities | null;
}

/** Every request that the server answers, with parameters that it answers. */
const requests: readonly Request[] = [
  { method: "textDocument/diagnostic", params: { textDocument }, told: "diagnosticProvider" },
  { method: "workspace/diagnostic", params: { previousResultIds: [] }, told: "diagnosticProvider" },
  { method: "textDocument/inlayHint", params: { textDocument, range }, told: "inlayHintProvider" },
  {
    method: "inlayHint/resolve",
    params: { position, label: "≈ 1", data: { uri } },
    spare: ["label", "data"],
    told: "inlayHintProvider",
  },
  { method: "textDocument/hover", params: { textDocument, position }, told: "hoverProvider" },
  { method: "textDocument/completion", params: { textDocument, position }, told: "completionProvider" },
  { method: "textDocument/definition", params: { textDocument, position }, told: "definitionProvider" },
  {
    method: "textDocument/references",
    params: { textDocument, position, context: { includeDeclaration: true } },
    told: "referencesProvider",
  },
  {
    method: "textDocument/documentHighlight",
    params: { textDocument, position },
    told: "documentHighlightProvider",
  },
  { method: "textDocument/prepareRename", params: { textDocument, position }, told: "renameProvider" },
  { method: "textDocument/rename", params: { textDocument, position, newName: "x" }, told: "renameProvider" },
  { method: "workspace/symbol", params: { query: "t" }, told: "workspaceSymbolProvider" },
  {
    method: "textDocument/codeAction",
    params: { textDocument, range, context: { diagnostics: [] } },
    told: "codeActionProvider",
  },
  { method: "textDocument/documentSymbol", params: { textDocument }, told: "documentSymbolProvider" },
  { method: "textDocument/foldingRange", params: { textDocument }, told: "foldingRangeProvider" },
  {
    method: "textDocument/selectionRange",
    params: { textDocument, positions: [position] },
    told: "selectionRangeProvider",
  },
  { method: "textDocument/semanticTokens/full", params: { textDocument }, told: "semanticTokensProvider" },
  {
    method: "textDocument/semanticTokens/range",
    params: { textDocument, range },
    told: "semanticTokensProvider",
  },
  { method: "textDocument/signatureHelp", params: { textDocument, position }, told: "signatureHelpProvider" },
  {
    method: "textDocument/formatting",
    params: { textDocument, options },
    spare: ["options"],
    told: "documentFormattingProvider",
  },
  {
    method: "textDocument/rangeFormatting",
    params: { textDocument, range, options },
    spare: ["options"],
    told: "documentRangeFormattingProvider",
  },
  {
    method: "textDocument/onTypeFormatting",
    params: { textDocument, position, ch: "\n", options },
    spare: ["ch", "options"],
    told: "documentOnTypeFormattingProvider",
  },
  { method: "plumbline/points", params: { textDocument }, told: null },
  { method: "plumbline/fences", params: { textDocument }, told: null },
  { method: "plumbline/readLine", params: { textDocument, line: 0 }, told: null },
  {
    method: "plumbline/copyWithValues",
    params: { textDocument, from: 0, to: 1, form: "text" },
    spare: ["form"],
    told: null,
  },
  {
    method: "plumbline/compare",
    params: { textDocument, oldText: "", oldName: "before", others: [] },
    told: null,
  },
  { method: "plumbline/status", params: {}, told: null },
];

const all: ClientCapabilities = {
  ...able,
  textDocument: {
    ...able.textDocument,
    rename: { prepareSupport: true },
    semanticTokens: { requests: {}, formats: ["relative"], tokenTypes: [], tokenModifiers: [] },
  },
};

/** What came of a request: the code of its refusal, or `answered`. */
const outcome = (answer: Promise<unknown>) =>
  answer.then(
    () => "answered",
    (error: { code: number; message: string }) => {
      expect(error.message.length).toBeGreaterThan(5);
      return error.code;
    },
  );

const NOT_INITIALIZED = -32002;
const INVALID_REQUEST = -32600;
const INVALID_PARAMS = -32602;
const CANCELLED = -32800;
const REQUEST_FAILED = -32803;

let client: Client;

beforeAll(async () => {
  client = await startClient([], all);
});

afterAll(async () => {
  expect(await client.stop()).toBe(0);
});

/** The server still reads and answers. */
async function lives(): Promise<void> {
  client.open(uri, text);
  expect((await client.diagnostics(uri)).map((one) => one.code)).toContain("missing-unit");
}

const wrong: readonly unknown[] = [null, 7, "seven", true, [], [null], [7], {}, { uri: 7 }, { start: {} }];

/** Every place in the parameters gets this line and this character. */
function placedAt(value: unknown, line: number, character: number): unknown {
  if (Array.isArray(value)) return value.map((one) => placedAt(one, line, character));
  if (typeof value !== "object" || value === null) return value;
  if ("line" in value) return { ...value, line, ...("character" in value ? { character } : {}) };
  return Object.fromEntries(Object.entries(value).map(([key, one]) => [key, placedAt(one, line, character)]));
}

const strangePlaces = [
  [-1, -1],
  [0, -5],
  [-5, 3],
  [3, 2 ** 31],
  [2 ** 31, 0],
  [1e300, 1e300],
  [-1e300, -1e300],
] as const;

describe.each(requests)("$method", ({ method, params, spare = [] }) => {
  it("is answered", async () => {
    await lives();
    expect(await outcome(client.request(method, params))).toBe("answered");
  });

  it("without what it needs is refused, and with what is not as it should be", async () => {
    const needed = Object.keys(params).filter((key) => !spare.includes(key));
    const lacking = needed.flatMap((key) => {
      const { [key]: _, ...others } = params;
      return [others, ...wrong.map((value) => ({ ...others, [key]: value }))];
    });
    const outcomes = await Promise.all(
      lacking.map(async (one) => ({ one, came: await outcome(client.request(method, one)) })),
    );
    // What happens to be right, such as an empty list of positions, is answered.
    const fits = (one: Record<string, unknown>) =>
      needed.every((key) => {
        const [is, was] = [one[key], params[key]];
        if (Array.isArray(was)) return Array.isArray(is) && is.length === 0;
        if (key === "context" && method === "textDocument/references") return typeof is === "object" && is;
        if (typeof was === "number") return Number.isInteger(is);
        return typeof was === "string" ? typeof is === "string" : is === was;
      });
    for (const { one, came } of outcomes) {
      expect(came, JSON.stringify(one)).toBe(fits(one) ? "answered" : INVALID_PARAMS);
    }
    if (0 < needed.length) {
      for (const one of [null, 7, "seven", [7]]) {
        const came = await outcome(client.request(method, one as unknown as object));
        expect([INVALID_PARAMS, INVALID_REQUEST]).toContain(came);
      }
    }
    await lives();
  });

  it("for a place beyond the text is answered or refused, and fractions are none", async () => {
    for (const [line, character] of strangePlaces) {
      const came = await outcome(client.request(method, placedAt(params, line, character) as object));
      expect(["answered", REQUEST_FAILED], `${line}:${character}`).toContain(came);
    }
    const fraction = placedAt(params, 0.5, 1.5);
    const hasPlace = JSON.stringify(fraction) !== JSON.stringify(params);
    expect(await outcome(client.request(method, fraction as object))).toBe(
      hasPlace ? INVALID_PARAMS : "answered",
    );
    await lives();
  });

  it("for a note that nobody knows is answered with nothing", async () => {
    if (!("textDocument" in params)) return;
    for (const unknown of ["file:///nowhere/a.plumb", "nonsense", "", "file:///%ZZ", "https://x"]) {
      const came = await client.request(method, { ...params, textDocument: { uri: unknown } });
      const empty = { items: [], kind: "full" };
      expect([null, [], { data: [] }, empty]).toContainEqual(came);
    }
  });

  it("that is cancelled is told so or answered, and the next is answered", async () => {
    const outcomes = await Promise.all(
      Array.from({ length: 5 }, () => {
        const source = new CancellationTokenSource();
        const came = outcome(client.connection.sendRequest(method, params, source.token));
        source.cancel();
        return came;
      }),
    );
    for (const came of outcomes) expect(["answered", CANCELLED]).toContain(came);
    expect(await outcome(client.request(method, params))).toBe("answered");
  });
});

describe("what comes out of order", () => {
  const start = { processId: process.pid, rootUri: null, capabilities: all };

  it("is refused before the start and after the end, and no note is lost between", async () => {
    const { connection, ended } = runServer();
    connection.onRequest(() => null);
    connection.listen();
    for (const { method, params } of requests) {
      expect(await outcome(connection.sendRequest(method, params)), method).toBe(NOT_INITIALIZED);
    }
    const open = (version: number) =>
      connection.sendNotification("textDocument/didOpen", {
        textDocument: { uri, languageId: "plumb", version, text },
      });
    await open(1);
    await connection.sendRequest("initialize", start);
    const hover = { textDocument, position };
    // What was opened before the start is not open.
    expect(await connection.sendRequest("textDocument/hover", hover)).toBeNull();
    await open(2);
    expect(await connection.sendRequest("textDocument/hover", hover)).not.toBeNull();
    await connection.sendNotification("initialized", {});
    expect(await outcome(connection.sendRequest("initialize", start))).toBe(INVALID_REQUEST);
    expect(await connection.sendRequest("textDocument/hover", hover)).not.toBeNull();
    await connection.sendRequest("shutdown");
    for (const { method, params } of requests) {
      expect(await outcome(connection.sendRequest(method, params)), method).toBe(INVALID_REQUEST);
    }
    await open(3);
    await connection.sendNotification("exit");
    expect(await ended).toBe(0);
  });

  it("or makes no sense is passed over where it has no answer", async () => {
    const places = [{ line: -1, character: 0.5 }, { line: "0", character: "1" }, null];
    const changes = [
      null,
      {},
      [{}],
      [{ text: 7 }],
      ...places.map((place) => [{ text: "x", range: { start: place, end: place } }]),
    ];
    await lives();
    for (const contentChanges of changes) {
      await client.connection.sendNotification("textDocument/didChange", {
        textDocument: { uri, version: 9 },
        contentChanges,
      });
    }
    const lost: [string, object][] = [
      ["textDocument/didOpen", {}],
      ["textDocument/didOpen", { textDocument: { uri, version: 1 } }],
      ["textDocument/didClose", {}],
      ["textDocument/didClose", { textDocument: { uri: "untitled:never-opened" } }],
      [
        "textDocument/didChange",
        { textDocument: { uri: "untitled:never" }, contentChanges: [{ text: "x" }] },
      ],
      ["workspace/didChangeWatchedFiles", {}],
      ["workspace/didChangeWatchedFiles", { changes: [{ uri: "nonsense", type: 99 }] }],
      ["workspace/didChangeWatchedFiles", { changes: [{ uri: "file:///%ZZ", type: 1 }] }],
      ["workspace/didChangeWorkspaceFolders", {}],
      ["workspace/didRenameFiles", {}],
      ["workspace/didRenameFiles", { files: [{}] }],
      ["workspace/didDeleteFiles", { files: [null] }],
      ["workspace/didCreateFiles", { files: [{ uri: 7 }] }],
      ["workspace/didChangeConfiguration", {}],
      ["workspace/nonsense", {}],
      ["$/cancelRequest", { id: 99 }],
      ["$/nonsense", {}],
    ];
    for (const [method, params] of lost) await client.connection.sendNotification(method, params);
    // The text is the one before: nothing of all this was taken in.
    expect((await client.diagnostics(uri)).map((one) => one.code)).toContain("missing-unit");
    await lives();
  });

  it("and whatever is answered stands in DEVELOPERS.md with a test that asks for it", () => {
    const read = (path: string) => readFileSync(new URL(`../../${path}`, import.meta.url), "utf8");
    const rows = [...read("DEVELOPERS.md").matchAll(/^\| `(\S+\/\S+)` \| .* \| `(test\/\S+)` \|$/gm)].map(
      ([, method = "", file = ""]) => ({ method, file }),
    );
    const listed = rows.map(({ method }) => method);
    expect(listed).toEqual(expect.arrayContaining(requests.map(({ method }) => method)));
    expect(new Set(listed).size).toBe(listed.length);
    for (const { method, file } of rows) expect(read(file), `${file}: ${method}`).toContain(`"${method}"`);
  });

  it("is every request that the server says it answers", () => {
    const told = new Set(requests.map((one) => one.told));
    const notRequests = ["positionEncoding", "textDocumentSync", "workspace"];
    const said = Object.keys(client.initialized.capabilities).filter((key) => !notRequests.includes(key));
    expect(said.filter((key) => !told.has(key as keyof ServerCapabilities))).toEqual([]);
    expect(said.length).toBeGreaterThan(15);
  });
});
