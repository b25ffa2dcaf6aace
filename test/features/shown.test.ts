import { describe, expect, it } from "vitest";
import { type CopyForm, copiedText } from "../../server/src/features/copiedText.ts";
import { allHintKinds, type HintKind } from "../../server/src/features/hintKinds.ts";
import { inlayHints } from "../../server/src/features/inlayHints.ts";
import { readLine } from "../../server/src/features/readLine.ts";
import { readSettings, standardSettings } from "../../server/src/lsp/settings.ts";
import type { Flavour } from "../../server/src/notation/document.ts";
import { caution } from "../../server/src/plan/caution.ts";
import { besideDemo } from "../support/besideDemo.ts";

const turn = `The first turn.

| fly brambling-37; under shuttle-rules; weight 56.4 t +- 0.4 t; qnh 985 hPa

| phase departure "Noise turn"
| burn 380 kg; config flaps-5; altitude 3200 ft; speed M 0.31
| bank 35 left
`;

const hintsOf = (text: string, kinds: readonly HintKind[], flavour: Flavour = "plumb") =>
  inlayHints(besideDemo(text, flavour), 0, 20, "full", kinds).map(({ kind }) => kind);

describe("kinds of hints", () => {
  it("part what is shown: each hint is of one kind, and shown with that kind alone", () => {
    const all = hintsOf(turn, allHintKinds);
    expect(all).toEqual(["points", "weights", "altitudes", "speeds", "banks"]);
    for (const kind of allHintKinds) expect(hintsOf(turn, [kind])).toEqual(all.filter((one) => one === kind));
    expect(
      hintsOf("| aircraft gull-1; basis vsr; reference 9 t; config clean stall 95 kt\n", ["cards"]),
    ).toEqual(["cards"]);
  });

  it("leave the point's hint as the only one in Markdown", () => {
    const text = `\`\`\`plumb\n${turn}\`\`\`\n`;
    expect(hintsOf(text, allHintKinds, "markdown")).toEqual(["points"]);
    expect(hintsOf(text, ["banks", "weights"], "markdown")).toEqual([]);
  });

  it("are read from the settings; an unknown name brings nothing back", () => {
    expect(readSettings({ hints: { level: "brief", kinds: ["banks", "bnaks"] } })).toEqual({
      ...standardSettings,
      hints: "brief",
      kinds: ["banks"],
    });
    expect(readSettings({ hints: { kinds: [] } }).kinds).toEqual([]);
    for (const raw of [null, {}, { hints: { kinds: "banks" } }])
      expect(readSettings(raw).kinds).toEqual(allHintKinds);
  });
});

describe("a line that is read", () => {
  const read = (text: string, line: number, flavour: Flavour = "plumb") =>
    readLine(besideDemo(text, flavour), line);

  it("is one sentence with every value and finding, without a mark that stands for a word", () => {
    expect(read(turn, 4)).toBe(
      "Line 5, departure, Noise turn; phase: margin 1.34, ratio 1.48, stall 142 kt, warning 147 kt.",
    );
    const bank = read(turn, 6);
    expect(bank).toMatch(
      /^Line 7, departure, Noise turn; bank: warning at 61°, load 1\.23, radius \d\.\d\d nm; error: Bank 35° exceeds the 30° .*\.$/,
    );
    expect(bank).not.toMatch(/≈|…|;;|\.\.|\|/);
  });

  it("has the same values in Markdown, where hints have less room", () => {
    const fence = `\`\`\`plumb\n${turn}\`\`\`\n`;
    for (let line = 0; line < 7; line++)
      expect(read(fence, line + 1, "markdown").replace(/^Line \d+/, "")).toBe(
        read(turn, line).replace(/^Line \d+/, ""),
      );
  });

  it("says that there is nothing, or what there is nearby", () => {
    expect(read(turn, 0)).toBe("Line 1 is prose, and nothing is computed for it.");
    expect(read(turn, 2)).toBe("Line 3, setting; no value of its own.");
    expect(read("| phase hold\n| aside\n", 1)).toMatch(
      /^Line 2, hold, aside; no value of its own; the point has /,
    );
  });

  it("says why figures wait", () => {
    const broken = turn.replace("56.4 t +- 0.4 t", "56.4");
    expect(read(broken, 4)).toBe(
      "Line 5, departure, Noise turn; phase: no figures: line 3 has to be mended first (missing-unit).",
    );
  });
});

describe("copied lines", () => {
  const copied = (form: CopyForm, from = 4, to = 6, text = turn) =>
    copiedText(besideDemo(text), from, to, form);

  it("are the lines with their values, findings and the caution, in every form", () => {
    for (const form of ["text", "markdown", "html"] as const) {
      const text = copied(form).replaceAll("\\", "").replaceAll("&#39;", "'");
      for (const part of ["margin 1.34, ratio 1.48", "warning at 61°", "56.02 t", "bank-over-limit", caution])
        expect(text).toContain(part);
      expect(text).not.toContain("The first turn");
    }
  });

  it("read as text as the editor shows them", () => {
    const [first, , last] = copied("text").split("\n");
    expect(first).toBe(
      '| phase departure "Noise turn" ≈ margin 1.34, ratio 1.48, stall 142 kt, warning 147 kt',
    );
    expect(last).toMatch(/^\| bank 35 left ≈ warning at 61°, load 1\.23, radius \d\.\d\d nm$/);
  });

  it("are a table of three columns in Markdown, whatever stands in them", () => {
    const rows = copied("markdown").split("\n").slice(0, 5);
    for (const row of rows) expect(row.replaceAll(/\\./g, "").split("|")).toHaveLength(5);
    expect(rows[2]).toContain("\\| phase departure");
  });

  it("draw no mark of the author's in HTML", () => {
    const html = copied("html", 4, 6, turn.replace("Noise turn", "<img src=x> & more"));
    expect(html).not.toContain("<img");
    expect(html).toContain("&lt;img src=x&gt; &amp; more");
    expect(html).toContain('<th scope="col">Values</th>');
  });

  it("end where the note does", () => {
    expect(copied("text", 6, 400)).toContain("bank 35 left");
  });
});
