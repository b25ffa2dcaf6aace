/**
 * The rows as plain text in columns. A row is `{ measure, value, baseline, ratio, aim, met }` of ready texts,
 * each of which may be left out; a row of `measure` alone heads a group.
 */
export function table(rows) {
  const columns = ["measure", "value", "baseline", "ratio", "aim", "met"];
  const cells = [columns, ...rows.map((row) => columns.map((column) => row[column] ?? ""))];
  const grouped = (line) => line.slice(1).every((cell) => cell === "");
  const widths = columns.map((_, at) =>
    Math.max(...cells.filter((line) => !grouped(line)).map((line) => line[at].length)),
  );
  return cells.map((line) => (grouped(line) ? `\n${line[0]}` : aligned(line, widths))).join("\n");
}

const aligned = (line, widths) =>
  line
    .map((cell, at) => cell.padEnd(widths[at]))
    .join("   ")
    .trimEnd();
