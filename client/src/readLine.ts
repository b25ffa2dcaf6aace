import { commands, window } from "vscode";
import type { ReadLineParams, readLineRequest } from "../../server/src/lsp/protocol.ts";
import { askServer } from "./askServer.ts";
import type { CommandContext } from "./commands.ts";
import { noteInEditor } from "./noteInEditor.ts";

const request: typeof readLineRequest = "plumbline/readLine";

/** Says what is computed and found on the cursor's line: shown as a message, which a screen reader reads out. */
export async function readLine({ client }: CommandContext): Promise<void> {
  const { document, selection } = noteInEditor();
  const params: ReadLineParams = {
    textDocument: { uri: document.uri.toString() },
    line: selection.active.line,
  };
  const sentence = await askServer(client, request, params);
  // Not awaited: it stands until it is dismissed. Without a button the editor would cut it short.
  void window.showInformationMessage(sentence, copy).then((picked) => {
    if (picked) void commands.executeCommand("plumbline.copyWithValues");
  });
}

const copy = "Copy with Values";
