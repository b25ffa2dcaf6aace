import { findings } from "./generateNote.mjs";

/**
 * A note open in a server. `edit` sends a change and asks for the diagnostics and for the hints of the 60
 * lines around it; it resolves when both are there, with the milliseconds that took and the answers.
 */
export function session(server, text) {
  const uri = "file:///bench/note.plumb";
  const textDocument = { uri };
  let version = 1;

  const change = (content) =>
    server.notify("textDocument/didChange", {
      textDocument: { uri, version: ++version },
      contentChanges: [content],
    });
  const ask = (line) => {
    const range = {
      start: { line: Math.max(0, line - 30), character: 0 },
      end: { line: line + 30, character: 0 },
    };
    return [
      server.request("textDocument/diagnostic", { textDocument }),
      server.request("textDocument/inlayHint", { textDocument, range }),
    ];
  };
  const since = (start, [diagnostics, hints]) => ({ ms: performance.now() - start, diagnostics, hints });

  return {
    /** Opens it and asks as an edit at the line would. */
    async open(line) {
      const start = performance.now();
      server.notify("textDocument/didOpen", { textDocument: { uri, languageId: "plumb", version, text } });
      return since(start, await Promise.all(ask(line)));
    },
    async edit(content) {
      const start = performance.now();
      change(content);
      return since(start, await Promise.all(ask(lineOf(content))));
    },
    /** All changes at once, asked for at the end. */
    async burst(contents) {
      const start = performance.now();
      for (const content of contents) change(content);
      return since(start, await Promise.all(ask(lineOf(contents[0]))));
    },
    /** Every change is asked for, and what the next one overtakes is cancelled, as an editor does. */
    async askedBurst(contents) {
      const start = performance.now();
      let asked = [];
      for (const content of contents) {
        for (const { id } of asked) server.notify("$/cancelRequest", { id });
        change(content);
        asked = ask(lineOf(content));
        for (const answer of asked) answer.catch(() => {});
      }
      return since(start, await Promise.all(asked));
    },
  };
}

const lineOf = (content) => content.range.start.line;

/** Throws unless the answers hold what the note does: `more` is how many findings an edit added. */
export function verify({ diagnostics, hints }, what, more = 0) {
  const found = diagnostics?.items?.length;
  if (found !== findings + more) {
    throw new Error(`Wrong answer: ${what} has ${found} findings where ${findings + more} are due.`);
  }
  if (!Array.isArray(hints) || hints.length === 0) throw new Error(`Wrong answer: ${what} has no hints.`);
}
