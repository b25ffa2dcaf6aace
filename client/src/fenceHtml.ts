import type { FencesAnswer } from "../../server/src/lsp/protocol.ts";

type Fences = Omit<NonNullable<FencesAnswer>, "version">;
export type Fence = Fences["fences"][number];
type FenceFinding = Fence["findings"][number];

/** Makes a text safe inside HTML and inside an attribute in double quotes. */
export type Escape = (text: string) => string;

/** A fence as a table of its points with what was found there. Every text in it is the server's own or the author's. */
export function fenceHtml(fence: Fence, { head, caution }: Fences, source: string, escaped: Escape): string {
  const table = fence.rows.length > 0 ? tableHtml(fence, head, escaped) : "";
  const found = findingsHtml(fence.findings, escaped);
  const figures = table || found ? `<p class="plumbline-caution">${escaped(caution)}</p>` : "";
  // Without points the lines themselves are what a reader looks for.
  return block(table + (table ? folded(source, escaped) : sourceHtml(source, escaped)) + found + figures);
}

/** The lines of a fence alone, with the reason why there is nothing else. */
export function waitingHtml(source: string, why: string, escaped: Escape): string {
  return block(`<p class="plumbline-state">${escaped(why)}</p>${sourceHtml(source, escaped)}`);
}

function block(inner: string): string {
  return `<div class="plumbline">${inner}</div>\n`;
}

function tableHtml({ caption, rows }: Fence, head: readonly string[], escaped: Escape): string {
  const columns = head.map((name) => `<th scope="col">${escaped(name)}</th>`).join("");
  const body = rows
    .map((cells) => `<tr>${cells.map((text, column) => cellHtml(text, column, escaped)).join("")}</tr>`)
    .join("");
  // It is wider than a narrow preview: the keyboard must be able to move what is cut off into view.
  return `<div class="plumbline-wide" role="region" tabindex="0" aria-label="${escaped(caption)}"><table><caption>${escaped(caption)}</caption><thead><tr>${columns}</tr></thead><tbody>${body}</tbody></table></div>`;
}

/** The phase names its row; the line before it is only where the point stands. */
function cellHtml(text: string, column: number, escaped: Escape): string {
  return column === 1 ? `<th scope="row">${escaped(text)}</th>` : `<td>${escaped(text)}</td>`;
}

function findingsHtml(findings: readonly FenceFinding[], escaped: Escape): string {
  if (findings.length === 0) return "";
  return `<ul class="plumbline-findings">${findings.map((one) => findingHtml(one, escaped)).join("")}</ul>`;
}

function findingHtml({ line, severity, code, message }: FenceFinding, escaped: Escape): string {
  const word = severity.charAt(0).toUpperCase() + severity.slice(1);
  return `<li class="plumbline-${escaped(severity)}"><strong>${escaped(word)}, line ${line}:</strong> ${escaped(message)} <code>${escaped(code)}</code></li>`;
}

function folded(source: string, escaped: Escape): string {
  return `<details><summary>The lines of this fence</summary>${sourceHtml(source, escaped)}</details>`;
}

function sourceHtml(source: string, escaped: Escape): string {
  // A long line runs out of a narrow preview, as the table does.
  return `<pre tabindex="0"><code>${escaped(source)}</code></pre>`;
}
