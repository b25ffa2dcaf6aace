import assert from "node:assert/strict";
import { mkdtemp, readdir, readFile, rm, writeFile } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import * as vscode from "vscode";
import { page } from "./page.ts";
import { inEveryTheme, picture } from "./picture.ts";
import { edited, eventually, hints, openNote, pause, startOf, type Test } from "./workbench.ts";

/** What stands on the page that the workbench is drawn on; pictures of it are saved on the way. */
export const pageTests: readonly Test[] = [
  [
    "every hint is drawn in its line, whole",
    async () => {
      const { document, editor } = await openNote("winter-shuttle.plumb");
      editor.revealRange(new vscode.Range(9, 0, 9, 0), vscode.TextEditorRevealType.AtTop);
      await eventually("drawn hints", async () => {
        const drawn = await drawnLines();
        const [first] = editor.visibleRanges;
        assert.ok(first);
        const inView = (await hints(document)).filter(({ line }) =>
          first.contains(new vscode.Position(line, 0)),
        );
        assert.ok(inView.length > 8, `${inView.length} hints in view`);
        for (const { text } of inView)
          assert.ok(
            drawn.some((line) => line.includes(text)),
            `${text} in\n${drawn.join("\n")}`,
          );
      });
    },
  ],
  [
    "pictures in a light, a dark and a high-contrast theme",
    async () => {
      const { editor } = await openNote("winter-shuttle.plumb");
      editor.selection = new vscode.Selection(0, 0, 0, 0);
      await vscode.commands.executeCommand("workbench.action.closeSidebar");
      await vscode.commands.executeCommand("workbench.actions.view.problems");
      await vscode.commands.executeCommand("workbench.action.focusActiveEditorGroup");
      editor.revealRange(new vscode.Range(4, 0, 4, 0), vscode.TextEditorRevealType.AtTop);
      await inEveryTheme((name) => picture(`screenshot-${name}`));
    },
  ],
  [
    "the pointer at rest shows the finding, the result and how it came about",
    async () => {
      await pointAt("32");
      const shown = await hoverText();
      assert.match(shown, /Bank 32° exceeds the 30° that shuttle-rules allows in departure/);
      assert.match(shown, /warning-bank \d+°/);
      assert.match(shown, /From: .*56\.02 t \(line \d+\)/s);
      await pause(600);
      await page.screenshot("finding");
      await page.press("Escape");
      // The picture of a derivation, where no finding stands above it and there is room for it.
      await vscode.commands.executeCommand("workbench.action.closePanel");
      await pointAt("205");
      await hoverText();
      await page.pullUp(".monaco-resizable-hover > .monaco-sash.horizontal:not(.disabled)", 270);
      await page.scroll(".monaco-resizable-hover .monaco-hover-content", 1);
      await pause(600);
      await page.screenshot("hover");
      await page.press("Escape");
      await page.away();
    },
  ],
  [
    "the list of completions is drawn, and the one chosen is inserted",
    async () => {
      const { document, editor } = await openNote("winter-shuttle.plumb");
      const at = startOf(document, "config flaps-5").translate(0, "config ".length);
      await edited(document, async () => {
        await editor.edit((edit) => edit.delete(new vscode.Range(at, at.translate(0, "flaps-5".length))));
        editor.selection = new vscode.Selection(at, at);
        await vscode.commands.executeCommand("editor.action.triggerSuggest");
        await eventually("the configurations", async () => {
          const rows = (await page.texts(".suggest-widget.visible .monaco-list-row")).join("\n");
          for (const name of ["clean", "flaps-5", "flaps-15", "flaps-30"])
            assert.ok(rows.includes(name), rows);
        });
        await pause(800);
        await page.screenshot("completion");
        // Not the whole name: what stands in the note in the end must come from the list.
        await page.type("flaps-3");
        await eventually("one row", async () => {
          const rows = await page.texts(".suggest-widget.visible .monaco-list-row");
          assert.equal(rows.length, 1, rows.join("\n"));
        });
        await page.press("Enter");
        await eventually("the accepted name", () =>
          assert.match(document.lineAt(at.line).text, /config flaps-30;/),
        );
      });
    },
  ],
  [
    "the Problems list holds the findings",
    async () => {
      await openNote("winter-shuttle.plumb");
      await vscode.commands.executeCommand("workbench.actions.view.problems");
      await eventually("rows of the list", async () => {
        const rows = (await page.texts(".markers-panel .monaco-list-row")).join("\n");
        assert.match(rows, /Bank 32° exceeds the 30° that shuttle-rules allows in departure/);
      });
      await picture("problems");
    },
  ],
  [
    "the values of a line are read by the keyboard alone",
    async () => {
      const { document, editor } = await openNote("winter-shuttle.plumb");
      const line = startOf(document, "bank 32").line;
      editor.selection = new vscode.Selection(line, 3, line, 3);
      await vscode.commands.executeCommand("workbench.action.focusActiveEditorGroup");
      await page.press("Control+k");
      await page.press("Control+v");
      await eventually("the sentence", async () => {
        const shown = (await page.texts(".notification-toast .notification-list-item-message")).join("\n");
        assert.match(
          shown,
          /^Line \d+, departure, Noise turn; bank: warning at \d+°, .*error: Bank 32° exceeds/,
        );
      });
      await pause(500);
      await page.screenshot("read-line");
      assert.equal(document.isDirty, false);
      await vscode.commands.executeCommand("notifications.clearAll");
    },
  ],
  [
    "the form of a copy is picked from a list",
    async () => {
      const { document, editor } = await openNote("winter-shuttle.plumb");
      const at = startOf(document, "bank 32");
      editor.selection = new vscode.Selection(at, at);
      void vscode.commands.executeCommand("plumbline.copyWithValues");
      await eventually("the forms", async () => {
        const rows = await page.texts(".quick-input-list .monaco-list-row");
        assert.equal(rows.length, 3, rows.join(" / "));
      });
      await page.screenshot("copy");
      await page.type("markdown");
      await page.press("Enter");
      await eventually("the copy", async () =>
        assert.match(await vscode.env.clipboard.readText(), /^\| Line \| Note \| Values \|/),
      );
    },
  ],
  [
    "the kinds of hints are ticked in a list",
    async () => {
      await openNote("winter-shuttle.plumb");
      const kinds = () => vscode.workspace.getConfiguration("plumbline").get<string[]>("hints.kinds", []);
      const all = kinds();
      void vscode.commands.executeCommand("plumbline.chooseHints");
      await eventually("the kinds", async () => {
        const rows = await page.texts(".quick-input-list .monaco-list-row");
        assert.equal(rows.length, all.length, rows.join(" / "));
      });
      await page.screenshot("choose-hints");
      // The first in the list, which the keyboard stands on.
      await page.press("ArrowDown");
      await page.press("Space");
      await page.press("Enter");
      await eventually("one kind less", () => assert.deepEqual(kinds(), all.slice(1)));
      await vscode.commands.executeCommand("plumbline.chooseHints", all);
    },
  ],
  [
    "the hints of a fence are drawn in Markdown",
    async () => {
      await openNote("contingency-briefing.md");
      await eventually("drawn hints", async () =>
        assert.match((await drawnLines()).join("\n"), /"After de-icing".?≈ margin \d\.\d\d, ratio \d\.\d\d/),
      );
      await picture("markdown");
    },
  ],
  [
    "the demo is opened as a new folder, beside one that is there already",
    async () => {
      const parent = await mkdtemp(join(tmpdir(), "plumbline-parent-"));
      try {
        const open = () => vscode.commands.executeCommand("plumbline.openDemo", vscode.Uri.file(parent));
        const demo = join(process.env.PLUMBLINE_REPOSITORY as string, "demo");
        void open();
        assert.ok((await page.opened()).includes(join(parent, "plumbline-demo")));
        const copied = (await readdir(join(parent, "plumbline-demo"))).sort();
        assert.deepEqual(copied, (await readdir(demo)).sort());
        const mine = join(parent, "plumbline-demo", "winter-shuttle.plumb");
        await writeFile(mine, "My own words.\n");
        void open();
        assert.ok((await page.opened()).includes(join(parent, "plumbline-demo-2")));
        assert.equal(await readFile(mine, "utf8"), "My own words.\n");
      } finally {
        await rm(parent, { recursive: true, force: true });
      }
    },
  ],
];

/** The text of the lines in view, with what is drawn between the words. */
async function drawnLines(): Promise<string[]> {
  return (await page.texts(".view-line")).map((line) => line.replaceAll("\u00a0", " "));
}

async function hoverText(): Promise<string> {
  return eventually("a hover", async () => {
    const text = (await page.texts(".monaco-hover:not(.hidden) .hover-row"))
      .join("\n")
      .replaceAll("\u00a0", " ");
    assert.match(text, /From:/);
    return text;
  });
}

/** Rests the pointer on a word of the note, which stands from its top in the view. */
async function pointAt(word: string): Promise<void> {
  const { editor } = await openNote("winter-shuttle.plumb");
  editor.selection = new vscode.Selection(0, 0, 0, 0);
  editor.revealRange(new vscode.Range(0, 0, 0, 0), vscode.TextEditorRevealType.AtTop);
  await page.hover(".view-line > span > span", word);
}
