import { type ExtensionContext, LanguageStatusSeverity, languages } from "vscode";
import { type BaseLanguageClient, State } from "vscode-languageclient";
import type { Status, statusChangedNotification } from "../../server/src/lsp/protocol.ts";

/** The type makes this the server's own name for it: only types come from there. */
const statusChanged: typeof statusChangedNotification = "plumbline/statusChanged";

/** Shows beside the language of a note how many notes are checked, and what was found in them. */
export function showStatus({ subscriptions }: ExtensionContext, client: BaseLanguageClient): void {
  const item = languages.createLanguageStatusItem("plumbline.status", [
    { language: "plumb" },
    { language: "markdown" },
  ]);
  item.name = "Plumbline";

  function show({ notes, points, errors, warnings, checking }: Status): void {
    item.busy = checking;
    item.text = `${counted(notes, "note")}, ${counted(points, "point")}`;
    item.detail = checking
      ? "The notes are being checked."
      : `${counted(errors, "error")}, ${counted(warnings, "warning")}`;
    item.severity = 0 < errors ? LanguageStatusSeverity.Warning : LanguageStatusSeverity.Information;
    item.command = { title: "Problems", command: "workbench.actions.view.problems" };
  }

  function showStopped(): void {
    item.busy = false;
    item.text = "The server does not run";
    item.detail = "No note is checked.";
    item.severity = LanguageStatusSeverity.Error;
    item.command = { title: "Restart", command: "plumbline.restartServer" };
  }

  client.registerFeature({
    fillClientCapabilities(capabilities) {
      const { plumbline, ...others } = capabilities.experimental ?? {};
      capabilities.experimental = { ...others, plumbline: { ...plumbline, statusChanged: true } };
    },
    initialize: () => undefined,
    getState: () => ({ kind: "static" }),
    clear: () => undefined,
  });
  subscriptions.push(
    item,
    client.onNotification(statusChanged, show),
    client.onDidChangeState(({ newState }) => {
      if (newState === State.Stopped) showStopped();
    }),
  );
}

function counted(count: number, noun: string): string {
  return `${count} ${noun}${count === 1 ? "" : "s"}`;
}
