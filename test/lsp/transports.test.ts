import { type ChildProcess, fork, spawn } from "node:child_process";
import { fileURLToPath } from "node:url";
import { describe, expect, it } from "vitest";
import type { Diagnostic, InitializeResult } from "vscode-languageserver";
import {
  createMessageConnection,
  IPCMessageReader,
  IPCMessageWriter,
  type MessageConnection,
  StreamMessageReader,
  StreamMessageWriter,
} from "vscode-languageserver/node";
import { able, serverPath } from "../support/lspClient.ts";

const commandLine = fileURLToPath(new URL("../../dist/server/cli.cjs", import.meta.url));

interface Started {
  readonly child: ChildProcess;
  readonly connection: MessageConnection;
  readonly ended: Promise<number | null>;
}

function listen(child: ChildProcess, connection: MessageConnection): Started {
  const ended = new Promise<number | null>((done) => child.once("exit", done));
  connection.onRequest(() => null);
  connection.listen();
  return { child, connection, ended };
}

function overStreams(...args: string[]): Started {
  const child = spawn(process.execPath, args, { stdio: ["pipe", "pipe", "inherit"] });
  return listen(
    child,
    createMessageConnection(new StreamMessageReader(child.stdout), new StreamMessageWriter(child.stdin)),
  );
}

function overIpc(): Started {
  const child = fork(serverPath, ["--node-ipc"], { silent: true });
  return listen(child, createMessageConnection(new IPCMessageReader(child), new IPCMessageWriter(child)));
}

async function initialize({ connection }: Started): Promise<InitializeResult> {
  const answer = await connection.sendRequest<InitializeResult>("initialize", {
    processId: process.pid,
    rootUri: null,
    capabilities: able,
  });
  await connection.sendNotification("initialized", {});
  return answer;
}

async function codes({ connection }: Started): Promise<unknown[]> {
  const textDocument = { uri: "untitled:Untitled-1" };
  await connection.sendNotification("textDocument/didOpen", {
    textDocument: { ...textDocument, languageId: "plumb", version: 1, text: "| weight 61.4" },
  });
  const report = await connection.sendRequest<{ items: Diagnostic[] }>("textDocument/diagnostic", {
    textDocument,
  });
  return report.items.map((one) => one.code);
}

describe("the server", () => {
  it.each([
    ["over standard input and output", () => overStreams(serverPath, "--stdio")],
    ["as the command line starts it", () => overStreams(commandLine, "serve", "--stdio")],
    ["over Node's own channel, as the extension starts it", overIpc],
  ])("answers and goes %s", async (_, start) => {
    const server = start();
    const { capabilities } = await initialize(server);
    expect(capabilities.positionEncoding).toBe("utf-16");
    expect(capabilities.diagnosticProvider).toMatchObject({ workspaceDiagnostics: true });
    expect(await codes(server)).toEqual(["missing-unit"]);
    await server.connection.sendRequest("shutdown");
    await server.connection.sendNotification("exit");
    expect(await server.ended).toBe(0);
  });

  it("that is left without a shutdown says so by its exit code", async () => {
    const server = overStreams(serverPath, "--stdio");
    await initialize(server);
    await server.connection.sendNotification("exit");
    expect(await server.ended).toBe(1);
  });

  it("whose client is gone goes too", async () => {
    const server = overStreams(serverPath, "--stdio");
    await initialize(server);
    server.child.stdin?.end();
    expect(await server.ended).toBe(1);
  });

  it("refuses what comes before it is initialized in a way it can be told, and goes on", async () => {
    const server = overStreams(serverPath, "--stdio");
    await server.connection.sendRequest("initialize", {}).then(
      () => undefined,
      (error: { message: string }) => expect(error.message.length).toBeGreaterThan(5),
    );
    await initialize(server);
    expect(await codes(server)).toEqual(["missing-unit"]);
    await server.connection.sendRequest("shutdown");
    await server.connection.sendNotification("exit");
    expect(await server.ended).toBe(0);
  });
});
