import type { Note } from "../plan/note.ts";
import { type DefinitionChange, definitionChanges } from "./comparison/definitionChanges.ts";
import { type Definition, definitionsOf, withSources } from "./comparison/definitionsOf.ts";
import { type FigureChange, figureChanges } from "./comparison/figureChanges.ts";
import { type FindingChange, findingChanges } from "./comparison/findingChanges.ts";
import { type Item, itemsOf } from "./comparison/items.ts";
import { type Match, matchItems } from "./comparison/matchItems.ts";
import { type PartChange, partChanges } from "./comparison/partChanges.ts";
import { type Tightest, tightest } from "./comparison/tightest.ts";
import { type FindingJson, findingsJson } from "./findingsJson.ts";
import { type Summary, summarize } from "./findingsText.ts";
import { fileJson, type JsonValue, type PointJson } from "./pointsJson.ts";

/** One of the two notes that are compared, with its own cards and limits around it. */
export interface Revision {
  readonly note: Note;
  /** How the note is spoken of. */
  readonly path: string;
}

/** What a whole revision comes to. */
export interface RevisionSummary {
  readonly path: string;
  readonly points: number;
  /** How many of them have no figures. */
  readonly withoutFigures: number;
  /** The codes of the findings that keep them from having any. */
  readonly withheldBy: readonly string[];
  readonly findings: Summary;
  readonly margin: Tightest | null;
  readonly ratio: Tightest | null;
}

/** What changed in a point or a setting; null on the side where it does not stand. */
export interface ItemChange {
  readonly old: Item | null;
  readonly new: Item | null;
  /** True where its order among the others changed. */
  readonly moved: boolean;
  readonly inputs: readonly PartChange[];
  readonly accepts: readonly PartChange[];
  readonly results: readonly FigureChange[];
  readonly findings: readonly FindingChange[];
  /** Where no clause of its own changed: what else can have changed its figures. */
  readonly because: readonly string[];
}

export interface Comparison {
  readonly old: RevisionSummary;
  readonly new: RevisionSummary;
  /** True where nothing of a plan changed; prose and layout may have. */
  readonly same: boolean;
  readonly definitions: readonly DefinitionChange[];
  /** In the order of the new revision; those that changed only. */
  readonly items: readonly ItemChange[];
  /** Findings that belong to no point and no setting. */
  readonly findings: readonly FindingChange[];
}

/** What changed between two revisions of a note. */
export function compare(old: Revision, now: Revision): Comparison {
  const oldDefinitions = definitionsOf(old.note);
  const newDefinitions = definitionsOf(now.note);
  const definitions = definitionChanges(oldDefinitions, newDefinitions);
  const behind = changedBehind(definitions, [...oldDefinitions, ...newDefinitions]);
  const olds = itemsOf(old.note);
  const news = itemsOf(now.note);
  const oldFindings = findingsByItem(old, olds);
  const newFindings = findingsByItem(now, news);
  const items: ItemChange[] = [];
  let carries = false;
  for (const match of matchItems(olds, news)) {
    const change = itemChange(
      match,
      (match.old && oldFindings.get(match.old)) ?? [],
      (match.new && newFindings.get(match.new)) ?? [],
      behind,
      carries,
    );
    if (!change) continue;
    items.push(change);
    carries ||= isEdit(change);
  }
  const findings = findingChanges(oldFindings.get(null) ?? [], newFindings.get(null) ?? []);
  return {
    old: summaryOf(old),
    new: summaryOf(now),
    same: definitions.length + items.length + findings.length === 0,
    definitions,
    items,
    findings,
  };
}

/** True where somebody edited the point or setting, and it is not only what reaches it that changed. */
export function isEdit({ old, new: now, moved, inputs, accepts }: ItemChange): boolean {
  return moved || !old || !now || inputs.length + accepts.length > 0;
}

function summaryOf({ note, path }: Revision): RevisionSummary {
  const { points, findings } = fileJson(note, path);
  return {
    path,
    points: points.length,
    withoutFigures: points.filter((point) => point.speed === null).length,
    withheldBy: [...new Set(points.map((point) => point.withheld).flatMap(codeOf))],
    findings: summarize([{ path, findings }]),
    margin: tightest(points, "margin"),
    ratio: tightest(points, "ratio"),
  };
}

function codeOf(withheld: JsonValue | undefined): readonly string[] {
  return withheld ? [String((withheld as PointJson).code)] : [];
}

/** The findings of each point and setting; under null those of nobody. */
function findingsByItem({ note }: Revision, items: readonly Item[]): ReadonlyMap<Item | null, FindingJson[]> {
  const owners = new Map(items.flatMap((item) => item.findings.map((finding) => [finding, item] as const)));
  const placed = note.findings();
  const found = new Map<Item | null, FindingJson[]>();
  findingsJson(note).forEach((json, i) => {
    const finding = placed[i]?.finding;
    const owner = (finding && owners.get(finding)) ?? null;
    const own = found.get(owner);
    if (own) own.push(json);
    else found.set(owner, [json]);
  });
  return found;
}

function itemChange(
  { old, new: now, moved }: Match,
  oldFindings: readonly FindingJson[],
  newFindings: readonly FindingJson[],
  behind: (item: Item) => readonly string[],
  carries: boolean,
): ItemChange | null {
  const parts = partChanges(old?.parts ?? [], now?.parts ?? []);
  const isAccept = ({ old: before, new: after }: PartChange) => (before ?? after)?.keyword === "accept";
  const change: ItemChange = {
    old,
    new: now,
    moved,
    inputs: parts.filter((part) => !isAccept(part)),
    accepts: parts.filter(isAccept),
    results: figureChanges(old?.point ?? null, now?.point ?? null),
    findings: findingChanges(oldFindings, newFindings),
    because: [],
  };
  if (isEdit(change)) return change;
  if (change.results.length + change.findings.length === 0) return null;
  const because = [...behind(now as Item), ...(carries ? [carriedDown] : [])];
  return { ...change, because };
}

const carriedDown = "what carries down from before";

/** For a point, the changed cards and limits that it is computed with, in either revision. */
function changedBehind(
  changes: readonly DefinitionChange[],
  all: readonly Definition[],
): (item: Item) => readonly string[] {
  const changed = changes.flatMap((change) => change.new ?? change.old ?? []);
  return ({ point }) => {
    if (!point || changed.length === 0) return [];
    const aircraft = point.aircraft?.toLowerCase();
    const limits = withSources([point.limitsName.toLowerCase()], all);
    return changed
      .filter(({ kind, name }) =>
        kind === "card" ? name.toLowerCase() === aircraft : limits.has(name.toLowerCase()),
      )
      .map(({ kind, name }) => `the ${kind} ${name}`);
  };
}
