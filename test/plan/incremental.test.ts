import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { createFolder } from "../../server/src/plan/createFolder.ts";
import { fileJson } from "../../server/src/report/pointsJson.ts";
import { demoFiles, notationLine } from "../support/sampleText.ts";

const uri = "file:///demo/note.plumb";

function demo() {
  const folder = createFolder({ today: "2026-12-01" });
  for (const { name, text, flavour } of demoFiles) folder.open(`file:///demo/${name}`, text, flavour);
  return folder;
}

const pieces = [
  "",
  "Prose.",
  "| phase departure",
  "| phase landing; aside",
  "| phase takeoff",
  "| weight 55 t +- 0.3 t",
  "| burn 400 kg",
  "| altitude 3000 ft",
  "| altitude FL350",
  "| config flaps-5; speed 190 kt",
  "| config flaps-30; speed vref + 5 kt",
  "| config clean; speed M 0.74 +- 0.02",
  "| bank 25 left",
  "| bank rate-one",
  "| isa +5",
  "| oat -5 C",
  "| fly gorsechat-2",
  "| fly brambling-37; under shuttle-rules",
  "| fly nobody",
  "| wieght 5 t",
  "| engine-out left",
  "| contamination frost",
  "| claim stall 120 kt",
  "| load 0.5",
  '| aircraft wheatear-9 "invented"; basis vsr; reference 9 t',
  "| config clean stall 90 kt",
  "| limits own-rules, from common-practice",
  "| must any bank 20",
  "| fly wheatear-9; under own-rules",
];

describe("an edited note", () => {
  it("says what it would say if it were opened anew", () => {
    const line = fc.oneof(
      { weight: 8, arbitrary: fc.constantFrom(...pieces) },
      { weight: 1, arbitrary: notationLine },
    );
    const edit = fc.record({
      from: fc.nat({ max: 24 }),
      count: fc.nat({ max: 3 }),
      lines: fc.array(line, { maxLength: 3 }),
    });
    fc.assert(
      fc.property(
        fc.array(line, { maxLength: 24 }),
        fc.array(edit, { minLength: 1, maxLength: 6 }),
        (start, edits) => {
          const folder = demo();
          const note = folder.open(uri, `| fly brambling-37\n${start.join("\n")}\n`, "plumb");
          for (const { from, count, lines } of edits) {
            note.edit(
              { line: from, character: 0 },
              { line: from + count, character: 0 },
              lines.map((one) => `${one}\n`).join(""),
            );
            const fresh = demo();
            const anew = fresh.open(uri, note.document.text(), "plumb");
            expect(fileJson(note, "note")).toEqual(fileJson(anew, "note"));
          }
        },
      ),
      { numRuns: 250 },
    );
  });

  const card = "| aircraft wheatear-9; basis vsr; reference 9 t\n| config clean stall 90 kt\n";
  const start = "| fly wheatear-9; weight 8 t; config clean; altitude FL100; speed 150 kt\n\n";
  const low = "| phase cruise; altitude FL110\n\n| phase landing";
  it.each([
    ["a value that is carried over", `${card}\n${start}${low}`, "carried-over"],
    ["one that is accepted", `${card}\n${start}${low}; accept carried-over because "x"`, "carried-over"],
    ["one that is expected", `${card}\n${start}${low}; expect carried-over`, "carried-over"],
    ["one that is not", `${card}\n${start}${low}; expect not carried-over`, "not-as-expected"],
    [
      "a sweep",
      `${card}\n${start}| phase cruise; speed 130 kt to 150 kt by 5 kt\n\n| phase cruise`,
      "missing-value",
    ],
    ["a card in error below", `${start}Prose.\n\n${card.replace("90 kt", "90")}`, "broken-definition"],
    [
      "limits in error below",
      "| under own\n\nProse.\n\n| limits own\n| must any bnk 20\n",
      "broken-definition",
    ],
    [
      "a line that a claim waits for",
      `${card}\n${start.replace("8 t", "8")}Prose.\n\n| phase cruise; claim stall 90 kt`,
      "claim-unchecked",
    ],
    ["a card of nearly that name", `${start.replace("r-9", "r-8")}Prose.\n\n${card}`, "unknown-aircraft"],
  ])("names in its messages the line where %s stands now", (_, text, code) => {
    for (const line of [0, text.split("\n").indexOf("Prose.")].filter((one) => 0 <= one)) {
      const folder = createFolder({ today: "2026-12-01" });
      const note = folder.open(uri, `Before.\n\n${text}\n`, "plumb");
      expect(note.findings().map(({ finding }) => finding.code)).toContain(code);
      note.edit({ line, character: 0 }, { line, character: 0 }, "One more line.\n");
      const anew = createFolder({ today: "2026-12-01" }).open(uri, note.document.text(), "plumb");
      expect(fileJson(note, "note")).toEqual(fileJson(anew, "note"));
    }
  });

  it("names another note by its file, for its lines move without this one being told", () => {
    const folder = createFolder({ today: "2026-12-01" });
    const cards = folder.open(
      "file:///demo/cards.plumb",
      `Prose.\n\n${card.replace("90 kt", "90")}`,
      "plumb",
    );
    const note = folder.open(uri, start, "plumb");
    const told = () => note.findings().map(({ finding }) => finding.message);
    expect(told()).toContainEqual(expect.stringContaining("has an error in cards.plumb, and"));
    cards.edit({ line: 0, character: 0 }, { line: 0, character: 0 }, "More.\n");
    expect(told()).toContainEqual(expect.stringContaining("has an error in cards.plumb, and"));
  });

  it("shows no figure that is not a number, whatever it says", () => {
    const line = fc.oneof(
      { weight: 3, arbitrary: fc.constantFrom(...pieces) },
      { weight: 2, arbitrary: notationLine },
    );
    fc.assert(
      fc.property(fc.array(line, { maxLength: 24 }), (lines) => {
        const note = demo().open(
          uri,
          `| fly brambling-37; weight 50 t; config clean; altitude FL100; speed 220 kt\n\n${lines.join("\n")}`,
          "plumb",
        );
        const text = JSON.stringify(fileJson(note, "note"), (_, value) => {
          if (typeof value === "number") expect(Number.isFinite(value)).toBe(true);
          if (typeof value === "string")
            expect(value).not.toMatch(/NaN|Infinity|undefined|unknown (?:kt|t|nm)/);
          return value;
        });
        expect(text).not.toBe("");
      }),
      { numRuns: 400 },
    );
  });
});
