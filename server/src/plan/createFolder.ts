import type { Block } from "../notation/block.ts";
import type { Flavour } from "../notation/document.ts";
import type { Card } from "./card.ts";
import { collectDefinitions } from "./collectDefinitions.ts";
import { commonPracticeDraft } from "./commonPractice.ts";
import type { Definitions } from "./definitions.ts";
import type { Finding } from "./finding.ts";
import { catalogue } from "./findings.ts";
import type { Folder } from "./folder.ts";
import type { Limits } from "./limits.ts";
import { type LimitsDraft, resolveLimits } from "./lowerLimits.ts";
import { type FolderNote, openNote, type Surroundings } from "./openNote.ts";
import type { Severities } from "./severities.ts";

/** The day the notes are read on, `2026-03-01`: below the editor and the command line nothing knows the clock. */
export interface FolderContext {
  readonly today: string;
}

/** A folder of notes that see each other's cards and limits, empty at first. */
export function createFolder(context: FolderContext): Folder {
  return new OpenFolder(context.today);
}

const noFindings: readonly Finding[] = [];

class OpenFolder implements Folder, Surroundings {
  readonly today: string;
  severities: Severities = {};
  readonly #notes = new Map<string, FolderNote>();
  #definitions: Definitions | null = null;
  #resolved = new Map<LimitsDraft, Limits>();
  #findings = new Map<Block, Finding[]>();
  #version = 0;
  #unused = "";
  #cards: readonly Card[] = [];
  #drafts: readonly LimitsDraft[] = [];
  #collected: ReturnType<typeof collectDefinitions> | null = null;

  constructor(today: string) {
    this.today = today;
  }

  open(uri: string, text: string, flavour: Flavour): FolderNote {
    const note = openNote(uri, text, flavour, this);
    this.#notes.set(uri, note);
    this.changed();
    return note;
  }

  remove(uri: string): void {
    if (this.#notes.delete(uri)) this.changed();
  }

  note(uri: string): FolderNote | null {
    return this.#notes.get(uri) ?? null;
  }

  get notes(): readonly FolderNote[] {
    return [...this.#notes.values()];
  }

  get definitionsVersion(): number {
    this.definitions();
    return this.#version;
  }

  changed(): void {
    this.#definitions = null;
  }

  definitions(): Definitions {
    return this.#definitions ?? this.#collect();
  }

  resolved(draft: LimitsDraft): Limits {
    this.definitions();
    return this.#resolved.get(draft) as Limits;
  }

  findingsAt(block: Block): readonly Finding[] {
    this.definitions();
    return this.#findings.get(block) ?? noFindings;
  }

  #collect(): Definitions {
    const notes = this.notes;
    const cards = notes.flatMap((note) => note.cards);
    const drafts = notes.flatMap((note) => note.drafts);
    // While no card and no limits changed, the definitions stay the same object, and no point is evaluated again.
    if (!this.#collected || !same(cards, this.#cards) || !same(drafts, this.#drafts)) {
      this.#cards = cards;
      this.#drafts = drafts;
      this.#resolved = new Map(
        drafts.map((draft) => [draft, resolveLimits(draft, [commonPracticeDraft(), ...drafts])]),
      );
      this.#collected = collectDefinitions(cards, [...this.#resolved.values()]);
      this.#version++;
    }
    this.#definitions = this.#collected.definitions;
    this.#findings = new Map(this.#collected.findings);
    if (notes.some((note) => note.hasPoints)) this.#findUnused(notes, [...cards, ...this.#resolved.values()]);
    return this.#collected.definitions;
  }

  #findUnused(notes: readonly FolderNote[], defined: readonly (FolderDefinition | Limits)[]): void {
    const used = new Set(notes.flatMap((note) => [...note.usedNames]));
    const unused = defined.filter(({ name }) => !used.has(name.toLowerCase())).map(({ name }) => name);
    // A card that nobody uses any more is told in another note than the one that was edited.
    if (unused.join(" ") !== this.#unused) this.#version++;
    this.#unused = unused.join(" ");
    for (const { name, block, origin } of defined) {
      if (used.has(name.toLowerCase())) continue;
      const finding: Finding = {
        code: "unused-definition",
        severity: catalogue["unused-definition"].severity,
        line: origin.line,
        span: origin.span,
        message: `No note in this folder uses ${name}.`,
        related: [],
        fixes: [],
      };
      this.#findings.set(block, [...(this.#findings.get(block) ?? []), finding]);
    }
  }
}

function same(a: readonly unknown[], b: readonly unknown[]): boolean {
  return a.length === b.length && a.every((one, i) => one === b[i]);
}

type FolderDefinition = Pick<Limits, "name" | "block" | "origin">;
