import assert from "node:assert/strict";
import * as vscode from "vscode";
import { sameAsCommandLine } from "./sameAsCommandLine.ts";
import { eventually, hintLabels, openNote, type Test } from "./workbench.ts";

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
