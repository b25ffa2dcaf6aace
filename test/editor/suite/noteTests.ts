import assert from "node:assert/strict";
import * as vscode from "vscode";
import { sameAsCommandLine } from "./sameAsCommandLine.ts";
import {
  codeOf,
  edited,
  eventually,
  hintLabels,
  lineOf,
  openNote,
  problems,
  startOf,
  type Test,
} from "./workbench.ts";

/** What the language service gives, asked through the editor's own interface. */
export const noteTests: readonly Test[] = [
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
    "a hover shows the result and how it came about",
    async () => {
      const { document } = await openNote("winter-shuttle.plumb");
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
    },
  ],
  [
    "completion offers the card's configurations",
    async () => {
      const { document } = await openNote("winter-shuttle.plumb");
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
];
