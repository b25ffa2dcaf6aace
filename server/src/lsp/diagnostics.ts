import {
  type CancellationToken,
  type Connection,
  type Diagnostic,
  DocumentDiagnosticReportKind,
  type WorkspaceDiagnosticReport,
} from "vscode-languageserver";
import type { Note } from "../plan/note.ts";
import { diagnosticOf, type PageUri } from "./convert.ts";
import type { Patience } from "./patience.ts";
import type { Runtime } from "./runtime.ts";
import type { Workspace } from "./workspace.ts";

/** What is told of a note, new findings only once their time has come. */
export function diagnosticsOf(note: Note, pageUri: PageUri, patience: Patience): Diagnostic[] {
  return patience.shown(note.uri, note.findings()).map((finding) => diagnosticOf(finding, pageUri));
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
  patience: Patience,
  token: CancellationToken,
): WorkspaceDiagnosticReport {
  const known = new Map(previous.map(({ uri, value }) => [uri, value]));
  const items: WorkspaceDiagnosticReport["items"] = [];
  const seen = new Set<string>();
  for (const note of workspace.notes) {
    if (token.isCancellationRequested) break;
    seen.add(note.uri);
    const diagnostics = diagnosticsOf(note, pageUri, patience);
    const id = resultId(diagnostics);
    const version = workspace.openNote(note.uri)?.version ?? null;
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

/** So many turns of the event loop let in what lies in the queue already: a burst of edits is told once. */
const TURNS = 3;

/** Sends diagnostics to clients that cannot ask for them: once for however many changes came together. */
export class Pusher {
  readonly #connection: Connection;
  readonly #workspace: Workspace;
  readonly #pageUri: PageUri;
  readonly #patience: Patience;
  /** Resolves once the folders are read: no card is told as missing that is only not read yet. */
  readonly #ready: () => Promise<unknown>;
  readonly #soon: Runtime["soon"];
  readonly #waiting = new Set<string>();
  #turns = 0;
  #scheduled = false;

  constructor(
    connection: Connection,
    workspace: Workspace,
    pageUri: PageUri,
    patience: Patience,
    ready: () => Promise<unknown>,
    soon: Runtime["soon"],
  ) {
    this.#connection = connection;
    this.#workspace = workspace;
    this.#pageUri = pageUri;
    this.#patience = patience;
    this.#ready = ready;
    this.#soon = soon;
  }

  push(uri: string): void {
    this.#waiting.add(uri);
    this.#turns = TURNS;
    if (this.#scheduled) return;
    this.#scheduled = true;
    void this.#ready().then(() => this.#turn());
  }

  pushAll(): void {
    for (const { note } of this.#workspace.openNotes) this.push(note.uri);
  }

  clear(uri: string): void {
    this.#waiting.delete(uri);
    this.#send(uri, {}, []);
  }

  #turn(): void {
    this.#soon(() => {
      this.#turns--;
      if (0 < this.#turns) this.#turn();
      else this.#flush();
    });
  }

  #flush(): void {
    this.#scheduled = false;
    const uris = [...this.#waiting];
    this.#waiting.clear();
    for (const uri of uris) {
      const open = this.#workspace.openNote(uri);
      if (open)
        this.#send(uri, { version: open.version }, diagnosticsOf(open.note, this.#pageUri, this.#patience));
    }
  }

  #send(uri: string, version: { readonly version?: number }, diagnostics: Diagnostic[]): void {
    // A client that went away is told nothing more, and that is no error of ours.
    this.#connection.sendDiagnostics({ uri, ...version, diagnostics }).catch(() => undefined);
  }
}
