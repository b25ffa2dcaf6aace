import { Uri, window, workspace } from "vscode";
import type { CommandContext } from "./commands.ts";

/** Opens an empty note that is not saved yet. */
export async function newNote(): Promise<void> {
  await open("");
}

/** Opens the sample as a note that is not saved yet, so that nobody writes into what ships. */
export async function openSample({ extension }: CommandContext): Promise<void> {
  const place = Uri.joinPath(extension.extensionUri, "client/media/walkthrough/sample.plumb");
  await open(new TextDecoder().decode(await workspace.fs.readFile(place)));
}

async function open(content: string): Promise<void> {
  const note = await workspace.openTextDocument({ language: "plumb", content });
  await window.showTextDocument(note, { preview: false });
}
