import assert from "node:assert/strict";
import * as vscode from "vscode";
import { page } from "./page.ts";
import { edited, eventually, openNote, startOf, type Test } from "./workbench.ts";

/** Names, symbols, selections, colours, arguments and Enter, asked through the editor's own interface. */
export const writingTests: readonly Test[] = [
  [
    "a name is found in notes that nobody opened, and renamed in all of them",
    async () => {
      const { document } = await openNote("winter-shuttle.plumb");
      const at = startOf(document, "brambling-37").translate(0, 3);
      const found = await vscode.commands.executeCommand<vscode.Location[]>(
        "vscode.executeReferenceProvider",
        document.uri,
        at,
      );
      const files = new Set(found.map(({ uri }) => uri.path.split("/").pop()));
      assert.ok(files.has("aeroplanes.plumb") && files.has("winter-shuttle.plumb"), [...files].join(", "));
      const edit = await vscode.commands.executeCommand<vscode.WorkspaceEdit>(
        "vscode.executeDocumentRenameProvider",
        document.uri,
        at,
        "bunting-40",
      );
      assert.equal(edit.entries().flatMap(([, edits]) => edits).length, found.length);
      await assert.rejects(
        async () =>
          vscode.commands.executeCommand(
            "vscode.executeDocumentRenameProvider",
            document.uri,
            at,
            "two words",
          ),
        /is no name/,
      );
    },
  ],
  [
    "symbols, selections, colours and arguments are told",
    async () => {
      const { document } = await openNote("winter-shuttle.plumb");
      const symbols = await vscode.commands.executeCommand<vscode.SymbolInformation[]>(
        "vscode.executeWorkspaceSymbolProvider",
        "noise turn",
      );
      assert.ok(symbols.some(({ name }) => name === "departure: Noise turn"));
      const at = startOf(document, "weight ").translate(0, 8);
      const [selection] = await vscode.commands.executeCommand<vscode.SelectionRange[]>(
        "vscode.executeSelectionRangeProvider",
        document.uri,
        [at],
      );
      assert.ok(selection?.parent?.parent?.range.contains(selection.range));
      const help = await vscode.commands.executeCommand<vscode.SignatureHelp>(
        "vscode.executeSignatureHelpProvider",
        document.uri,
        at,
      );
      assert.equal(help.signatures[0]?.label, "weight MASS [+- MASS]");
      const legend = await vscode.commands.executeCommand<vscode.SemanticTokensLegend>(
        "vscode.provideDocumentSemanticTokensLegend",
        document.uri,
      );
      assert.ok(legend.tokenTypes.includes("unit"));
      const tokens = await vscode.commands.executeCommand<vscode.SemanticTokens>(
        "vscode.provideDocumentSemanticTokens",
        document.uri,
      );
      assert.ok(tokens.data.length > 100);
    },
  ],
];

/** What keys do, and what stands in the status bar. */
export const writingPageTests: readonly Test[] = [
  [
    "Enter lays out the line that was left, and the next begins with one bar",
    async () => {
      const { document, editor } = await openNote("winter-shuttle.plumb");
      await edited(document, async () => {
        const end = document.lineAt(document.lineCount - 1).range.end;
        editor.selection = new vscode.Selection(end, end);
        await vscode.commands.executeCommand("workbench.action.focusActiveEditorGroup");
        await page.press("Enter");
        await page.press("Enter");
        await page.type("|  isa   +6");
        await page.press("Escape");
        await page.press("Enter");
        await eventually("the line laid out", () => assert.match(document.getText(), /\n\| isa \+6\n\| $/));
        const { active } = editor.selection;
        assert.deepEqual([active.line, active.character], [document.lineCount - 1, 2]);
      });
    },
  ],
  [
    "how many notes are checked stands beside the language",
    async () => {
      await openNote("winter-shuttle.plumb");
      await eventually("the status", async () => {
        await page.hover("#status\\.languageStatus", "");
        const said = (await page.texts(".hover-language-status")).join(" ");
        assert.match(said, /\d+ notes, \d+ points.*\d+ errors?, \d+ warnings?/);
      });
      await page.screenshot("status");
      await page.away();
    },
  ],
];
