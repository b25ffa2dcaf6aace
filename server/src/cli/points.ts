import { caution } from "../plan/caution.ts";
import { pointsCsv } from "../report/csv.ts";
import { fileJson } from "../report/pointsJson.ts";
import { markdownTable, plainTable, pointsTable } from "../report/pointsTable.ts";
import { printable } from "../report/printable.ts";
import { type LoadedNote, load } from "./load.ts";
import { emit } from "./output.ts";
import type { Common } from "./run.ts";

export interface PointsOptions extends Common {
  readonly format: "table" | "json" | "csv" | "markdown";
}

/** `plumbline points`: every point with its computed values. */
export async function points(paths: readonly string[], options: PointsOptions): Promise<number> {
  const notes = await load(paths, options);
  await emit(written(notes, options), options);
  return 0;
}

function written(notes: readonly LoadedNote[], { format }: PointsOptions): string {
  const files = () => notes.map(({ path, note }) => fileJson(note, path));
  switch (format) {
    case "json":
      return `${JSON.stringify({ schema: 1, caution, files: files() }, null, 2)}\n`;
    case "csv":
      return pointsCsv(files(), caution);
    case "table":
      return printable(`${tables(notes, ({ path }) => `${path}\n`, plainTable)}${caution}\n`);
    case "markdown":
      return printable(`${tables(notes, ({ path }) => `## ${path}\n\n`, markdownTable)}${caution}\n`);
  }
}

/** A table for each note that has points. */
function tables(
  notes: readonly LoadedNote[],
  head: (note: LoadedNote) => string,
  table: typeof plainTable,
): string {
  return notes
    .map((one) => ({ one, ...pointsTable(one.note) }))
    .filter(({ rows }) => rows.length > 0)
    .map(({ one, rows, head: columns }) => `${head(one)}${table(rows, columns)}\n`)
    .join("");
}
