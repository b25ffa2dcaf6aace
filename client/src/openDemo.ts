import { commands, FileSystemError, Uri, window, workspace } from "vscode";
import type { CommandContext } from "./commands.ts";

const NAME = "plumbline-demo";

/** Paths in the demo, written in by the bundler: an extension on the web can be read, but its folders not listed. */
declare const DEMO_FILES: readonly string[];

/**
 * Copies the demo into a new folder beneath one that the user picks, and opens the copy: in this window
 * if no folder is open in it, else in a new one. Nothing that exists is written to. A caller that has a
 * folder already passes its URI.
 */
export async function openDemo({ extension }: CommandContext, parent?: unknown): Promise<void> {
  const picked = parent instanceof Uri ? parent : await pickFolder();
  if (picked === undefined) return;
  const copy = await copyDemo(Uri.joinPath(extension.extensionUri, "demo"), picked);
  const forceNewWindow = (workspace.workspaceFolders?.length ?? 0) > 0;
  await commands.executeCommand("vscode.openFolder", copy, { forceNewWindow });
}

async function pickFolder(): Promise<Uri | undefined> {
  const picked = await window.showOpenDialog({
    title: `Where to put the folder ${NAME}`,
    openLabel: "Put the Demo Here",
    canSelectFiles: false,
    canSelectFolders: true,
    canSelectMany: false,
  });
  return picked?.[0];
}

/** The copy's URI: the first of plumbline-demo, plumbline-demo-2, … that is not there yet. */
async function copyDemo(demo: Uri, parent: Uri): Promise<Uri> {
  for (let n = 1; n < 100; n++) {
    const target = Uri.joinPath(parent, n === 1 ? NAME : `${NAME}-${n}`);
    try {
      if (await isThere(target)) continue;
      for (const path of DEMO_FILES) {
        const text = await workspace.fs.readFile(Uri.joinPath(demo, path));
        await workspace.fs.writeFile(Uri.joinPath(target, path), text);
      }
      return target;
    } catch (error) {
      const why = error instanceof Error ? error.message : String(error);
      throw new Error(`The demo could not be copied to ${target.fsPath}: ${why}`);
    }
  }
  throw new Error(`${parent.fsPath} holds too many copies of the demo already; pick another folder.`);
}

async function isThere(target: Uri): Promise<boolean> {
  try {
    await workspace.fs.stat(target);
    return true;
  } catch (error) {
    if (error instanceof FileSystemError && error.code === "FileNotFound") return false;
    throw error;
  }
}
