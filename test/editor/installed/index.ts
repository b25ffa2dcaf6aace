import assert from "node:assert/strict";
import * as vscode from "vscode";
import { noteTests } from "../suite/noteTests.ts";
import { runTests } from "../suite/runTests.ts";
import type { Test } from "../suite/workbench.ts";

const installed: Test = [
  "the extension is the one that was installed from the package",
  async () => {
    const extension = vscode.extensions.getExtension("plumbline.plumbline");
    assert.ok(extension, "it is installed");
    assert.match(extension.extensionPath, /[\\/]extensions[\\/]plumbline\.plumbline-/);
    const page = vscode.Uri.joinPath(extension.extensionUri, "dist/pages/stalled.md");
    assert.match(new TextDecoder().decode(await vscode.workspace.fs.readFile(page)), /not approved data/);
  },
];

/** What somebody who installed the package sees of a note. */
export function run(): Promise<void> {
  return runTests([installed, ...noteTests]);
}
