import { type ExtensionContext, type TextDocument, window } from "vscode";
import { type BaseLanguageClient, InlayHintRequest } from "vscode-languageclient";
import { noteInEditor } from "./noteInEditor.ts";

/** Which notes show no hints, whatever the settings say. */
export interface HintsOfNotes {
  /** Hides the hints of the note in the active editor, or shows them again. */
  toggle(): Promise<void>;
}

const HIDDEN = "hints.hiddenNotes";

/** It is remembered in the workspace: what one reader hides is no setting of the note. */
export function hintsOfNotes(context: ExtensionContext, client: BaseLanguageClient): HintsOfNotes {
  const hidden = new Set(context.workspaceState.get<readonly string[]>(HIDDEN, []));

  client.middleware.provideInlayHints = (document, range, token, next) =>
    hidden.has(document.uri.toString()) ? [] : next(document, range, token);

  function drawAnew(document: TextDocument): void {
    client.getFeature(InlayHintRequest.method).getProvider(document)?.onDidChangeInlayHints.fire();
  }

  return {
    async toggle() {
      const { document } = noteInEditor();
      const uri = document.uri.toString();
      const hides = !hidden.delete(uri);
      if (hides) hidden.add(uri);
      drawAnew(document);
      await context.workspaceState.update(HIDDEN, [...hidden]);
      window.setStatusBarMessage(
        hides
          ? "Plumbline: the hints of this note are hidden."
          : "Plumbline: the hints of this note are shown as the settings say.",
        4000,
      );
    },
  };
}
