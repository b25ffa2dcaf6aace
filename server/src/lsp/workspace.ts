import type { TextDocumentContentChangeEvent } from "vscode-languageserver";
import type { Flavour } from "../notation/document.ts";
import { createFolder } from "../plan/createFolder.ts";
import type { Folder } from "../plan/folder.ts";
import type { Note } from "../plan/note.ts";
import type { Runtime } from "./runtime.ts";

/** A note as the editor has it open, or as the disk has it. */
export interface OpenNote {
  readonly folder: Folder;
  readonly note: Note;
  /** The editor's version; null for a note that is only on the disk. */
  version: number | null;
}

/**
 * The folders of the editor's window. Each sees its own cards and limits only; a note outside all
 * folders sees itself. An open editor's text counts before the disk's.
 */
export class Workspace {
  readonly #runtime: Runtime;
  readonly #log: (message: string) => void;
  /** By folder URI, each ending with `/`. */
  readonly #folders = new Map<string, Folder>();
  /** Folders of their own for notes outside all others, by note. */
  readonly #strays = new Map<string, Folder>();
  readonly #open = new Map<string, OpenNote>();

  constructor(runtime: Runtime, log: (message: string) => void) {
    this.#runtime = runtime;
    this.#log = log;
  }

  get openNotes(): ReadonlyMap<string, OpenNote> {
    return this.#open;
  }

  /** Every note of every folder, and the open ones outside. */
  get notes(): readonly { readonly folder: Folder; readonly note: Note }[] {
    const all = [...this.#folders.values(), ...this.#strays.values()];
    return all.flatMap((folder) => folder.notes.map((note) => ({ folder, note })));
  }

  find(uri: string): { readonly folder: Folder; readonly note: Note } | null {
    const open = this.#open.get(uri);
    if (open) return open;
    const folder = this.#folderOf(uri);
    const note = folder?.note(uri);
    return folder && note ? { folder, note } : null;
  }

  /** Adds a folder and reads its notes; those that are open keep the editor's text. */
  async addFolder(uri: string): Promise<void> {
    const base = uri.endsWith("/") ? uri : `${uri}/`;
    if (this.#folders.has(base)) return;
    const folder = createFolder({ today: this.#runtime.today() });
    this.#folders.set(base, folder);
    for (const [open, { note, version }] of [...this.#open]) {
      if (this.#folderOf(open) !== folder) continue;
      this.#leave(open);
      this.#put(folder, open, note.document.text(), note.flavour, version);
    }
    const found = await this.#runtime.listNotes(base).catch((error: unknown) => {
      this.#log(`${base} cannot be read: ${String(error)}`);
      return [];
    });
    await Promise.all(found.map((note) => this.#readInto(folder, note)));
  }

  removeFolder(uri: string): void {
    const base = uri.endsWith("/") ? uri : `${uri}/`;
    const folder = this.#folders.get(base);
    if (!folder) return;
    this.#folders.delete(base);
    for (const [open, { note, version, folder: own }] of [...this.#open]) {
      if (own === folder) this.#put(this.#home(open), open, note.document.text(), note.flavour, version);
    }
  }

  open(uri: string, text: string, flavour: Flavour, version: number): void {
    this.#put(this.#home(uri), uri, text, flavour, version);
  }

  change(uri: string, changes: readonly TextDocumentContentChangeEvent[], version: number): void {
    const open = this.#open.get(uri);
    if (!open) return;
    for (const change of changes) {
      if ("range" in change) open.note.edit(change.range.start, change.range.end, change.text);
      else this.#put(open.folder, uri, change.text, open.note.flavour, version);
    }
    const now = this.#open.get(uri);
    if (now) now.version = version;
  }

  /** The disk's text counts again, if there is any. */
  async close(uri: string): Promise<void> {
    const open = this.#open.get(uri);
    if (!open) return;
    this.#open.delete(uri);
    if (this.#strays.delete(uri)) return;
    await this.refresh(uri);
  }

  /** Reads a note from the disk again, unless an editor has it open. */
  async refresh(uri: string): Promise<void> {
    if (this.#open.has(uri)) return;
    const folder = this.#folderOf(uri);
    if (folder) await this.#readInto(folder, uri);
  }

  removed(uri: string): void {
    if (!this.#open.has(uri)) this.#folderOf(uri)?.remove(uri);
  }

  async #readInto(folder: Folder, uri: string): Promise<void> {
    const text = await this.#runtime.readNote(uri, this.#log);
    // While the disk was read, an editor may have opened it.
    if (this.#open.has(uri)) return;
    if (text === null) folder.remove(uri);
    else folder.open(uri, text, flavourOf(uri));
  }

  #put(folder: Folder, uri: string, text: string, flavour: Flavour, version: number | null): void {
    this.#open.set(uri, { folder, note: folder.open(uri, text, flavour), version });
  }

  #leave(uri: string): void {
    const open = this.#open.get(uri);
    if (!this.#strays.delete(uri)) open?.folder.remove(uri);
  }

  /** The folder of a note, made for it alone where none holds it. */
  #home(uri: string): Folder {
    const folder = this.#folderOf(uri) ?? this.#strays.get(uri);
    if (folder) return folder;
    const own = createFolder({ today: this.#runtime.today() });
    this.#strays.set(uri, own);
    return own;
  }

  /** The innermost folder that holds the note. */
  #folderOf(uri: string): Folder | null {
    let best = "";
    for (const base of this.#folders.keys())
      if (uri.startsWith(base) && best.length < base.length) best = base;
    return this.#folders.get(best) ?? null;
  }
}

export function flavourOf(uri: string): Flavour {
  return /\.(md|markdown)$/i.test(uri) ? "markdown" : "plumb";
}
