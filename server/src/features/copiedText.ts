import { caution } from "../plan/caution.ts";
import { fileName } from "../plan/fileName.ts";
import type { Note } from "../plan/note.ts";
import { escapedHtml } from "../report/escapedHtml.ts";
import { findingsText } from "../report/findingsText.ts";
import { plainMarkdown } from "../report/plainMarkdown.ts";
import { type ValuedLine, valuedLines } from "./valuedLines.ts";

export type CopyForm = "text" | "markdown" | "html";

/**
 * Lines of a note with their values and findings, to be pasted elsewhere; both lines are included and
 * count from 0. The caution goes with them, for the figures leave the editor.
 */
export function copiedText(note: Note, from: number, to: number, form: CopyForm): string {
  const lines = valuedLines(note, from, to);
  const name = fileName(note.uri);
  switch (form) {
    case "text":
      return plainForm(lines, name);
    case "markdown":
      return markdownForm(lines);
    case "html":
      return htmlForm(lines, name);
  }
}

function plainForm(lines: readonly ValuedLine[], name: string): string {
  const findings = findingsText([{ path: name, findings: found(lines) }], (_, text) => text);
  const text = lines.map(({ annotated }) => `${annotated}\n`).join("");
  return `${text}${findings && `\n${findings}`}\n${caution}\n`;
}

function markdownForm(lines: readonly ValuedLine[]): string {
  const rows = filled(lines).map(
    ({ line, text, values }) =>
      `| ${line + 1} | ${cellMarkdown(text)} | ${cellMarkdown(values.join("; "))} |\n`,
  );
  const findings = found(lines).map(
    ({ line, severity, message, code }) =>
      `- Line ${line}, ${severity}: ${plainMarkdown(message)} (\`${code}\`)\n`,
  );
  return `| ${head.join(" | ")} |\n| ---: | --- | --- |\n${rows.join("")}${findings.length > 0 ? "\n" : ""}${findings.join("")}\n${plainMarkdown(caution)}\n`;
}

function htmlForm(lines: readonly ValuedLine[], name: string): string {
  const columns = head.map((one) => `<th scope="col">${one}</th>`).join("");
  const rows = filled(lines).map(
    ({ line, text, values }) =>
      `<tr><th scope="row">${line + 1}</th><td><code>${escapedHtml(text.trim())}</code></td><td>${escapedHtml(values.join("; "))}</td></tr>\n`,
  );
  const findings = found(lines).map(
    ({ line, severity, message, code }) =>
      `<li>Line ${line}, ${severity}: ${escapedHtml(message)} (<code>${escapedHtml(code)}</code>)</li>\n`,
  );
  const list = findings.length > 0 ? `<ul>\n${findings.join("")}</ul>\n` : "";
  return `<table>
<caption>${escapedHtml(name)}</caption>
<thead><tr>${columns}</tr></thead>
<tbody>
${rows.join("")}</tbody>
</table>
${list}<p>${escapedHtml(caution)}</p>
`;
}

const head = ["Line", "Note", "Values"];

function cellMarkdown(text: string): string {
  return plainMarkdown(text.trim().replaceAll("\t", " "));
}

/** A table has no use for blank lines. */
function filled(lines: readonly ValuedLine[]): readonly ValuedLine[] {
  return lines.filter(({ text }) => text.trim() !== "");
}

function found(lines: readonly ValuedLine[]) {
  return lines.flatMap(({ findings }) => findings);
}
