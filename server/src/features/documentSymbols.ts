import type { Span } from "../notation/span.ts";
import type { BlockResult, Note } from "../plan/note.ts";

/** An entry of the outline. */
export interface OutlineEntry {
  readonly name: string;
  readonly detail: string;
  readonly kind: "point" | "setting" | "card" | "limits" | "configuration";
  readonly firstLine: number;
  readonly lastLine: number;
  readonly nameLine: number;
  readonly nameSpan: Span;
  readonly children: readonly OutlineEntry[];
}

/** The points, settings, cards and limits of a note, in the order of their lines. */
export function documentSymbols(note: Note): readonly OutlineEntry[] {
  return note.results().map(symbolOf);
}

function symbolOf(result: BlockResult): OutlineEntry {
  const { block } = result;
  const first = block.clauses[0];
  const base = {
    firstLine: block.start,
    lastLine: block.start + block.lines.length - 1,
    nameLine: block.start + (first?.line ?? 0),
    nameSpan: first?.clause.span ?? { start: 0, end: block.lines[0]?.text.length ?? 0 },
    children: [] as readonly OutlineEntry[],
  };
  switch (result.kind) {
    case "point": {
      const { point } = result;
      const name = point.title ? `${point.phase ?? "point"}: ${point.title}` : (point.phase ?? "point");
      return { ...base, kind: "point", name, detail: point.aside ? "aside" : "" };
    }
    case "setting":
      return {
        ...base,
        kind: "setting",
        name: block.clauses.map(({ clause }) => clause.keyword ?? "?").join(", ") || "empty",
        detail: "setting",
      };
    case "card":
      return {
        ...base,
        kind: "card",
        name: result.card.name || "aircraft",
        detail: result.card.title ?? "card",
        children: result.card.configurations.map((one) => ({
          name: one.name,
          detail: "configuration",
          kind: "configuration" as const,
          firstLine: block.start + one.origin.line,
          lastLine: block.start + one.origin.line,
          nameLine: block.start + one.origin.line,
          nameSpan: one.origin.span,
          children: [],
        })),
      };
    case "limits":
      return {
        ...base,
        kind: "limits",
        name: result.limits.name || "limits",
        detail: result.limits.title ?? "limits",
      };
  }
}
