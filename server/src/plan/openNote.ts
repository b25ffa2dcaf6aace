import type { Block } from "../notation/block.ts";
import type { BlockChange, Flavour, Position } from "../notation/document.ts";
import { openDocument } from "../notation/openDocument.ts";
import type { Card } from "./card.ts";
import { type Clauses, sortClauses } from "./clauses.ts";
import type { Definitions } from "./definitions.ts";
import { evaluateBlock, textFindings } from "./evaluateBlock.ts";
import type { Finding } from "./finding.ts";
import { catalogue } from "./findings.ts";
import type { Limits } from "./limits.ts";
import { lowerCard } from "./lowerCard.ts";
import { type LimitsDraft, lowerLimits } from "./lowerLimits.ts";
import type { BlockResult, Note, PlacedFinding } from "./note.ts";
import { type Anchor, lineOf } from "./origin.ts";
import { type Severities, withSeverity } from "./severities.ts";
import type { PlanSite } from "./site.ts";
import { type State, sameState, startState } from "./state.ts";

/** What a folder gives its notes: everything that one note cannot know of itself. */
export interface Surroundings {
  /** The cards and limits in force now; the same object while none of them changed. */
  definitions(): Definitions;
  /** Limits with the rows of `from` taken in. */
  resolved(draft: LimitsDraft): Limits;
  /** Findings that the other notes cause at this block: a name given twice, a definition that nobody uses. */
  findingsAt(block: Block): readonly Finding[];
  /** The day the notes are read on. */
  readonly today: string;
  /** What codes are made of in this folder. */
  readonly severities: Severities;
  /** Told after an edit that touched a definition or the use of one. */
  changed(): void;
}

/** A block with what it came to, and from what. */
interface Entry {
  readonly block: Block;
  readonly place: Place;
  readonly clauses: Clauses | null;
  readonly card: Card | null;
  readonly draft: LimitsDraft | null;
  /** The names the block uses, in lower case. */
  readonly uses: readonly string[];
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
  #results: BlockResult[] = [];
  /** Everything before this entry is up to date. */
  #dirtyFrom = 0;
  /** From here on the entries are as they were, if the state that reaches them is. */
  #dirtyTo = 0;
  #evaluatedWith: Definitions | null = null;
  /** How many of the entries are points. */
  #points = 0;
  /** Entries whose findings are told, so that a note of 10,000 points is not looked through for 20 findings. */
  #telling: Entry[] | null = null;

  constructor(uri: string, text: string, flavour: Flavour, around: Surroundings) {
    this.uri = uri;
    this.flavour = flavour;
    this.document = openDocument(text, flavour);
    this.#around = around;
    this.#replace({ from: 0, removed: 0, added: this.document.blocks.length });
  }

  edit(start: Position, end: Position, newText: string): void {
    if (this.#replace(this.document.edit(start, end, newText))) this.#around.changed();
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
    return 0 < this.#points;
  }

  get usedNames(): ReadonlySet<string> {
    const names = new Set<string>();
    for (const { uses } of this.#entries) for (const name of uses) names.add(name);
    return names;
  }

  results(): readonly BlockResult[] {
    this.#evaluate();
    return this.#results;
  }

  resultOf(block: Block): BlockResult {
    const results = this.results();
    return results[indexOfBlock(results, block.start)] as BlockResult;
  }

  findings(): readonly PlacedFinding[] {
    this.#evaluate();
    this.#nameLinesAnew();
    const placed: PlacedFinding[] = [];
    for (const finding of this.document.findings) {
      const severity = catalogue[finding.code].severity;
      placed.push({ line: finding.line, finding: { ...finding, severity, related: [] } });
    }
    let builtIn = false;
    for (const { block, result } of this.#tellingEntries()) {
      if (!result) continue;
      for (const finding of result.findings) placed.push({ line: block.start + finding.line, finding });
      if (result.kind === "card" || result.kind === "limits") {
        for (const finding of this.#around.findingsAt(block)) {
          placed.push({ line: block.start + finding.line, finding });
        }
      } else if (!builtIn && usesBuiltIn(result)) {
        builtIn = true;
        const finding = builtInFinding(block);
        placed.push({ line: block.start + finding.line, finding });
      }
    }
    placed.sort((a, b) => a.line - b.line || a.finding.span.start - b.finding.span.start);
    const { severities } = this.#around;
    if (Object.keys(severities).length === 0) return placed;
    return placed.map(({ line, finding }) => ({ line, finding: withSeverity(finding, severities) }));
  }

  /** Evaluates again, from the state it knew, what names a line that is another one now. */
  #nameLinesAnew(): void {
    const outdated = this.#tellingEntries().filter(namesAnOldLine);
    for (const entry of outdated) {
      this.#evaluateEntry(entry, this.#around.definitions(), entry.before ?? startState);
      this.#results[indexOfBlock(this.#results, entry.block.start)] = entry.result as BlockResult;
    }
  }

  /** Found anew only when an entry that told something, or does now, was evaluated again. */
  #tellingEntries(): readonly Entry[] {
    this.#telling ??= this.#entries.filter(tells);
    return this.#telling;
  }

  /**
   * Brings the entries in step with the document's blocks. A block that took another's place takes
   * over its `Place`. True where a definition, or the use of one, came, went or changed.
   */
  #replace({ from, removed, added }: BlockChange): boolean {
    if (removed === 0 && added === 0) return false;
    const { blocks } = this.document;
    const gone = this.#entries.slice(from, from + removed);
    const come: Entry[] = [];
    for (let i = 0; i < added; i++) {
      const block = blocks[from + i] as Block;
      const old = gone[i];
      come.push(old?.block === block ? old : this.#entry(block, placeFor(block, old)));
    }
    spliceAll(this.#entries, from, removed, come);
    spliceAll(
      this.#results,
      from,
      removed,
      come.map((entry) => entry.result as BlockResult),
    );
    this.#dirtyFrom = Math.min(this.#dirtyFrom, from);
    this.#dirtyTo = Math.max(from + added, this.#dirtyTo + added - removed);
    if (gone.some(tells)) this.#telling = null;
    const had = this.hasPoints;
    this.#points += count(come, isPoint) - count(gone, isPoint);
    // A definition that nobody uses is told only where there are points.
    return gone.some(defines) || come.some(defines) || this.hasPoints !== had;
  }

  #entry(block: Block, place: Place): Entry {
    const planned = block.kind === "point" || block.kind === "setting";
    const clauses = planned ? sortClauses(block) : null;
    return {
      block,
      place,
      clauses,
      card: block.kind === "card" ? lowerCard(block, this.uri) : null,
      draft: block.kind === "limits" ? lowerLimits(block, this.uri) : null,
      uses: namesUsed(block, clauses),
      before: null,
      definitions: null,
      result: null,
    };
  }

  #evaluate(): void {
    const definitions = this.#around.definitions();
    const anew = definitions !== this.#evaluatedWith;
    const from = anew ? 0 : this.#dirtyFrom;
    if (anew) this.#dirtyTo = this.#entries.length;
    if (this.#entries.length <= from) return;
    let state = this.#stateBefore(from);
    for (let i = from; i < this.#entries.length; i++) {
      const entry = this.#entries[i] as Entry;
      const current = entry.result !== null && entry.before === state && entry.definitions === definitions;
      // Beyond the blocks that changed, the first that starts from the state it knew ends the work.
      if (current && this.#dirtyTo <= i) break;
      if (!current) this.#evaluateEntry(entry, definitions, state);
      const result = entry.result as BlockResult;
      this.#results[i] = result;
      state = stateAfter(result, state);
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
    const told = tells(entry);
    entry.before = before;
    entry.definitions = definitions;
    entry.result = this.#resultOf(entry, definitions, before);
    if (told || tells(entry)) this.#telling = null;
  }

  #resultOf(
    { block, card, draft, place, clauses }: Entry,
    definitions: Definitions,
    before: State,
  ): BlockResult {
    if (card) return { kind: "card", block, card, findings: [...textFindings(block), ...card.findings] };
    if (draft) {
      const limits = this.#around.resolved(draft);
      return { kind: "limits", block, limits, findings: [...textFindings(block), ...limits.findings] };
    }
    const site: PlanSite = { uri: this.uri, block, anchor: place, today: this.#around.today };
    const known = place.after;
    const result = evaluateBlock(site, clauses as Clauses, definitions, before);
    // The same state as this place left before: what follows need not be evaluated again.
    if (known && sameState(known, result.after)) return { ...result, after: known };
    place.after = result.after;
    return result;
  }
}

/** True where the entry has findings, or may have some that the folder or the whole note cause. */
function tells({ block, result }: Entry): boolean {
  if (block.kind === "card" || block.kind === "limits") return true;
  return result !== null && (result.findings.length > 0 || usesBuiltIn(result));
}

function namesAnOldLine({ result }: Entry): boolean {
  return (
    result?.findings.some(({ mentions }) => mentions?.some(({ origin, line }) => lineOf(origin) !== line)) ??
    false
  );
}

function usesBuiltIn(result: BlockResult): boolean {
  return result.kind === "point" && result.point.limits?.builtIn === true;
}

/** `splice` that does not spread many items over the stack. */
function spliceAll<T>(array: T[], at: number, remove: number, items: readonly T[]): void {
  if (remove === items.length) {
    items.forEach((item, i) => {
      array[at + i] = item;
    });
  } else if (items.length < 1000) array.splice(at, remove, ...items);
  else {
    const tail = array.splice(at).slice(remove);
    for (const item of items) array.push(item);
    for (const item of tail) array.push(item);
  }
}

/** Where successive versions of one block stand. It outlives them, so that what was carried on from it stays the same. */
class Place implements Anchor {
  block: Block;
  /** The state that the last version of the block left. */
  after: State | null = null;

  constructor(block: Block) {
    this.block = block;
  }

  get start(): number {
    return this.block.start;
  }
}

function placeFor(block: Block, gone: Entry | undefined): Place {
  if (!gone) return new Place(block);
  gone.place.block = block;
  return gone.place;
}

function stateAfter(result: BlockResult, before: State): State {
  return result.kind === "point" || result.kind === "setting" ? result.after : before;
}

function isPoint({ block }: Entry): boolean {
  return block.kind === "point";
}

function count<T>(items: readonly T[], fits: (item: T) => boolean): number {
  let found = 0;
  for (const item of items) if (fits(item)) found++;
  return found;
}

function defines(entry: Entry): boolean {
  return entry.card !== null || entry.draft !== null || entry.uses.length > 0;
}

const nothing: readonly string[] = [];

function namesUsed(block: Block, clauses: Clauses | null): readonly string[] {
  if (block.kind === "limits") {
    return block.clauses.flatMap(({ clause }) =>
      clause.body?.kind === "limits" && clause.body.from ? [clause.body.from.text.toLowerCase()] : [],
    );
  }
  if (!clauses?.fly && !clauses?.under) return nothing;
  return [clauses.fly, clauses.under].flatMap((read) => (read ? [read.body.name.text.toLowerCase()] : []));
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
