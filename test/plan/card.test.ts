import { describe, expect, it } from "vitest";
import type { Card } from "../../server/src/plan/card.ts";
import { createFolder } from "../../server/src/plan/createFolder.ts";
import { fileJson } from "../../server/src/report/pointsJson.ts";

const base =
  "| aircraft a-1; basis vsr; reference 55 t\n| config clean stall 138 kt, load -1 to 2.5\n| config full stall 106 kt, vfe 178 kt, landing\n";

function read(text: string): { card: Card; told: string[] } {
  const note = createFolder({ today: "2026-12-01" }).open("file:///cards.plumb", text, "plumb");
  const [result] = note.results();
  if (result?.kind !== "card") throw new Error("The first block is no card.");
  return { card: result.card, told: note.findings().map(({ line, finding }) => `${line} ${finding.code}`) };
}

/** What a point in `clean` gives of a card, in a note of its own. */
function flown(card: string) {
  const text = `${card.trimEnd()}\n\n| fly a-1; weight 55 t; config clean; altitude FL200; speed 220 kt\n\n| phase cruise; bank 20\n`;
  return fileJson(createFolder({ today: "2026-12-01" }).open("file:///note.plumb", text, "plumb"), "note")
    .points[0];
}

describe("a card", () => {
  it("is read in SI", () => {
    const { card, told } = read(
      `${base}| vmo 318 kt; mmo 0.79; ceiling FL385; warning 1.03; mass 33 t to 59 t, landing 53 t\n| source "x" issue 3, from 2026-03-01\n`,
    );
    expect(told).toEqual([]);
    expect(card).toMatchObject({
      name: "a-1",
      withheld: null,
      basis: { value: { kind: "vsr", factor: 1 } },
      source: { title: "x", issue: "3", from: "2026-03-01" },
    });
    expect(card.referenceMass?.value).toBe(55_000);
    expect(card.mass?.value).toEqual({ low: 33_000, high: 59_000 });
    expect(card.landingMass?.value).toBe(53_000);
    expect(card.ceiling?.value).toBeCloseTo(38_500 * 0.3048, 9);
    expect(card.configurations.map((one) => one.name)).toEqual(["clean", "full"]);
    expect(card.configurations[0]?.stallSpeed).toBeCloseTo((138 * 1852) / 3600, 12);
  });

  it("on the vs basis gives the 1-g speed by its factor", () => {
    expect(read(base.replace("vsr", "vs 0.94")).card.configurations[0]?.stallSpeed).toBeCloseTo(
      (138 * 1852) / 3600 / 0.94,
      12,
    );
  });

  it.each([
    ["no basis", base.replace("basis vsr; ", ""), ["0 missing-value"]],
    ["no reference", base.replace("; reference 55 t", ""), ["0 missing-value"]],
    ["no stall speed", base.replace("stall 138 kt, ", ""), ["1 missing-value"]],
    ["no factor of vs", base.replace("vsr", "vs"), ["0 missing-argument"]],
    ["a factor that cannot be", base.replace("vsr", "vs 1.94"), ["0 out-of-range"]],
    ["a table that does not rise", `${base}| lift-mach clean 0.5 1.00, 0.3 0.9`, ["3 bad-table"]],
    [
      "a lift table whose first factor is not 1",
      `${base}| lift-mach clean 0.3 0.95, 0.5 0.9`,
      ["3 bad-table"],
    ],
    [
      "a lift table that begins below the stall",
      `${base}| lift-mach clean 0.1 1.00, 0.5 0.9`,
      ["3 bad-table"],
    ],
    ["a cg factor above 1 on VSR", `${base}| cg-effect 14 % 1.01, 30 % 0.98`, ["3 bad-table"]],
    ["buffet beyond the stall", `${base}| wing 104 m2; buffet clean 0.40 2.9, 0.79 0.62`, ["3 bad-table"]],
    [
      "a table of a configuration that is none",
      `${base}| buffet slats 0.40 1.2, 0.79 0.62`,
      ["3 unknown-config"],
    ],
    ["an indicated speed without a table", `${base}| vmo 318 kt ias`, ["3 missing-value"]],
    [
      "an ias table that does not rise in both columns",
      `${base}| ias clean 40 kt 50 kt, 60 kt 50 kt`,
      ["3 bad-table"],
    ],
    ["a range that falls", base.replace("-1 to 2.5", "2.5 to -1"), ["1 out-of-range"]],
    ["one configuration twice", `${base}| config clean stall 140 kt`, ["3 duplicate-clause"]],
    ["a keyword that is none", `${base}| vnoo 118 kt`, ["3 unknown-keyword"]],
    [
      "a published speed below the least",
      `${base}| published vref full 45 t 101 kt, 55 t 131 kt`,
      ["3 published-below-least"],
    ],
  ])("with %s is told", (_, text, told) => expect(read(text).told).toEqual(told));
});

describe("nothing is computed from what is in error", () => {
  it.each([
    ["a lift table", `${base}| lift-mach clean 0.3 0.95, 0.5 0.9`],
    ["a lift table without a configuration", `${base}| lift-mach`],
    ["the cg effect", `${base}| cg-effect 14 % 1.01, 30 % 0.98`],
    ["an unknown keyword", `${base}| lift-mahc clean 0.3 1.00, 0.5 0.9`],
    ["the basis", base.replace("vsr", "vs 9")],
    ["a configuration given twice", `${base}| config clean stall 140 kt`],
    ["a configuration in error", base.replace("138 kt", "138")],
  ])("%s withholds the figures", (_, card) => {
    expect(flown(card)).toMatchObject({ stall_kt: null, margin: null, ratio: null, speed: null });
    expect(flown(card)?.withheld).not.toBeNull();
  });

  it.each([
    ["the buffet table", `${base}| wing 104 m2; buffet clean 0.40 2.9, 0.79 0.62`, "buffet_load"],
    ["the warning", `${base}| warning 9`, "warning_kt"],
    ["the limit load factors", base.replace("-1 to 2.5", "2.5 to -1"), "va_kt"],
  ])("%s withholds what depends on it alone", (_, card, field) => {
    const point = flown(card);
    expect(point?.[field]).toBeNull();
    expect(point?.stall_kt).toBeGreaterThan(100);
  });

  it("a card without one value has no check for it, and says so", () => {
    expect(flown(base)?.not_evaluated).toContainEqual({
      rule: "over-vmo",
      why: "The card a-1 states no vmo.",
    });
  });

  it("an indicated limit is compared through the table at the load that is flown", () => {
    const text = `${base}| ias clean 100 kt 105 kt, 200 kt 204 kt, 300 kt 303 kt\n| vmo 216 kt ias\n`;
    const note = (speed: string) =>
      createFolder({ today: "2026-12-01" }).open(
        "file:///n.plumb",
        `${text}\n| fly a-1; weight 55 t; config clean; altitude FL100; speed ${speed}\n\n| phase cruise\n`,
        "plumb",
      );
    const codes = (speed: string) =>
      note(speed)
        .findings()
        .map(({ finding }) => finding.code);
    expect(codes("219 kt")).not.toContain("over-vmo");
    expect(codes("220 kt")).toContain("over-vmo");
    expect(codes("216 kt ias")).not.toContain("over-vmo");
  });
});
