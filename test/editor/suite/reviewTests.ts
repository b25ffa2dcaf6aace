import assert from "node:assert/strict";
import * as vscode from "vscode";
import { hasPage } from "./page.ts";
import { inEveryTheme, picture } from "./picture.ts";
import {
  codeOf,
  edited,
  eventually,
  hintLabels,
  openNote,
  problems,
  startOf,
  type Test,
} from "./workbench.ts";

/** What planners, instructors and reviewers do with a note: seek a value, write it, claim, mend, accept. */
export const reviewTests: readonly Test[] = [
  [
    "a value that is sought shows what bounds it, and is written in",
    async () => {
      const { document } = await openNote("slow-flight-lesson.plumb");
      await hinted(document, /^≈ 60, bound by must manoeuvre bank 60/);
      await hinted(document, /^≈ 62 kt, bound by warning-in-turn$/);
      await hinted(document, /^≈ breaks at 60 \(warning-in-turn\)$/);
      await hinted(document, /^≈ time to warning 18 s, time to stall 22 s$/);
      await edited(document, async () => {
        const before = await hintLabels(document);
        await act(document, "bank ?", /^Write bank 60 \(bound by must manoeuvre bank 60\)$/);
        assert.match(document.getText(), /speed 85 kt; bank 60\n/);
        // Another figure of the point has not moved: its phase shows what it did.
        await eventually("the same figures", async () => {
          const now = await hintLabels(document);
          assert.deepEqual(
            now.filter((one) => one.startsWith("≈ margin")),
            before.filter((one) => one.startsWith("≈ margin")),
          );
        });
      });
    },
  ],
  [
    "a claim goes stale with the weight, and its fix mends it",
    async () => {
      const { document } = await openNote("night-mail-1.plumb");
      await eventually("no stale claim", () => assert.ok(!codes(document).includes("claim-stale")));
      await edited(document, async () => {
        await replace(document, "weight 52.8 t", "weight 53.4 t");
        await found(document, "claim-stale");
        const stale = () => problems(document.uri).filter((one) => codeOf(one) === "claim-stale");
        for (let left = stale().length; left > 0; left--) {
          const [first] = stale();
          assert.ok(first);
          await act(document, document.getText(first.range), /^Write \d/);
          await eventually("one stale claim less", () => assert.equal(stale().length, left - 1));
        }
        assert.doesNotMatch(document.getText(), /claim margin 1\.46/);
      });
    },
  ],
  [
    "a finding is accepted with a reason, and stays listed as information",
    async () => {
      const { document } = await openNote("winter-shuttle.plumb");
      await edited(document, async () => {
        await act(document, "bank 32 left", /^Accept bank-over-limit, with a reason$/);
        assert.match(document.getText(), /\n\| accept bank-over-limit to 32 because "" by ""\n/);
        await found(document, "accept-refused");
        await replace(document, 'because ""', 'because "the valley"');
        await eventually("the accepted finding", () => {
          const taken = problems(document.uri).filter((one) => codeOf(one) === "bank-over-limit");
          assert.equal(taken[0]?.severity, vscode.DiagnosticSeverity.Information);
          assert.match(taken[0]?.message ?? "", /^Accepted to 32 \("the valley"\)|^Accepted to 32 by/);
        });
        if (hasPage) await picture("accepted");
      });
    },
  ],
  ...(hasPage
    ? ([
        [
          "pictures of an instructor's note in a light, a dark and a high-contrast theme",
          async () => {
            const { editor } = await openNote("slow-flight-lesson.plumb");
            editor.selection = new vscode.Selection(0, 0, 0, 0);
            editor.revealRange(new vscode.Range(0, 0, 0, 0), vscode.TextEditorRevealType.AtTop);
            await inEveryTheme((name) => picture(name === "light" ? "exercise" : `exercise-${name}`));
          },
        ],
      ] as const)
    : []),
];

function codes(document: vscode.TextDocument): string[] {
  return problems(document.uri).map(codeOf);
}

async function hinted(document: vscode.TextDocument, wanted: RegExp): Promise<void> {
  await eventually(String(wanted), async () => {
    const labels = await hintLabels(document);
    assert.ok(
      labels.some((label) => wanted.test(label)),
      labels.join(" / "),
    );
  });
}

async function found(document: vscode.TextDocument, code: string): Promise<void> {
  await eventually(code, () => assert.ok(codes(document).includes(code), codes(document).join(", ")));
}

async function replace(document: vscode.TextDocument, from: string, to: string): Promise<void> {
  const at = startOf(document, from);
  const edit = new vscode.WorkspaceEdit();
  edit.replace(document.uri, new vscode.Range(at, at.translate(0, from.length)), to);
  await vscode.workspace.applyEdit(edit);
}

/** Takes the action of a title that is offered at a text. */
async function act(document: vscode.TextDocument, text: string, title: RegExp): Promise<void> {
  const at = startOf(document, text);
  const action = await eventually(String(title), async () => {
    const actions = await vscode.commands.executeCommand<vscode.CodeAction[]>(
      "vscode.executeCodeActionProvider",
      document.uri,
      new vscode.Range(at, at),
    );
    const one = actions.find((offered) => title.test(offered.title));
    assert.ok(one?.edit, actions.map((offered) => offered.title).join(", "));
    return one.edit;
  });
  await vscode.workspace.applyEdit(action);
}
