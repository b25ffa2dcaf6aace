import type { Connection, Diagnostic } from "vscode-languageserver";
import type { Note } from "../plan/note.ts";
import { diagnosticOf, type PageUri } from "./convert.ts";
import type { Patience } from "./patience.ts";
import type { Runtime } from "./runtime.ts";
import type { Workspace } from "./workspace.ts";

/** What is told of a note, new findings only once their time has come. */
export function diagnosticsOf(note: Note, pageUri: PageUri, patience: Patience): Diagnostic[] {
  return patience.shown(note.uri, note.findings()).map((finding) => diagnosticOf(finding, pageUri));
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
