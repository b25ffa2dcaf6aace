import assert from "node:assert/strict";
import { execFileSync } from "node:child_process";
import { join } from "node:path";
import * as vscode from "vscode";
import { page } from "./page.ts";
import { inEveryTheme, picture } from "./picture.ts";
import { edited, eventually, lineOf, openNote, startOf, type Test } from "./workbench.ts";

const NOTE = "contingency-briefing.md";

/** The Markdown preview: its figures are the command line's, follow every change, and keep no reader out. */
export const previewTests: readonly Test[] = [
  [
    "the Markdown preview shows each fence as a table, with the figures of the command line",
    async () => {
      const { document } = await openNote(NOTE);
      await vscode.commands.executeCommand("markdown.showPreview", document.uri);
      await eventually("the tables", async () => {
        const tables = await page.framed(".plumbline table");
        assert.equal(tables.length, 2);
        assert.deepEqual(tables.flatMap(bodyRows), printedRows());
      });
      const found = (await page.framed(".plumbline-findings")).join("");
      assert.match(found, /contaminated-takeoff/);
      assert.match((await page.framed(".plumbline-caution")).join(""), /not approved data/);
    },
  ],
  [
    "the preview is legible in every theme, and nothing in it keeps a reader out",
    async () => {
      await vscode.commands.executeCommand("workbench.action.closePanel");
      await inEveryTheme(async (name) => {
        await page.reveal(".plumbline table");
        await picture(`preview-${name}`);
        assert.deepEqual(
          (await page.faults(".plumbline")).filter(({ impact }) => impact !== "minor"),
          [],
        );
      });
    },
  ],
  [
    "the preview follows the text and the cards, and never keeps a figure of an older text",
    async () => {
      const { document, editor } = await openNote(NOTE);
      await vscode.commands.executeCommand("markdown.showPreviewToSide", document.uri);
      const before = await eventually("the tables", () => tables(2));
      await edited(document, async () => {
        const at = startOf(document, "900 kg");
        await editor.edit((edit) => edit.replace(new vscode.Range(at, at.translate(0, 3)), "400"));
        // Whatever is drawn on the way, a table is one of the old text only while the old text stands beside it.
        await eventually("the figures of the new text", async () => {
          const drawn = await page.framed(".plumbline");
          for (const one of drawn)
            if (one.includes("burn 400 kg")) assert.ok(!one.includes(before[1] as string), "an older figure");
          assert.notEqual((await tables(2))[1], before[1]);
        });
      });
      await eventually("the figures as they were", async () => assert.deepEqual(await tables(2), before));
      // Not over the preview, which would be taken down.
      await vscode.commands.executeCommand("workbench.action.focusFirstEditorGroup");
      const card = await openNote("aeroplanes.plumb");
      await edited(card.document, async () => {
        const at = startOf(card.document, "stall 117 kt").translate(0, 6);
        await card.editor.edit((edit) => edit.replace(new vscode.Range(at, at.translate(0, 3)), "121"));
        await eventually("the figures of the new card", async () =>
          assert.notEqual((await tables(2))[0], before[0]),
        );
      });
      await eventually("the figures of the old card", async () => assert.deepEqual(await tables(2), before));
      await vscode.commands.executeCommand("workbench.action.closeAllEditors");
    },
  ],
  [
    "a finding's code opens its page from the disk",
    async () => {
      const { document } = await openNote(NOTE);
      const [first] = await eventually("problems", () => {
        const found = vscode.languages
          .getDiagnostics(document.uri)
          .filter((one) => one.source === "plumbline");
        assert.ok(found.length > 0);
        return found;
      });
      const code = first?.code;
      assert.ok(typeof code === "object");
      assert.equal(code.target.scheme, "file");
      const text = new TextDecoder().decode(await vscode.workspace.fs.readFile(code.target));
      assert.ok(text.startsWith(`# ${code.value}: `), text.slice(0, 80));
    },
  ],
  [
    "the walkthrough opens, and keeps no reader out",
    async () => {
      const category = "plumbline.plumbline#start";
      await vscode.commands.executeCommand("workbench.action.openWalkthrough", category);
      await eventually("its steps", async () => {
        const shown = (await page.texts(".gettingStartedContainer .step-title")).join(" / ");
        assert.match(shown, /Open a sample note/);
        assert.match(shown, /Write a note of your own/);
      });
      await vscode.commands.executeCommand("workbench.action.closePanel");
      for (const [step, words] of [
        ["Open a sample note", /A note is prose with bar lines in it/],
        ["Read the figures", /a number or nothing/],
        ["Mend a finding", /needs no network/],
        ["Choose what is shown", /Nothing is said by a hint alone/],
        ["Write a note of your own", /Cards and limits are found by their names/],
        ["Look at a whole folder", /A qualified person checks every figure/],
      ] as const) {
        // The first is open already.
        if (step !== "Open a sample note") await page.click(".getting-started-step .step-title", step);
        await eventually(step, async () =>
          assert.match((await page.framed("vertically-centered")).join(""), words),
        );
        assert.deepEqual(
          (await page.faults("vertically-centered")).filter(({ impact }) => impact !== "minor"),
          [],
        );
      }
      await inEveryTheme((name) => picture(`walkthrough-${name}`));
      await vscode.commands.executeCommand("workbench.action.closeAllEditors");
    },
  ],
  [
    "the sample opens as a note of its own and has its finding; a new note is empty",
    async () => {
      await vscode.commands.executeCommand("plumbline.openSample");
      const sample = await eventually("the sample", () => {
        const document = vscode.window.activeTextEditor?.document;
        assert.ok(document?.isUntitled && document.languageId === "plumb");
        return document;
      });
      await eventually("its finding", () => {
        const found = vscode.languages.getDiagnostics(sample.uri);
        assert.deepEqual(
          [...new Set(found.map(({ range }) => range.start.line))],
          [lineOf(sample, "bank 35 left")],
        );
      });
      await picture("sample");
      await vscode.commands.executeCommand("workbench.action.revertAndCloseActiveEditor");
      await vscode.commands.executeCommand("plumbline.newNote");
      assert.equal(vscode.window.activeTextEditor?.document.getText(), "");
      assert.equal(vscode.window.activeTextEditor?.document.languageId, "plumb");
      await vscode.commands.executeCommand("workbench.action.revertAndCloseActiveEditor");
    },
  ],
];

async function tables(count: number): Promise<string[]> {
  const found = await page.framed(".plumbline table");
  assert.equal(found.length, count);
  return found;
}

/** The cells of a table's body, row by row. */
function bodyRows(html: string): string[][] {
  const [, body = ""] = /<tbody>(.*)<\/tbody>/s.exec(html) ?? [];
  return body
    .split("</tr>")
    .slice(0, -1)
    .map((row) =>
      [...row.matchAll(/<t[dh][^>]*>(.*?)<\/t[dh]>/gs)].map(([, cell = ""]) =>
        cell.replaceAll("&quot;", '"').replaceAll("&amp;", "&"),
      ),
    );
}

/** The rows of the points table, as the command line prints them for the same note. */
function printedRows(): string[][] {
  const root = process.env.PLUMBLINE_REPOSITORY as string;
  const printed = execFileSync(
    process.execPath,
    [join(root, "dist/server/cli.cjs"), "points", NOTE, "--root", ".", "--format", "markdown"],
    { cwd: vscode.workspace.workspaceFolders?.[0]?.uri.fsPath as string, encoding: "utf8" },
  );
  return printed
    .split("\n")
    .filter((line) => /^\| \d/.test(line))
    .map((line) => line.slice(2, -2).split(" | "));
}
