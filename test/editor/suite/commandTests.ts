import assert from "node:assert/strict";
import * as vscode from "vscode";
import { sameAsCommandLine } from "./sameAsCommandLine.ts";
import { eventually, hintLabels, hints, lineOf, openNote, type Test } from "./workbench.ts";

/** What the commands of the extension do. Opening the demo is among the tests of the page, for it opens one. */
export const commandTests: readonly Test[] = [
  [
    "hints are turned off and on again",
    async () => {
      const { document } = await openNote("winter-shuttle.plumb");
      await vscode.commands.executeCommand("plumbline.toggleHints");
      await eventually("no hints", async () => assert.equal((await hintLabels(document)).length, 0));
      await vscode.commands.executeCommand("plumbline.toggleHints");
      await eventually("hints again", async () => assert.ok((await hintLabels(document)).length > 15));
    },
  ],
  [
    "hints are shown by kind",
    async () => {
      const { document } = await openNote("winter-shuttle.plumb");
      const settings = () => vscode.workspace.getConfiguration("plumbline").get<string[]>("hints.kinds", []);
      const all = settings();
      await vscode.commands.executeCommand("plumbline.chooseHints", ["banks"]);
      await eventually("hints of banks alone", async () => {
        const labels = await hintLabels(document);
        assert.ok(labels.length > 3);
        for (const label of labels) assert.match(label, /^≈ (?:warning|stall) at /);
      });
      await vscode.commands.executeCommand("plumbline.chooseHints", all);
      await eventually("all hints", async () => assert.ok((await hintLabels(document)).length > 15));
      assert.deepEqual(settings(), all);
    },
  ],
  [
    "hints are hidden for one note and stay in another",
    async () => {
      const other = await openNote("steep-turns.plumb");
      const { document } = await openNote("winter-shuttle.plumb");
      await vscode.commands.executeCommand("plumbline.toggleHintsOfNote");
      await eventually("no hints", async () => assert.equal((await hintLabels(document)).length, 0));
      assert.ok((await hintLabels(other.document)).length > 5);
      await vscode.commands.executeCommand("plumbline.toggleHintsOfNote");
      await eventually("hints again", async () => assert.ok((await hintLabels(document)).length > 15));
    },
  ],
  [
    "lines are copied with their values, in each form",
    async () => {
      const { document, editor } = await openNote("winter-shuttle.plumb");
      const line = lineOf(document, "Noise turn");
      editor.selection = new vscode.Selection(line, 0, line + 2, 0);
      const label = (await hints(document)).find((hint) => hint.line === line)?.text ?? "";
      for (const form of ["text", "markdown", "html"]) {
        await vscode.commands.executeCommand("plumbline.copyWithValues", form);
        const copied = (await vscode.env.clipboard.readText()).replaceAll("\\", "");
        assert.ok(copied.includes(label), `${label} in\n${copied}`);
        assert.match(copied, /not approved data/);
        assert.match(copied, /burn 380 kg/);
        assert.doesNotMatch(copied, /bank 32/);
      }
    },
  ],
  [
    "the server is restarted and answers again",
    async () => {
      const { document } = await openNote("winter-shuttle.plumb");
      await vscode.commands.executeCommand("plumbline.restartServer");
      await eventually("hints after the restart", async () =>
        assert.ok((await hintLabels(document)).length > 15),
      );
      await sameAsCommandLine("winter-shuttle.plumb");
    },
  ],
];
