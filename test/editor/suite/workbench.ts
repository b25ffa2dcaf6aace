import assert from "node:assert/strict";
import * as vscode from "vscode";

/** A sentence that the editor must make true, and what tries it. */
export type Test = readonly [name: string, run: () => Promise<void>];

export const pause = (milliseconds: number) => new Promise<void>((done) => setTimeout(done, milliseconds));

/** Tries until it does not throw any more; what it threw last is the failure. */
export async function eventually<T>(what: string, attempt: () => T | Promise<T>): Promise<T> {
  const until = Date.now() + 20_000;
  for (;;) {
    try {
      return await attempt();
    } catch (error) {
      if (until < Date.now())
        throw new Error(`Waited for ${what}: ${error instanceof Error ? error.message : String(error)}`);
      await pause(150);
    }
  }
}

export async function openNote(
  name: string,
): Promise<{ document: vscode.TextDocument; editor: vscode.TextEditor }> {
  const folder = vscode.workspace.workspaceFolders?.[0];
  assert.ok(folder, "a folder is open");
  const document = await vscode.workspace.openTextDocument(vscode.Uri.joinPath(folder.uri, name));
  const editor = await vscode.window.showTextDocument(document, { preview: false });
  return { document, editor };
}

/** Lets a test change a note and puts its text back, whatever happened. */
export async function edited(document: vscode.TextDocument, change: () => Promise<void>): Promise<void> {
  const before = document.getText();
  try {
    await change();
  } finally {
    // An edit is refused where the text has moved on meanwhile.
    await eventually("the text as it was", async () => {
      const edit = new vscode.WorkspaceEdit();
      edit.replace(document.uri, new vscode.Range(0, 0, document.lineCount, 0), before);
      await vscode.workspace.applyEdit(edit);
      assert.equal(document.getText(), before);
    });
  }
}

export async function hintLabels(document: vscode.TextDocument): Promise<string[]> {
  return (await hints(document)).map(({ text }) => text);
}

/** The hints of a whole note, with the lines they stand in. */
export async function hints(document: vscode.TextDocument): Promise<{ line: number; text: string }[]> {
  const whole = new vscode.Range(0, 0, document.lineCount, 0);
  const found = await vscode.commands.executeCommand<vscode.InlayHint[]>(
    "vscode.executeInlayHintProvider",
    document.uri,
    whole,
  );
  return found.map(({ label, position }) => ({
    line: position.line,
    text: typeof label === "string" ? label : label.map((part) => part.value).join(""),
  }));
}

export function problems(uri: vscode.Uri): vscode.Diagnostic[] {
  return vscode.languages.getDiagnostics(uri).filter((one) => one.source === "plumbline");
}

export function codeOf({ code }: vscode.Diagnostic): string {
  return String(typeof code === "object" ? code.value : code);
}

export function startOf(document: vscode.TextDocument, text: string): vscode.Position {
  const at = document.getText().indexOf(text);
  assert.ok(at >= 0, `${text} stands in the note`);
  return document.positionAt(at);
}

export function lineOf(document: vscode.TextDocument, text: string): number {
  return startOf(document, text).line;
}
