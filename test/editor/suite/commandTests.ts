import assert from "node:assert/strict";
import { execFileSync } from "node:child_process";
import { readFile, rm, writeFile } from "node:fs/promises";
import { join } from "node:path";
import * as vscode from "vscode";
import { hasPage, page } from "./page.ts";
import { sameAsCommandLine } from "./sameAsCommandLine.ts";
import {
  codeOf,
  edited,
  eventually,
  hintLabels,
  hints,
  lineOf,
  openNote,
  problems,
  startOf,
  type Test,
} from "./workbench.ts";

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
  [
    "a server that was killed is started again, and what it shows comes back",
    async () => {
      const { document } = await openNote("winter-shuttle.plumb");
      await eventually("hints", async () => assert.ok((await hintLabels(document)).length > 15));
      const before = serverProcess();
      process.kill(before, "SIGKILL");
      await eventually("another server", () => assert.notEqual(serverProcess(), before));
      await eventually("hints again", async () => assert.ok((await hintLabels(document)).length > 15));
      await sameAsCommandLine("winter-shuttle.plumb");
    },
  ],
  [
    "the problems of a note that nobody opened are listed",
    async () => {
      const folder = vscode.workspace.workspaceFolders?.[0];
      assert.ok(folder);
      const never = vscode.Uri.joinPath(folder.uri, "night-mail-2.plumb");
      await eventually("its findings", () =>
        assert.deepEqual(problems(never).map(codeOf).sort(), ["bank-over-advice", "reference-config"]),
      );
      assert.ok(!vscode.workspace.textDocuments.some((one) => one.uri.toString() === never.toString()));
    },
  ],
  [
    "a note that was never saved is not compared, and is told so",
    async () => {
      const untitled = await vscode.workspace.openTextDocument({
        language: "plumb",
        content: "| weight 5 t",
      });
      await vscode.window.showTextDocument(untitled);
      await vscode.commands.executeCommand("plumbline.compareWithCommitted");
      assert.deepEqual(comparisonsOpen(), []);
      if (hasPage) {
        await eventually("the reason", async () => {
          const told = await page.texts(".notifications-toasts .notification-list-item-message");
          assert.match(told.join("\n"), /Save the note as a file in a Git repository first/);
        });
      }
      await vscode.commands.executeCommand("workbench.action.revertAndCloseActiveEditor");
    },
  ],
  [
    "a note is compared with its last commit, and its cards with theirs",
    async () => {
      const { document } = await openNote("winter-shuttle.plumb");
      const folder = join(document.uri.fsPath, "..");
      const cards = join(folder, "aeroplanes.plumb");
      const cardsBefore = await readFile(cards, "utf8");
      try {
        await refused("lies in no Git repository, so there is no commit to compare it with.");
        git(folder, "init", "--quiet");
        await refused("The repository has no commit yet: commit the note first.");
        git(folder, "add", "limits.plumb", "aeroplanes.plumb");
        git(folder, "commit", "--quiet", "-m", "The rules");
        await refused("winter-shuttle.plumb is not in the last commit: commit it first.");
        git(folder, "add", "winter-shuttle.plumb");
        git(folder, "commit", "--quiet", "-m", "The plan");
        await edited(document, async () => {
          const at = startOf(document, "bank 32 left");
          const edit = new vscode.WorkspaceEdit();
          edit.replace(document.uri, new vscode.Range(at, at.translate(0, 7)), "bank 28");
          await vscode.workspace.applyEdit(edit);
          const text = await comparisonWith(/\| bank 32 left \| bank 28 left \|/);
          assert.match(text, /gone, error: Bank 32°/);
          assert.match(text, /not approved data/);
          assert.doesNotMatch(text, /The card/);
          if (hasPage) await drawn(/gone, error: Bank 32° exceeds/);
        });
        await writeFile(cards, cardsBefore.replace("stall 127 kt", "stall 129 kt"));
        const text = await comparisonWith(/The card brambling-37 has changed \(aeroplanes\.plumb, line 7\)/);
        assert.match(text, /not edited; the card brambling-37 changed/);
        assert.doesNotMatch(text, /bank 28/);
        if (hasPage) await drawn(/The card brambling-37 has changed/);
        const tabs = vscode.window.tabGroups.all.flatMap((group) => group.tabs);
        assert.equal(tabs.filter((tab) => tab.label.includes("since its last commit")).length, 1);
      } finally {
        await writeFile(cards, cardsBefore);
        await rm(join(folder, ".git"), { recursive: true, force: true });
        await vscode.commands.executeCommand("workbench.action.closeEditorsInOtherGroups");
      }
    },
  ],
];

/** The process of the server, which this host has started. */
function serverProcess(): number {
  const found = execFileSync("pgrep", ["-P", String(process.pid), "-f", "main.node.cjs"], {
    encoding: "utf8",
  });
  return Number(found.trim().split("\n")[0]);
}

/** Git as somebody of the tests, whatever this machine says of its user. */
function git(folder: string, ...args: string[]): void {
  const somebody = ["-c", "user.name=Somebody", "-c", "user.email=somebody@example.invalid"];
  execFileSync("git", [...somebody, "-c", "commit.gpgsign=false", ...args], { cwd: folder });
}

/** Runs the comparison until the editor tells why it cannot be made, where there is a page to read that on. */
async function refused(message: string): Promise<void> {
  await eventually(message, async () => {
    await openNote("winter-shuttle.plumb");
    await vscode.commands.executeCommand("plumbline.compareWithCommitted");
    assert.deepEqual(comparisonsOpen(), []);
    if (!hasPage) return;
    const told = await page.texts(".notifications-toasts .notification-list-item-message");
    assert.ok(
      told.some((one) => one.includes(message)),
      told.join("\n"),
    );
  });
}

/** Runs the comparison until it says what is looked for, and its preview is there; gives its text. */
async function comparisonWith(what: RegExp): Promise<string> {
  return eventually(`a comparison with ${what}`, async () => {
    const folder = vscode.workspace.workspaceFolders?.[0];
    assert.ok(folder);
    // Beside the preview, and not in its place.
    const note = vscode.Uri.joinPath(folder.uri, "winter-shuttle.plumb");
    await vscode.window.showTextDocument(note, { viewColumn: vscode.ViewColumn.One, preview: false });
    await vscode.commands.executeCommand("plumbline.compareWithCommitted");
    const tabs = vscode.window.tabGroups.all.flatMap((group) => group.tabs);
    assert.ok(
      tabs.some((tab) => tab.label.includes("winter-shuttle.plumb since its last commit")),
      tabs.map((tab) => tab.label).join(", "),
    );
    const text = comparisonsOpen().join("");
    assert.match(text, what);
    return text;
  });
}

/** Waits until the preview shows a text, the newest one; a picture of it is saved. */
async function drawn(text: RegExp): Promise<void> {
  await vscode.commands.executeCommand("workbench.action.closePanel");
  await vscode.commands.executeCommand("notifications.clearAll");
  await eventually(`a preview with ${text}`, async () =>
    assert.match((await page.frames()).join("\n"), text),
  );
  await page.screenshot("compare");
}

function comparisonsOpen(): readonly string[] {
  return vscode.workspace.textDocuments
    .filter((one) => one.uri.scheme === "plumbline-comparison")
    .map((one) => one.getText());
}
