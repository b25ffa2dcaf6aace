import type { FileJson, JsonValue, PointJson } from "./pointsJson.ts";

/** Points as CSV (RFC 4180): one row a point or value of a sweep, nested names joined with `.`, the caution in the last column. */
export function pointsCsv(files: readonly FileJson[], caution: string): string {
  const rows = files.flatMap(({ path, points }) =>
    points.flatMap(values).map((point) => new Map<string, JsonValue>([["path", path], ...flat(point, "")])),
  );
  const columns = [...new Set(rows.flatMap((row) => [...row.keys()]))];
  const lines = [
    [...columns, "caution"],
    ...rows.map((row) => [...columns.map((column) => row.get(column) ?? null), caution]),
  ];
  return lines.map((line) => `${line.map(cell).join(",")}\r\n`).join("");
}

/** A point, or each value of its sweep as if it were one; `sweep` then says which it is. */
function values(point: PointJson): readonly PointJson[] {
  const { sweep } = point;
  if (!Array.isArray(sweep)) return [{ ...point, sweep: noValue }];
  return (sweep as readonly PointJson[]).map(({ what, value, unit, ...computed }) => ({
    ...point,
    ...computed,
    sweep: { what: what ?? null, value: value ?? null, unit: unit ?? null },
  }));
}

const noValue: PointJson = { what: null, value: null, unit: null };

function flat(value: PointJson, prefix: string): [string, JsonValue][] {
  return Object.entries(value).flatMap(([key, one]): [string, JsonValue][] => {
    const name = prefix + key;
    // The record of a speed or a category has the same names in every point; what varies stays in one cell.
    if (columnGroups.has(name) && one !== null) return flat(one as PointJson, `${name}.`);
    return [[name, one]];
  });
}

const columnGroups = new Set(["speed", "approach_category", "solved", "sweep"]);

function cell(value: JsonValue): string {
  if (value === null) return "";
  const text = typeof value === "object" ? JSON.stringify(value) : String(value);
  // A cell that a spreadsheet would take for a formula is kept a text.
  const safe = typeof value === "string" && /^[=+\-@\t\r]/.test(text) ? `'${text}` : text;
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
}
