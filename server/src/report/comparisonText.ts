import { caution } from "../plan/caution.ts";
import { fileName } from "../plan/fileName.ts";
import { type Comparison, type ItemChange, isEdit, type RevisionSummary } from "./compare.ts";
import type { DefinitionChange } from "./comparison/definitionChanges.ts";
import type { FigureChange } from "./comparison/figureChanges.ts";
import type { FindingChange } from "./comparison/findingChanges.ts";
import type { PartChange } from "./comparison/partChanges.ts";
import { pointName } from "./comparison/pointName.ts";
import type { Tightest } from "./comparison/tightest.ts";
import type { FindingJson } from "./findingsJson.ts";
import { plainMarkdown } from "./plainMarkdown.ts";
import { markdownTable, plainTable, type TableRow } from "./pointsTable.ts";

/** How the parts of a comparison are written: as plain text or as Markdown. */
interface Style {
  title(text: string): string;
  heading(text: string): string;
  line(text: string): string;
  table(rows: readonly TableRow[], head: TableRow): string;
}

const plain: Style = {
  title: (text) => `${text}\n\n`,
  heading: (text) => `\n${text}\n`,
  line: (text) => `  ${text}\n`,
  table: (rows, head) => plainTable(rows, head).replace(/^/gm, "  ").trimEnd().concat("\n"),
};

const markdown: Style = {
  title: (text) => `# ${plainMarkdown(text)}\n\n`,
  heading: (text) => `\n## ${plainMarkdown(text)}\n\n`,
  line: (text) => `- ${plainMarkdown(text)}\n`,
  table: (rows, head) => `${markdownTable(rows, head)}\n`,
};

/** A comparison for a reader. */
export function comparisonText(comparison: Comparison, format: "table" | "markdown"): string {
  const style = format === "markdown" ? markdown : plain;
  const { old, new: now, same, definitions, items, findings } = comparison;
  return [
    style.title(`${old.path} compared with ${now.path}`),
    style.table(summaryRows(old, now), ["", "before", "now"]),
    ...(same ? [style.heading("Nothing changed in the plan"), style.line(nothing)] : []),
    ...definitions.map((change) => definitionText(change, style)),
    ...items.map((change) => itemText(change, style)),
    ...(findings.length > 0
      ? [style.heading("Findings beside the points"), ...findingLines(findings, style)]
      : []),
    `\n${caution}\n`,
  ].join("");
}

const nothing =
  "The points, the cards and limits that they use, and the findings are the same. Prose and layout are not compared.";

function summaryRows(old: RevisionSummary, now: RevisionSummary): readonly TableRow[] {
  const row = (name: string, of: (one: RevisionSummary) => string): TableRow => [name, of(old), of(now)];
  return [
    row("points", ({ points }) => String(points)),
    ...(old.withoutFigures + now.withoutFigures > 0 ? [row("without figures", withoutFigures)] : []),
    ...(["error", "warning", "information", "hint"] as const).map((severity) =>
      row(plurals[severity], ({ findings }) => String(findings[severity])),
    ),
    row("tightest margin", ({ margin }) => tightestText(margin)),
    row("tightest ratio", ({ ratio }) => tightestText(ratio)),
  ];
}

function withoutFigures({ withoutFigures: count, withheldBy }: RevisionSummary): string {
  return withheldBy.length > 0 ? `${count} (${withheldBy.join(", ")})` : String(count);
}

const plurals = { error: "errors", warning: "warnings", information: "information", hint: "hints" };

function tightestText(tightest: Tightest | null): string {
  if (!tightest) return "not known";
  return `${tightest.shown}, line ${tightest.point.line}, ${pointName(tightest.point)}`;
}

function definitionText({ old, new: now, parts }: DefinitionChange, style: Style): string {
  const one = now ?? old;
  if (!one) return "";
  const what = `The ${one.kind} ${one.name}`;
  const [are, have] = one.kind === "card" ? ["is", "has"] : ["are", "have"];
  const place = `${fileName(one.uri)}, ${linesOf(old?.start, now?.start)}`;
  if (!old) return style.heading(`${what} ${are} new (${place})`);
  if (!now) return style.heading(`${what} ${are} gone (${place})`);
  return [
    style.heading(`${what} ${have} changed (${place}): figures change because of it`),
    style.table(
      parts.map((part) => partRow(part, old.start, now.start)),
      partHead,
    ),
  ].join("");
}

const partHead: TableRow = ["what", "before", "now"];

function itemText(change: ItemChange, style: Style): string {
  const { old, new: now, inputs, accepts, results, findings } = change;
  const both = old !== null && now !== null;
  const parts = [...inputs, ...accepts].map((part) => partRow(part, old?.start ?? 0, now?.start ?? 0));
  const figures = both ? results : results.filter(({ name }) => saysMost.has(name));
  const rows = [...parts, ...figures.map(figureRow)];
  return [
    style.heading(headingOf(change)),
    rows.length > 0 ? style.table(rows, partHead) : "",
    ...findingLines(findings, style),
  ].join("");
}

/** What is shown of a point that came or went. */
const saysMost = new Set(["figures", "stall", "warning", "ratio", "margin"]);

function headingOf(change: ItemChange): string {
  const { old, new: now, moved, because } = change;
  const item = now ?? old;
  const name = item?.point ? pointName(item.point) : "Setting";
  const where = `${name}, ${linesOf(old?.start, now?.start)}`;
  if (!old) return `${where}: new`;
  if (!now) return `${where}: gone`;
  if (moved) return `${where}: moved${change.inputs.length + change.accepts.length > 0 ? " and edited" : ""}`;
  if (isEdit(change)) return `${where}: edited`;
  return because.length > 0 ? `${where}: not edited; ${because.join(" and ")} changed` : where;
}

/** "line 4", "line 4, before line 3"; lines count from 0 here and from 1 in the text. */
function linesOf(old: number | undefined, now: number | undefined): string {
  if (now === undefined) return `before line ${(old ?? 0) + 1}`;
  return old === undefined || old === now ? `line ${now + 1}` : `line ${now + 1}, before line ${old + 1}`;
}

function partRow({ old, new: now }: PartChange, before: number, after: number): TableRow {
  const place = linesOf(old ? before + old.line : undefined, now ? after + now.line : undefined);
  return [`${(now ?? old)?.keyword ?? "remark"} (${place})`, old?.text ?? "-", now?.text ?? "-"];
}

function figureRow({ name, old, new: now }: FigureChange): TableRow {
  return [`≈ ${name}`, old?.shown ?? "-", now?.shown ?? "-"];
}

function findingLines(findings: readonly FindingChange[], style: Style): readonly string[] {
  const text = (one: FindingJson) => `${one.severity}: ${one.message} [${one.code}]`;
  return findings.map(({ old, new: now }) => {
    if (!now) return style.line(`gone, ${old ? text(old) : ""}`);
    if (!old) return style.line(`new, ${text(now)}`);
    return style.line(`still there, ${text(now)} Before: ${old.severity}: ${old.message}`);
  });
}
