import { type ExtensionContext, commands as editorCommands, window } from "vscode";
import type { BaseLanguageClient } from "vscode-languageclient";
import { chooseHints } from "./chooseHints.ts";
import { compareWithCommitted } from "./compareWithCommitted.ts";
import type { Comparisons } from "./comparisons.ts";
import { copyWithValues } from "./copyWithValues.ts";
import type { HintsOfNotes } from "./hintsOfNotes.ts";
import { newNote, openSample } from "./newNote.ts";
import { openDemo } from "./openDemo.ts";
import { readLine } from "./readLine.ts";
import { toggleHints } from "./toggleHints.ts";

/** What a command works with. */
export interface CommandContext {
  readonly extension: ExtensionContext;
  readonly client: BaseLanguageClient;
  readonly comparisons: Comparisons;
  readonly hintsOfNotes: HintsOfNotes;
}

type Command = (context: CommandContext, ...args: unknown[]) => Promise<void>;

/** Every command of the manifest and what it does. One that fails throws an error whose message is a full sentence. */
const commands: Readonly<Record<string, Command>> = {
  "plumbline.toggleHints": toggleHints,
  "plumbline.chooseHints": chooseHints,
  "plumbline.toggleHintsOfNote": ({ hintsOfNotes }) => hintsOfNotes.toggle(),
  "plumbline.readLine": readLine,
  "plumbline.copyWithValues": copyWithValues,
  "plumbline.restartServer": restartServer,
  "plumbline.newNote": newNote,
  "plumbline.openSample": openSample,
  "plumbline.openDemo": openDemo,
  "plumbline.compareWithCommitted": compareWithCommitted,
};

export function registerCommands(context: CommandContext): void {
  for (const [id, command] of Object.entries(commands)) {
    const run = async (...args: unknown[]) => {
      try {
        await command(context, ...args);
      } catch (error) {
        // Not awaited: the command is over, though nobody has dismissed the message yet.
        void window.showErrorMessage(`Plumbline: ${reason(error)}`);
      }
    };
    context.extension.subscriptions.push(editorCommands.registerCommand(id, run));
  }
}

/** Stops the server if it runs and starts it, also after it crashed too often to be started again by itself. */
async function restartServer({ client }: CommandContext): Promise<void> {
  try {
    if (client.needsStop()) await client.stop();
  } catch {
    // A server that does not answer any more is why somebody restarts it.
  }
  try {
    await client.start();
  } catch (error) {
    throw new Error(
      `The server did not start again (${reason(error)}); the output channel "Plumbline" has its log.`,
    );
  }
  window.setStatusBarMessage("Plumbline: the server was restarted.", 4000);
}

function reason(error: unknown): string {
  return error instanceof Error ? error.message : String(error);
}
