import assert from "node:assert/strict";
import * as vscode from "vscode";
import { page } from "../suite/page.ts";
import { sameAsCommandLine } from "../suite/sameAsCommandLine.ts";
import { codeOf, edited, eventually, hintLabels, openNote, problems, type Test } from "../suite/workbench.ts";

/** What is otherwise in a browser: the server is a worker, and what it knows of other notes the client told it. */
export const webTests: readonly Test[] = [
  [
    "the extension runs in the browser",
    async () => {
      assert.ok("WorkerGlobalScope" in globalThis, "the host is a worker");
      const extension = vscode.extensions.getExtension("plumbline.plumbline");
      assert.ok(extension);
      assert.equal(extension.packageJSON.main, undefined);
    },
  ],
  [
    "a note is checked with the card of a note that nobody opened",
    async () => {
      const { document } = await openNote("winter-shuttle.plumb");
      await eventually("hints", async () => assert.ok((await hintLabels(document)).length > 15));
      await sameAsCommandLine("winter-shuttle.plumb");
      const opened = vscode.workspace.textDocuments.map(({ uri }) => uri.path);
      assert.ok(!opened.some((path) => path.endsWith("aeroplanes.plumb")), opened.join(", "));
      await page.screenshot("web");
    },
  ],
  [
    "the page of a finding opens, and so do the built-in limits",
    async () => {
      const { document, editor } = await openNote("winter-shuttle.plumb");
      const finding = problems(document.uri).find((one) => codeOf(one) === "bank-over-limit");
      assert.ok(finding && typeof finding.code === "object");
      const shown = await vscode.workspace.openTextDocument(finding.code.target);
      assert.match(shown.getText(), /bank-over-limit/);
      await edited(document, async () => {
        const end = document.lineAt(document.lineCount - 1).range.end;
        await editor.edit((edit) => edit.insert(end, "\n| under common-practice\n"));
        const [place] = await vscode.commands.executeCommand<(vscode.Location | vscode.LocationLink)[]>(
          "vscode.executeDefinitionProvider",
          document.uri,
          new vscode.Position(end.line + 1, "| under com".length),
        );
        assert.ok(place);
        const uri = "targetUri" in place ? place.targetUri : place.uri;
        assert.match((await vscode.workspace.openTextDocument(uri)).getText(), /limits common-practice/);
      });
    },
  ],
  [
    "a note that comes, changes and goes is seen, and one that is ignored is not",
    async () => {
      const folder = vscode.workspace.workspaceFolders?.[0]?.uri;
      assert.ok(folder);
      const write = (name: string, text: string) =>
        vscode.workspace.fs.writeFile(vscode.Uri.joinPath(folder, name), new TextEncoder().encode(text));
      const remove = (name: string) =>
        vscode.workspace.fs.delete(vscode.Uri.joinPath(folder, name), { recursive: true });
      const twin = "| aircraft brambling-37; basis vsr; reference 50 t\n| config clean stall 127 kt\n";
      const doubles = () =>
        vscode.languages
          .getDiagnostics()
          .flatMap(([uri, found]) => (uri.path.startsWith(`${folder.path}/`) ? found : []))
          .filter((one) => codeOf(one) === "duplicate-name").length;
      await write("twin.plumb", twin);
      try {
        await eventually("the second card", () => assert.ok(doubles() > 0));
        await write(".gitignore", "twin.plumb\n");
        await eventually("one card again", () => assert.equal(doubles(), 0));
      } finally {
        await remove("twin.plumb");
        await remove(".gitignore");
      }
    },
  ],
  [
    "the demo is opened as a new folder",
    async () => {
      const folder = vscode.workspace.workspaceFolders?.[0]?.uri;
      assert.ok(folder);
      const parent = vscode.Uri.joinPath(folder, "../parent");
      void vscode.commands.executeCommand("plumbline.openDemo", parent);
      assert.ok((await page.opened()).includes(`${parent.path}/plumbline-demo`));
      const names = async (uri: vscode.Uri) =>
        (await vscode.workspace.fs.readDirectory(uri)).map(([name]) => name).sort();
      const extension = vscode.extensions.getExtension("plumbline.plumbline");
      assert.ok(extension);
      const shipped = await names(vscode.Uri.joinPath(extension.extensionUri, "demo"));
      assert.ok(shipped.includes("winter-shuttle.plumb"));
      assert.deepEqual(await names(vscode.Uri.joinPath(parent, "plumbline-demo")), shipped);
    },
  ],
  [
    "the server is restarted and answers again",
    async () => {
      const { document } = await openNote("winter-shuttle.plumb");
      for (let i = 0; i < 2; i++) {
        await vscode.commands.executeCommand("plumbline.restartServer");
        await eventually("hints after the restart", async () =>
          assert.ok((await hintLabels(document)).length > 15),
        );
        await sameAsCommandLine("winter-shuttle.plumb");
      }
    },
  ],
];
