import { expect, it } from "vitest";
import type { CodeAction } from "vscode-languageserver";
import { startClient } from "../support/lspClient.ts";

const uri = "untitled:Untitled-1";
const at = (line: number, character: number) => ({ line, character });

it("all units are spelt at once by who asks for it, and never among the quick fixes", async () => {
  const client = await startClient();
  client.open(uri, "| speed 250 knots; weight 5\n| phase hold; altitude 3000 FT\n");
  const ask = (only?: string[]) =>
    client.request<CodeAction[]>("textDocument/codeAction", {
      textDocument: { uri },
      range: { start: at(0, 0), end: at(0, 0) },
      context: { diagnostics: [], ...(only ? { only } : {}) },
    });
  const provider = client.initialized.capabilities.codeActionProvider;
  expect(provider).toMatchObject({ codeActionKinds: expect.arrayContaining(["source.fixAll.plumbline"]) });
  for (const kind of ["source.fixAll.plumbline", "source.fixAll", "source"]) {
    expect(await ask([kind])).toEqual([
      {
        title: "Spell the units of this note as the notation does",
        kind: "source.fixAll.plumbline",
        edit: {
          changes: {
            [uri]: [
              { range: { start: at(0, 12), end: at(0, 17) }, newText: "kt" },
              { range: { start: at(1, 28), end: at(1, 30) }, newText: "ft" },
            ],
          },
        },
      },
    ]);
  }
  for (const only of [undefined, ["quickfix"]]) {
    const offered = await ask(only);
    expect(new Set(offered.map(({ kind }) => kind))).toEqual(new Set(["quickfix"]));
    expect(offered.filter(({ isPreferred }) => isPreferred).map(({ title }) => title)).toEqual(["Write kt"]);
  }
  expect(await ask(["refactor.extract"])).toEqual([]);
  client.change(uri, 2, { text: "| isa +6" });
  expect(await ask(["source.fixAll"])).toEqual([]);
  expect(await client.stop()).toBe(0);
});

it.each(["\n", "\r\n", "\r"])("a line that is added ends as the note's own do: %j", async (lineEnd) => {
  const client = await startClient();
  client.open(uri, ["| phase hold", "| phase climb", ""].join(lineEnd));
  const offered = await client.request<CodeAction[]>("textDocument/codeAction", {
    textDocument: { uri },
    range: { start: at(1, 0), end: at(1, 0) },
    context: { diagnostics: [] },
  });
  const apart = offered.find(({ title }) => title === "Leave a blank line before it");
  expect(apart?.edit?.changes?.[uri]).toEqual([
    { range: { start: at(1, 0), end: at(1, 0) }, newText: lineEnd },
  ]);
  expect(await client.stop()).toBe(0);
});
