import { spawn } from "node:child_process";

/**
 * Starts a language server over stdio and speaks to it with as little work as can be, the same for every
 * server, so that what is timed is the server. A server's own requests are answered with null.
 */
export function startServer(command, args, { cwd = process.cwd() } = {}) {
  const child = spawn(command, args, { cwd, stdio: ["pipe", "pipe", "pipe"] });
  const waiting = new Map();
  const listeners = new Map();
  let errors = "";
  let ended = null;
  let lastId = 0;

  child.stderr.on("data", (chunk) => {
    errors = (errors + chunk).slice(-2000);
  });
  child.on("error", (error) => fail(error.message));
  child.on("exit", (code, signal) => fail(`ended with ${signal ?? code}. ${errors}`));
  child.stdin.on("error", () => {});
  child.stdout.on("data", frames(receive));

  function fail(why) {
    ended ??= new Error(`${args[0] ?? command}: ${why}`);
    for (const { reject } of waiting.values()) reject(ended);
    waiting.clear();
  }

  function receive(message) {
    if (message.method === undefined) {
      const asked = waiting.get(message.id);
      waiting.delete(message.id);
      if (message.error) asked?.reject(Object.assign(new Error(message.error.message), message.error));
      else asked?.resolve(message.result);
    } else if (message.id !== undefined) {
      send({ jsonrpc: "2.0", id: message.id, result: message.params?.items?.map(() => null) ?? null });
    } else {
      listeners.get(message.method)?.(message.params);
    }
  }

  function send(message) {
    const body = Buffer.from(JSON.stringify(message));
    child.stdin.write(Buffer.concat([Buffer.from(`Content-Length: ${body.length}\r\n\r\n`), body]));
  }

  return {
    pid: child.pid,
    /** The promise has the request's `id`, for `$/cancelRequest`. */
    request(method, params) {
      const id = ++lastId;
      const answer = new Promise((resolve, reject) => {
        if (ended) reject(ended);
        else waiting.set(id, { resolve, reject });
      });
      send({ jsonrpc: "2.0", id, method, params });
      return Object.assign(answer, { id });
    },
    notify(method, params) {
      send({ jsonrpc: "2.0", method, params });
    },
    on(method, listener) {
      listeners.set(method, listener);
    },
    /** Shuts the server down as the protocol says, and ends it if it does not. */
    async stop() {
      if (ended) return;
      const gone = new Promise((resolve) => child.once("exit", resolve));
      const timer = setTimeout(() => child.kill("SIGKILL"), 3000);
      await this.request("shutdown", null).catch(() => {});
      this.notify("exit", null);
      child.stdin.end();
      await gone;
      clearTimeout(timer);
    },
  };
}

/** Cuts a stream of chunks into its messages. */
function frames(receive) {
  let rest = Buffer.alloc(0);
  return (chunk) => {
    rest = rest.length === 0 ? chunk : Buffer.concat([rest, chunk]);
    for (;;) {
      const headEnd = rest.indexOf("\r\n\r\n");
      if (headEnd < 0) return;
      const length = Number(/Content-Length: *(\d+)/i.exec(rest.toString("latin1", 0, headEnd))?.[1]);
      const end = headEnd + 4 + length;
      if (rest.length < end) return;
      const body = rest.toString("utf8", headEnd + 4, end);
      rest = rest.subarray(end);
      receive(JSON.parse(body));
    }
  };
}
