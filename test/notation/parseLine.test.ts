import { describe, expect, it } from "vitest";
import { openDocument } from "../../server/src/notation/openDocument.ts";
import { parseLine } from "../../server/src/notation/parseLine.ts";
import { vocabulary } from "../../server/src/notation/vocabulary.ts";
import { withMarks } from "../support/fixture.ts";

/** The findings of a note stand where the carets are, and nowhere else. */
function check(marked: string): void {
  const { text, marks } = withMarks(marked);
  const document = openDocument(text, "plumb");
  const found = [
    ...document.blocks.flatMap((block) =>
      block.findings.map((one) => ({ ...one, line: block.start + one.line })),
    ),
    ...document.findings,
  ].map(({ line, span, code }) => `${line}:${span.start}-${span.end} ${code}`);
  expect(found.sort()).toEqual(
    marks.map(({ line, start, end, says }) => `${line}:${start}-${end} ${says}`).sort(),
  );
}

function messages(text: string): string[] {
  const document = openDocument(text, "plumb");
  return [...document.blocks.flatMap((block) => block.findings), ...document.findings].map(
    (one) => one.message,
  );
}

describe("every keyword", () => {
  it.each(vocabulary.map((one) => [one.keyword, one.example] as const))(
    "%s is read: %s",
    (keyword, example) => {
      const { clauses, findings } = parseLine(`| ${example}`);
      expect(findings).toEqual([]);
      expect(clauses.map((one) => one.keyword)).toEqual([keyword]);
    },
  );

  it.each(vocabulary.map((one) => one.keyword))("%s is read in any case", (keyword) => {
    expect(parseLine(`| ${keyword.toUpperCase()}`).clauses[0]?.keyword).toBe(keyword);
  });
});

describe("forms", () => {
  it.each([
    "weight 56.4 t",
    "weight 553 kN",
    "weight 56.4t+-0.4t",
    "weight 61.4 t ± 0.5",
    "weight 50 to 60 by 1 t",
    "weight ?",
    "weight ? t +- 0.2 t",
    "burn 450 kg",
    "burn 450 kg +- 20 kg",
    "burn 2.4 t/h for 35 min",
    "altitude FL350",
    "altitude 3000 ft +- 100 ft",
    "altitude 900 m",
    "altitude ?",
    "isa 0",
    "isa-3",
    "isa –3",
    "isa +8 C",
    "oat -42 °C",
    "oat 230 K",
    "qnh 29.92 inHg",
    "speed 200 kt",
    "speed 200kts",
    "speed 210 kt tas",
    "speed 60 kt ias",
    "speed M 0.76",
    "speed M.76",
    "speed mach 0.76",
    "speed M 0.70 to 0.78 by 0.02",
    "speed M ?",
    "speed 1.3 vs1g",
    "speed 1.1 to 1.5 by 0.1 vs1g",
    "speed vref + 5 kt",
    "speed vref+5kt +- 3 kt",
    "speed vref-5kt",
    "speed warning +- 2 kt",
    "speed ?",
    "speed ? kt",
    "bank 25 left",
    "bank 25°left",
    "bank 15 +- 5",
    "bank 0 to 60 by 15",
    "bank rate-one right",
    "bank ?",
    "path -3 deg",
    "path 2.4 %",
    "path 300 ft/nm",
    "path −700 ft/min",
    "load 0.5",
    "gust 30 ft/s",
    "shear 15 kt",
    "cg 18 %",
    "contamination 8%",
    "contamination frost",
    "contamination none",
    "power 70 %",
    "decel 1 kt/s",
    "engine-out none",
    "emergency",
    'emergency "fire"',
    "claim stall 135 kt",
    "claim margin 1.34 within 0.02",
    "claim radius 1.2 nm",
    "claim stall-bank 62",
    "expect not stalled",
    'accept bank-over-limit to 35 because "terrain" by "J. L." until 2027-03-31',
    'accept ratio-short to 1.1 because "short hop"',
    "config flaps-5",
    "config clean stall 138 kt, load -1 to 2.5, vfe 228 kt ias, takeoff, landing",
    "mass 33 t to 59 t, landing 53 t",
    "mass 33 to 59 t",
    "wing 104 m2, chord 3.7 m, slope 5.5 per rad",
    "wing 1100 ft2, slope 0.00 5.1, 0.60 5.9 per rad",
    "basis vsr",
    "basis vs 0.94",
    "vmo 318 kt ias",
    "lift-mach clean 0.30 1.00, 0.50 0.92",
    "buffet clean cg 25 %, 0.40 1.25, 0.60 1.05",
    "ias clean 43 kt 49 kt, 50 kt 54 kt",
    "cg-effect 14 % 1.000, 24 % 0.990",
    "contamination heavy-rain 15 %, rain",
    "published vref flaps-30 45 t 119 kt, 53 t 131 kt",
    'limits a-b "T", from common-practice',
    "must takeoff, departure, missed ratio 1.13, vs 1.2",
    "should any bank 25 or rate-one when ifr",
    "should any buffet 1.3 above FL250",
    "should landing margin 1.10 after shear",
    "must any radius 2 nm below 10000 ft when engine-out",
    "should manoeuvre bank none",
    "phase maneuver",
    "fly weight",
    "aircraft 東京-7",
    'source "x" issue 3b, from 2026-02-28',
    "rules ifr (a (nested) remark)",
    "phase hold “Title”",
  ])("%s is read without a finding", (clause) => {
    const { findings, clauses } = parseLine(`| ${clause}`);
    expect(findings).toEqual([]);
    expect(clauses).toHaveLength(1);
    expect(clauses[0]?.body).not.toBeNull();
  });

  it("understands `mass` in a plan as weight, and a range as a card's", () => {
    expect(parseLine("| mass 56 t").clauses[0]?.keyword).toBe("weight");
    expect(parseLine("| mass 33 t to 59 t").clauses[0]?.keyword).toBe("mass");
  });

  it("reads a negative zero as zero", () => {
    const body = parseLine("| path -0 deg").clauses[0]?.body;
    expect(
      body?.kind === "path" && body.value.kind === "scalar" && Object.is(body.value.quantity.value, 0),
    ).toBe(true);
  });
});

describe("findings stand where the slip is", () => {
  it.each([
    "| weight 61.4\n         ^^^^ missing-unit",
    "| weight 61,4 t\n         ^^^^ ambiguous-number",
    "| altitude 3 000 ft\n           ^^^^^ ambiguous-number",
    "| altitude 3.000 ft\n           ^^^^^ ambiguous-number",
    "| altitude FL35\n           ^^^^ ambiguous-number",
    "| weight 61.4 kt\n              ^^ wrong-unit",
    "| gust 30 kt; phase hold\n          ^^ wrong-unit",
    "| path 2 deg +- 100 ft/min; phase hold\n             ^^^^^^^^^^^^^ wrong-unit",
    "| path 500 ft/min +- 1 deg; phase hold\n                  ^^^^^^^^ wrong-unit",
    "| path 1 deg to 3 % by 1 deg; phase hold\n                ^^^ wrong-unit",
    "| wieght 5 t\n  ^^^^^^ unknown-keyword",
    "| weight 5 t config clean\n             ^^^^^^ separator",
    "| weight: 5 t\n        ^ separator",
    "| weight 5 t, isa +3\n            ^ separator",
    "| weight 5 t; weight 6 t\n              ^^^^^^^^^^ duplicate-clause",
    "| isa +3; oat 4 C\n          ^^^^^^^ duplicate-clause",
    "| phase hold; must any bank 3\n              ^^^^^^^^^^^^^^^ misplaced-clause",
    // A row in error is told once: its subject is no clause of its own.
    "| limits l; must landings bank 30\n                 ^^^^^^^^ unknown-phase",
    "| limits l; must landing, crusie bank 30\n                          ^^^^^^ unknown-phase",
    "| limits l; must bank 30\n                 ^^^^ missing-argument",
    "| limits l; must landing bnak 30\n                         ^^^^ unexpected-text",
    "| limits l; must landing bank 30 at night\n                                 ^^ unexpected-text",
    "| limits l; must climb landing bank 30\n                       ^^^^^^^ separator",
    "| limits l; may landing bank 30\n            ^^^ unknown-keyword",
    "| fase climb; bank 30\n  ^^^^ unknown-keyword",
    "| weight 5 t; bank 30; qqq\n                       ^^^ unknown-keyword",
    "| phase hold; claim 1.2; claim 106 kt\n                    ^ missing-argument\n                               ^^^ missing-argument",
    "| aircraft a; mass 4000 kg - 6200 kg\n                           ^^^^^^^^^ unexpected-text",
    '| phase hold "a\u001b[2Jb"\n               ^ unexpected-text',
    "| isa +3 (a\u202eb)\n           ^ unexpected-text",
    // Joiners belong to emoji and to some scripts.
    '| phase hold "👩\u200d✈️"',
    "| phase hold; bank -20\n                   ^^^ bad-quantity",
    '| source "x\n  ^^^^^^^^^ misplaced-clause\n         ^^ unclosed-title',
    "| qnh 1013 hPa (x\n               ^^ unclosed-remark",
    "| speed 200 kt (TAS)\n               ^^^^^ remark-not-read",
    "| bank 25\n  ^^^^^^^ point-needs-phase",
    "weight 5 t; isa +3\n^^^^^^^^^^^^^^^^^^ missing-bar",
    "| qnh 1013 hPa\nweight 5 t\n^^^^^^^^^^ missing-bar",
    "```plumb\n^^^^^^^^ no-bar-lines\ntext\n```",
    "~~~~ plumb\n^^^^^^^^^^ unclosed-fence\n| weight 5 t",
    "```text\n^^^^^^^ unclosed-fence\n| weight 5 t",
    "```text\nno bar here",
    "| a | b |\n| - | - |\n| weight | 5 |",
    "---\n| weight | x\n---\n| weight 5 t",
    "\\| weight nonsense",
    "| accept stalled to 3; phase hold\n         ^^^^^^^ missing-argument",
    "| phase hold; expect never-heard-of\n                     ^^^^^^^^^^^^^^ unknown-code",
    '| source "x", from 2026-02-30; aircraft a\n                   ^^^^^^^^^^ bad-quantity\n                               ^^^^^^^^^^ misplaced-clause',
  ])("%s", (marked) => check(marked));
});

describe("the first messages a newcomer meets", () => {
  it.each([
    ["| weight 61.4", "Weight 61.4 of what? Write 61.4 t, 61.4 kg or 61.4 lb."],
    ["| limits l; must landings bank 30", "landings is no phase: did you mean landing?"],
    [
      "| limits l; must night bank 30",
      "night is no phase: write any, emergency, takeoff, departure, climb, cruise, descent, hold, approach, circling, landing, missed or manoeuvre.",
    ],
    [
      "| limits l; may landing bank 30",
      "`may` is not a keyword: a row of limits begins with `must` or, where it is advice, with `should`.",
    ],
    [
      "| limits l; must any bank 30 at night",
      "at is no condition of a row: write `above` or `below` and a level, `when ifr`, `when vfr`, `when engine-out` or `after shear`, or leave it out.",
    ],
    ["| fase climb", '`fase` is not a keyword; did you mean `phase`, as in `phase departure "Noise turn"`?'],
    [
      "| phase hold; claim 106 kt",
      "A claim names a result, then its figure, as in `claim stall 106 kt`: write vs1g, overshoot, stall, warning, ratio, margin, load, stall-load, stall-bank, warning-bank, buffet-bank, buffet-load, radius, rate, rate-one-bank, v2min, vfto, vref or va first.",
    ],
    [
      "| aircraft a; mass 4 t - 6 t",
      "A range is written with `to`, as in `5 t to 9 t`: write it in place of `-`.",
    ],
    [
      "| aircraft a; config full stall 80 kt; vfe 130 kt",
      "`vfe` begins no clause, it is a part of one, as in `config flaps-5 stall 127 kt, vfe 228 kt`: write it there.",
    ],
    ["| landing; config full", "`landing` is a phase: write `phase landing`."],
    ["| climb 300 ft/min", "`climb` is not a keyword; did you mean `path`, as in `path -3 deg`?"],
    ["| bank 30 degrees left; phase hold", "A unit is written short: write deg instead of degrees."],
    ["| isa +3 weight 5 t", "Clauses are separated by `;`: put one here, before weight."],
    ["| flaps 5", "`flaps` is not a keyword; a configuration is `config flaps-5`."],
    ["| weight 61,4 t", "61,4 is not read, for the decimal mark is a point: write 61.4."],
    ["| altitude 3,000 ft", "Is 3,000 ft 3000 ft or 3 ft? Choose one."],
    [
      "| phase hold; phase climb",
      "A block is one moment of the plan and this is its second phase; a blank line before it begins a new point.",
    ],
    [
      "| aircraft brambling-37; phase hold",
      "`aircraft` begins a card; to use one here write `fly brambling-37`.",
    ],
    [
      "| qnh 1013 hPa | isa +3",
      "A `|` begins a line and means nothing inside it; if this is a Markdown table, leave a blank line above it and make its second line `| --- | --- |`.",
    ],
  ])("%s: %s", (text, message) => expect(messages(text)).toContain(message));
});

describe("quick fixes", () => {
  it.each([
    ["| weight 61.4", "| weight 61.4 t"],
    ["| weight 61,4 t", "| weight 61.4 t"],
    ["| wieght 5 t", "| weight 5 t"],
    ["| weight 5 t config clean", "| weight 5 t; config clean"],
    ["| weight: 5 t", "| weight 5 t"],
    ["| limits l; must climb landing bank 30", "| limits l; must climb, landing bank 30"],
    ["| limits l; must landings bank 30", "| limits l; must landing bank 30"],
    ["| limits l; may any bank 30", "| limits l; must any bank 30"],
    ["| fase climb", "| phase climb"],
    ["| landing; config full", "| phase landing; config full"],
    ["| config full stall 80 kt; landing; vfe 130 kt", "| config full stall 80 kt, landing; vfe 130 kt"],
    ["| phase hold; claim margin 1.3; within 0.1", "| phase hold; claim margin 1.3 within 0.1"],
    ["| bank 30 degrees left; phase hold", "| bank 30 deg left; phase hold"],
    ["| aircraft a; mass 4 t-6 t", "| aircraft a; mass 4 t to 6 t"],
    ["| aircraft a; mass 4 t – 6 t", "| aircraft a; mass 4 t to 6 t"],
    ["| qnh 1013 hPa (x", "| qnh 1013 hPa (x)"],
    ["| phase cruse", "| phase cruise"],
    ["weight 5 t; isa +3", "| weight 5 t; isa +3"],
    ["| isa 6", "| isa +6"],
    ["| speed 200 kt (TAS)", "| speed 200 kt tas"],
    ["| phase hold; claim stal 90 kt", "| phase hold; claim stall 90 kt"],
    ["| wing 100 m2, slope 5", "| wing 100 m2, slope 5 per rad"],
  ])("%s becomes %s", (text, mended) => {
    const document = openDocument(text, "plumb");
    const finding = [...document.blocks.flatMap((block) => block.findings), ...document.findings].find(
      (one) => one.fixes.length > 0,
    );
    const edits = [...(finding?.fixes[0]?.edits ?? [])].sort((a, b) => b.start - a.start);
    for (const { line, start, end, newText } of edits)
      document.edit({ line, character: start }, { line, character: end }, newText);
    expect(document.text()).toBe(mended);
  });
});

describe("what is prose", () => {
  it("in Markdown is everything outside plumb fences", () => {
    const document = openDocument(
      "| weight 5\n\n```plumb\n| weight 5 t\n```\n\n``` text\n| weight 5\n```\n\n  ~~~ PLUMB note\n  | isa +3\n  ~~~\n",
      "markdown",
    );
    expect(document.blocks.map((block) => block.lines.map((line) => line.text))).toEqual([
      ["| weight 5 t"],
      ["  | isa +3"],
    ]);
  });

  it("is a fence of another word, though it begins alike", () => {
    expect(openDocument("```plumbing\n| weight 5\n```\n", "markdown").blocks).toEqual([]);
  });

  it("is nothing between bar lines that a bare bar holds together", () => {
    expect(
      openDocument("| phase hold\n|\n| bank 5\n\n| isa +3", "plumb").blocks.map(
        (block) => block.lines.length,
      ),
    ).toEqual([3, 1]);
  });
});
