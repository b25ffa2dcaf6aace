import { describe, expect, it } from "vitest";
import { createFolder } from "../../server/src/plan/createFolder.ts";
import { fileJson, type PointJson } from "../../server/src/report/pointsJson.ts";

const KT = 1852 / 3600;
const G = 9.80665;
const RHO0 = 1.225;

const card = `| aircraft testbed-1; basis vsr; reference 55 t; mass 33 t to 59 t, landing 53 t; warning 1.03
| config clean stall 138 kt, load -1 to 2.5
| config flaps-30 stall 106 kt, load 0 to 2, landing, takeoff
| wing 104 m2, chord 3.7 m, slope 0.00 5.1, 0.60 5.9 per rad; ceiling FL385
| buffet clean 0.40 1.25, 0.60 1.05, 0.74 0.82, 0.79 0.62
| power-effect 0 % 1.00, 100 % 0.96
`;

function file(point: string, { rows = "", own = card, setting = "altitude FL100; speed 220 kt" } = {}) {
  const text = `${own}\n| limits own${rows}\n| should any bank none\n| should any margin none\n\n| fly testbed-1; under own; weight 50 t; config clean; ${setting}\n\n${point}\n`;
  return fileJson(createFolder({ today: "2026-12-01" }).open("file:///note.plumb", text, "plumb"), "note");
}

const point = (text: string, options = {}) => file(text, options).points[0] as PointJson;
const codes = (text: string, options = {}) =>
  file(text, options).findings.map(({ code, severity }) => `${code} ${severity}`);

describe("a gust", () => {
  it("adds and takes away what 14 CFR 23.341 gives, worked by hand", () => {
    // Sea level, M = 200 kt / 340.294 m/s = 0.30235: slope 5.1 + 0.8 * 0.30235 / 0.6 = 5.50313 per rad.
    const {
      gust_load: up,
      gust_load_down: down,
      load,
    } = point("| phase cruise; altitude 0 ft; speed 200 kt; gust 50 ft/s");
    const slope = 5.1 + (0.8 * ((200 * KT) / 340.29399)) / 0.6;
    const loading = 50_000 / 104;
    const massRatio = (2 * loading) / (RHO0 * 3.7 * slope);
    const alleviation = (0.88 * massRatio) / (5.3 + massRatio);
    const added = (alleviation * RHO0 * 50 * 0.3048 * 200 * KT * slope) / (2 * loading * G);
    expect(load).toBe(1);
    expect(up).toBeCloseTo(1 + added, 5);
    expect(down).toBeCloseTo(1 - added, 5);
  });

  it("is told where it stalls, buffets or overloads", () => {
    expect(codes("| phase cruise; altitude FL100; speed 150 kt; gust 60 ft/s")).toEqual([
      "gust-over-stall warning",
    ]);
    const file_ = file("| phase cruise; altitude FL050; speed 310 kt; gust 66 ft/s");
    expect(file_.findings.map(({ message }) => message).join()).toContain("beyond the limit 2.50 of clean");
    expect(codes("| phase cruise; speed 250 kt; gust 25 ft/s")).toEqual([]);
  });

  it("is not known without the wing, or beyond the Mach number that one slope holds to", () => {
    expect(
      codes("| phase cruise; gust 25 ft/s", {
        own: card.replace(/\| wing.*\n/, "").replace(/\| buffet.*\n/, ""),
      }),
    ).toEqual(["missing-value error"]);
    const one = card.replace("slope 0.00 5.1, 0.60 5.9 per rad", "slope 5.4 per rad");
    expect(codes("| phase cruise; altitude FL300; speed 250 kt; gust 25 ft/s", { own: one })).toEqual([
      "outside-table warning",
    ]);
    expect(
      point("| phase cruise; altitude FL300; speed 250 kt; gust 25 ft/s", { own: one }).gust_load,
    ).toBeNull();
    expect(codes("| phase cruise; altitude 0 ft; speed 200 kt; gust 25 ft/s", { own: one })).toEqual([]);
  });

  it("with a tolerance is held at its strongest", () => {
    const { gust_load: nominal, gust_load_high: high } = point("| phase cruise; gust 25 ft/s +- 5 ft/s");
    expect(high).toBe(point("| phase cruise; gust 30 ft/s").gust_load);
    expect(nominal).toBe(point("| phase cruise; gust 25 ft/s").gust_load);
  });
});

describe("a sudden loss of airspeed", () => {
  it("is taken off the calibrated speed, bank and load as they were", () => {
    const flown = point(
      "| phase landing; config flaps-30; altitude 0 ft; speed 140 kt; bank 20; shear 15 kt",
    );
    expect(flown.margin_after_shear).toBeCloseTo((125 / 140) * (flown.margin as number), 9);
    expect(flown.ratio_after_shear).toBeCloseTo((125 / 140) * (flown.ratio as number), 9);
  });

  it("holds the rows that are for it, and only where there is one", () => {
    const rows = "\n| must landing margin 1.25 after shear\n| must landing margin 1.10";
    const landing = "| phase landing; config flaps-30; altitude 0 ft; speed 135 kt; bank 15";
    expect(codes(landing, { rows })).toEqual([]);
    expect(codes(`${landing}; shear 15 kt`, { rows })).toEqual(["margin-short error"]);
    expect(file(`${landing}; shear 15 kt`, { rows }).findings[0]?.message).toMatch(
      /^After the shear of 15 kt: The margin over the stall is 1\.16 and own requires 1\.25 in landing/,
    );
  });

  it("after which the warning has come leaves no bank to it, and breaks the row that asks for some", () => {
    const rows = "\n| must landing overshoot 10 after shear";
    const landing = "| phase landing; config flaps-30; altitude 0 ft; speed 118 kt";
    expect(codes(`${landing}; shear 2 kt`, { rows })).toEqual([]);
    expect(codes(`${landing}; shear 15 kt`, { rows })).toEqual(["overshoot-short error"]);
    expect(file(`${landing}; shear 15 kt`, { rows }).findings[0]?.message).toMatch(
      /^After the shear of 15 kt: The warning comes before this bank is reached, and own requires 10° of bank beyond it/,
    );
    const accepting = `${landing}; bank 20; shear 15 kt; accept overshoot-short to 0 because "an exercise"`;
    expect(codes(accepting, { rows })).toEqual(["overshoot-short error", "stalled warning"]);
    const both = `${rows}\n| should landing overshoot 40`;
    expect(codes(accepting, { rows: both })).toEqual(["overshoot-short error", "stalled warning"]);
  });

  it("that leaves no speed leaves its rows not evaluated", () => {
    const rows = "\n| must landing margin 1.10 after shear";
    expect(
      codes("| phase landing; config flaps-30; altitude 0 ft; speed 135 kt; shear 140 kt", { rows }),
    ).toEqual(["not-evaluated error", "stalled warning"]);
  });

  it("that stalls the aeroplane is told without a row too, one step lower than a stall as it is flown", () => {
    const at = (shear: number, phase = "landing") =>
      `| phase ${phase}; config flaps-30; altitude 0 ft; speed 135 kt; shear ${shear} kt`;
    // vs1g of flaps-30 at 50 t, by hand: 106 kt * sqrt(50 / 55) = 101.07 kt.
    expect(codes(at(33))).toEqual([]);
    expect(codes(at(34))).toEqual(["stalled warning"]);
    expect(codes(at(34, "manoeuvre"))).toEqual(["stalled information"]);
    expect(file(at(45)).findings[0]?.message).toBe(
      "After the shear of 45 kt it is stalled: at 90 kt the wing carries 0.79 g and the point needs 1.00 g: fly faster, bank less or fly lighter.",
    );
    expect(file(at(140)).findings[0]?.message).toMatch(/^After the shear of 140 kt no airspeed is left/);
    const sought = point("| phase landing; config flaps-30; altitude 0 ft; speed ?; shear 40 kt");
    expect(sought.solved).toMatchObject({ value: 142, boundBy: "stalled" });
  });
});

describe("buffet at the worst corner", () => {
  const clauses = "| phase cruise; altitude FL300; bank 15; speed M 0.74";

  it("is what the heaviest and the steepest give: the Mach numbers close in, the altitude comes down", () => {
    const within = point(`${clauses}; weight 50 t +- 2 t`);
    const [nominal, heavy] = [point(`${clauses}; weight 50 t`), point(`${clauses}; weight 52 t`)];
    expect(within.low_buffet_mach).toBe(nominal.low_buffet_mach);
    expect(within.low_buffet_mach_high).toBe(heavy.low_buffet_mach);
    expect(within.high_buffet_mach_low).toBe(heavy.high_buffet_mach);
    expect(within.buffet_altitude_ft).toBe(nominal.buffet_altitude_ft);
    expect(within.buffet_altitude_low_ft).toBe(heavy.buffet_altitude_ft);
  });
});

describe("buffet", () => {
  it("ends at the Mach numbers and the altitude where the table carries just the load, worked by hand", () => {
    const {
      high_buffet_mach: high,
      low_buffet_mach: low,
      buffet_altitude_ft: altitude,
    } = point("| phase cruise; altitude FL350; speed M 0.74; bank 15");
    const mach = 0.74;
    const pressure = 23_842.27; // Pa at FL350, ICAO Doc 7488 (computed)
    const table: readonly (readonly [number, number])[] = [
      [0.4, 1.25],
      [0.6, 1.05],
      [0.74, 0.82],
      [0.79, 0.62],
    ];
    const at = (m: number) => {
      const i = table.findIndex(([edge]) => m <= edge);
      const [m0, c0] = table[i - 1] as readonly [number, number];
      const [m1, c1] = table[i] as readonly [number, number];
      return c0 + ((c1 - c0) * (m - m0)) / (m1 - m0);
    };
    const load = (m: number, p: number) => (at(m) * 0.7 * p * m * m * 104) / (50_000 * G);
    const needed = 1 / Math.cos((15 * Math.PI) / 180);
    expect(load(low as number, pressure)).toBeCloseTo(needed, 4);
    // At the table's end the wing still carries the load, so that the upper bound is not known.
    expect(0.62 * 0.7 * pressure * 0.79 ** 2 * 104).toBeGreaterThan(needed * 50_000 * G);
    expect(high).toBeNull();
    const p = (1.3 * 50_000 * G) / (at(mach) * 0.7 * mach * mach * 104);
    // Above 11 km (ICAO Doc 7488): H = 11000 + (R T / g) ln(22632.06 / p).
    const metres = 11_000 + ((287.05287 * 216.65) / G) * Math.log(22_632.06 / p);
    expect(altitude).toBeCloseTo(Math.min(metres / 0.3048, 38_500), 0);
  });

  it("has an upper end where the table falls below the load, and keeps the row in force", () => {
    const heavy = "weight 59 t; altitude FL385; speed M 0.74";
    const { high_buffet_mach: high } = point(`| phase cruise; ${heavy}; bank 10`);
    expect(high).toBeGreaterThan(0.74);
    expect(high).toBeLessThan(0.79);
    const usual = point(`| phase cruise; ${heavy}`).buffet_altitude_ft as number;
    const stricter = point(`| phase cruise; ${heavy}`, { rows: "\n| should any buffet 1.5" })
      .buffet_altitude_ft as number;
    expect(stricter).toBeLessThan(usual);
  });

  it("beyond the table's last Mach number is said not to be checked; below its first it is listed", () => {
    expect(codes("| phase cruise; altitude FL350; speed M 0.80")).toEqual(["not-evaluated warning"]);
    const slow = file("| phase cruise; altitude FL100; speed 200 kt");
    expect(slow.findings).toEqual([]);
    expect(slow.points[0]?.not_evaluated).toContainEqual(expect.objectContaining({ rule: "buffet-in-turn" }));
  });
});

describe("the approach category", () => {
  it("is that of the landing configuration at the greatest landing mass, by hand", () => {
    // 106 kt * sqrt(53/55) * 1.23 = 127.99 kt: C.
    expect(point("| phase cruise").approach_category).toEqual({ icao: "C", faa: "C" });
  });

  it("differs where the card publishes vref, which only the FAA takes", () => {
    const own = `${card}| published vref flaps-30 45 t 130 kt, 53 t 142 kt\n`;
    expect(point("| phase cruise", { own }).approach_category).toEqual({ icao: "C", faa: "D" });
  });

  it("takes the greatest mass where no landing mass is stated, and nothing where no mass is", () => {
    const own = card.replace(", landing 53 t", "");
    expect(point("| phase cruise", { own }).approach_category).toEqual({ icao: "C", faa: "C" });
    const none = card.replace("; mass 33 t to 59 t, landing 53 t", "");
    expect(point("| phase cruise", { own: none }).approach_category).toBeNull();
  });
});

describe("slowing down", () => {
  it("takes the seconds that the speeds are apart, by hand", () => {
    const flown = point("| phase approach; config flaps-30; altitude 0 ft; speed 150 kt; decel 0.5 kt/s");
    expect(flown.seconds_to_stall).toBeCloseTo((150 - (flown.stall_kt as number)) / 0.5, 9);
    expect(flown.seconds_to_warning).toBeCloseTo((150 - (flown.warning_kt as number)) / 0.5, 9);
    // 106 * sqrt(50/55) = 101.067 kt: 97.9 s.
    expect(flown.seconds_to_stall).toBeCloseTo(97.87, 1);
  });

  it("has no time left at a speed that is already passed", () => {
    const flown = point("| phase manoeuvre; speed 120 kt; decel 1 kt/s");
    expect(flown.seconds_to_stall).toBe(0);
  });

  it("is told above 1 kt/s, one step lower in an exercise", () => {
    expect(codes("| phase cruise; decel 1.5 kt/s")).toEqual(["decel-too-fast warning"]);
    expect(codes("| phase manoeuvre; decel 1.5 kt/s")).toEqual(["decel-too-fast information"]);
  });
});

describe("a hold", () => {
  const holds: readonly (readonly [string, readonly string[]])[] = [
    ["altitude 6000 ft; speed 200 kt", []],
    ["altitude 6000 ft; speed 201 kt", ["over-holding-speed information"]],
    ["altitude 14000 ft; speed 230 kt", []],
    ["altitude 14000 ft; speed 231 kt", ["over-holding-speed information"]],
    ["altitude 20000 ft; speed 240 kt", []],
    ["altitude 20000 ft; speed 241 kt", ["over-holding-speed information"]],
    ["altitude 14200 ft; speed 235 kt", []],
    ["altitude 14200 ft +- 300 ft; speed 235 kt", ["over-holding-speed information"]],
    ["altitude FL350; speed M 0.78", []],
  ];

  it.each(holds)("%s", (clauses, wanted) => {
    expect(codes(`| phase hold; ${clauses}`)).toEqual(wanted);
  });

  it("names both authorities and their figures", () => {
    expect(file("| phase hold; altitude 5000 ft; speed 235 kt").findings[0]?.message).toContain(
      "230 kt ias (ICAO Doc 8168) and 200 kt ias (the FAA's AIM, 5-3-8)",
    );
  });
});

describe("power", () => {
  it("gives a stall speed for information, and no figure else moves", () => {
    const off = point("| phase climb; altitude 0 ft; bank 20");
    const on = point("| phase climb; altitude 0 ft; bank 20; power 50 %");
    expect(on.power_on_stall_kt).toBeCloseTo(0.98 * (off.stall_kt as number), 9);
    expect(on.stall_kt).toBe(off.stall_kt);
    expect(off.power_on_stall_kt).toBeNull();
    expect(on.assumed).not.toContain("power off");
  });
});
