import { caution } from "../plan/caution.ts";
import { fileName } from "../plan/fileName.ts";
import type { Comparison, ItemChange, RevisionSummary } from "./compare.ts";
import type { Definition } from "./comparison/definitionsOf.ts";
import type { FindingChange } from "./comparison/findingChanges.ts";
import type { Item } from "./comparison/items.ts";
import type { PartChange } from "./comparison/partChanges.ts";
import type { Part } from "./comparison/parts.ts";
import type { Figure } from "./comparison/pointFigures.ts";
import type { Tightest } from "./comparison/tightest.ts";

/** What `compare --format json` prints: lines count from 1, values have full precision, `shown` is as tables show it. */
export function comparisonJson(comparison: Comparison): object {
  return {
    schema: 1,
    caution,
    old: revisionJson(comparison.old),
    new: revisionJson(comparison.new),
    same: comparison.same,
    definitions: comparison.definitions.map(({ old, new: now, parts }) => ({
      kind: (now ?? old)?.kind,
      name: (now ?? old)?.name,
      change: changeOf(old, now),
      old: old && definitionPlace(old),
      new: now && definitionPlace(now),
      clauses: parts.map((part) => partJson(part, old, now)),
    })),
    points: comparison.items.map(itemJson),
    findings: comparison.findings.map(findingJson),
  };
}

function revisionJson({ margin, ratio, ...counts }: RevisionSummary): object {
  return { ...counts, tightest: { margin: tightestJson(margin), ratio: tightestJson(ratio) } };
}

function tightestJson(tightest: Tightest | null): object | null {
  if (!tightest) return null;
  const { point, value, shown } = tightest;
  return { line: point.line, phase: point.phase, title: point.title, value, shown };
}

function itemJson(change: ItemChange): object {
  const { old, new: now, moved, inputs, accepts, results, findings, because } = change;
  return {
    kind: (now ?? old)?.point ? "point" : "setting",
    change: changeOf(old, now),
    moved,
    old: old && itemPlace(old),
    new: now && itemPlace(now),
    inputs: inputs.map((part) => partJson(part, old, now)),
    accepts: accepts.map((part) => partJson(part, old, now)),
    results: results.map((one) => ({ name: one.name, old: figureJson(one.old), new: figureJson(one.new) })),
    findings: findings.map(findingJson),
    because,
  };
}

function changeOf(old: unknown, now: unknown): "added" | "removed" | "changed" {
  if (!old) return "added";
  return now ? "changed" : "removed";
}

function itemPlace({ start, lines, point }: Item): object {
  return {
    line: start + 1,
    endLine: start + lines,
    phase: point?.phase ?? null,
    title: point?.title ?? null,
  };
}

function definitionPlace({ uri, start, lines }: Definition): object {
  return { file: fileName(uri), line: start + 1, endLine: start + lines };
}

interface Started {
  readonly start: number;
}

function partJson({ old, new: now }: PartChange, before: Started | null, after: Started | null): object {
  const side = (part: Part | null, at: Started | null) =>
    part && at ? { line: at.start + part.line + 1, text: part.text } : null;
  return { keyword: (now ?? old)?.keyword ?? null, old: side(old, before), new: side(now, after) };
}

function figureJson(figure: Figure | null): object | null {
  return figure && { shown: figure.shown, value: figure.value };
}

function findingJson({ old, new: now }: FindingChange): object {
  return { change: old ? (now ? "changed" : "gone") : "new", code: (now ?? old)?.code, old, new: now };
}
