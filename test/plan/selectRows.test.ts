import { describe, expect, it } from "vitest";
import { openDocument } from "../../server/src/notation/openDocument.ts";
import { commonPractice } from "../../server/src/plan/commonPractice.ts";
import type { Limits } from "../../server/src/plan/limits.ts";
import { lowerLimits, resolveLimits } from "../../server/src/plan/lowerLimits.ts";
import { rowsInForce, type Situation } from "../../server/src/plan/selectRows.ts";
import type { Spread } from "../../server/src/plan/spread.ts";

const FEET = 0.3048;

function feet(nominal: number, tolerance = 0): Spread {
  return {
    nominal: nominal * FEET,
    low: (nominal - tolerance) * FEET,
    high: (nominal + tolerance) * FEET,
  };
}

const situation: Situation = {
  phase: "cruise",
  emergency: false,
  rules: "ifr",
  engineOut: false,
  shear: false,
  altitude: feet(10_000),
  pressureAltitude: feet(10_000),
};

function limits(rows: string): Limits {
  const [block] = openDocument(`| limits a\n${rows}`, "plumb").blocks;
  if (!block) throw new Error("The text holds no block.");
  const draft = lowerLimits(block, "file:///limits.plumb");
  expect([...block.findings, ...draft.findings]).toEqual([]);
  return resolveLimits(draft, []);
}

/** The rows in force, and those switched off behind a minus. */
function inForce(rows: string | Limits, changed: Partial<Situation> = {}): string[] {
  const { groups, off } = rowsInForce(typeof rows === "string" ? limits(rows) : rows, {
    ...situation,
    ...changed,
  });
  return [
    ...groups.flatMap((group) => group.rows.map((row) => row.text)),
    ...off.map((row) => `- ${row.text}`),
  ];
}

describe("rows that do not apply drop out", () => {
  it.each<[string, Partial<Situation>, boolean]>([
    ["must cruise bank 30", {}, true],
    ["must climb, cruise bank 30", {}, true],
    ["must climb bank 30", {}, false],
    ["must emergency bank 30", {}, false],
    ["must emergency bank 30", { emergency: true }, true],
    ["must any bank 30 when ifr", {}, true],
    ["must any bank 30 when vfr", {}, false],
    ["must any bank 30 when vfr", { rules: "vfr" }, true],
    ["must any bank 30 when vfr", { rules: null }, true],
    ["must any bank 30 when ifr", { rules: null }, true],
    ["must any bank 30 when engine-out", {}, false],
    ["must any bank 30 when engine-out", { engineOut: true }, true],
    ["must any bank 30 when engine-out when vfr", { engineOut: true }, false],
    ["must any margin 1.1 after shear", {}, false],
    ["must any margin 1.1 after shear", { shear: true }, true],
  ])("%s with %j: %s", (row, changed, holds) => {
    expect(inForce(`| ${row}`, changed)).toEqual(holds ? [row] : []);
  });
});

describe("a level", () => {
  it.each<[string, Spread, boolean]>([
    ["above FL100", feet(10_000), false],
    ["above FL100", feet(10_001), true],
    ["below FL100", feet(10_000), false],
    ["below FL100", feet(9_999), true],
    // Any corner of a tolerance beyond the level is enough.
    ["above FL100", feet(9_900, 300), true],
    ["above FL100", feet(9_900, 100), false],
    ["below FL100", feet(10_100, 300), true],
    ["below FL100", feet(10_100, 100), false],
  ])("%s at %j", (level, pressureAltitude, holds) => {
    const row = `must any bank 20 ${level}`;
    expect(inForce(`| ${row}`, { pressureAltitude })).toEqual(holds ? [row] : []);
  });

  it("in FL is compared with the pressure altitude, in feet with the altitude as stated", () => {
    const both = "| must any bank 20 above FL100\n| must any load 2 above 10000 ft";
    expect(inForce(both, { altitude: feet(9_800), pressureAltitude: feet(10_400) })).toEqual([
      "must any bank 20 above FL100",
    ]);
    expect(inForce(both, { altitude: feet(10_400), pressureAltitude: feet(9_800) })).toEqual([
      "must any load 2 above 10000 ft",
    ]);
  });

  it("above one and below another holds between them", () => {
    const row = "must any bank 20 above FL080 below FL120";
    const at = (level: number) => inForce(`| ${row}`, { pressureAltitude: feet(level * 100) });
    expect([at(80), at(100), at(120)]).toEqual([[], [row], []]);
  });
});

describe("of the rows that apply", () => {
  it("one that names the phase replaces the `any` rows of its verb, subject and conditions", () => {
    expect(inForce("| must any bank 20\n| must cruise bank 30")).toEqual(["must cruise bank 30"]);
    expect(inForce("| must cruise bank 30\n| must any bank 20")).toEqual(["must cruise bank 30"]);
  });

  it.each([
    ["verb", "should any bank 20"],
    ["subject", "must any load 2"],
    ["condition", "must any bank 20 when ifr"],
    ["level", "must any bank 20 above FL050"],
  ])("no row of another %s is replaced", (_, other) => {
    expect(inForce(`| ${other}\n| must cruise bank 30`).sort()).toEqual(
      [other, "must cruise bank 30"].sort(),
    );
  });

  it("a row of the phase that drops out replaces nothing", () => {
    expect(inForce("| must any bank 20\n| must cruise bank 30 when vfr")).toEqual(["must any bank 20"]);
  });

  it("an emergency row replaces both", () => {
    const rows = "| must any bank 20\n| must cruise bank 30\n| must emergency bank 45\n| must any load 2";
    expect(inForce(rows, { emergency: true })).toEqual(["must emergency bank 45", "must any load 2"]);
    expect(inForce(rows)).toEqual(["must cruise bank 30", "must any load 2"]);
  });

  it("several of one rank all hold, for the figures to decide", () => {
    const rows = "| must any bank 30\n| must any bank 20\n| must any bank 25 when ifr";
    const { groups } = rowsInForce(limits(rows), situation);
    expect(groups).toHaveLength(1);
    expect(groups[0]).toMatchObject({ verb: "must", subject: "bank", afterShear: false });
    expect(groups[0]?.rows.map((row) => row.text)).toEqual([
      "must any bank 30",
      "must any bank 20",
      "must any bank 25 when ifr",
    ]);
  });

  it("rows after shear are a group of their own", () => {
    const { groups } = rowsInForce(limits("| must any margin 1.2\n| must any margin 1.1 after shear"), {
      ...situation,
      shear: true,
    });
    expect(groups.map((group) => group.afterShear)).toEqual([false, true]);
  });

  it("`none` switches its own row off and is listed, where it applies", () => {
    const rows = "| must any bank 20\n| must cruise bank none\n| must any bank 15 when ifr";
    expect(inForce(rows)).toEqual(["must any bank 15 when ifr", "- must cruise bank none"]);
    expect(inForce(rows, { phase: "climb" })).toEqual(["must any bank 20", "must any bank 15 when ifr"]);
  });
});

describe("the built-in rows in force", () => {
  it("of a cruise under IFR above FL300", () => {
    expect(inForce(commonPractice(), { pressureAltitude: feet(35_000) })).toEqual([
      "must any bank 30",
      "should any bank 25 or rate-one when ifr",
      "should any bank 15 above FL300",
      "should any overshoot 15",
      "should any buffet 1.3 above FL250",
    ]);
  });

  it("of an exercise there", () => {
    expect(inForce(commonPractice(), { phase: "manoeuvre", pressureAltitude: feet(35_000) })).toEqual([
      "must manoeuvre bank 60",
      "should any buffet 1.3 above FL250",
      "- should manoeuvre bank none when ifr",
      "- should manoeuvre bank none above FL300",
      "- should manoeuvre overshoot none",
    ]);
  });

  it("of a takeoff on one engine", () => {
    expect(inForce(commonPractice(), { phase: "takeoff", engineOut: true, rules: "vfr" })).toEqual([
      "must any bank 30",
      "must takeoff bank 15 when engine-out",
      "must takeoff, departure, missed ratio 1.13, vs 1.2",
      "should any overshoot 15",
    ]);
  });
});
