import { describe, expect, it } from "vitest";
import { createFolder } from "../../server/src/plan/createFolder.ts";
import { pointsCsv } from "../../server/src/report/csv.ts";
import { fileJson, type PointJson } from "../../server/src/report/pointsJson.ts";
import { tableRows } from "../../server/src/report/pointsTable.ts";

const card = `| aircraft testbed-1; basis vsr; reference 55 t; mass 33 t to 59 t; warning 1.03
| config clean stall 138 kt, load -1 to 2.5
| config flaps-30 stall 106 kt, load 0 to 2, landing, takeoff
| cg-effect 14 % 1.000, 34 % 0.98; wing 104 m2, chord 3.7 m, slope 0.00 5.1, 0.60 5.9 per rad

| limits own
| must any bank 40
| must any margin none

| fly testbed-1; under own; weight 50 t; config clean; altitude FL100; speed 220 kt
`;

function open(points: string) {
  return createFolder({ today: "2026-12-01" }).open("file:///note.plumb", `${card}\n${points}\n`, "plumb");
}

const json = (points: string) => fileJson(open(points), "note");
const found = (points: string) => json(points).findings.map(({ code }) => code);

/** The computed fields of a point, which those of a sweep's row must be. */
function figures({ vs1g_kt, stall_kt, ratio, margin, load, mass_kg, bank_deg }: PointJson) {
  return { vs1g_kt, stall_kt, ratio, margin, load, mass_kg, bank_deg };
}

describe("a sweep", () => {
  const sweeps: readonly (readonly [string, readonly string[]])[] = [
    ["bank 0 to 60 by 15", ["bank 0", "bank 15", "bank 30", "bank 45", "bank 60"]],
    ["bank 60 to 0 by 25", ["bank 60", "bank 35", "bank 10", "bank 0"]],
    [
      "weight 40 t to 42 t by 0.5 t",
      ["weight 40 t", "weight 40.5 t", "weight 41 t", "weight 41.5 t", "weight 42 t"],
    ],
    ["altitude 2000 ft to 5000 ft by 2000 ft", ["altitude 2000 ft", "altitude 4000 ft", "altitude 5000 ft"]],
    ["altitude FL250 to FL270 by 1000 ft", ["altitude FL250", "altitude FL260", "altitude FL270"]],
    [
      "weight 40 t to 41 t by 250 kg",
      ["weight 40 t", "weight 40250 kg", "weight 40500 kg", "weight 40750 kg", "weight 41 t"],
    ],
    ["altitude FL100 to FL102 by 150 ft", ["altitude FL100", "altitude 10150 ft", "altitude FL102"]],
    ["speed 360 km/h to 200 kt by 5 kt", ["speed 360 km/h", "speed 369.26 km/h", "speed 370.4 km/h"]],
    ["speed 180 kt to 200 kt by 10 kt tas", ["speed 180 kt tas", "speed 190 kt tas", "speed 200 kt tas"]],
    ["speed M 0.40 to 0.44 by 0.02", ["speed M 0.40", "speed M 0.42", "speed M 0.44"]],
    ["speed 1.2 to 1.4 by 0.1 vs1g", ["speed 1.2 vs1g", "speed 1.3 vs1g", "speed 1.4 vs1g"]],
    ["isa -10 to +10 by 10", ["isa -10", "isa 0", "isa +10"]],
    ["cg 14 % to 34 % by 10 %", ["cg 14 %", "cg 24 %", "cg 34 %"]],
    ["contamination 0 % to 10 % by 5 %", ["contamination 0 %", "contamination 5 %", "contamination 10 %"]],
    ["load 1 to 2 by 0.5", ["load 1", "load 1.5", "load 2"]],
    ["path -3 deg to 3 deg by 3 deg", ["path -3 deg", "path 0 deg", "path 3 deg"]],
    ["gust 10 ft/s to 30 ft/s by 10 ft/s", ["gust 10 ft/s", "gust 20 ft/s", "gust 30 ft/s"]],
    ["decel 0.5 kt/s to 1 kt/s by 0.5 kt/s", ["decel 0.5 kt/s", "decel 1 kt/s"]],
  ];

  it.each(sweeps)("%s is the same points one by one", (sweep, stated) => {
    const [point] = json(`| phase cruise; ${sweep}`).points;
    const rows = point?.sweep as readonly PointJson[];
    expect(rows).toHaveLength(stated.length);
    expect(rows.map(figures)).toEqual(
      stated.map((clause) => figures(json(`| phase cruise; ${clause}`).points[0] as PointJson)),
    );
    expect(rows.map((row) => row.gust_load)).toEqual(
      stated.map((clause) => json(`| phase cruise; ${clause}`).points[0]?.gust_load),
    );
  });

  it("shows the first value that breaks something, and says at which it is so", () => {
    const note = open("| phase cruise; bank 0 to 60 by 15");
    const [point] = fileJson(note, "note").points;
    expect(point?.bank_deg).toBeCloseTo(45);
    const [finding] = note.findings();
    expect(finding?.finding.message).toBe(
      "At bank 45: Bank 45° exceeds the 40° that own allows in cruise: bank 40° or less; at 220 kt the warning would come at 67°. So it is at 60 too.",
    );
  });

  it("shows the tightest where none breaks anything", () => {
    const [point] = json("| phase cruise; bank 0 to 40 by 10").points;
    expect(point?.bank_deg).toBeCloseTo(40);
    expect(found("| phase cruise; bank 0 to 40 by 10")).toEqual([]);
  });

  it("has every row in the table, the CSV and the JSON", () => {
    const note = open("| phase cruise; bank 0 to 60 by 15\n\n| phase cruise; bank 10");
    expect(tableRows(note).map(([, phase]) => phase)).toEqual([
      "cruise (bank 0)",
      "cruise (bank 15)",
      "cruise (bank 30)",
      "cruise (bank 45)",
      "cruise (bank 60)",
      "cruise",
    ]);
    const [head, ...rows] = pointsCsv([fileJson(note, "note")], "caution")
      .trimEnd()
      .split("\r\n");
    expect(rows).toHaveLength(6);
    const at = head?.split(",").indexOf("sweep.value") ?? -1;
    expect(rows.map((row) => row.split(",")[at])).toEqual(["0", "15", "30", "45", "60", ""]);
  });

  it.each([
    ["speed M 0.40 to 0.44 by 0.04", "speed M 0.40", "speed M 0.44"],
    ["speed 200 kt to 240 kt by 40 kt tas", "speed 200 kt tas", "speed 240 kt tas"],
    ["speed 1.4 to 1.6 by 0.2 vs1g", "speed 1.4 vs1g", "speed 1.6 vs1g"],
    ["speed 200 kt to 240 kt by 40 kt", "speed 200 kt", "speed 240 kt"],
  ])("%s says of its values what they are of", (clause, first, last) => {
    const note = open(`| phase cruise; bank 45; ${clause}`);
    expect(tableRows(note).map(([, phase]) => phase)).toEqual([`cruise (${first})`, `cruise (${last})`]);
    expect(note.findings()[0]?.finding.message).toContain(`at ${first}: Bank 45°`);
  });

  it("says a value as it is, where its step is in another unit", () => {
    const phases = tableRows(open("| phase cruise; weight 40 t to 41 t by 250 kg")).map(([, phase]) => phase);
    expect(phases).toEqual(["40", "40.25", "40.5", "40.75", "41"].map((one) => `cruise (weight ${one} t)`));
  });

  it("does not carry on, and what is assumed otherwise is not assumed then", () => {
    expect(found("| phase cruise; weight 40 t to 42 t by 1 t\n\n| phase cruise; bank 10")).toEqual([
      "missing-value",
    ]);
    expect(found("| phase cruise; contamination 0 % to 2 % by 1 %\n\n| phase cruise; bank 10")).toEqual([
      "missing-value",
    ]);
    expect(found("| phase cruise; isa -5 to +5 by 5\n\n| phase cruise; bank 10; isa 0")).toEqual([]);
    expect(found("| phase cruise; weight 40 t to 42 t by 1 t; aside\n\n| phase cruise; bank 10")).toEqual([]);
  });

  it("holds a claim at its worst row", () => {
    expect(found("| phase cruise; bank 0 to 40 by 10; claim load 1.31")).toEqual([]);
    expect(found("| phase cruise; bank 0 to 40 by 10; claim load 1.16")).toEqual(["claim-stale"]);
  });

  it.each([
    // The bank is over its limit at every row, so that the first is shown; the worst is the last.
    ["config flaps-30; speed 170 kt; weight 37 t to 54 t by 1 t", "vref", 108, 130],
    ["weight 59 t to 30 t by 1 t", "va", 222, 158],
  ])("at %s holds a claim of %s at its worst row, though it is nominal", (clauses, name, first, worst) => {
    const point = `| phase cruise; bank 45; ${clauses}`;
    expect(found(`${point}; claim ${name} ${first} kt`)).toContain("claim-stale");
    expect(found(`${point}; claim ${name} ${worst} kt`)).not.toContain("claim-stale");
  });

  it.each([
    ["| phase cruise; bank 0 to 60 by 0.1", "601"],
    ["| phase cruise; bank 0 to 60 by 0", "step"],
    ["| phase cruise; bank 0 to 60 by -5", "step"],
  ])("%s is refused", (text, says) => {
    const { points, findings } = json(text);
    expect(findings.map(({ code }) => code)).toEqual(["out-of-range"]);
    expect(findings[0]?.message).toContain(says);
    expect(points[0]).toMatchObject({ stall_kt: null, withheld: { code: "out-of-range" } });
  });

  it("has 500 values at the most", () => {
    expect(json("| phase cruise; bank 0 to 49.9 by 0.1").points[0]?.sweep).toHaveLength(500);
  });

  it("is met by `expect` and `accept` as one point", () => {
    expect(found("| phase cruise; bank 0 to 60 by 15; expect bank-over-limit")).toEqual(["bank-over-limit"]);
    expect(found("| phase cruise; bank 0 to 30 by 15; expect bank-over-limit")).toEqual(["not-as-expected"]);
    const taken = json(
      '| phase cruise; bank 0 to 60 by 15; accept bank-over-limit to 60 because "an exercise"',
    );
    expect(taken.findings).toMatchObject([{ code: "bank-over-limit", severity: "information" }]);
    const short = json(
      '| phase cruise; bank 0 to 60 by 15; accept bank-over-limit to 50 because "an exercise"',
    );
    expect(short.findings).toMatchObject([{ code: "bank-over-limit", severity: "error" }]);
    expect(short.findings[0]?.message).toContain("accepted to 50 only, and it is 60 now");
  });
});

it("a value that is sought at every value of a sweep, with many tolerances, is refused before an editor stands still", () => {
  const heavy = (more: string) =>
    open(`| phase cruise; weight 33 t to 58.9 t by 0.1 t; altitude ? +- 100 ft; speed 90 kt +- 2 kt${more}`)
      .findings()
      .map(({ finding }) => finding.message);
  expect(heavy("; bank 20 +- 2; isa +2 +- 3; cg 20 % +- 2 %")).toContainEqual(
    expect.stringMatching(
      /^With these tolerances a value cannot be sought at every value of the sweep: after \d+ /,
    ),
  );
}, 60_000);
