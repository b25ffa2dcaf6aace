import assert from "node:assert/strict";
import * as vscode from "vscode";
import { page } from "./page.ts";
import { eventually, pause } from "./workbench.ts";

/** Takes the pointer and messages away first. */
export async function picture(name: string): Promise<void> {
  await vscode.commands.executeCommand("notifications.clearAll");
  await page.away();
  await pause(600);
  await page.screenshot(name);
}

/** Does something in a light, a dark and a high-contrast theme, and goes back to the light one. */
export async function inEveryTheme(
  work: (name: "light" | "dark" | "contrast") => Promise<void>,
): Promise<void> {
  try {
    for (const [theme, kind, name] of [
      ["Default Light Modern", vscode.ColorThemeKind.Light, "light"],
      ["Default Dark Modern", vscode.ColorThemeKind.Dark, "dark"],
      ["Default High Contrast", vscode.ColorThemeKind.HighContrast, "contrast"],
    ] as const) {
      await change(theme, kind);
      await work(name);
    }
  } finally {
    await change("Default Light Modern", vscode.ColorThemeKind.Light);
  }
}

async function change(theme: string, kind: vscode.ColorThemeKind): Promise<void> {
  await vscode.workspace
    .getConfiguration("workbench")
    .update("colorTheme", theme, vscode.ConfigurationTarget.Global);
  await eventually(theme, () => assert.equal(vscode.window.activeColorTheme.kind, kind));
  // The colours of the text follow a little later than the kind.
  await pause(1200);
}
