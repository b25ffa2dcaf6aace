import type { Finding } from "../../plan/finding.ts";
import type { Note } from "../../plan/note.ts";
import type { PointResult } from "../../plan/point.ts";
import { type Part, partsOf } from "./parts.ts";

/** A point or a setting of a revision. */
export interface Item {
  /** Among the points and settings of its note. */
  readonly index: number;
  /** Null for a setting. */
  readonly point: PointResult | null;
  /** Line of the file, from 0, and how many there are. */
  readonly start: number;
  readonly lines: number;
  readonly parts: readonly Part[];
  readonly findings: readonly Finding[];
  /** What all its clauses say, in any order. */
  readonly content: string;
}

/** The points and settings of a note in the order of its lines. */
export function itemsOf(note: Note): readonly Item[] {
  const items: Item[] = [];
  for (const result of note.results()) {
    if (result.kind !== "point" && result.kind !== "setting") continue;
    const { block } = result;
    const parts = partsOf(block);
    const content = parts.map((part) => part.says).sort();
    items.push({
      index: items.length,
      point: result.kind === "point" ? result.point : null,
      start: block.start,
      lines: block.lines.length,
      parts,
      findings: result.findings,
      content: content.join("\n"),
    });
  }
  return items;
}
