import { describe, expect, it } from "vitest";
import { codeActions } from "../../server/src/features/codeActions.ts";
import { completion } from "../../server/src/features/completion.ts";
import { definition } from "../../server/src/features/definition.ts";
import { hover } from "../../server/src/features/hover.ts";
import { type HintLevel, inlayHints } from "../../server/src/features/inlayHints.ts";
import type { Flavour } from "../../server/src/notation/document.ts";
import { createFolder } from "../../server/src/plan/createFolder.ts";
import { lineOf } from "../../server/src/plan/origin.ts";
import { plainTable, tableHead, tableRows } from "../../server/src/report/pointsTable.ts";
import { atCursor } from "../support/fixture.ts";
import { demoFiles } from "../support/sampleText.ts";

const uri = "file:///demo/note.plumb";

function open(text: string, flavour: Flavour = "plumb") {
  const folder = createFolder({ today: "2026-12-01" });
  for (const file of demoFiles) folder.open(`file:///demo/${file.name}`, file.text, file.flavour);
  return folder.open(uri, text, flavour);
}

function hints(text: string, level: HintLevel = "full", flavour: Flavour = "plumb"): string[] {
  const note = open(text, flavour);
  return inlayHints(note, 0, note.document.lineCount - 1, level).map(
    ({ line, character, parts }) => `${line}:${character} ${parts.map((part) => part.text).join("")}`,
  );
}

const turn = `| fly brambling-37; under shuttle-rules; weight 56.4 t +- 0.4 t; qnh 985 hPa

| phase departure "Noise turn"
| burn 380 kg; config flaps-5; altitude 3200 ft; speed M 0.31
| bank 25 left
`;

describe("hints", () => {
  it("stand at the end of their clauses, full", () => {
    expect(hints(turn)).toEqual([
      "2:30 ≈ margin 1.41, ratio 1.48, stall 135 kt, warning 140 kt",
      "3:13 ≈ 56.02 t, vs1g 129 kt",
      "3:47 ≈ FL039",
      "3:61 ≈ 191 kt, 202 kt tas",
      "4:14 ≈ warning at 61°, load 1.11, radius 1.28 nm",
    ]);
  });

  it("say less when brief, and nothing when off", () => {
    expect(hints(turn, "brief")).toEqual([
      "2:30 ≈ margin 1.41, ratio 1.48",
      "3:61 ≈ 191 kt",
      "4:14 ≈ warning at 61°",
    ]);
    expect(hints(turn, "off")).toEqual([]);
  });

  it("keep their places and say `≈ …` while a line has an error", () => {
    const broken = turn.replace("56.4 t +-", "56.4 +- ").replace("0.4 t;", "0.4;");
    expect(hints(broken)).toEqual(["2:30 ≈ …", "3:13 ≈ …", "3:47 ≈ …", "3:61 ≈ …", "4:14 ≈ …"]);
  });

  it("are one a line in Markdown, and never longer than the editor draws", () => {
    const text = `\`\`\`plumb\n${turn}\`\`\`\n`;
    expect(hints(text, "full", "markdown")).toEqual(["3:30 ≈ margin 1.41, ratio 1.48, stall 135 kt"]);
  });

  it("show each configuration's 1-g stall speed in a card", () => {
    expect(hints("| aircraft twite-4; basis vs 0.94; reference 4 t\n| config clean stall 94 kt")).toEqual([
      "1:26 ≈ vs1g 100 kt at 4000 kg",
    ]);
  });

  it("are made for the lines asked for alone", () => {
    const note = open(turn);
    expect(inlayHints(note, 4, 4, "full").map((hint) => hint.line)).toEqual([4]);
  });
});

describe("one formatter", () => {
  it("writes the same figure in hint, hover, table and message", () => {
    const text = `| fly brambling-37; under shuttle-rules; weight 56 t; rules ifr\n\n| phase departure; config flaps-5; altitude FL050; speed 195 kt; bank 35; claim stall 130 kt\n`;
    const note = open(text);
    const [hint] = hints(text).filter((one) => one.includes("margin"));
    const stall = /stall (\d+ kt)/.exec(hint ?? "")?.[1] ?? "";
    const bank = /warning at (\d+°)/.exec(hints(text).join(" "))?.[1] ?? "";
    const margin = /margin (\d\.\d\d)/.exec(hint ?? "")?.[1] ?? "";
    expect([stall, bank, margin].every((one) => one.length > 2)).toBe(true);
    const shown = hover(note, 2, 5)?.text ?? "";
    const table = plainTable(tableRows(note), tableHead);
    const messages = note
      .findings()
      .map(({ finding }) => finding.message)
      .join("\n");
    for (const [where, said] of [
      ["hover", shown],
      ["table", table],
    ] as const) {
      for (const figure of [stall, bank, margin]) expect(said, where).toContain(figure);
    }
    expect(messages).toContain(`it is ${stall} now`);
    expect(messages).toContain(`the warning would come at ${bank}`);
    const claims = completion(
      open(text.replace("claim stall 130 kt", "claim ")),
      2,
      text.split("\n")[2]?.indexOf("claim ") === undefined
        ? 0
        : (text.split("\n")[2] as string).indexOf("claim ") + 6,
    );
    expect(claims.find((one) => one.label === "stall")?.insertText).toBe(`stall ${stall}`);
  });
});

describe("hover", () => {
  it("derives the result with the source line of each input, the rule and what is absent", () => {
    const text = hover(open(turn), 4, 4)?.text ?? "";
    expect(text).toMatch(/n = cos 0\.0° \/ cos 25° = 1\.11/);
    expect(text).toContain("56.02 t (line 4)");
    expect(text).toContain("flaps-5 (line 4)");
    expect(text).toContain(
      "must any bank 30: 25°, at most 30°, kept *(operations manual 8.3; limits.plumb, line 8)*",
    );
    expect(text).toContain("Assumed: level flight, ISA, no contamination, worst cg, power off, all engines.");
    expect(text).toContain("The card has no buffet table for flaps-5.");
    expect(text).toContain("half of it");
    expect(text).toContain("a skid stalls earlier");
    expect(text).toContain("issue 3");
  });

  it("names the line that figures wait for", () => {
    const text =
      hover(open(turn.replace("56.4 t +-", "56.4 +-").replace("0.4 t;", "0.4;")), 2, 4)?.text ?? "";
    expect(text).toMatch(/^No figures: line 1 has to be mended first \(`missing-unit`\)\./);
  });

  it("shows a card, limits, and the documentation of a keyword", () => {
    expect(hover(open(turn), 0, 8)?.text).toContain("Brambling 37, an invented twin jet");
    expect(hover(open(turn), 0, 28)?.text).toContain("must any bank 30");
    expect(hover(open("| qnh 1013 hPa"), 0, 3)?.text).toContain("altimeter setting");
    expect(hover(open("Prose."), 0, 3)).toBeNull();
  });
});

describe("definition", () => {
  it.each([
    ["| fly bram$0bling-37", "aeroplanes.plumb", "| aircraft brambling-37"],
    ["| under shuttle$0-rules", "limits.plumb", "| limits shuttle-rules"],
    ["| fly brambling-37; config flaps$0-15", "aeroplanes.plumb", "| config flaps-15"],
    ["| fly brambling-37; contamination fr$0ost", "aeroplanes.plumb", "| contamination frost"],
  ])("%s goes to %s", (marked, file, line) => {
    const { text, line: at, character } = atCursor(marked);
    const origin = definition(open(text), at, character);
    expect(origin?.uri).toBe(`file:///demo/${file}`);
    const source = demoFiles.find((one) => one.name === file)?.text.split("\n") ?? [];
    expect(source[origin ? lineOf(origin) : 0]).toContain(line);
  });
});

function offered(marked: string): string[] {
  const { text, line, character } = atCursor(marked);
  return completion(open(text), line, character)
    .toSorted((a, b) => a.rank - b.rank)
    .map((one) => one.label);
}

describe("completion", () => {
  it.each([
    ["| fly $0", ["brambling-37", "gorsechat-2"]],
    ["| under $0", ["shuttle-rules", "school-rules", "common-practice"]],
    ["| fly brambling-37; config $0", ["clean", "flaps-5", "flaps-15", "flaps-30"]],
    ["| fly brambling-37\n\n| phase hold; config fl$0; bank 5", ["clean", "flaps-5", "flaps-15", "flaps-30"]],
    ["| rules $0", ["ifr", "vfr"]],
    ["| weight 61.4 $0", ["t", "kg", "lb", "N", "kN"]],
    ["| weight 61.4$0", ["t", "kg", "lb", "N", "kN"]],
    ["| qnh 1013 h$0", ["hPa", "inHg"]],
    ["| engine-out $0", ["left", "right", "none"]],
    ["| should any buffet 1.3 when $0", ["ifr", "vfr", "engine-out"]],
    ["A prose line wei$0", []],
    ["| qnh 1013 hPa (rem$0ark)", []],
    ['| phase hold "ti$0tle"', []],
  ])("%s", (marked, labels) => expect(offered(marked)).toEqual(labels));

  it("offers what a point lacks first, and never what is there", () => {
    const labels = offered("| fly brambling-37\n\n| phase hold; $0");
    expect(labels.slice(0, 5).sort()).toEqual(["altitude", "bank", "config", "speed", "weight"]);
    expect(labels).not.toContain("phase");
    expect(labels).not.toContain("vmo");
  });

  it("offers a phase and an aeroplane first at a block's start", () => {
    expect(offered("| $0").slice(0, 2).sort()).toEqual(["fly", "phase"]);
  });

  it("offers each result with its value now", () => {
    const { text, line, character } = atCursor(`${turn.trimEnd()}; claim $0`);
    const stall = completion(open(text), line, character).find((one) => one.label === "stall");
    expect(stall).toMatchObject({ detail: "135 kt", insertText: "stall 135 kt" });
  });
});

describe("code actions", () => {
  it("mend a name by its nearest, and add the knots that a tolerance lacks", () => {
    const mend = (text: string, code: string) => {
      const note = open(text);
      const action = codeActions(note, 0, note.document.lineCount).find((one) => one.finding?.code === code);
      for (const { line, start, end, newText } of action?.edits ?? [])
        note.edit({ line, character: start }, { line, character: end }, newText);
      return { note, text: note.document.text() };
    };
    expect(mend("| fly brambling-3", "unknown-aircraft").text).toBe("| fly brambling-37");
    const short =
      "| fly brambling-37; weight 50 t +- 2 t; rules vfr\n\n| phase landing; config flaps-30; altitude 700 ft; speed 126 kt\n";
    const { note, text } = mend(short, "ratio-short");
    expect(text).toMatch(/speed 12[789] kt/);
    expect(note.findings().map(({ finding }) => finding.code)).not.toContain("ratio-short");
  });

  it("offer the unit first that brings a weight within the card's masses", () => {
    const titles = (text: string) => codeActions(open(text), 0, 0).map((one) => one.title);
    expect(titles("| fly gorsechat-2; weight 690")[0]).toBe("Write 690 kg");
    expect(titles("| fly brambling-37; weight 110000")[0]).toBe("Write 110000 lb");
    expect(titles("| weight 690")[0]).toBe("Write 690 t");
  });

  it("join a block without a phase to the point above", () => {
    const note = open("| phase hold\n\n| bank 25\n");
    const join = codeActions(note, 2, 2).find((one) => one.title.startsWith("Join"));
    expect(join?.edits).toEqual([{ line: 1, start: 0, end: 0, newText: "", wholeLine: true }]);
  });
});
