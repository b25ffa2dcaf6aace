import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { codeActions } from "../../server/src/features/codeActions.ts";
import { unitSpelling } from "../../server/src/features/unitSpelling.ts";
import { type QuantityKind, unitInWords, unitOf, unitRule } from "../../server/src/notation/units.ts";
import { createFolder } from "../../server/src/plan/createFolder.ts";
import { catalogue, type FindingCode } from "../../server/src/plan/findings.ts";
import type { Note } from "../../server/src/plan/note.ts";
import { fileJson } from "../../server/src/report/pointsJson.ts";
import { besideDemo } from "../support/besideDemo.ts";
import { demoFiles, noteText } from "../support/sampleText.ts";

function spell(note: Note): Note {
  for (const { line, start, end, newText } of unitSpelling(note).toReversed()) {
    note.edit({ line, character: start }, { line, character: end }, newText);
  }
  return note;
}

const speltAs = (text: string) => spell(besideDemo(text)).document.text();

/** What the clauses say that say something: their bodies without their places. */
function meanings(note: Note): string[] {
  return note.document.blocks.flatMap(({ start, clauses }) =>
    clauses.flatMap(({ line, clause: { body, faulty } }, i) =>
      faulty
        ? []
        : [
            `${start + line} ${i} ${JSON.stringify(body, (key, value) => (/span$/i.test(key) ? undefined : value))}`,
          ],
    ),
  );
}

describe("the spelling of units", () => {
  it.each([
    ["| weight 5 T; speed 250 kts", "| weight 5 t; speed 250 kt"],
    ["| weight 5 KG +- 20 lbs", "| weight 5 kg +- 20 lb"],
    ["| speed 250 knots tas", "| speed 250 kt tas"],
    ["| altitude 3000 Feet; qnh 985 HPA", "| altitude 3000 ft; qnh 985 hPa"],
    ["| burn 2.4 T/H for 35 minutes", "| burn 2.4 t/h for 35 min"],
    ["| oat -42 celsius; isa +6 c", "| oat -42 C; isa +6 C"],
    ["| weight 553 kn", "| weight 553 kN"],
    ["| cg 18 percent", "| cg 18 %"],
    ["| weight ? KG", "| weight ? kg"],
    ["Prose at 250 kts.\n\n| isa +6 (250 kts)", "Prose at 250 kts.\n\n| isa +6 (250 kts)"],
  ])("%s", (before, after) => expect(speltAs(before)).toBe(after));

  it.each([
    "| weight 5",
    "| weight 5 tons",
    "| weight 5 Tonnes",
    "| speed 250",
    "| speed 250 kn",
    "| weight 3.000 kg",
    "| path -3",
    "| gust 30 knots",
    "| oat -4 °C; bank 25°; phase hold",
    "| aircraft a; wing 104 m²",
    "| weight 5 furlongs",
    "| speed M 0.8",
  ])("chooses no meaning: %s stays", (text) => expect(speltAs(text)).toBe(text));

  it.each(demoFiles)(
    "changes no figure of $name, however its units are written",
    ({ text, flavour, name }) => {
      const wild = text.replace(/(?<=^\s*\|.*\d )(?:kt|t|kg|ft|hPa|min)\b(?!\/)/gm, (unit) =>
        unit.toUpperCase(),
      );
      const before = JSON.stringify(fileJson(besideDemo(wild, flavour, name), "").points);
      const note = spell(besideDemo(wild, flavour, name));
      expect(JSON.stringify(fileJson(note, "").points)).toBe(before);
      expect(unitSpelling(note)).toEqual([]);
    },
  );

  it("leaves what every clause says as it is, in any text, and finds nothing more to do", () => {
    fc.assert(
      fc.property(noteText, fc.constantFrom("kts", "KT", "knots", "Knot"), (plain, speed) => {
        const text = plain.replace(/\bkt\b/g, speed).replace(/\b(?:kg|ft)\b/g, (unit) => unit.toUpperCase());
        const before = meanings(besideDemo(text));
        const note = spell(besideDemo(text));
        expect(meanings(note)).toEqual(expect.arrayContaining(before));
        expect(unitSpelling(note)).toEqual([]);
      }),
      { numRuns: 200 },
    );
  });

  it("knows a word for one unit only, and none that the notation reads already", () => {
    const kinds: QuantityKind[] = ["mass", "speed", "altitude", "temperature", "time", "slope", "per cent"];
    for (const word of ["knots", "feet", "kilos", "degrees", "percent", "hours"]) {
      expect(unitOf(word)).toBeNull();
      const units = kinds.flatMap((kind) => unitInWords(word, kind) ?? []);
      expect(new Set(units).size).toBe(1);
    }
    expect(unitInWords("knots", "mass")).toBeNull();
    expect(unitRule("speed").units).toContain(unitInWords("Knots", "speed"));
  });
});

describe("the fix that an editor may take without asking", () => {
  const perFinding = (Object.keys(catalogue) as FindingCode[]).flatMap((code) => {
    const note = createFolder({ today: "2026-12-01" }).open(
      "file:///n.plumb",
      catalogue[code].breaks,
      "plumb",
    );
    const actions = codeActions(note, 0, Number.MAX_SAFE_INTEGER).filter(({ kind }) => kind === "fix");
    return [...new Set(actions.flatMap(({ finding }) => finding ?? []))].map(
      (finding) => [finding.code, actions.filter((one) => one.finding === finding)] as const,
    );
  });
  /** Each way out of these gives the author's number another meaning. */
  const asked = ["missing-unit", "wrong-unit", "ambiguous-number", "bad-quantity"];

  it.each(perFinding)("is one for %s, or none where it would choose what a number means", (code, actions) => {
    expect(actions.filter(({ preferred }) => preferred)).toHaveLength(asked.includes(code) ? 0 : 1);
  });

  it("is the unit that the card's masses leave, and the one that a word means", () => {
    const taken = (text: string) =>
      codeActions(besideDemo(text), 0, 0)
        .filter(({ preferred }) => preferred)
        .map(({ title }) => title);
    expect(taken("| fly gorsechat-2; weight 690")).toEqual(["Write 690 kg"]);
    expect(taken("| speed 250 knots")).toEqual(["Write kt"]);
    expect(taken("| weight 5 tons")).toEqual([]);
    expect(taken("| speed 250")).toEqual([]);
  });
});
