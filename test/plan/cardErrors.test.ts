import { describe, expect, it } from "vitest";
import { openDocument } from "../../server/src/notation/openDocument.ts";
import type { Card } from "../../server/src/plan/card.ts";
import { lowerCard } from "../../server/src/plan/lowerCard.ts";

/** A card of two configurations, with more clauses on lines 3 and on. */
function card(more = "", basis = "vsr"): Card {
  return lowered(
    `| aircraft a-1; basis ${basis}; reference 55 t\n| config clean stall 138 kt\n| config full stall 106 kt, takeoff, landing\n${more}`,
  );
}

function lowered(text: string): Card {
  const [block] = openDocument(text, "plumb").blocks;
  if (!block) throw new Error("The text holds no block.");
  return lowerCard(block, "file:///cards.plumb");
}

function configuration(of: Card, name: string) {
  const found = of.configurations.find((one) => one.name === name);
  if (!found) throw new Error(`No configuration ${name}.`);
  return found;
}

function codes(of: Card): string[] {
  return [...of.block.findings, ...of.findings].map((one) => `${one.line} ${one.code}`);
}

describe("a table in error is unknown, never absent", () => {
  const faults: readonly [string, (keyword: string, pairs: string) => string, string][] = [
    ["text that is not understood", (keyword, pairs) => `| ${keyword} clean ${pairs} x`, "3 unexpected-text"],
    ["given twice", (k, pairs) => `| ${k} clean ${pairs}\n| ${k} clean ${pairs}`, "4 duplicate-clause"],
    ["a misspelt configuration", (keyword, pairs) => `| ${keyword} claen ${pairs}`, "3 unknown-config"],
    ["one pair", (keyword, pairs) => `| ${keyword} clean ${pairs.split(",")[0]}`, "3 bad-table"],
  ];
  const tables = [
    ["lift-mach", "liftMach", "0.30 1.00, 0.79 0.68"],
    ["buffet", "buffet", "0.40 1.25, 0.79 0.62"],
    ["ias", "ias", "100 kt 104 kt, 200 kt 200 kt"],
  ] as const;
  const cases = faults.flatMap(([fault, write, code]) =>
    tables.map(([keyword, key, pairs]) => [keyword, fault, key, write(keyword, pairs), code] as const),
  );

  it.each(cases)("%s: %s", (_, __, key, text, code) => {
    const read = card(text);
    expect(codes(read)).toContain(code);
    expect(configuration(read, "clean")[key]).toMatchObject({ value: null });
  });

  it.each(["vref", "v2min", "vfto"] as const)("published %s of a configuration that is none", (name) => {
    const read = card(`| published ${name} ful 45 t 150 kt, 57 t 170 kt`);
    expect(codes(read)).toEqual(["3 unknown-config"]);
    const { published } = configuration(read, "full");
    expect(published[name]).toMatchObject({ value: null });
    for (const other of ["vref", "v2min", "vfto"] as const)
      if (other !== name) expect(published[other]).toBeNull();
  });

  it("leaves alone a configuration that has its own", () => {
    const read = card("| lift-mach clean 0.30 1.00, 0.79 0.68\n| lift-mach slats 0.30 1.00, 0.79 0.70");
    expect(configuration(read, "clean").liftMach?.value?.values).toEqual([1, 0.68]);
    expect(configuration(read, "full").liftMach).toMatchObject({ value: null });
  });

  it("is not asked for a configuration whose own clause is in error", () => {
    const read = lowered(
      "| aircraft a-1; basis vsr; reference 55 t\n| config clean stall 138\n| config full stall 106 kt\n| lift-mach clean 0.30 1.00, 0.79 0.68\n",
    );
    expect(codes(read)).toEqual(["1 missing-unit"]);
    expect(configuration(read, "clean").stallSpeed).toBeNull();
    expect(configuration(read, "full").liftMach).toBeNull();
  });

  it("names the configurations there are, and writes the nearest", () => {
    const [finding] = card("| buffet claen 0.40 1.25, 0.79 0.62").findings;
    expect(finding?.message).toBe("a-1 has no configuration claen; it has clean and full.");
    expect(finding?.fixes[0]?.edits).toEqual([{ line: 3, start: 9, end: 14, newText: "clean" }]);
  });

  it("a cg of a buffet table that cannot be costs the table", () => {
    const read = card("| wing 104 m2; buffet clean cg 900 %, 0.40 1.25, 0.79 0.62");
    expect(codes(read)).toEqual(["3 out-of-range"]);
    expect(configuration(read, "clean").buffet).toMatchObject({ value: null, cg: null });
  });
});

describe("buffet beyond the stall", () => {
  const wing = "| wing 104 m2\n";

  it("is found at the pairs of either table", () => {
    // The stall's CL is 1.68; at M 0.5 lift-mach leaves 1.01 of it, where the buffet line stands at 1.14.
    const read = card(
      `${wing}| lift-mach clean 0.30 1.00, 0.50 0.60, 0.79 0.58\n| buffet clean 0.30 1.50, 0.79 0.62`,
    );
    expect(codes(read)).toEqual(["5 bad-table"]);
    expect(read.findings[0]?.message).toMatch(/^At M 0.500 /);
    expect(configuration(read, "clean").buffet).toMatchObject({ value: null });
  });

  it("is not looked for without the wing area, or where the lift table is in error", () => {
    expect(codes(card("| buffet clean 0.40 2.90, 0.79 0.62"))).toEqual([]);
    const read = card(`${wing}| lift-mach clean 0.30 0.90, 0.79 0.60\n| buffet clean 0.40 2.90, 0.79 0.62`);
    expect(codes(read)).toEqual(["4 bad-table"]);
  });
});

describe("published speeds below the least value", () => {
  // full: VSR 106 kt at 55 t, so that vref is at least 1.23 * 106 * sqrt(45 / 55) = 117.94 kt at 45 t.
  it("are told with both figures", () => {
    const [finding] = card("| published vref full 45 t 117 kt, 57 t 140 kt").findings;
    expect(finding).toMatchObject({ code: "published-below-least", severity: "warning", line: 3 });
    expect(finding?.message).toContain("117 kt");
    expect(finding?.message).toContain("118 kt");
  });

  it("are compared at every mass, and at the least value they pass", () => {
    expect(codes(card("| published vref full 45 t 118 kt, 57 t 130 kt"))).toEqual([
      "3 published-below-least",
    ]);
    expect(codes(card("| published vref full 45 t 118 kt, 57 t 133 kt"))).toEqual([]);
  });

  it("on the vs basis are compared with 1.3 vs", () => {
    const at = (knots: number) =>
      codes(card(`| published vref full 55 t ${knots} kt, 57 t 160 kt`, "vs 0.94"));
    expect(at(138)).toEqual([]);
    expect(at(137)).toEqual(["3 published-below-least"]);
  });

  it("take the card's own factor of v2min, and nothing where it is in error", () => {
    const published = "| published v2min full 55 t 115 kt, 57 t 130 kt";
    expect(codes(card(published))).toEqual(["3 published-below-least"]);
    expect(codes(card(`| v2min 1.08\n${published}`))).toEqual([]);
    expect(codes(card(`| v2min 1.8\n${published}`))).toEqual(["3 out-of-range"]);
  });

  it("are not compared where cg-effect is in error", () => {
    expect(
      codes(card("| cg-effect 14 % 1.2, 34 % 1\n| published vref full 45 t 117 kt, 57 t 140 kt")),
    ).toEqual(["3 bad-table"]);
  });
});

describe("what withholds a card", () => {
  it.each([
    ["an unknown keyword", "| wng 104 m2", "vsr", { line: 3, code: "unknown-keyword" }],
    ["a factor out of its range", "", "vs 0.4", { line: 0, code: "out-of-range" }],
    ["a basis given twice", "| basis vs1g", "vsr", { line: 0, code: "duplicate-clause" }],
    ["a factor that is missing", "", "vs", { line: 0, code: "missing-argument" }],
  ])("%s", (_, more, basis, { line, code }) => {
    expect(card(more, basis).withheld).toMatchObject({ origin: { line }, code });
  });

  it("names every clause that is missing, at once", () => {
    const read = lowered("| aircraft a-1\n");
    expect(read.withheld?.code).toBe("missing-value");
    expect(read.findings.map((one) => one.message)).toEqual([
      "The card a-1 needs `basis`, `reference` and `config`, and does not state them: write `basis vsr`, `basis vs1g` or `basis vs` with its factor; `reference … t`, the mass at which the stall speeds hold; `config NAME stall … kt`.",
    ]);
    expect(read.findings[0]?.fixes.map((one) => one.title)).toEqual([
      "Write basis",
      "Write reference",
      "Write config",
    ]);
  });

  it("is nothing less: an error elsewhere costs what it states", () => {
    const read = card("| vmo 318; warning 1.03");
    expect(read.withheld).toBeNull();
    expect(read.vmo).toMatchObject({ value: null });
    expect(read.warning?.value).toBe(1.03);
    expect(read.vne).toBeNull();
  });
});

describe("a configuration in error", () => {
  it("keeps what it is marked, lest another pass for the only landing configuration", () => {
    const read = lowered(
      "| aircraft a-1; basis vsr; reference 55 t\n| config clean stall 138 kt\n| config mid stall 110 kt, landing\n| config full stall 106, landing, takeoff\n",
    );
    const full = configuration(read, "full");
    expect(full.stallSpeed).toBeNull();
    expect(full.landing).toBe(true);
    expect(full.takeoff).toBe(true);
    expect(configuration(read, "clean").landing).toBe(false);
  });

  it("given twice gives no figure, under one name", () => {
    const read = card("| config clean stall 140 kt");
    expect(codes(read)).toEqual(["3 duplicate-clause"]);
    expect(read.configurations.map((one) => one.name)).toEqual(["full", "clean"]);
    expect(configuration(read, "clean").statedStall).toBeNull();
  });
});

describe("a stall speed that is indicated", () => {
  const indicated = (ias: string) =>
    lowered(`| aircraft a-1; basis vs 0.94; reference 740 kg\n| config clean stall 45 kt ias\n${ias}`);

  it("is calibrated by its table, at 1 g and the reference mass", () => {
    const clean = configuration(indicated("| ias clean 40 kt 48 kt, 50 kt 54 kt"), "clean");
    const calibrated = (51 * 1852) / 3600;
    expect(clean.statedStall).toBeCloseTo(calibrated, 9);
    expect(clean.stallSpeed).toBeCloseTo(calibrated / 0.94, 9);
  });

  it.each([
    ["outside the table", "| ias clean 50 kt 54 kt, 60 kt 62 kt", ["1 outside-table"]],
    ["without a table", "", ["1 missing-value"]],
    ["with a table in error", "| ias clean 40 kt 48 kt, 50 54 kt", ["2 missing-unit"]],
  ])("%s is none", (_, ias, told) => {
    const read = indicated(ias);
    expect(codes(read)).toEqual(told);
    expect(configuration(read, "clean")).toMatchObject({ statedStall: null, stallSpeed: null });
  });
});
