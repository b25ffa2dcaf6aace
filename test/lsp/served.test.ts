import { spawn } from "node:child_process";
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { dirname, join } from "node:path";
import { afterEach, describe, expect, it } from "vitest";
import {
  createMessageConnection,
  StreamMessageReader,
  StreamMessageWriter,
} from "vscode-languageserver/node";
import { discover } from "../../server/src/disk/discover.ts";
import { eventually } from "../support/eventually.ts";
import { serverPath } from "../support/lspClient.ts";
import { type Started, servedClient } from "../support/servedClient.ts";
import { startWorker } from "../support/startWorker.ts";

const card = (stall: number) =>
  `| aircraft wheatear-9; basis vsr; reference 9 t\n| config clean stall ${stall} kt\n`;
const use =
  "| phase cruise; fly wheatear-9; weight 9 t; config clean; altitude 3000 ft; speed 150 kt; claim vs1g 90 kt\n";

const folder = "drawer://harbour/plans/spring";
const at = (name: string) => `${folder}/${name}`;

function startDesktop(): Started {
  const child = spawn(process.execPath, [serverPath, "--stdio"], { stdio: ["pipe", "pipe", "inherit"] });
  const ended = new Promise<void>((done) => child.once("exit", () => done()));
  const connection = createMessageConnection(
    new StreamMessageReader(child.stdout),
    new StreamMessageWriter(child.stdin),
  );
  return {
    connection,
    async end() {
      child.stdin.end();
      await ended;
    },
  };
}

let server: Started;
afterEach(() => server.end());

describe.each([
  ["a worker without a disk", startWorker],
  ["the desktop's server, for a folder that is on no disk", startDesktop],
])("files that a client serves to %s", (_, start) => {
  const serve = (files: Readonly<Record<string, string>>) => {
    server = start();
    return servedClient(server, folder, new Map(Object.entries(files)));
  };

  it("hold the cards of a note, though nobody opened them", async () => {
    const client = await serve({ [at("fleet/cards.plumb")]: card(80), [at("note.plumb")]: use });
    await client.open(at("note.plumb"), use);
    expect(await client.codes(at("note.plumb"))).toContain("claim-stale");
    const found = await server.connection.sendRequest("textDocument/definition", {
      textDocument: { uri: at("note.plumb") },
      position: { line: 0, character: use.indexOf("wheatear") + 2 },
    });
    expect(found).toMatchObject({ uri: at("fleet/cards.plumb") });
  });

  it("are followed when they change, come and go", async () => {
    const client = await serve({ [at("cards.plumb")]: card(80), [at("note.plumb")]: use });
    expect(await client.codes(at("note.plumb"))).toContain("claim-stale");
    client.files.set(at("cards.plumb"), card(90));
    await client.tell(at("cards.plumb"), "changed");
    await eventually(async () => expect(await client.codes(at("note.plumb"))).not.toContain("claim-stale"));
    client.files.set(at("more/cards.plumb"), card(95));
    await client.tell(at("more"), "created");
    await eventually(async () => expect(await client.codes(at("note.plumb"))).toContain("duplicate-name"));
    client.files.delete(at("more/cards.plumb"));
    await client.tell(at("more"), "deleted");
    await eventually(async () =>
      expect(await client.codes(at("note.plumb"))).not.toContain("duplicate-name"),
    );
  });

  it("are one with the editor's text, however the editor spells the URI", async () => {
    const client = await serve({ [at("cards%20(1).plumb")]: card(80), [at("note.plumb")]: use });
    expect(await client.codes(at("note.plumb"))).toContain("claim-stale");
    await client.open(at("cards%20%281%29.plumb"), card(90));
    const codes = await client.codes(at("note.plumb"));
    expect(codes).not.toContain("claim-stale");
    expect(codes).not.toContain("duplicate-name");
  });

  it("are not read where they are too large or not UTF-8, and the log says so", async () => {
    const client = await serve({
      [at("large.plumb")]: " ".repeat(4 * 1024 * 1024 + 1),
      [at("other.plumb")]: `${card(80)}\uFFFD`,
      [at("note.plumb")]: use,
    });
    expect(await client.codes(at("note.plumb"))).toContain("unknown-aircraft");
    const log = client.received.flatMap(({ method, params }) =>
      method === "window/logMessage" ? [(params as { message: string }).message] : [],
    );
    expect(log.sort()).toEqual([
      `${at("large.plumb")} is larger than 4 MB, so it is not read: split it.`,
      `${at("other.plumb")} is not UTF-8, so it is not read: save it as UTF-8.`,
    ]);
  });

  it("are the same notes that the command line finds on a disk", async () => {
    const tree: Readonly<Record<string, string>> = {
      ".git/HEAD": "",
      ".git/hidden.plumb": "",
      ".gitignore": "out/\n*.draft.plumb\n/plans/spring/top.plumb\n",
      "plans/.gitignore": "!kept.draft.plumb\n",
      "plans/outside.plumb": "",
      "plans/spring/.gitignore": "sub/*.md\n",
      "plans/spring/a.plumb": "",
      "plans/spring/top.plumb": "",
      "plans/spring/one.draft.plumb": "",
      "plans/spring/kept.draft.plumb": "",
      "plans/spring/out/b.plumb": "",
      "plans/spring/node_modules/c.plumb": "",
      "plans/spring/sub/d.md": "",
      "plans/spring/sub/e é.plumb": "",
      "plans/spring/sub/.gitignore": "!d.md\nf.*",
      "plans/spring/sub/f.markdown": "",
      "plans/spring/sub/g.markdown": "",
      "plans/spring/notes.txt": "",
    };
    const place = mkdtempSync(join(tmpdir(), "plumbline-same-"));
    try {
      for (const [name, text] of Object.entries(tree)) {
        mkdirSync(join(place, dirname(name)), { recursive: true });
        writeFileSync(join(place, name), text);
      }
      const { files } = await discover([join(place, "plans/spring")], "/");
      const onDisk = files.map((path) => path.slice(place.length + 1));
      const encoded = (name: string) => name.split("/").map(encodeURIComponent).join("/");
      const client = await serve(
        Object.fromEntries(
          Object.entries(tree).map(([name, text]) => [`drawer://harbour/${encoded(name)}`, text]),
        ),
      );
      expect(await client.notes()).toEqual(onDisk.map((name) => `drawer://harbour/${encoded(name)}`).sort());
      expect(onDisk).toContain("plans/spring/kept.draft.plumb");
      expect(onDisk).toHaveLength(5);
    } finally {
      rmSync(place, { recursive: true });
    }
  });
});

describe("a worker", () => {
  it("tells pages by the place that its client says they ship at", async () => {
    server = startWorker();
    const client = await servedClient(server, folder, new Map([[at("note.plumb"), "| weight 61.4\n"]]), {
      answers: ["plumbline/listFiles", "plumbline/readFile"],
      pages: "https://plumbline.example/dist/pages/",
    });
    const [finding] = await client.diagnostics(at("note.plumb"));
    expect(finding).toMatchObject({
      code: "missing-unit",
      codeDescription: { href: "https://plumbline.example/dist/pages/missing-unit.md" },
    });
  });

  it("answers for open notes where its client serves no files, and asks for none", async () => {
    server = startWorker();
    const client = await servedClient(server, folder, new Map([[at("cards.plumb"), card(90)]]), {});
    await client.open(at("note.plumb"), "| weight 61.4\n");
    expect(await client.codes(at("note.plumb"))).toEqual(["missing-unit"]);
    expect(client.received.filter(({ method }) => method.startsWith("plumbline/"))).toEqual([]);
  });

  it("has no diagnostics of a text that was overtaken in its queue", async () => {
    server = startWorker();
    const client = await servedClient(server, folder, new Map());
    await client.open(at("note.plumb"), "| weight 61.4\n");
    const overtaken = client.diagnostics(at("note.plumb"));
    void server.connection.sendNotification("textDocument/didChange", {
      textDocument: { uri: at("note.plumb"), version: 2 },
      contentChanges: [{ text: "| weight 61.4 t\n" }],
    });
    const last = client.codes(at("note.plumb"));
    await expect(overtaken).rejects.toMatchObject({ message: "The text has changed since." });
    expect(await last).toEqual([]);
  });
});
