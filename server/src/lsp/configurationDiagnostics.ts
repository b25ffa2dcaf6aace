import { type Connection, type Diagnostic, DiagnosticSeverity } from "vscode-languageserver";
import type { ConfigurationRead } from "./workspace.ts";

/** Tells what is wrong in a folder's `plumbline.json`, beside its lines. It is no note, so no client asks for it. */
export function configurationDiagnostics(connection: Connection): ConfigurationRead {
  const told = new Set<string>();
  return (uri, text, problems) => {
    if (problems.length === 0 && !told.delete(uri)) return;
    if (problems.length > 0) told.add(uri);
    const diagnostics = problems.map(
      ({ message, start, end }): Diagnostic => ({
        range: { start: positionAt(text ?? "", start), end: positionAt(text ?? "", end) },
        severity: DiagnosticSeverity.Error,
        source: "plumbline",
        message: `${message} Nothing of this file holds until it is mended.`,
      }),
    );
    connection.sendDiagnostics({ uri, diagnostics }).catch(() => undefined);
  };
}

function positionAt(text: string, offset: number) {
  const before = text.slice(0, offset).split(/\r\n|\r|\n/);
  return { line: before.length - 1, character: before[before.length - 1]?.length ?? 0 };
}
