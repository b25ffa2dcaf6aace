import type { TextDocumentContentChangeEvent } from "vscode-languageserver";
import type { ReadNote } from "../files/readNote.ts";
import type { Flavour } from "../notation/document.ts";
import {
  CONFIGURATION_FILE,
  type Configuration,
  type ConfigurationProblem,
  noConfiguration,
  readConfiguration,
} from "../plan/configuration.ts";
import { createFolder } from "../plan/createFolder.ts";
import type { Folder } from "../plan/folder.ts";
import type { Note } from "../plan/note.ts";
import type { Severities } from "../plan/severities.ts";
import type { NoteFiles } from "./noteFiles.ts";
import { uriKey } from "./uriKey.ts";

/** A note that an editor has open. */
export interface OpenNote {
  readonly folder: Folder;
  readonly note: Note;
  version: number;
}

/** What a client tells of files on the disk, or of a note whose editor is closed. */
export interface FileChange {
  readonly uri: string;
  readonly kind: "created" | "changed" | "deleted" | "closed";
}

/** A folder of the window, or the one that a note outside all folders has for itself. */
interface Root {
  /** As the client wrote it; null for the folder of one note. */
  readonly uri: string | null;
  readonly folder: Folder;
  /** The URI that each note is held by, by its key. */
  readonly held: Map<string, string>;
  /** Keys of what the folder's notes are, whether they can be read or not. */
  readonly listed: Set<string>;
  /** Keys of notes that are there and cannot be read: they may be mended. */
  readonly refused: Set<string>;
  /** What the folder's `plumbline.json` says. */
  configuration: Configuration;
}

/** Told of a folder's `plumbline.json` whenever it was read; without a text where there is none. */
export type ConfigurationRead = (
  uri: string,
  text: string | null,
  problems: readonly ConfigurationProblem[],
) => void;

/** So many notes are read at once: every one holds a file open. */
const READ_AT_ONCE = 32;

/**
 * The folders of the editor's window. Each sees its own cards and limits only; a note belongs to the
 * innermost folder that holds it, and one outside all folders sees itself. An open editor's text
 * counts before the disk's.
 */
export class Workspace {
  readonly #files: NoteFiles;
  readonly #today: () => string;
  readonly #log: (message: string) => void;
  /** By key, each ending with `/`. */
  readonly #roots = new Map<string, Root>();
  /** By the key of the note. */
  readonly #strays = new Map<string, Root>();
  readonly #open = new Map<string, OpenNote>();

  readonly #configurationRead: ConfigurationRead;
  /** What the user's settings make of codes; a folder's own configuration wins over it. */
  #severities: Severities = {};

  constructor(
    files: NoteFiles,
    today: () => string,
    log: (message: string) => void,
    configurationRead: ConfigurationRead,
  ) {
    this.#files = files;
    this.#today = today;
    this.#log = log;
    this.#configurationRead = configurationRead;
  }

  set severities(severities: Severities) {
    this.#severities = severities;
    for (const root of [...this.#roots.values(), ...this.#strays.values()]) this.#applySeverities(root);
  }

  #applySeverities({ folder, configuration }: Root): void {
    folder.severities = { ...this.#severities, ...configuration.severity };
  }

  /** Takes in the folder's `plumbline.json`. True where it says something else now. */
  async #configure(root: Root): Promise<boolean> {
    if (root.uri === null) return false;
    const file = await this.#files
      .readIn(root.uri, CONFIGURATION_FILE)
      .catch((error: unknown) => ({ problem: `It cannot be read: ${String(error)}` }));
    const text = file && "text" in file ? file.text : null;
    const { configuration, problems } =
      text === null ? { configuration: noConfiguration, problems: unread(file) } : readConfiguration(text);
    const before = JSON.stringify(root.configuration);
    root.configuration = configuration;
    this.#applySeverities(root);
    this.#configurationRead(configurationUri(root.uri), text, problems);
    return JSON.stringify(configuration) !== before;
  }

  get openNotes(): Iterable<OpenNote> {
    return this.#open.values();
  }

  openNote(uri: string): OpenNote | null {
    return this.#open.get(uriKey(uri)) ?? null;
  }

  /** Every note of every folder, and the open ones outside. */
  get notes(): readonly Note[] {
    return [...this.#roots.values(), ...this.#strays.values()].flatMap(({ folder }) => folder.notes);
  }

  note(uri: string): Note | null {
    const key = uriKey(uri);
    const root = this.#rootOf(key);
    return this.#open.get(key)?.note ?? root?.folder.note(root.held.get(key) ?? "") ?? null;
  }

  /** The folder that a note is in, or would be in. */
  folderOf(uri: string): Folder | null {
    const key = uriKey(uri);
    return (this.#rootOf(key) ?? this.#strays.get(key))?.folder ?? null;
  }

  /** Adds a folder and reads its notes; those that are open keep the editor's text. */
  async addFolder(uri: string): Promise<void> {
    const base = baseOf(uri);
    if (this.#roots.has(base)) return;
    const outer = this.#rootOf(base);
    const root = this.#newRoot(uri);
    this.#roots.set(base, root);
    this.#moveOpenNotes();
    // What lies in the new folder is the outer one's no longer.
    if (outer) for (const key of [...outer.held.keys()]) if (key.startsWith(base)) this.#drop(outer, key);
    await this.#configure(root);
    await this.#synchronise(root);
  }

  /** Takes a folder away; what an outer folder now holds again is read there. */
  async removeFolder(uri: string): Promise<void> {
    const base = baseOf(uri);
    const root = this.#roots.get(base);
    if (!root || !this.#roots.delete(base)) return;
    this.#configurationRead(configurationUri(root.uri ?? uri), null, []);
    this.#moveOpenNotes();
    const outer = this.#rootOf(base);
    if (outer) await this.#synchronise(outer);
  }

  open(uri: string, text: string, flavour: Flavour, version: number): void {
    const key = uriKey(uri);
    this.#putOpen(key, uri, text, flavour, version);
  }

  change(uri: string, changes: readonly TextDocumentContentChangeEvent[], version: number): void {
    const key = uriKey(uri);
    const open = this.#open.get(key);
    if (!open) return;
    for (const change of changes) {
      const { note } = this.#open.get(key) as OpenNote;
      if ("range" in change) note.edit(change.range.start, change.range.end, change.text);
      else this.#putOpen(key, note.uri, change.text, note.flavour, version);
    }
    (this.#open.get(key) as OpenNote).version = version;
  }

  /** From now on the disk's text counts, which {@link filesChanged} then brings. */
  close(uri: string): void {
    const key = uriKey(uri);
    this.#open.delete(key);
    this.#strays.delete(key);
  }

  /**
   * Takes in what happened on the disk. Where something came, or a `.gitignore` says something else
   * now, the folder is looked through again: only that tells what its notes are. True where a note
   * is another one now.
   */
  async filesChanged(changes: readonly FileChange[]): Promise<boolean> {
    let changed = false;
    const looked = new Set<Root>();
    for (const { uri, kind } of changes) {
      const key = uriKey(uri);
      const root = this.#rootOf(key);
      if (!root || isNeverEntered(root, key)) continue;
      // An ignored note counts as long as an editor has it open.
      if (kind === "closed" && !root.listed.has(key)) looked.add(root);
      if (kind === "deleted") changed = this.#dropBelow(root, key) || changed;
      if (root.held.has(key) || root.refused.has(key))
        changed = (await this.#read(root, key, uri)) || changed;
      else if (isConfiguration(root, key)) {
        changed = (await this.#configure(root)) || changed;
        looked.add(root);
      } else if (key.endsWith("/.gitignore") || (kind === "created" && (await this.#mayHoldNotes(uri))))
        looked.add(root);
    }
    for (const root of looked) changed = (await this.#synchronise(root)) || changed;
    return changed;
  }

  async #mayHoldNotes(uri: string): Promise<boolean> {
    return flavourOrNull(uri) !== null || (await this.#files.isFolder(uri));
  }

  /** Brings a folder in step with the disk. */
  async #synchronise(root: Root): Promise<boolean> {
    if (root.uri === null) return false;
    const found = await this.#files.listNotes(root.uri, this.#log).catch((error: unknown) => {
      this.#log(`${root.uri} cannot be read: ${String(error)}`);
      return [];
    });
    const { excluded } = await import("../files/excluded.ts");
    const leavesOut = excluded(root.configuration.exclude);
    const base = baseOf(root.uri);
    const there = new Map<string, string>();
    for (const uri of found) {
      const key = uriKey(uri);
      if (this.#rootOf(key) === root && !leavesOut(decodedPath(key.slice(base.length)))) there.set(key, uri);
    }
    root.listed.clear();
    for (const key of there.keys()) root.listed.add(key);
    let changed = false;
    for (const key of [...root.held.keys()]) {
      if (!there.has(key) && !this.#open.has(key)) changed = this.#drop(root, key) || changed;
    }
    const fresh = [...there].filter(([key]) => !root.held.has(key));
    for (let i = 0; i < fresh.length; i += READ_AT_ONCE) {
      const batch = fresh.slice(i, i + READ_AT_ONCE);
      const read = await Promise.all(batch.map(([key, uri]) => this.#read(root, key, uri)));
      changed = read.includes(true) || changed;
    }
    return changed;
  }

  /** Reads a note from the disk, unless an editor has it open. True where it is another one now. */
  async #read(root: Root, key: string, uri: string): Promise<boolean> {
    if (this.#open.has(key)) return false;
    const text = await this.#files.readNote(uri, this.#log);
    // While the disk was read, an editor may have opened it, or the folder may have gone.
    if (this.#open.has(key) || this.#rootOf(key) !== root) return false;
    if (text === null) {
      root.refused.add(key);
      return this.#drop(root, key);
    }
    root.refused.delete(key);
    const before = root.folder.note(root.held.get(key) ?? "");
    if (before?.document.text() === text) return false;
    this.#hold(root, key, uri, text, flavourOf(uri));
    return true;
  }

  /** Puts a note into a folder, in the place of one that was held by another spelling of its URI. */
  #hold(root: Root, key: string, uri: string, text: string, flavour: Flavour): Note {
    const before = root.held.get(key);
    const same = before === uri ? root.folder.note(uri) : null;
    if (same?.flavour === flavour && same.document.text() === text) return same;
    if (before !== undefined && before !== uri) root.folder.remove(before);
    root.held.set(key, uri);
    return root.folder.open(uri, text, flavour);
  }

  #drop(root: Root, key: string): boolean {
    const uri = root.held.get(key);
    if (uri === undefined) return false;
    root.held.delete(key);
    root.folder.remove(uri);
    return true;
  }

  /** A note that is gone, or all notes of a folder that is: clients tell of the folder alone. */
  #dropBelow(root: Root, key: string): boolean {
    let changed = false;
    for (const held of [...root.held.keys()]) {
      const gone = held === key || held.startsWith(`${key}/`);
      if (gone && !this.#open.has(held)) changed = this.#drop(root, held) || changed;
    }
    return changed;
  }

  #putOpen(key: string, uri: string, text: string, flavour: Flavour, version: number): void {
    const root = this.#home(key);
    this.#open.set(key, { folder: root.folder, note: this.#hold(root, key, uri, text, flavour), version });
  }

  /** After folders came or went, open notes live where they belong now. */
  #moveOpenNotes(): void {
    for (const [key, { note, version, folder }] of [...this.#open]) {
      const stray = this.#strays.get(key);
      const old = [...this.#roots.values(), ...(stray ? [stray] : [])].find((one) => one.folder === folder);
      const root = this.#rootOf(key);
      if (root ? root === old : stray && stray === old) continue;
      if (old) this.#drop(old, key);
      this.#strays.delete(key);
      this.#putOpen(key, note.uri, note.document.text(), note.flavour, version);
    }
  }

  /** The folder of a note, made for it alone where none holds it. */
  #home(key: string): Root {
    const root = this.#rootOf(key) ?? this.#strays.get(key);
    if (root) return root;
    const own = this.#newRoot(null);
    this.#strays.set(key, own);
    return own;
  }

  #newRoot(uri: string | null): Root {
    const folder = createFolder({ today: this.#today() });
    const root: Root = {
      uri,
      folder,
      held: new Map(),
      listed: new Set(),
      refused: new Set(),
      configuration: noConfiguration,
    };
    this.#applySeverities(root);
    return root;
  }

  /** The innermost folder that holds the note. */
  #rootOf(key: string): Root | null {
    let best = "";
    for (const base of this.#roots.keys()) if (key.startsWith(base) && best.length < base.length) best = base;
    return this.#roots.get(best) ?? null;
  }
}

function baseOf(uri: string): string {
  const key = uriKey(uri);
  return key.endsWith("/") ? key : `${key}/`;
}

/** What is never looked into, as on the command line. */
function isNeverEntered({ uri }: Root, key: string): boolean {
  const inside = uri === null ? "" : key.slice(baseOf(uri).length - 1);
  return /\/(\.git|node_modules)(\/|$)/.test(inside);
}

function configurationUri(folder: string): string {
  return `${folder.replace(/\/$/, "")}/${CONFIGURATION_FILE}`;
}

/** What is told of a file that is there and cannot be read. */
function unread(file: ReadNote | null): readonly ConfigurationProblem[] {
  return file && "problem" in file ? [{ message: file.problem, start: 0, end: 0 }] : [];
}

function isConfiguration({ uri }: Root, key: string): boolean {
  return uri !== null && key === `${baseOf(uri)}${CONFIGURATION_FILE}`;
}

function decodedPath(path: string): string {
  try {
    return decodeURIComponent(path);
  } catch {
    return path;
  }
}

/** A note that ends so is one, whatever the editor calls its language: not every editor knows the name. */
export function flavourOpened(uri: string, languageId: string): Flavour {
  if (/\.plumb$/i.test(uri)) return "plumb";
  return languageId === "markdown" || languageId === "plumb" ? languageId : flavourOf(uri);
}

export function flavourOf(uri: string): Flavour {
  return flavourOrNull(uri) ?? "plumb";
}

function flavourOrNull(uri: string): Flavour | null {
  if (/\.(md|markdown)$/i.test(uri)) return "markdown";
  return /\.plumb$/i.test(uri) ? "plumb" : null;
}
