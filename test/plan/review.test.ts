import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { codeActions } from "../../server/src/features/codeActions.ts";
import { createFolder } from "../../server/src/plan/createFolder.ts";
import { formatClaimNumber } from "../../server/src/plan/format.ts";
import type { Note } from "../../server/src/plan/note.ts";
import { resultEntry, resultNames } from "../../server/src/plan/results.ts";
import { fileJson } from "../../server/src/report/pointsJson.ts";

const card = `| aircraft testbed-1; basis vsr; reference 55 t; mass 33 t to 59 t; warning 1.03; vmo 318 kt; vmca 101 kt
| config clean stall 138 kt, load -1 to 2.5
| config flaps-30 stall 106 kt, load 0 to 2, landing, takeoff, vfe 178 kt
| wing 104 m2, chord 3.7 m, slope 0.00 5.1, 0.60 5.9 per rad; buffet clean 0.30 1.25, 0.79 0.80
| contamination frost 30 %

| limits own
| must any bank 30
| should any overshoot 15

| fly testbed-1; under own; weight 50 t; config clean; altitude FL100; speed 220 kt
`;

function open(points: string, today = "2026-12-01"): Note {
  return createFolder({ today }).open("file:///note.plumb", `${card}\n${points}\n`, "plumb");
}

const told = (points: string, today?: string) =>
  open(points, today)
    .findings()
    .map(({ finding }) => `${finding.code} ${finding.severity}`);

describe("accept", () => {
  const taken: readonly (readonly [string, string, readonly string[]])[] = [
    [
      "takes a finding up to its figure",
      'bank 35; accept bank-over-limit to 35 because "terrain"',
      ["bank-over-limit information"],
    ],
    [
      "and not beyond it",
      'bank 36; accept bank-over-limit to 35 because "terrain"',
      ["bank-over-limit error"],
    ],
    [
      "and what got better",
      'bank 31; accept bank-over-limit to 35 because "terrain"',
      ["bank-over-limit information"],
    ],
    [
      "takes nothing where there is nothing",
      'bank 30; accept bank-over-limit to 35 because "terrain"',
      ["accept-unused warning"],
    ],
    [
      "until its day, that day included",
      'bank 35; accept bank-over-limit to 35 because "t" until 2026-12-01',
      ["bank-over-limit information"],
    ],
    [
      "and no longer",
      'bank 35; accept bank-over-limit to 35 because "t" until 2026-11-30',
      ["accept-expired error", "bank-over-limit error"],
    ],
    [
      "needs the figure that the finding has",
      'bank 35; accept bank-over-limit because "terrain"',
      ["accept-refused warning", "bank-over-limit error"],
    ],
    [
      "in a unit of its kind",
      'bank 35; accept bank-over-limit to 35 kt because "terrain"',
      ["accept-refused warning", "bank-over-limit error"],
    ],
    [
      "and none where it has none",
      'bank 30; contamination 9 %; accept stall-before-warning to 3 because "t"',
      ["accept-refused warning", "stall-before-warning error"],
    ],
    [
      "needs a reason with words in it",
      'bank 35; accept bank-over-limit to 35 because " "',
      ["accept-refused warning", "bank-over-limit error"],
    ],
    [
      "takes a finding that has no figure",
      'bank 30; contamination 9 %; accept stall-before-warning because "no reliance on the warning"',
      ["stall-before-warning information"],
    ],
    [
      "reads an overweight in its units",
      'weight 60 t; accept overweight to 60 t because "ferry"',
      ["overweight information"],
    ],
    [
      "reads a lesser figure as worse where less is worse",
      'speed 150 kt; bank 28; accept overshoot-short to 2 because "t"',
      ["overshoot-short information"],
    ],
    [
      "and refuses what is below it",
      'speed 150 kt; bank 28; accept overshoot-short to 9 because "t"',
      ["overshoot-short warning"],
    ],
  ];

  it.each(taken)("%s", (_, clauses, wanted) => {
    expect(told(`| phase cruise; ${clauses}`).sort()).toEqual([...wanted].sort());
  });

  const refused: readonly (readonly [string, string])[] = [
    ["missing-value", "config flaps-30"],
    ["outside-table", "cg 20 %"],
    ["not-evaluated", "bank 0"],
    ["no-level-flight", "bank 0"],
    ["over-load-limit", "bank 70; speed 300 kt"],
    ["over-vne", "bank 0"],
    ["contaminated-takeoff", "contamination frost"],
    ["claim-stale", "claim stall 1 kt"],
    ["stalled", "speed 120 kt"],
    ["unknown-keyword", "bank 0"],
  ];

  it.each(refused)("%s is refused", (code, clauses) => {
    expect(told(`| phase cruise; ${clauses}; accept ${code} because "no"`)).toContain(
      "accept-refused warning",
    );
  });

  it("takes a stall where it is the exercise", () => {
    const stalled = "speed 120 kt; accept stalled because";
    expect(told(`| phase manoeuvre; ${stalled} "the exercise"`)).toContain("stalled information");
    expect(told(`| phase cruise; ${stalled} "the exercise"`)).toContain("stalled error");
  });

  it("is listed with the point and with the finding", () => {
    const file = fileJson(
      open(
        '| phase cruise; bank 35; accept bank-over-limit to 35 because "terrain" by "M. Roe" until 2027-01-31',
      ),
      "note",
    );
    const accepted = {
      code: "bank-over-limit",
      to: "35",
      because: "terrain",
      by: "M. Roe",
      until: "2027-01-31",
    };
    expect(file.points[0]?.accepted).toEqual([accepted]);
    expect(file.findings).toMatchObject([{ code: "bank-over-limit", accepted }]);
    expect(file.findings[0]?.message).toMatch(
      /^Accepted to 35 by M\. Roe until 2027-01-31 \("terrain"\): Bank 35°/,
    );
  });

  it("covers exactly what its figure says, at any bank", () => {
    fc.assert(
      fc.property(fc.integer({ min: 31, max: 60 }), fc.integer({ min: 31, max: 60 }), (bank, to) => {
        const codes = told(
          `| phase cruise; speed 300 kt; bank ${bank}; accept bank-over-limit to ${to} because "t"`,
        );
        expect(codes.includes("bank-over-limit information")).toBe(bank <= to);
      }),
    );
  });
});

describe("expect", () => {
  const cases: readonly (readonly [string, string, readonly string[]])[] = [
    ["what comes is information", "bank 35; expect bank-over-limit", ["bank-over-limit information"]],
    ["what does not come is an error", "bank 30; expect bank-over-limit", ["not-as-expected error"]],
    ["what must not come and does not is silent", "bank 30; expect not stalled", []],
    [
      "what must not come and does is an error",
      "bank 35; expect not bank-over-limit",
      ["bank-over-limit error", "not-as-expected error"],
    ],
    [
      "what was not checked cannot be expected",
      "bank 30; claim stall 1 kt; expect claim-stale",
      ["claim-stale error", "not-as-expected error"],
    ],
  ];

  it.each(cases)("%s", (_, clauses, wanted) => {
    expect(told(`| phase cruise; ${clauses}`).sort()).toEqual([...wanted].sort());
  });

  it("says in JSON what was expected and whether it came", () => {
    const [point] = fileJson(
      open("| phase cruise; bank 35; expect bank-over-limit; expect not stalled"),
      "n",
    ).points;
    expect(point?.expected).toEqual([
      { code: "bank-over-limit", not: false, came: true },
      { code: "stalled", not: true, came: false },
    ]);
  });

  it("is not known where the point has no figures, which is told already", () => {
    const note = open("| phase cruise; config flaps-99; expect stalled");
    expect(fileJson(note, "n").points[0]?.expected).toEqual([{ code: "stalled", not: false, came: null }]);
    expect(note.findings().map(({ finding }) => finding.code)).toEqual(["unknown-config"]);
  });
});

describe("a claim", () => {
  /** A note whose point claims a result at the figure the formatter gives, to some decimals. */
  function claiming(name: string, weight: number, bank: number, decimals: number) {
    const shownIn = resultEntry(name as "stall").unit;
    const unit = shownIn === "kt" || shownIn === "nm" ? ` ${shownIn}` : "";
    const point = (tonnes: number, claim: string) =>
      `| phase cruise; weight ${tonnes} t; bank ${bank}${claim}`;
    const plain = open(point(weight, ""));
    const result = plain.results().find((one) => one.kind === "point");
    const spread = result?.kind === "point" ? result.point.results?.[name as "stall"] : null;
    if (!spread) return null;
    const probe = open(point(weight, `; claim ${name} ${(1).toFixed(decimals)}${unit}`));
    const body = probe.document.blocks
      .flatMap((block) => block.clauses)
      .map(({ clause }) => clause.body)
      .find((one) => one?.kind === "claim");
    if (body?.kind !== "claim") return null;
    const figure = formatClaimNumber(name as "stall", spread, body.value, 0);
    return {
      note: open(point(weight, `; claim ${name} ${figure}${unit}`)),
      heavier: (by: number) => open(point(weight * by, `; claim ${name} ${figure}${unit}`)),
    };
  }

  const claimable = [
    "vs1g",
    "stall",
    "warning",
    "ratio",
    "margin",
    "stall-load",
    "load",
    "radius",
    "overshoot",
    "buffet-load",
    "vref",
  ] as const;
  const drawn = fc.record({
    name: fc.constantFrom(...claimable),
    weight: fc.integer({ min: 340, max: 580 }).map((tenths) => tenths / 10),
    bank: fc.integer({ min: 5, max: 40 }),
    decimals: fc.integer({ min: 0, max: 3 }),
  });

  const stale = (note: Note) => note.findings().some(({ finding }) => finding.code === "claim-stale");

  it("at the figure that is shown is never stale", () => {
    fc.assert(
      fc.property(drawn, ({ name, weight, bank, decimals }) => {
        const found = claiming(name, weight, bank, decimals);
        if (!found) return;
        expect(found.note.findings().map(({ finding }) => finding.code)).not.toContain("missing-unit");
        expect(stale(found.note)).toBe(false);
      }),
      { numRuns: 300 },
    );
  });

  it("of what hangs on the weight is stale with 1 % more of it, and the fix mends it and nothing else", () => {
    let mended = 0;
    fc.assert(
      fc.property(drawn, ({ name, weight, bank }) => {
        if (["load", "radius"].includes(name)) return;
        const found = claiming(name, weight, bank, 3);
        if (!found) return;
        const note = found.heavier(1.01);
        expect(stale(note)).toBe(true);
        const before = note.document.text();
        const fix = codeActions(note, 0, note.document.lineCount).find(
          ({ finding, kind }) => kind === "fix" && finding?.code === "claim-stale",
        );
        for (const { line, start, end, newText } of fix?.edits ?? [])
          note.edit({ line, character: start }, { line, character: end }, newText);
        expect(stale(note)).toBe(false);
        const off = (text: string) => text.replace(/claim .*/, "");
        expect(off(note.document.text())).toBe(off(before));
        mended++;
      }),
      { numRuns: 300 },
    );
    expect(mended).toBeGreaterThan(100);
  });

  it("names every result", () => {
    expect(resultNames.length).toBe(19);
  });
});
