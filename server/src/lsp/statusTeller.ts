import type { Connection } from "vscode-languageserver";
import type { Severity } from "../plan/finding.ts";
import type { guardWith } from "./guard.ts";
import { nextTurn, type Soon } from "./nextTurn.ts";
import { type Status, statusChangedNotification } from "./protocol.ts";
import type { Workspace } from "./workspace.ts";

type Counts = Pick<Status, "points" | "errors" | "warnings">;

export interface Counting {
  readonly connection: Connection;
  readonly guard: ReturnType<typeof guardWith>;
  readonly workspace: Workspace;
  /** True while folders are being read. */
  reading(): boolean;
  /** True where the client wants to hear of every change. */
  hears(): boolean;
  readonly soon: Soon;
}

/**
 * Knows how many notes are checked and what was found in them, and tells a client that wants to hear
 * it. A note is counted again only where its text changed, or a definition that it may use. It gives
 * way to requests between two notes.
 */
export class StatusTeller {
  readonly #with: Counting;
  /** By the URI of the note. */
  readonly #counted = new Map<string, Counts>();
  #told = "";
  #running = false;
  /** Grows with every change, so that a count that was overtaken is not told. */
  #change = 0;

  constructor(counting: Counting) {
    this.#with = counting;
  }

  /** One note's text changed. */
  changed(uri: string): void {
    this.#counted.delete(this.#with.workspace.note(uri)?.uri ?? uri);
    this.#start();
  }

  /** Any note may have changed, come or gone. */
  allChanged(): void {
    this.#counted.clear();
    this.#start();
  }

  /** Counts what is not counted yet. While folders are read it is told at once, for the notes that are there. */
  async status(): Promise<Status> {
    const { workspace, reading, soon } = this.#with;
    for (let change = -1; change !== this.#change; ) {
      change = this.#change;
      for (const { uri } of workspace.notes) {
        this.#count(uri);
        await nextTurn(soon);
      }
    }
    return this.#sum(reading());
  }

  #start(): void {
    this.#change++;
    if (this.#running || !this.#with.hears()) return;
    this.#running = true;
    void this.#with.guard.asking("status", async () => {
      try {
        await this.#run();
      } finally {
        this.#running = false;
      }
    });
  }

  async #run(): Promise<void> {
    const { workspace, soon } = this.#with;
    for (let change = -1; change !== this.#change; ) {
      change = this.#change;
      // A burst of edits is counted once.
      for (let turn = 0; turn < 3; turn++) await nextTurn(soon);
      const open = workspace.notes.filter(({ uri }) => !this.#counted.has(uri));
      // One note is counted before anybody could read that it is being counted.
      if (1 < open.length || this.#with.reading()) this.#tell(this.#sum(true));
      for (const { uri } of open) {
        if (change !== this.#change) break;
        this.#count(uri);
        await nextTurn(soon);
      }
    }
    // A change from here on begins a count of its own.
    this.#running = false;
    this.#tell(this.#sum(this.#with.reading()));
  }

  #count(uri: string): void {
    const { workspace } = this.#with;
    const note = workspace.note(uri);
    if (!note || this.#counted.has(uri)) return;
    const findings = note.findings();
    const of = (severity: Severity) => findings.filter(({ finding }) => finding.severity === severity).length;
    this.#counted.set(uri, {
      points: note.results().filter(({ kind }) => kind === "point").length,
      errors: of("error"),
      warnings: of("warning"),
    });
  }

  /** Of the notes that are counted and still there. */
  #sum(checking: boolean): Status {
    const counts = this.#with.workspace.notes.flatMap(({ uri }) => this.#counted.get(uri) ?? []);
    const sum = (of: keyof Counts) => counts.reduce((total, one) => total + one[of], 0);
    return {
      notes: counts.length,
      points: sum("points"),
      errors: sum("errors"),
      warnings: sum("warnings"),
      checking,
    };
  }

  #tell(status: Status): void {
    const text = JSON.stringify(status);
    if (text === this.#told) return;
    this.#told = text;
    // A client that went away is told nothing more, and that is no error of ours.
    this.#with.connection.sendNotification(statusChangedNotification, status).catch(() => undefined);
  }
}
