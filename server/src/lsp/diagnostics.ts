import {
  type CancellationToken,
  type Connection,
  type Diagnostic,
  DocumentDiagnosticReportKind,
  type WorkspaceDiagnosticReport,
} from "vscode-languageserver";
import type { Note } from "../plan/note.ts";
import { diagnosticOf, type PageUri } from "./convert.ts";
import type { Workspace } from "./workspace.ts";

export function diagnosticsOf(note: Note, pageUri: PageUri): Diagnostic[] {
  return note.findings().map((finding) => diagnosticOf(finding, pageUri));
}

/** A short name for a list of diagnostics: the same list has the same one. */
function resultId(diagnostics: readonly Diagnostic[]): string {
  const text = JSON.stringify(diagnostics);
  let hash = 0x811c9dc5;
  for (let i = 0; i < text.length; i++) hash = Math.imul(hash ^ text.charCodeAt(i), 0x01000193);
  return `${text.length}-${(hash >>> 0).toString(36)}`;
}

/** Every note of the window; those whose diagnostics the client has already are told as unchanged. */
export function workspaceReport(
  workspace: Workspace,
  previous: readonly { readonly uri: string; readonly value: string }[],
  pageUri: PageUri,
  token: CancellationToken,
): WorkspaceDiagnosticReport {
  const known = new Map(previous.map(({ uri, value }) => [uri, value]));
  const items: WorkspaceDiagnosticReport["items"] = [];
  const seen = new Set<string>();
  for (const { note } of workspace.notes) {
    if (token.isCancellationRequested) break;
    seen.add(note.uri);
    const diagnostics = diagnosticsOf(note, pageUri);
    const id = resultId(diagnostics);
    const version = workspace.openNotes.get(note.uri)?.version ?? null;
    if (known.get(note.uri) === id)
      items.push({ uri: note.uri, version, kind: DocumentDiagnosticReportKind.Unchanged, resultId: id });
    else
      items.push({
        uri: note.uri,
        version,
        kind: DocumentDiagnosticReportKind.Full,
        resultId: id,
        items: diagnostics,
      });
  }
  // What a removed note was told is taken back.
  for (const uri of known.keys()) {
    if (!seen.has(uri))
      items.push({ uri, version: null, kind: DocumentDiagnosticReportKind.Full, items: [] });
  }
  return { items };
}

/** Sends diagnostics to clients that cannot ask for them: once for however many changes came together. */
export class Pusher {
  readonly #connection: Connection;
  readonly #workspace: Workspace;
  readonly #pageUri: PageUri;
  readonly #waiting = new Set<string>();
  #scheduled = false;

  constructor(connection: Connection, workspace: Workspace, pageUri: PageUri) {
    this.#connection = connection;
    this.#workspace = workspace;
    this.#pageUri = pageUri;
  }

  push(uri: string): void {
    this.#waiting.add(uri);
    if (this.#scheduled) return;
    this.#scheduled = true;
    setImmediate(() => this.#flush());
  }

  pushAll(): void {
    for (const uri of this.#workspace.openNotes.keys()) this.push(uri);
  }

  clear(uri: string): void {
    this.#waiting.delete(uri);
    void this.#connection.sendDiagnostics({ uri, diagnostics: [] });
  }

  #flush(): void {
    this.#scheduled = false;
    const uris = [...this.#waiting];
    this.#waiting.clear();
    for (const uri of uris) {
      const open = this.#workspace.openNotes.get(uri);
      if (!open) continue;
      const diagnostics = diagnosticsOf(open.note, this.#pageUri);
      const version = open.version === null ? {} : { version: open.version };
      void this.#connection.sendDiagnostics({ uri, ...version, diagnostics });
    }
  }
}
