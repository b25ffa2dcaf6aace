import assert from "node:assert/strict";
import * as vscode from "vscode";
import { page } from "./page.ts";
import { eventually, pause } from "./workbench.ts";

export async function theme(name: string, kind: vscode.ColorThemeKind): Promise<void> {
  await vscode.workspace
    .getConfiguration("workbench")
    .update("colorTheme", name, vscode.ConfigurationTarget.Global);
  await eventually(name, () => assert.equal(vscode.window.activeColorTheme.kind, kind));
  // The colours of the text follow a little later than the kind.
  await pause(1200);
}

/** Takes the pointer and messages away first. */
export async function picture(name: string): Promise<void> {
  await vscode.commands.executeCommand("notifications.clearAll");
  await page.away();
  await pause(600);
  await page.screenshot(name);
}
