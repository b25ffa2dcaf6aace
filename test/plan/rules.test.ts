import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { phases } from "../../server/src/notation/vocabulary.ts";
import { createFolder } from "../../server/src/plan/createFolder.ts";
import { passedJson } from "../../server/src/report/passed.ts";
import { fileJson, type PointJson } from "../../server/src/report/pointsJson.ts";

const card = `| aircraft testbed-1; basis vsr; reference 55 t; warning 1.03
| config clean stall 138 kt
| config flaps-30 stall 106 kt, landing, takeoff
`;

/** The limits leave the other subject open, and say so. */
const open = "; should any bank none; should any margin none";

function file(rows: string, points: string, more = "") {
  const folder = createFolder({ today: "2026-12-01" });
  const text = `${card}${more}\n| limits own${rows}${open}\n\n| fly testbed-1; under own; weight 55 t; config clean; altitude FL100; speed 220 kt\n\n${points}\n`;
  return fileJson(folder.open("file:///note.plumb", text, "plumb"), "note");
}

/** The plan's findings, `code severity`, without those about definitions. */
function told(rows: string, points: string, more = ""): string[] {
  return file(rows, points, more).findings.map(({ code, severity }) => `${code} ${severity}`);
}

/** Name, rows after `limits own`, points, what is told, more definitions. */
type Case = readonly [string, string, string, readonly string[], string?];

describe("rows of limits", () => {
  const cases: readonly Case[] = [
    ["a phase replaces `any`", "\n| must any bank 20\n| must cruise bank 30", "| phase cruise; bank 25", []],
    [
      "and nothing else",
      "\n| must any bank 20\n| must cruise bank 30",
      "| phase climb; bank 25",
      ["bank-over-limit error"],
    ],
    [
      "of several the strictest counts",
      "\n| must any bank 30\n| must any bank 20\n| must any bank 25",
      "| phase cruise; bank 22",
      ["bank-over-limit error"],
    ],
    ["`none` switches off", "\n| must any bank 20\n| must cruise bank none", "| phase cruise; bank 25", []],
    [
      "a condition makes it another row",
      "\n| must any bank 30\n| must any bank 20 when engine-out",
      "| phase cruise; bank 25; engine-out left",
      ["bank-over-limit error"],
    ],
    [
      "a row for ifr and one for vfr both hold without rules",
      "\n| must any bank 30 when ifr\n| must any bank 20 when vfr",
      "| phase cruise; bank 25",
      ["bank-over-limit error"],
    ],
    [
      "and one of them with rules",
      "\n| must any bank 30 when ifr\n| must any bank 20 when vfr",
      "| phase cruise; bank 25; rules ifr",
      [],
    ],
    ["the level itself is excluded", "\n| must any bank 20 above FL100", "| phase cruise; bank 25", []],
    [
      "above it holds",
      "\n| must any bank 20 above FL099",
      "| phase cruise; bank 25",
      ["bank-over-limit error"],
    ],
    [
      "feet are compared with the altitude as stated",
      "\n| must any bank 20 below 10000 ft",
      "| phase cruise; bank 25; qnh 980 hPa; altitude 9900 ft",
      ["bank-over-limit error"],
    ],
    [
      "a tolerance reaches over the level",
      "\n| must any bank 20 above FL100",
      "| phase cruise; bank 25; altitude FL099 +- 300 ft",
      ["bank-over-limit error"],
    ],
    [
      "an emergency row replaces the phase's",
      "\n| must any bank 20\n| must cruise bank 20\n| must emergency bank 40",
      "| phase cruise; bank 35; emergency",
      [],
    ],
    [
      "advice is a step lower in an emergency",
      "\n| should any bank 20",
      "| phase cruise; bank 25; emergency",
      ["bank-over-advice information"],
    ],
    ["the bank exactly at its limit keeps it", "\n| must any bank 30", "| phase cruise; bank 30", []],
    [
      "the speed exactly at its ratio keeps it",
      "\n| must any ratio 1.23",
      "| phase landing; config flaps-30; altitude 500 ft; speed 1.23 vs1g",
      [],
    ],
    [
      "rows taken with `from` are replaced by own ones",
      ", from base\n| must any bank 40",
      "| phase cruise; bank 35",
      [],
      "\n| limits base\n| must any bank 20\n",
    ],
    [
      "and held where they are not",
      ", from base\n| must any load 3",
      "| phase cruise; bank 35",
      ["bank-over-limit error"],
      "\n| limits base\n| must any bank 20\n",
    ],
    [
      "rate one is a ceiling",
      "\n| should any bank 30 or rate-one",
      "| phase cruise; speed 120 kt tas; config flaps-30; bank 25",
      ["bank-over-advice warning", "stalled error"].slice(0, 1),
    ],
    [
      "a turn at rate one keeps it, with any tolerance",
      "\n| should any bank 60 or rate-one",
      "| phase cruise; speed 220 kt +- 20 kt; bank rate-one",
      [],
    ],
    [
      "advice and rule of one subject are told once",
      "\n| must any overshoot 41\n| should any overshoot 45",
      "| phase cruise; bank 25",
      ["overshoot-short error"],
    ],
  ];
  it.each(cases.map(([name, ...rest]) => [name, rest] as const))(
    "%s",
    (_, [rows, points, wanted, more = ""]) => {
      const own = told(rows, points, more).filter(
        (one) => !/unused|ratio|stall-before/.test(one) || wanted.includes(one),
      );
      expect(own.filter((one) => !/^(stalled|warning-in-turn|carried-over)/.test(one))).toEqual(wanted);
    },
  );

  it("hold a ratio on the vs basis against vs", () => {
    const vs = card.replace("vsr", "vs 0.94");
    const text = (speed: string) =>
      `${vs}\n| limits own\n| must any ratio 1.23, vs 1.3\n| must any bank none\n\n| fly testbed-1; under own; weight 55 t; config clean; altitude FL050\n\n| phase cruise; speed ${speed} vs\n`;
    const codes = (speed: string) => {
      const note = createFolder({ today: "2026-12-01" }).open("file:///note.plumb", text(speed), "plumb");
      return note.findings().map(({ finding }) => finding.code);
    };
    expect(codes("1.3")).toEqual([]);
    expect(codes("1.29")).toEqual(["ratio-short"]);
  });

  it.each([
    ["must any ratio 1.235", "speed 1.2 vs1g", "1.20 times vs1g and own requires 1.235 in"],
    ["must any ratio 1.235", "speed 1.234 vs1g", "1.23 times vs1g and own requires 1.235 in"],
    [
      "should any overshoot 12.5",
      "speed 1.3 vs1g; bank 45",
      "Only 5° of bank are left to the warning and own advises 12.5°",
    ],
    ["must any load 1.333", "bank 45", "1.42 exceeds the 1.333"],
    ["must any bank 27.5", "bank 45", "45° exceeds the 27.5°"],
    ["must any bank 60 or rate-one", "speed 200 kt tas; bank 45", "45° exceeds the 28°"],
    ["must any radius 3 km", "speed 300 kt; bank 10", " exceeds the 1.61 nm"],
  ])("%s is told as it is written, and at %s never as less than it asks", (row, clauses, says) => {
    const { findings } = file(`\n| ${row}`, `| phase cruise; ${clauses}`);
    expect(findings.map(({ message }) => message).join()).toContain(says);
  });

  it("of a ratio to vs and one to vs1g the one that lacks more counts, and what is accepted is held against it", () => {
    const rows = "\n| must any ratio 1.13, vs 1.2\n| must any ratio 1.15 above FL050";
    // 1.10 times vs1g is 1.17 times vs: 97.5 % of the one bound and 95.7 % of the other.
    const flown = "| phase cruise; speed 1.1 vs1g; accept ratio-short to 1.12";
    const vs = `\n${card.replace("vsr", "vs 0.94").replace("testbed-1", "testbed-2")}`;
    const start = "| fly testbed-2; weight 55 t; config clean; altitude FL100\n\n";
    const findings = file(rows, `${start}${flown} because "a test"`, vs).findings;
    expect(findings.find(({ code }) => code === "ratio-short")).toMatchObject({
      severity: "error",
      message: expect.stringMatching(/^The speed is 1\.10 times vs1g and own requires 1\.15 in cruise/),
    });
  });

  it("that take from one another in a circle are told, and hold nothing", () => {
    const findings = told(
      ", from base\n| must any bank 10",
      "| phase cruise; bank 20",
      "\n| limits base, from own\n| must any bank 5\n",
    );
    expect(findings.filter((one) => one.startsWith("broken-definition")).length).toBeGreaterThan(1);
    expect(findings).not.toContain("bank-over-limit error");
  });
});

function speedOf(point: PointJson | undefined): { cas_kt: number; mach: number } {
  return point?.speed as unknown as { cas_kt: number; mach: number };
}

describe("a tolerance", () => {
  it.each(["deg", "%", "ft/min"])("of a path in %s that may climb or sink reaches level flight", (unit) => {
    const scale = unit === "ft/min" ? 100 : 1;
    const [point, level] = file(
      "\n| must any bank 60",
      `| phase cruise; bank 45; path ${-8 * scale} ${unit} +- ${15 * scale} ${unit}; aside\n\n| phase cruise; bank 45`,
    ).points as [PointJson, PointJson];
    expect(point.stall_high_kt).toBeCloseTo(level.stall_kt as number, 9);
    expect(point.margin_low).toBeCloseTo(level.margin as number, 9);
    expect(point.stall_high_kt).toBeGreaterThan(point.stall_kt as number);
  });
});

describe("every value inside a tolerance", () => {
  // Tables that bend both ways, so that the extreme need not be at an end.
  const bent = `| aircraft bent-1; basis vsr; reference 40 t; warning 1.05
| config clean stall 120 kt
| wing 100 m2, chord 3.5 m, slope 0.00 4.8, 0.40 5.2, 0.60 6.4, 0.90 3.5 per rad
| lift-mach clean 0.25 1.00, 0.32 0.80, 0.40 0.86, 0.55 0.60, 0.70 0.68, 0.85 0.40
| buffet clean 0.20 1.10, 0.35 0.80, 0.45 1.00, 0.85 0.40
| cg-effect 14 % 1.000, 20 % 0.960, 34 % 0.985
| ias clean 60 kt 70 kt, 110 kt 112 kt, 160 kt 150 kt, 210 kt 214 kt, 320 kt 318 kt
`;
  /** A value, half of its tolerance, and the clause with both; the second is empty at one value inside it. */
  type Toleranced = readonly [number, number, (value: string, tolerance: (unit: string) => string) => string];
  const speeds: readonly Toleranced[] = [
    [190, 25, (value, within) => `speed ${value} kt${within("kt")}`],
    [250, 30, (value, within) => `speed ${value} kt${within("kt")} tas`],
    [200, 10, (value, within) => `speed ${value} kt${within("kt")} ias`],
    [0.45, 0.1, (value, within) => `speed M ${value}${within("")}`],
  ];
  const others: readonly Toleranced[] = [
    [36, 4, (value, within) => `weight ${value} t${within("t")}`],
    [17_000, 4000, (value, within) => `altitude ${value} ft${within("ft")}`],
    [16, 15, (value, within) => `isa +${value}${within("")}`],
    [32, 12, (value, within) => `bank ${value}${within("")}`],
    [-3, 8, (value, within) => `path ${value} deg${within("deg")}`],
    [21, 4, (value, within) => `cg ${value} %${within("%")}`],
  ];
  const point = (clauses: readonly Toleranced[], share: readonly number[] | null) => {
    const written = clauses.map(([value, half, clause], i) =>
      share === null
        ? clause(String(value), (unit) => ` +- ${half} ${unit}`)
        : clause((value + half * (share[i] as number)).toFixed(6), () => ""),
    );
    return `| phase manoeuvre; aside; ${written.join("; ")}; gust 20 ft/s; shear 12 kt; decel 1 kt/s`;
  };
  const low = ["margin", "ratio", "stall_load", "buffet_load", "gust_load_down", "seconds_to_warning"];
  const after = ["margin_after_shear", "ratio_after_shear", "seconds_to_stall"];
  const banks = ["stall_bank_deg", "warning_bank_deg", "overshoot_deg", "buffet_bank_deg"];
  const bounds: readonly (readonly [string, string, 1 | -1])[] = [
    ...[...low, ...after].map((name) => [name, `${name}_low`, 1] as const),
    ...banks.map((name) => [name, name.replace("_deg", "_low_deg"), 1] as const),
    ["stall_kt", "stall_high_kt", -1],
    ["vs1g_kt", "vs1g_high_kt", -1],
    ["warning_kt", "warning_high_kt", -1],
    ["gust_load", "gust_load_high", -1],
    ["radius_nm", "radius_high_nm", -1],
  ];

  it("is no worse than the figures that are shown for it, whatever bends between its ends", () => {
    const share = fc.double({ min: -1, max: 1, noNaN: true });
    const drawn = fc.record({
      speed: fc.constantFrom(...speeds),
      varied: fc.subarray([...others], { maxLength: 3 }),
      inside: fc.array(fc.array(share, { minLength: 7, maxLength: 7 }), { minLength: 12, maxLength: 12 }),
    });
    fc.assert(
      fc.property(drawn, ({ speed, varied, inside }) => {
        const clauses = [speed, ...varied];
        const points = [null, ...inside].map((one) => point(clauses, one)).join("\n\n");
        const start = "| fly bent-1; under own; weight 36 t; config clean; altitude 17000 ft; isa +4";
        const [all, ...each] = file("\n| must any load 9", `${start}\n\n${points}`, `\n${bent}`).points;
        expect(all?.withheld).toBeNull();
        for (const one of each) {
          for (const [name, bound, way] of bounds) {
            const [figure, worst] = [one[name], all?.[bound]];
            if (typeof figure !== "number" || typeof worst !== "number") continue;
            expect(way * (figure - worst), `${name} of ${points}`).toBeGreaterThanOrEqual(-1e-5);
          }
        }
      }),
      { numRuns: 60 },
    );
  });
});

describe("the state that carries on", () => {
  const points = (text: string) => file("\n| must any bank 60", text).points;

  it("goes on for what is not stated, and an aside passes nothing on", () => {
    const [first, aside, last] = points(
      "| phase climb; burn 1 t; isa +5; bank 20\n\n| phase climb; aside; burn 5 t; altitude FL200\n\n| phase cruise; burn 1 t",
    );
    expect(first).toMatchObject({ mass_kg: 54_000, isa_deviation_c: 5, bank_deg: 20 });
    expect(aside).toMatchObject({ mass_kg: 49_000, bank_deg: 0, isa_deviation_c: 5 });
    expect(last).toMatchObject({ mass_kg: 53_000, pressure_altitude_ft: expect.closeTo(10_000, 6) });
    expect(Object.keys(last?.inherited as object).sort()).toEqual([
      "aircraft",
      "altitude",
      "config",
      "isa",
      "limits",
      "speed",
    ]);
  });

  it("carries a temperature as the deviation it is at its own altitude", () => {
    const [low, high] = points("| phase climb; altitude FL100; oat 5 C\n\n| phase cruise; altitude FL200");
    expect(low?.isa_deviation_c).toBeCloseTo(278.15 - 268.338, 6);
    expect(high?.isa_deviation_c).toBeCloseTo(low?.isa_deviation_c as number, 9);
  });

  it("carries a speed as it was flown, not the expression that gave it", () => {
    const [first, second] = points("| phase climb; speed 1.5 vs1g\n\n| phase cruise; burn 5 t");
    expect(speedOf(second).cas_kt).toBeCloseTo(speedOf(first).cas_kt, 9);
    const [, mach] = points("| phase cruise; altitude FL300; speed M 0.7\n\n| phase descent; altitude FL280");
    expect(speedOf(mach).mach).toBeCloseTo(0.7, 12);
  });

  it("adds the tolerances of burns to that of the weight", () => {
    const result = file(
      "\n| must any bank 60",
      "| phase climb; weight 50 t +- 1 t\n\n| phase cruise; burn 2 t +- 0.5 t",
    );
    const ratio = result.points[1] as { vs1g_kt: number; vs1g_high_kt: number };
    expect(ratio.vs1g_high_kt / ratio.vs1g_kt).toBeCloseTo(Math.sqrt(49.5 / 48), 3);
  });

  it("begins a new sector at a takeoff after a landing", () => {
    const { findings, points: all } = file(
      "\n| must any bank 60",
      "| phase landing; config flaps-30; altitude 500 ft; speed 150 kt; contamination 5 %; engine-out left\n\n| phase takeoff; config flaps-30; altitude 600 ft; speed 160 kt",
    );
    expect(findings.map((one) => one.code)).toContain("missing-value");
    expect(findings.find((one) => one.code === "missing-value")?.message).toContain(
      "a new sector begins here",
    );
    expect(all[1]).toMatchObject({
      mass_kg: null,
      assumed: expect.arrayContaining(["no contamination", "all engines"]),
    });
  });

  it("takes into the new sector what was stated after the landing, a clause in error among it", () => {
    const landing = "| phase landing; config flaps-30; altitude 500 ft; speed 150 kt; engine-out left";
    const takeoff = "| phase takeoff; config flaps-30; altitude 600 ft; speed 160 kt";
    const between = (setting: string, second = "") =>
      file("\n| must any bank 60", `${landing}\n\n${setting}\n\n${second}${takeoff}`);
    const dirty = between("| weight 54 t; contamination 30 %");
    expect(dirty.points[1]).toMatchObject({
      mass_kg: expect.closeTo(54_000, 6),
      lift_loss_percent: expect.closeTo(30, 9),
      engine_out: null,
    });
    expect(dirty.findings.map((one) => one.code)).toContain("contaminated-takeoff");
    const spoilt = between("| weight 54 t; contamination 30 kg");
    expect(spoilt.points[1]).toMatchObject({ mass_kg: null, withheld: { line: 12 } });
    const again = between("| weight 54 t; contamination 30 %", `${landing}\n\n`);
    expect(again.points[2]).toMatchObject({ mass_kg: null, withheld: { code: "missing-value" } });
    expect(between("| burn 2 t").points[1]).toMatchObject({ withheld: { code: "missing-value" } });
  });

  it("starts afresh with another aeroplane; limits and rules go on", () => {
    const { points: all, findings } = file(
      "\n| must any bank 60",
      "| fly testbed-2; rules ifr\n\n| phase cruise",
      `\n${card.replaceAll("testbed-1", "testbed-2")}`,
    );
    expect(all[0]).toMatchObject({ aircraft: "testbed-2", limits: "own", rules: "ifr", mass_kg: null });
    expect(findings.map((one) => one.code)).toContain("missing-value");
  });

  it("never falls back on an older value after an error", () => {
    const { points: all } = file(
      "\n| must any bank 60",
      "| phase climb; weight 50\n\n| phase cruise\n\n| phase descent; weight 50 t",
    );
    expect(all.map((one) => one.mass_kg)).toEqual([null, null, expect.closeTo(50_000, 6)]);
    expect(all[1]?.withheld).toMatchObject({ code: "missing-unit" });
  });

  it("tells what is missing once, where it is", () => {
    const folder = createFolder({ today: "2026-12-01" });
    const note = folder.open(
      "file:///n.plumb",
      `${card}\n| fly testbed-1; config clean; altitude FL100\n\n| phase climb; speed 200 kt\n\n| phase cruise\n\n| phase descent; weight 50 t\n`,
      "plumb",
    );
    expect(
      note
        .findings()
        .filter(({ finding }) => finding.code === "missing-value")
        .map(({ line }) => line),
    ).toEqual([6]);
  });
});

describe("what cannot be checked does not pass for checked", () => {
  it("a row in error is an error where the limits are used, and listed at every point", () => {
    const result = file(
      ", from base\n| must any bank 2O",
      "| phase cruise; bank 35",
      "\n| limits base\n| must any bank 40\n",
    );
    expect(result.findings).toContainEqual(
      expect.objectContaining({ code: "broken-definition", severity: "error" }),
    );
    expect(result.points[0]?.not_evaluated).toContainEqual({
      rule: "must any bank 2O",
      why: "The row is in error, so it is not held.",
    });
  });

  it.each([
    ["0 +- 0.5", "Under a negative load no stall speed is computed."],
    ["0.3 +- 0.3", "Without load there is no stall."],
  ])("a margin that is known at some of the loads alone: load %s", (load, why) => {
    const { findings } = file("\n| must any margin 3", `| phase manoeuvre; load ${load}`);
    const finding = findings.find(({ code }) => code === "not-evaluated");
    expect(finding).toMatchObject({ severity: "error", message: expect.stringContaining(why) });
    expect(told("\n| must any margin 3", "| phase manoeuvre; load 0")).not.toContain("not-evaluated error");
  });

  const tables = `| aircraft tables-1; basis vsr; reference 55 t; warning 1.03
| config clean stall 138 kt
| wing 104 m2, chord 3.7 m, slope 0.00 5.1, 0.60 5.9 per rad
| lift-mach clean 0.30 1.00, 0.60 0.85
| buffet clean 0.40 1.25, 0.60 1.05
`;
  const lift = ["stalled", "warning-in-turn", "stall-before-warning", "no-level-flight", "buffet-in-turn"];

  /** Card, clauses of the point, and the checks that are not held there. */
  it.each([
    [tables, "speed M 0.62; gust 30 ft/s", [...lift, "gust-over-stall"]],
    [tables, "speed M 0.5; contamination 5 %; gust 30 ft/s", ["buffet-in-turn", "gust-over-stall"]],
    [tables, "speed M 0.5; load -0.5", ["stalled", "warning-in-turn", "stall-before-warning"]],
    [tables, "speed M 0.2", ["stalled", "warning-in-turn", "buffet-in-turn"]],
    [tables.replace("; warning 1.03", ""), "speed M 0.5", ["warning-in-turn", "stall-before-warning"]],
    [tables.replace(/\| wing.*\n/, ""), "speed M 0.5", ["buffet-in-turn"]],
    [tables, "speed M 0.5; gust 30 ft/s", []],
  ] as const)("a check that could not be made is none that was held %#", (definition, clauses, missed) => {
    const text = `${definition}\n| limits own\n| must any load 9\n\n| fly tables-1; under own; weight 50 t; config clean; altitude FL200\n\n| phase cruise; ${clauses}\n`;
    const note = createFolder({ today: "2026-12-01" }).open("file:///note.plumb", text, "plumb");
    const held = passedJson(note).map(({ code }) => code);
    expect(lift.concat("gust-over-stall").filter((code) => !held.includes(code as never))).toEqual(
      [...lift, "gust-over-stall"].filter(
        (code) => missed.includes(code as never) || (code === "gust-over-stall" && !clauses.includes("gust")),
      ),
    );
  });

  it("a tolerance that leaves what a value can be gives no figures", () => {
    const result = file(
      "\n| must any bank 60",
      "| phase cruise; weight 55 t +- 70 t\n\n| phase climb; weight 55 t; speed 1.2 vs1g; bank 2 +- 5",
    );
    expect(result.points[0]).toMatchObject({ mass_kg: null, withheld: { code: "out-of-range" } });
    expect(result.points[1]?.stall_kt).toBeGreaterThan(100);
    expect(told("\n| must any bank 60", "| phase cruise; speed vref - 290 kt")).toContain(
      "out-of-range error",
    );
  });
});

describe("what no row bounds", () => {
  /** The findings of a point in cruise under these rows alone, and what is listed as not evaluated. */
  function unbounded(rows: readonly string[], point = "bank 50", own = card) {
    const limits = ["| limits own", ...rows.map((row) => `| ${row}`)].join("\n");
    const text = `${own}\n${limits}\n\n| fly testbed-1; under own; weight 55 t; config clean; altitude FL100; speed 220 kt\n\n| phase cruise; ${point}\n`;
    const note = createFolder({ today: "2026-12-01" }).open("file:///note.plumb", text, "plumb");
    return {
      told: note
        .findings()
        .map(({ finding }) => finding)
        .filter(({ code }) => code === "unbounded"),
      listed: fileJson(note, "note").points[0]?.not_evaluated as { rule: string; why: string }[],
      codes: note.findings().map(({ finding }) => finding.code),
      note,
    };
  }

  it("is told at the point and listed there: the bank and the margin", () => {
    const { told, listed } = unbounded(["must departure, landing bank 30"]);
    expect(told).toMatchObject([
      {
        severity: "warning",
        message:
          "Nothing in own bounds the bank in cruise, so it is not held here: write a row with its figure (`must cruise bank`), or with `none` where no limit is meant. Nothing in own asks for a margin over the stall in cruise, so only the stall itself and its warning are checked here: write a row with its figure (`must cruise ratio`, `margin` or `overshoot`), or with `none` where no limit is meant.",
      },
    ]);
    expect(listed).toContainEqual({ rule: "bank", why: "Nothing in own bounds the bank in cruise." });
    expect(listed.map(({ rule }) => rule)).toContain("margin");
  });

  it("says that the warning is not checked either where the card states none", () => {
    const { told } = unbounded(["must any bank 60"], "bank 20", card.replace("; warning 1.03", ""));
    expect(told).toHaveLength(1);
    expect(told[0]?.message).toContain("so only the stall itself is checked here");
  });

  it.each([
    ["a row of another phase", ["must climb bank 30", "must climb margin 1.1"], 2],
    ["a row whose condition does not hold", ["must any bank 30 when engine-out", "must any ratio 1.2"], 1],
    ["a row of another level", ["must any bank 30 above FL200", "must any ratio 1.2"], 1],
    ["a margin after a shear that is not there", ["must any bank 60", "must any margin 1.1 after shear"], 1],
    ["a row of another subject", ["must any load 2", "must any radius 3 nm", "must any buffet none"], 2],
    ["advice", ["should any bank 60", "should any overshoot 5"], 0],
    ["each of the margins", ["must any bank 60", "must any margin 1.1"], 0],
    ["and", ["must any bank 60", "must any ratio 1.1"], 0],
    ["`none`", ["must cruise bank none", "must any overshoot none"], 0],
  ] as const)("with %s", (_, rows, missing) => {
    const { told } = unbounded(rows);
    expect(told.flatMap(({ message }) => message.match(/Nothing in own/g) ?? [])).toHaveLength(missing);
  });

  it("is not told where a row is in error, which is told already", () => {
    const { told, codes } = unbounded(["must any bank 3O", "must any ratio 1.2"]);
    expect(told).toEqual([]);
    expect(codes).toContain("broken-definition");
  });

  it("is told at limits without a row, whose fix takes the built-in ones", () => {
    const { told, note } = unbounded([]);
    expect(told.map(({ message }) => message)).toContainEqual(
      expect.stringMatching(/^own has no row, so it limits nothing: write one below/),
    );
    const [fix] = told.flatMap(({ fixes }) => fixes);
    expect(fix?.edits).toHaveLength(1);
    for (const { start, end, newText } of fix?.edits ?? [])
      note.edit({ line: 4, character: start }, { line: 4, character: end }, newText);
    expect(note.document.lineText(4)).toBe("| limits own, from common-practice");
    expect(note.findings().map(({ finding }) => finding.code)).toEqual(["bank-over-limit"]);
  });

  it("is no answer to `?`, which is sought all the same", () => {
    const { told, note } = unbounded(["must any margin 1.2"], "bank ?");
    expect(told).toHaveLength(1);
    const [point] = fileJson(note, "note").points;
    expect(point?.solved).toMatchObject({ value: expect.any(Number), boundBy: "must any margin 1.2" });
  });

  it("is never so under the built-in limits, in any phase and under any rules", () => {
    for (const phase of phases)
      for (const rules of ["", "; rules ifr", "; rules vfr"]) {
        const text = `${card}\n| fly testbed-1${rules}; weight 50 t; config clean; altitude FL310; speed 220 kt\n\n| phase ${phase}; speed 220 kt\n\n| phase ${phase}; altitude 3000 ft; emergency\n`;
        const note = createFolder({ today: "2026-12-01" }).open("file:///note.plumb", text, "plumb");
        expect(note.findings().map(({ finding }) => finding.code)).not.toContain("unbounded");
      }
  });
});

it("a bank over its limit is not told to be over the advice too", () => {
  const rows = "\n| must any bank 30\n| should any bank 25";
  expect(told(rows, "| phase cruise; bank 28")).toEqual(["bank-over-advice warning"]);
  const { findings } = file(rows, "| phase cruise; bank 35");
  expect(findings.map(({ code }) => code)).toEqual(["bank-over-limit"]);
  expect(findings[0]?.message).toBe(
    "Bank 35° exceeds the 30° that own allows in cruise and the 25° that it advises: bank 25° or less; at 220 kt the warning would come at 65°.",
  );
  // Advice that is wider than the limit is no way out.
  const wider = file("\n| must any bank 15\n| should any bank 25", "| phase cruise; bank 35").findings;
  expect(wider.map(({ message }) => message)).toEqual([
    "Bank 35° exceeds the 15° that own allows in cruise: bank 15° or less; at 220 kt the warning would come at 65°.",
  ]);
});
