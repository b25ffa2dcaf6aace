import { readFileSync } from "node:fs";
import { Worker } from "node:worker_threads";
import { createMessageConnection, PortMessageReader, PortMessageWriter } from "vscode-languageserver/node";
import type { Started } from "./servedClient.ts";

const script = new URL("../../dist/server/main.web.js", import.meta.url);

/** What a worker of the browser has, and nothing that only Node has: no process, no require, no setImmediate. */
const surroundings = `
  const { parentPort, workerData } = require("node:worker_threads");
  const { createContext, runInContext } = require("node:vm");
  const self = { postMessage: (message) => parentPort.postMessage(message), addEventListener() {} };
  parentPort.on("message", (data) => self.onmessage({ data }));
  const given = { self, crypto, console, setTimeout, clearTimeout, TextDecoder, TextEncoder, URL, queueMicrotask };
  runInContext(workerData, createContext(given));
`;

/** Starts the built worker in a thread that has no more than a browser gives it. */
export function startWorker(): Started {
  const worker = new Worker(surroundings, { eval: true, workerData: readFileSync(script, "utf8") });
  const connection = createMessageConnection(new PortMessageReader(worker), new PortMessageWriter(worker));
  return { connection, end: async () => void (await worker.terminate()) };
}
