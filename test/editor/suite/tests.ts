import assert from "node:assert/strict";
import { execFileSync } from "node:child_process";
import { join } from "node:path";
import * as vscode from "vscode";
import { hasPage, page } from "./page.ts";
import { edited, eventually, hintLabels, lineOf, openNote, pause, problems, startOf } from "./workbench.ts";

type Test = readonly [name: string, run: () => Promise<void>];

/** What the command line says of the same folder: the editor must say the same. */
function checked(): Map<string, string[]> {
  const root = process.env.PLUMBLINE_REPOSITORY as string;
  const folder = vscode.workspace.workspaceFolders?.[0]?.uri.fsPath as string;
  const printed = execFileSync(
    process.execPath,
    [join(root, "dist/server/cli.cjs"), "check", ".", "--format", "json", "--fail-on", "never"],
    {
      cwd: folder,
      encoding: "utf8",
    },
  );
  const { files } = JSON.parse(printed) as {
    files: { path: string; findings: { line: number; code: string; message: string }[] }[];
  };
  return new Map(
    files.map(({ path, findings }) => [
      path,
      findings.map((one) => `${one.line} ${one.code} ${one.message}`).sort(),
    ]),
  );
}

async function sameAsCommandLine(name: string): Promise<void> {
  const wanted = checked().get(name) ?? [];
  const { document } = await openNote(name);
  await eventually(`the problems of ${name}`, () => {
    const found = problems(document.uri)
      .map((one) => `${one.range.start.line + 1} ${codeOf(one)} ${one.message}`)
      .sort();
    assert.deepEqual(found, wanted);
  });
}

function codeOf(problem: vscode.Diagnostic): string {
  const { code } = problem;
  return String(typeof code === "object" ? code.value : code);
}

async function theme(name: string): Promise<void> {
  await vscode.workspace
    .getConfiguration("workbench")
    .update("colorTheme", name, vscode.ConfigurationTarget.Global);
  await pause(1500);
}

/** Puts the notes' own part of the workbench in front for a picture. */
async function picture(name: string): Promise<void> {
  if (!hasPage) return;
  await vscode.commands.executeCommand("notifications.clearAll");
  await page.away();
  await pause(600);
  await page.screenshot(name);
}

export const tests: readonly Test[] = [
  [
    "the demo's note shows its hints and its problems, as the command line finds them",
    async () => {
      const { document } = await openNote("winter-shuttle.plumb");
      assert.equal(document.languageId, "plumb");
      const hints = await eventually("hints", async () => {
        const labels = await hintLabels(document);
        assert.ok(labels.length > 15, `${labels.length} hints`);
        return labels;
      });
      assert.ok(
        hints.some((label) => /^≈ margin 1\.\d\d, ratio 1\.\d\d, stall \d+ kt, warning \d+ kt$/.test(label)),
        hints.join(" / "),
      );
      assert.ok(
        hints.some((label) => /^≈ warning at \d+°, load \d\.\d\d, radius \d+\.\d\d nm$/.test(label)),
        hints.join(" / "),
      );
      for (const name of ["winter-shuttle.plumb", "steep-turns.plumb", "aeroplanes.plumb", "limits.plumb"])
        await sameAsCommandLine(name);
    },
  ],
  [
    "the hints are drawn in the editor",
    async () => {
      if (!hasPage) return;
      const { editor } = await openNote("winter-shuttle.plumb");
      editor.revealRange(new vscode.Range(9, 0, 9, 0), vscode.TextEditorRevealType.AtTop);
      await eventually("drawn hints", async () => {
        const drawn = (await page.texts(".view-lines")).join("\n").replaceAll("\u00a0", " ");
        assert.match(drawn, /≈ margin 1\.\d\d/);
        assert.match(drawn, /≈ warning at \d+°/);
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
      for (const [name, file] of [
        ["Default Light Modern", "screenshot-light"],
        ["Default Dark Modern", "screenshot-dark"],
        ["Default High Contrast", "screenshot-contrast"],
      ] as const) {
        await theme(name);
        await picture(file);
      }
      await theme("Default Light Modern");
    },
  ],
  [
    "a hover shows the result and how it came about",
    async () => {
      const { document, editor } = await openNote("winter-shuttle.plumb");
      const at = startOf(document, "bank 32").translate(0, 6);
      const hovers = await vscode.commands.executeCommand<vscode.Hover[]>(
        "vscode.executeHoverProvider",
        document.uri,
        at,
      );
      const text = hovers
        .flatMap((one) =>
          one.contents.map((content) => (typeof content === "string" ? content : content.value)),
        )
        .join("\n");
      assert.match(text, /warning-bank \d+°/);
      assert.match(text, /From: 56\.02 t \(line \d+\)/);
      assert.match(text, /must any bank 30/);
      assert.match(text, /cross-check/);
      if (!hasPage) return;
      editor.selection = new vscode.Selection(at, at);
      editor.revealRange(new vscode.Range(at, at), vscode.TextEditorRevealType.InCenter);
      await vscode.commands.executeCommand("editor.action.showHover");
      await page.appears(".monaco-hover");
      await pause(1200);
      await page.screenshot("hover");
      await page.press("Escape");
    },
  ],
  [
    "completion offers the card's configurations, and inserts the one chosen",
    async () => {
      const { document, editor } = await openNote("winter-shuttle.plumb");
      const at = startOf(document, "config flaps-5").translate(0, "config ".length);
      const list = await vscode.commands.executeCommand<vscode.CompletionList>(
        "vscode.executeCompletionItemProvider",
        document.uri,
        at,
      );
      const labels = list.items.map((item) =>
        typeof item.label === "string" ? item.label : item.label.label,
      );
      for (const name of ["clean", "flaps-5", "flaps-15", "flaps-30"])
        assert.ok(labels.includes(name), labels.join(", "));
      if (!hasPage) return;
      await edited(document, async () => {
        await editor.edit((edit) => edit.delete(new vscode.Range(at, at.translate(0, "flaps-5".length))));
        editor.selection = new vscode.Selection(at, at);
        await vscode.commands.executeCommand("editor.action.triggerSuggest");
        await page.appears(".suggest-widget.visible .monaco-list-row");
        await pause(800);
        await page.screenshot("completion");
        await page.type("flaps-30");
        await pause(500);
        await vscode.commands.executeCommand("acceptSelectedSuggestion");
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
      if (!hasPage) return;
      await eventually("rows of the list", async () => {
        const rows = (await page.texts(".markers-panel .monaco-list-row")).join("\n");
        assert.match(rows, /Bank 32° exceeds the 30° that shuttle-rules allows in departure/);
      });
      await picture("problems");
    },
  ],
  [
    "a fence in Markdown has its hints and problems, and the table beside it has none",
    async () => {
      const { document } = await openNote("contingency-briefing.md");
      await eventually("hints in the fence", async () => {
        const labels = await hintLabels(document);
        assert.ok(labels.length >= 3, labels.join(" / "));
        for (const label of labels) assert.ok(label.length <= 43, label);
      });
      await sameAsCommandLine("contingency-briefing.md");
      assert.ok(problems(document.uri).every((one) => one.range.start.line > lineOf(document, "```plumb")));
      await picture("markdown");
    },
  ],
  [
    "a missing unit has a quick fix that mends it",
    async () => {
      const { document, editor } = await openNote("winter-shuttle.plumb");
      await edited(document, async () => {
        const at = startOf(document, "195 kt").translate(0, 3);
        await editor.edit((edit) => edit.delete(new vscode.Range(at, at.translate(0, 3))));
        await eventually("the finding", () =>
          assert.ok(problems(document.uri).some((one) => codeOf(one) === "missing-unit")),
        );
        const waiting = await hintLabels(document);
        assert.ok(waiting.includes("≈ …"), waiting.join(" / "));
        const actions = await vscode.commands.executeCommand<vscode.CodeAction[]>(
          "vscode.executeCodeActionProvider",
          document.uri,
          new vscode.Range(at, at),
        );
        const fix = actions.find((one) => one.title === "Write 195 kt");
        assert.ok(fix?.edit, actions.map((one) => one.title).join(", "));
        await vscode.workspace.applyEdit(fix.edit);
        await eventually("no finding", () =>
          assert.ok(!problems(document.uri).some((one) => codeOf(one) === "missing-unit")),
        );
        assert.match(document.lineAt(at.line).text, /speed 195 kt/);
      });
    },
  ],
  [
    "a changed card changes the figures of the notes that use it",
    async () => {
      const note = await openNote("winter-shuttle.plumb");
      const before = (await hintLabels(note.document)).join("\n");
      const card = await openNote("aeroplanes.plumb");
      await edited(card.document, async () => {
        const at = startOf(card.document, "stall 127 kt").translate(0, 6);
        await card.editor.edit((edit) => edit.replace(new vscode.Range(at, at.translate(0, 3)), "131"));
        await eventually("other figures", async () =>
          assert.notEqual((await hintLabels(note.document)).join("\n"), before),
        );
      });
      await eventually("the old figures", async () =>
        assert.equal((await hintLabels(note.document)).join("\n"), before),
      );
    },
  ],
  [
    "Go to Definition opens the card",
    async () => {
      const { document } = await openNote("winter-shuttle.plumb");
      const at = startOf(document, "brambling-37");
      const found = await vscode.commands.executeCommand<(vscode.Location | vscode.LocationLink)[]>(
        "vscode.executeDefinitionProvider",
        document.uri,
        at.translate(0, 3),
      );
      const [first] = found;
      assert.ok(first);
      const uri = "targetUri" in first ? first.targetUri : first.uri;
      assert.ok(uri.path.endsWith("/aeroplanes.plumb"));
    },
  ],
  [
    "Enter continues the bar, and the comment command makes prose of it",
    async () => {
      const { document, editor } = await openNote("steep-turns.plumb");
      await edited(document, async () => {
        const line = lineOf(document, "| speed 85 kt");
        const end = document.lineAt(line).range.end;
        editor.selection = new vscode.Selection(end, end);
        await vscode.commands.executeCommand("type", { text: "\n" });
        assert.equal(document.lineAt(line + 1).text, "| ");
        await vscode.commands.executeCommand("type", { text: "path 2 deg" });
        await vscode.commands.executeCommand("editor.action.commentLine");
        assert.match(document.lineAt(line + 1).text, /^\\ ?\| path 2 deg$/);
      });
    },
  ],
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
