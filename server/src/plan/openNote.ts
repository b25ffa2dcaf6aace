import type { Block } from "../notation/block.ts";
import { type Flavour, type Position } from "../notation/document.ts";
import { openDocument } from "../notation/openDocument.ts";
import type { Definitions } from "./definitions.ts";
import { clausesOf, evaluateBlock, textFindings } from "./evaluateBlock.ts";
import type { Finding } from "./finding.ts";
import { catalogue } from "./findings.ts";
import { lowerCard } from "./lowerCard.ts";
import { type LimitsDraft, lowerLimits } from "./lowerLimits.ts";
import type { BlockResult, Note, PlacedFinding } from "./note.ts";
import type { Anchor } from "./origin.ts";
import type { Site } from "./site.ts";
import { sameState, startState, type State } from "./state.ts";
import type { Card } from "./card.ts";
import type { Limits } from "./limits.ts";

/** What a folder gives its notes: everything that one note cannot know of itself. */
export interface Surroundings {
  /** The cards and limits in force now; the same object while none of them changed. */
  definitions(): Definitions;
  /** Limits with the rows of `from` taken in. */
  resolved(draft: LimitsDraft): Limits;
  /** Findings that the other notes cause at this block: a name given twice, a definition that nobody uses. */
  findingsAt(block: Block): readonly Finding[];
  /** Told after an edit that touched a definition or the use of one. */
  changed(): void;
}

/** Where successive versions of one block stand. It outlives them, so that what was carried on from it stays the same. */
interface Place extends Anchor {
  block: Block;
}

/** A block with what it came to, and from what. */
interface Entry {
  readonly block: Block;
  readonly place: Place;
  readonly card: Card | null;
  readonly draft: LimitsDraft | null;
  before: State | null;
  definitions: Definitions | null;
  result: BlockResult | null;
}

export interface FolderNote extends Note {
  readonly cards: readonly Card[];
  readonly drafts: readonly LimitsDraft[];
  /** Names after `fly`, `under` and `from`, in lower case. */
  readonly usedNames: ReadonlySet<string>;
  readonly hasPoints: boolean;
}

/**
 * Opens a note and keeps its evaluation up to date as it is edited. An edit costs the blocks it
 * touches and those that its state reaches; it stops where the state is again what it was.
 */
export function openNote(uri: string, text: string, flavour: Flavour, around: Surroundings): FolderNote {
  return new OpenNote(uri, text, flavour, around);
}

class OpenNote implements FolderNote {
  readonly uri: string;
  readonly flavour: Flavour;
  readonly document;
  readonly #around: Surroundings;
  #entries: Entry[] = [];
  /** Everything before this entry is up to date. */
  #dirtyFrom = 0;
  /** From here on the entries are as they were, if the state that reaches them is. */
  #dirtyTo = 0;
  #evaluatedWith: Definitions | null = null;
  #results: BlockResult[] = [];

  constructor(uri: string, text: string, flavour: Flavour, around: Surroundings) {
    this.uri = uri;
    this.flavour = flavour;
    this.document = openDocument(text, flavour);
    this.#around = around;
    this.#align();
  }

  edit(start: Position, end: Position, newText: string): void {
    this.document.edit(start, end, newText);
    if (this.#align()) this.#around.changed();
  }

  get definitions(): Definitions {
    return this.#around.definitions();
  }

  get cards(): readonly Card[] {
    return this.#entries.flatMap((entry) => entry.card ?? []);
  }

  get drafts(): readonly LimitsDraft[] {
    return this.#entries.flatMap((entry) => entry.draft ?? []);
  }

  get hasPoints(): boolean {
    return this.#entries.some((entry) => entry.block.kind === "point");
  }

  get usedNames(): ReadonlySet<string> {
    const names = new Set<string>();
    for (const { block } of this.#entries) for (const name of namesUsed(block)) names.add(name);
    return names;
  }

  results(): readonly BlockResult[] {
    this.#evaluate();
    return this.#results;
  }

  resultOf(block: Block): BlockResult {
    const results = this.results();
    const index = indexOfBlock(results, block.start);
    return results[index] as BlockResult;
  }

  findings(): readonly PlacedFinding[] {
    const placed: PlacedFinding[] = [];
    for (const finding of this.document.findings) {
      const severity = catalogue[finding.code].severity;
      placed.push({ line: finding.line, finding: { ...finding, severity, related: [] } });
    }
    let builtIn = false;
    for (const result of this.results()) {
      const { block, findings } = result;
      for (const finding of findings) placed.push({ line: block.start + finding.line, finding });
      if (result.kind === "card" || result.kind === "limits") {
        for (const finding of this.#around.findingsAt(block)) {
          placed.push({ line: block.start + finding.line, finding });
        }
      } else if (!builtIn && result.kind === "point" && result.point.limits?.builtIn) {
        builtIn = true;
        placed.push({ line: block.start, finding: builtInFinding(block) });
      }
    }
    return placed.sort((a, b) => a.line - b.line || a.finding.span.start - b.finding.span.start);
  }

  /**
   * Brings the entries in step with the document's blocks: those that are the same objects are kept,
   * and a block that took another's place takes over its `Place`. True where a definition, or the use
   * of one, came, went or changed.
   */
  #align(): boolean {
    const blocks = this.document.blocks;
    const old = this.#entries;
    let head = 0;
    const shorter = Math.min(blocks.length, old.length);
    while (head < shorter && (old[head] as Entry).block === blocks[head]) head++;
    let tail = 0;
    while (
      tail < shorter - head &&
      (old[old.length - 1 - tail] as Entry).block === blocks[blocks.length - 1 - tail]
    ) {
      tail++;
    }
    const gone = old.slice(head, old.length - tail);
    const come: Entry[] = [];
    for (let i = head; i < blocks.length - tail; i++) {
      const block = blocks[i] as Block;
      come.push(this.#entry(block, placeFor(block, gone[i - head])));
    }
    if (gone.length === 0 && come.length === 0) return false;
    if (gone.length === come.length) {
      for (let i = 0; i < come.length; i++) old[head + i] = come[i] as Entry;
    } else {
      old.splice(head, gone.length, ...come);
      this.#results.splice(head, gone.length, ...(come.map(() => null) as unknown as BlockResult[]));
    }
    this.#dirtyFrom = Math.min(this.#dirtyFrom, head);
    const after = head + come.length;
    this.#dirtyTo = Math.max(after, this.#dirtyTo + (come.length - gone.length));
    return gone.some(defines) || come.some(defines);
  }

  #entry(block: Block, place: Place): Entry {
    return {
      block,
      place,
      card: block.kind === "card" ? lowerCard(block, this.uri) : null,
      draft: block.kind === "limits" ? lowerLimits(block, this.uri) : null,
      before: null,
      definitions: null,
      result: null,
    };
  }

  #evaluate(): void {
    const definitions = this.#around.definitions();
    const from = definitions === this.#evaluatedWith ? this.#dirtyFrom : 0;
    if (definitions !== this.#evaluatedWith) this.#dirtyTo = this.#entries.length;
    let state = this.#stateBefore(from);
    for (let i = from; i < this.#entries.length; i++) {
      const entry = this.#entries[i] as Entry;
      const current = entry.result !== null && entry.before === state && entry.definitions === definitions;
      // Beyond the blocks that changed, the first that starts from the state it knew ends the work.
      if (current && this.#dirtyTo <= i) break;
      if (!current) this.#evaluateEntry(entry, definitions, state);
      this.#results[i] = entry.result as BlockResult;
      state = stateAfter(entry.result as BlockResult, state);
    }
    this.#dirtyFrom = this.#entries.length;
    this.#dirtyTo = 0;
    this.#evaluatedWith = definitions;
  }

  #stateBefore(index: number): State {
    for (let i = index - 1; 0 <= i; i--) {
      const { result } = this.#entries[i] as Entry;
      if (result && (result.kind === "point" || result.kind === "setting")) return result.after;
    }
    return startState;
  }

  #evaluateEntry(entry: Entry, definitions: Definitions, before: State): void {
    const { block, card, draft, place } = entry;
    entry.before = before;
    entry.definitions = definitions;
    if (card) {
      entry.result = { kind: "card", block, card, findings: [...textFindings(block), ...card.findings] };
    } else if (draft) {
      const limits = this.#around.resolved(draft);
      entry.result = { kind: "limits", block, limits, findings: [...textFindings(block), ...limits.findings] };
    } else {
      const site: Site = { uri: this.uri, block, anchor: place };
      const known = place.after;
      const result = evaluateBlock(site, definitions, before);
      // The same state as this place left before: what follows need not be evaluated again.
      entry.result = known && sameState(known, result.after) ? { ...result, after: known } : result;
      place.after = entry.result.kind === "point" || entry.result.kind === "setting" ? entry.result.after : null;
    }
  }
}

interface Place {
  /** The state that the last version of the block left. */
  after: State | null;
}

function placeFor(block: Block, gone: Entry | undefined): Place {
  if (gone) {
    gone.place.block = block;
    return gone.place;
  }
  return {
    block,
    after: null,
    get start() {
      return this.block.start;
    },
  };
}

function stateAfter(result: BlockResult, before: State): State {
  return result.kind === "point" || result.kind === "setting" ? result.after : before;
}

function defines(entry: Entry): boolean {
  return entry.card !== null || entry.draft !== null || namesUsed(entry.block).length > 0;
}

const nothing: readonly string[] = [];

/** The names a block uses, in lower case. */
function namesUsed(block: Block): readonly string[] {
  if (block.kind === "card") return nothing;
  if (block.kind === "limits") {
    return block.clauses.flatMap(({ clause }) =>
      clause.body?.kind === "limits" && clause.body.from ? [clause.body.from.text.toLowerCase()] : [],
    );
  }
  const { fly, under } = clausesOf(block);
  if (!fly && !under) return nothing;
  return [fly, under].flatMap((read) => (read ? [read.body.name.text.toLowerCase()] : []));
}

function indexOfBlock(results: readonly BlockResult[], start: number): number {
  let low = 0;
  let high = results.length - 1;
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((results[middle] as BlockResult).block.start < start) low = middle + 1;
    else high = middle;
  }
  return low;
}

/** Told once a file: the rules that are held here are nobody's own. */
function builtInFinding(block: Block): Finding {
  const phase = block.clauses.find((placed) => placed.clause.keyword === "phase") ?? block.clauses[0];
  return {
    code: "built-in-limits",
    severity: catalogue["built-in-limits"].severity,
    line: phase?.line ?? 0,
    span: phase?.clause.keywordSpan ?? { start: 0, end: 1 },
    message:
      "No limits are named, so the built-in common-practice is held here; it must be replaced by the operator's own: write `under NAME`.",
    related: [],
    fixes: [],
  };
}
