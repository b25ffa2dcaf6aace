import { describe, expect, it } from "vitest";
import type { ResultName } from "../../server/src/notation/vocabulary.ts";
import { createFolder } from "../../server/src/plan/createFolder.ts";
import { formatResult } from "../../server/src/plan/format.ts";

const card = `| aircraft wheatear-9; basis vsr; reference 9 t; mass 5 t to 9 t; warning 1.05
| config clean stall 95 kt, load -1 to 3, vfe 331.6 km/h
| wing 32 m2; buffet clean 0.30 0.90, 0.70 0.45; mmo 0.70; vmca 199 km/h

| fly wheatear-9; weight 8 t; config clean; altitude FL100; speed 170 kt
`;

function evaluated(point: string, own = card) {
  const note = createFolder({ today: "2026-12-01" }).open("file:///n.plumb", `${own}\n| ${point}\n`, "plumb");
  const result = note.results().at(-1);
  if (result?.kind !== "point" || !result.point.results) throw new Error("the point has no figures");
  const { results } = result.point;
  const message = (code: string) =>
    note.findings().find(({ finding }) => finding.code === code)?.finding.message;
  const shown = (name: ResultName) => {
    const spread = results[name];
    return spread ? formatResult(name, spread) : "none";
  };
  return { message, shown };
}

it("a message says the load at the stall as every table does", () => {
  const { message, shown } = evaluated("phase cruise; speed 95 kt; bank 30");
  expect(shown("stall-load")).toBe("1.12");
  expect(message("stalled")).toContain("carries 1.12 g and the point needs 1.16 g");
  expect(shown("load")).toBe("1.16");
});

it("a message says the load at buffet onset as every table does", () => {
  const { message, shown } = evaluated("phase cruise; altitude FL390; speed M 0.68; bank 40");
  expect(shown("buffet-load")).toBe("1.22");
  expect(message("buffet-in-turn")).toContain("load factor of 1.22 and 1.31");
  expect(message("buffet-short")).toContain("load factor of 1.22");
});

it("a message says the warning as every table does", () => {
  const { message, shown } = evaluated("phase cruise; contamination 15 %");
  expect(shown("warning")).toBe("95 kt");
  expect(message("stall-before-warning")).toContain("stall comes at 97 kt and the warning at 95 kt");
});

it.each([
  // 91.51 kt to the nearest is 91.5 kt and 91.46 kt rounded up is too: another decimal more tells them apart.
  ["1.00", "", /^The stall and its warning both come at 90 kt, too late/],
  [
    "1.0005",
    "; contamination 0.11 %",
    /^With 0\.1 % of the maximum lift lost, the stall comes at (89\.\d+) kt and the warning at/,
  ],
  ["1.02", "; contamination 4 %", /stall comes at 91\.51 kt and the warning at 91\.46 kt/],
])(
  "a warning of %s times the stall that comes no sooner never reads as sooner%s",
  (factor, clauses, says) => {
    const text = evaluated(
      `phase cruise${clauses}`,
      card.replace("warning 1.05", `warning ${factor}`),
    ).message("stall-before-warning");
    expect(text).toMatch(says);
    const [stall, warning] = (text?.match(/[\d.]+(?= kt)/g) ?? []).map(Number);
    expect(warning ?? 0).toBeLessThanOrEqual(stall ?? 0);
  },
);

it("a greatest speed is said rounded down, a least one up", () => {
  // 331.6 km/h is 179.05 kt, 199 km/h is 107.45 kt.
  expect(evaluated("phase cruise; speed 190 kt").message("over-vfe")).toContain(
    "190 kt exceeds the vfe of clean, 179 kt",
  );
  expect(evaluated("phase cruise; speed 179.4 kt").message("over-vfe")).toContain(
    "179.4 kt exceeds the vfe of clean, 179.0 kt",
  );
  expect(evaluated("phase departure; speed 105 kt").message("below-vmca")).toContain("air, 108 kt");
});

it("a claim that a narrow `within` finds stale never reads as what it is now", () => {
  const { message } = evaluated("phase cruise; claim margin 1.89 within 0.0001");
  expect(message("claim-stale")).toMatch(/claims margin 1\.89 and it is 1\.89\d+ now/);
});

describe("a claim without figures", () => {
  const found = (points: string) =>
    createFolder({ today: "2026-12-01" })
      .open("file:///n.plumb", `${card}\n${points}\n`, "plumb")
      .findings()
      .map(({ line, finding }) => `${line} ${finding.code}: ${finding.message}`)
      .filter((one) => /claim|missing-unit/.test(one));

  it("is left to what the point itself is told", () => {
    expect(found("| phase cruise; weight 5; claim stall 90 kt")).toEqual([
      "6 missing-unit: Weight 5 of what? Write 5 t, 5 kg or 5 lb.",
    ]);
  });

  it("names the line that is to be mended where that is another", () => {
    expect(found("| weight 5\n\n| phase cruise; claim stall 90 kt")[1]).toBe(
      "8 claim-unchecked: The stall that is claimed cannot be checked, for it is not known here. Line 7 has to be mended first (missing-unit).",
    );
  });

  it("that promises too much is told so, one that promises too little is not", () => {
    expect(found("| phase cruise; claim vs1g 80 kt")[0]).toMatch(/kt now, so that it promises too much: /);
    expect(found("| phase cruise; claim vs1g 95 kt")[0]).toMatch(/kt now: check/);
  });
});

it("what nobody stated is told with what to write", () => {
  const note = createFolder({ today: "2026-12-01" }).open(
    "file:///n.plumb",
    "| phase cruise; altitude FL100; speed 200 kt\n",
    "plumb",
  );
  expect(note.findings().map(({ finding }) => finding.message)).toContain(
    "This point needs an aeroplane, a weight and a configuration, and no line up to here states them: write `fly NAME`, `weight … t` and `config NAME` here, or in a setting before it.",
  );
});

it("a reference speed without its configuration says how a card marks one", () => {
  const note = createFolder({ today: "2026-12-01" }).open(
    "file:///n.plumb",
    `${card}\n| phase landing; altitude 500 ft; speed vref + 5 kt\n`,
    "plumb",
  );
  expect(note.findings().map(({ finding }) => finding.message)).toContain(
    "vref is not known in the configuration clean. The card marks no configuration landing. Mark the configuration in the card (`config NAME …, landing`), fly one that is, or state the speed in knots.",
  );
});

it("a message tells nobody to fly faster where the wing carries less then", () => {
  const steep = card
    .replace("| wing", "| lift-mach clean 0.30 1.00, 0.60 0.50, 0.79 0.20\n| wing")
    .replace(/; buffet.*; mmo 0.70/, ", chord 2 m, slope 0.00 5, 0.80 6 per rad");
  const { message } = evaluated("phase cruise; altitude FL250; speed M 0.77; bank 70", steep);
  expect(message("stalled")).toMatch(
    /^Stalled: at 324 kt the wing carries 2\.77 g and the point needs 2\.93 g, for at M 0\.770 it carries less than slower\. Fly slower or lower, bank less/,
  );
  const near = evaluated("phase cruise; altitude FL250; speed M 0.74; bank 10; gust 60 ft/s", steep);
  expect(near.message("gust-over-stall")).toContain("fly slower, lower, lighter, or bank less");
  const rated = evaluated("phase cruise; altitude FL250; speed M 0.77; bank 62", steep);
  expect(rated.message("overshoot-short")).toContain("bank less or fly slower or lower");
  const slow = evaluated("phase cruise; altitude FL250; speed 95 kt; bank 30; gust 30 ft/s", steep);
  expect(slow.message("stalled")).toContain("Fly faster, bank less");
  expect(slow.message("gust-over-stall")).toContain("fly faster, lighter");
});
