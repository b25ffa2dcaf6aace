import fc from "fast-check";
import MarkdownIt from "markdown-it";
import { describe, expect, it } from "vitest";
import { extendMarkdownIt, type Figures, type PreviewParser } from "../../client/src/markdownPreview.ts";
import { caution } from "../../server/src/plan/caution.ts";
import { fences } from "../../server/src/report/fences.ts";
import { pointsTable } from "../../server/src/report/pointsTable.ts";
import { besideDemo } from "../support/besideDemo.ts";
import { demoFiles, noteText } from "../support/sampleText.ts";

const uri = "file:///demo/note.md";

/** What the preview shows of a text, while the server has answered for another one, or for it. */
function preview(text: string, answeredFor = text): string {
  const note = besideDemo(answeredFor, "markdown");
  const figuresOf = (of: string, drawn: string): Figures =>
    of === uri && drawn === answeredFor.replace(/\r\n?/g, "\n").replaceAll("\0", "\uFFFD")
      ? { kind: "known", answer: { ...fences(note), version: 1 } }
      : { kind: "coming" };
  const parser = new MarkdownIt();
  extendMarkdownIt(parser as unknown as PreviewParser, figuresOf);
  // As the editor does it: the note's address is only known when the tokens are drawn.
  const tokens = parser.parse(text, {});
  return parser.renderer.render(tokens, parser.options, { currentDocument: uri });
}

const briefing = demoFiles.find(({ name }) => name === "contingency-briefing.md")?.text ?? "";
const turn = (title: string, bank: string) => `# Note

\`\`\`plumb
| fly brambling-37; under shuttle-rules; weight 56.4 t
| phase departure "${title}"; config flaps-5; altitude 3200 ft; speed 195 kt; bank ${bank}
\`\`\`
`;

describe("the preview of a note", () => {
  it("draws each point with the figures of the points table, under their heads, and says what was found", () => {
    const shown = preview(briefing);
    const note = besideDemo(briefing, "markdown");
    const { head: columns, rows } = pointsTable(note);
    expect(rows.length).toBeGreaterThan(2);
    for (const [line, phase, ...cells] of rows) {
      const name = (phase ?? "").replaceAll('"', "&quot;");
      const row = `<tr><td>${line}</td><th scope="row">${name}</th>${cells.map((cell) => `<td>${cell}</td>`).join("")}</tr>`;
      expect(shown).toContain(row);
    }
    for (const head of columns) expect(shown).toContain(`<th scope="col">${head}</th>`);
    expect(note.findings().length).toBeGreaterThan(0);
    for (const { finding } of note.findings()) expect(shown).toContain(`<code>${finding.code}</code>`);
    expect(shown.split(caution).length - 1).toBe(2);
    expect(shown.match(/<caption>Points of lines \d+ to \d+<\/caption>/g)).toHaveLength(2);
  });

  it("draws the lines and no figure while the answer is for another text", () => {
    const shown = preview(turn("Turn", "25"), turn("Turn", "26"));
    expect(shown).toContain("Figures are coming.");
    expect(shown).toContain("bank 25");
    expect(shown).not.toContain("<table");
    expect(preview(turn("Turn", "25"))).toContain("<table");
  });

  it("draws no mark of an author's text", () => {
    const shown = preview(turn("<img src=x onerror=alert(1)> & '", "35"));
    expect(shown).not.toContain("<img");
    expect(shown).toContain("&lt;img src=x onerror=alert(1)&gt; &amp; '");
    fc.assert(
      fc.property(noteText, (text) => {
        const inside = preview(`\`\`\`plumb\n${text.replace(/[`~]/g, "<b>")}\n\`\`\`\n`);
        expect(inside).not.toMatch(/<(?:b>|img|script)/);
      }),
      { numRuns: 100 },
    );
  });

  it("leaves other fences alone, and says of one inside a quotation that it is not read", () => {
    expect(preview("```js\n1 < 2\n```\n")).toBe(new MarkdownIt().render("```js\n1 < 2\n```\n"));
    expect(preview("```plumbing\n| phase hold\n```\n")).not.toContain("plumbline");
    const quoted = preview("> ```plumb\n> | phase hold\n> ```\n");
    expect(quoted).toContain("does not read this fence");
    expect(quoted).not.toContain("<table");
  });

  it("finds its fences at every line end, and one that nothing closes", () => {
    const text = turn("Turn", "25");
    for (const end of ["\r\n", "\r"]) expect(preview(text.replaceAll("\n", end))).toContain("<table");
    expect(preview(text.slice(0, text.lastIndexOf("```")))).toContain("<table");
    expect(preview(`${text}\n${text}`).match(/<table/g)).toHaveLength(2);
  });

  it("draws the lines of a fence without points, with what was found in them", () => {
    const shown = preview("```plumb\n| fly wheatear-77\n```\n");
    expect(shown).not.toContain("<table");
    expect(shown).toContain("<pre");
    expect(shown).toContain("<code>unknown-aircraft</code>");
  });
});
