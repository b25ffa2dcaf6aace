import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { caution } from "../../server/src/plan/caution.ts";
import { createFolder } from "../../server/src/plan/createFolder.ts";
import { formatResult } from "../../server/src/plan/format.ts";
import { type Comparison, compare, type ItemChange, isEdit } from "../../server/src/report/compare.ts";
import { comparisonJson } from "../../server/src/report/comparisonJson.ts";
import { comparisonText } from "../../server/src/report/comparisonText.ts";
import { furtherRows } from "../../server/src/report/furtherRows.ts";
import { solvedText } from "../../server/src/report/openText.ts";
import { fileJson } from "../../server/src/report/pointsJson.ts";

const card = `| aircraft wheatear-9 "invented"; source "invented"; basis vsr; reference 9 t; warning 1.05
| config clean stall 95 kt, load -1 to 2.5
| config full stall 80 kt, load 0 to 2, vfe 150 kt, landing

| limits own-rules, from base-rules
| must any bank 40

| limits base-rules
| must any bank 35; must any ratio 1.1
`;

const start = "| fly wheatear-9; under own-rules; weight 8 t; config clean; altitude FL100; speed 190 kt";

/** A folder of one note, beside its cards. */
function revision(text: string, cards = card) {
  const folder = createFolder({ today: "2026-12-01" });
  folder.open("file:///plan/cards.plumb", cards, "plumb");
  return { note: folder.open("file:///plan/note.plumb", text, "plumb"), path: "note.plumb" };
}

function compared(old: string, now: string, oldCards = card, newCards = card): Comparison {
  return compare(revision(old, oldCards), revision(now, newCards));
}

/** An edit as one line: its kind, the titles on both sides, and the clauses. */
function editOf({ old, new: now, moved, inputs, accepts }: ItemChange): string {
  const name = (item: typeof old) => item && (item.point?.title ?? item.point?.phase ?? "setting");
  const clauses = [...inputs, ...accepts].map((one) => `${one.old?.text ?? "-"} > ${one.new?.text ?? "-"}`);
  if (!old) return `new ${name(now)}`;
  if (!now) return `gone ${name(old)}`;
  return [moved ? "moved" : "edited", name(now), ...clauses].join(" / ");
}

const edits = ({ items }: Comparison) => items.filter(isEdit).map(editOf);
const shownResults = (change: ItemChange | undefined) =>
  Object.fromEntries(
    (change?.results ?? []).map((one) => [one.name, `${one.old?.shown ?? "-"} > ${one.new?.shown ?? "-"}`]),
  );

/** A point of a long plan: its title, then what is flown there. */
interface Leg {
  readonly title: string | null;
  readonly bank: number;
  readonly speed: number;
  readonly burn: number;
}

const phase = (n: number) => ["climb", "cruise", "descent", "hold"][n % 4] as string;

function legText({ title, bank, speed, burn }: Leg, n: number): string {
  return `| phase ${phase(n)}${title ? ` "${title}"` : ""}\n| speed ${speed} kt; bank ${bank}; burn ${burn} kg`;
}

const legs = Array.from({ length: 30 }, (_, n): Leg & { readonly text: string } => {
  const leg = { title: `Leg ${n + 1}`, bank: 5 + n, speed: 180 + n, burn: 10 + n };
  return { ...leg, text: legText(leg, n) };
});
const plan = (texts: readonly string[]) => `${[start, ...texts].join("\n\nProse.\n\n")}\n`;
const thirty = legs.map((leg) => leg.text);

describe("a note of 30 points", () => {
  it("compared with itself in another layout has no change", () => {
    const other = plan(thirty)
      .replaceAll("Prose.", "Other prose,\non two lines.")
      .replaceAll("; bank", "\n|   BANK")
      .replace("weight 8 t; config clean", "config   clean; weight 8t");
    const comparison = compared(plan(thirty), other);
    expect(comparison).toMatchObject({ same: true, items: [], definitions: [], findings: [] });
    expect(comparisonText(comparison, "table")).toContain("Nothing changed in the plan");
  });

  it("compared with an edited and reordered copy shows exactly the edits", () => {
    const copy = [...thirty];
    copy[3] = (copy[3] as string).replace("bank 8", "bank 9 left");
    copy[11] = (copy[11] as string).replace('"Leg 12"', '"Leg twelve"');
    copy[17] = (copy[17] as string).replace("phase cruise", "phase climb");
    copy[20] = `${copy[20]}; claim margin 1.4; accept bank-over-limit to 45 because "terrain"`;
    const [moved] = copy.splice(7, 1) as [string];
    copy.splice(24, 0, moved.replace("speed 187 kt", "speed 200 kt"));
    copy.splice(14, 1);
    copy.splice(1, 0, '| phase manoeuvre "Come"\n| speed 190 kt; bank 30');
    expect(edits(compared(plan(thirty), plan(copy)))).toEqual([
      "new Come",
      "edited / Leg 4 / bank 8 > bank 9 left",
      'edited / Leg twelve / phase hold "Leg 12" > phase hold "Leg twelve"',
      "gone Leg 16",
      'edited / Leg 18 / phase cruise "Leg 18" > phase climb "Leg 18"',
      'edited / Leg 21 / - > claim margin 1.4 / - > accept bank-over-limit to 45 because "terrain"',
      "moved / Leg 8 / speed 187 kt > speed 200 kt",
    ]);
  });

  it("finds untitled points of one phase by what they say", () => {
    const untitled = legs.map((_, n) => `| phase cruise\n| speed ${180 + n} kt; bank ${n}; path ${n} deg`);
    const copy = [...untitled];
    copy[9] = (copy[9] as string).replace("bank 9;", "bank 10;");
    copy.splice(4, 1);
    copy.splice(20, 0, "| phase cruise\n| speed 250 kt");
    expect(edits(compared(plan(untitled), plan(copy)))).toEqual([
      "gone cruise",
      "edited / cruise / bank 9 > bank 10",
      "new cruise",
    ]);
  });

  it("has as many edits as were made, whatever they are", () => {
    const edit = fc.oneof(
      fc.record({
        kind: fc.constant("bank" as const),
        at: fc.nat(29),
        value: fc.integer({ min: 40, max: 80 }),
      }),
      fc.record({ kind: fc.constant("drop" as const), at: fc.nat(29), value: fc.constant(0) }),
      fc.record({ kind: fc.constant("move" as const), at: fc.nat(29), value: fc.nat(29) }),
      fc.record({ kind: fc.constant("add" as const), at: fc.nat(29), value: fc.nat(29) }),
    );
    // One edit a point: what two edits of one point come to is another question.
    const several = fc.uniqueArray(edit, { maxLength: 5, selector: (one) => one.at });
    fc.assert(
      fc.property(several, fc.boolean(), (made, titled) => {
        const texts = legs.map((leg, n) => (titled ? leg.text : legText({ ...leg, title: null }, n)));
        const old = texts.map((text, n) => ({ n, text }));
        let now = [...old];
        for (const { kind, at, value } of made) {
          const place = now.findIndex((one) => one.n === at);
          const one = now[place] as { n: number; text: string };
          if (kind === "bank") now[place] = { n: at, text: one.text.replace(/bank \d+/, `bank ${value}`) };
          else if (kind === "add") now.splice(value, 0, { n: -1, text: `| phase missed "Added ${at}"` });
          else {
            now.splice(place, 1);
            if (kind === "move") now.splice(value, 0, one);
          }
        }
        const { items } = compared(plan(old.map((one) => one.text)), plan(now.map((one) => one.text)));
        const found = items.filter(isEdit);
        const count = (kind: string) => made.filter((one) => one.kind === kind).length;
        expect(found.filter((one) => !one.new)).toHaveLength(count("drop"));
        expect(found.filter((one) => !one.old)).toHaveLength(count("add"));
        expect(found.filter((one) => one.inputs.length > 0 && one.old && one.new)).toHaveLength(
          count("bank"),
        );
        // A point that came back to its place, as its neighbours went, did not move.
        expect(found.filter((one) => one.moved).length).toBeLessThanOrEqual(count("move"));
        now = now.filter((one) => 0 <= one.n);
        const kept = now.every((one, i) => i === 0 || (now[i - 1] as { n: number }).n < one.n);
        expect(found.some((one) => one.moved)).toBe(!kept);
      }),
      { numRuns: 60 },
    );
  });

  it("goes back by the same edits", () => {
    const order = fc.shuffledSubarray(thirty, { minLength: 20 });
    fc.assert(
      fc.property(order, order, (old, now) => {
        const there = compared(plan(old), plan(now)).items.filter(isEdit);
        const back = compared(plan(now), plan(old)).items.filter(isEdit);
        const names = (items: readonly ItemChange[], side: "old" | "new") =>
          items
            .filter((one) => !one[side])
            .map(editOf)
            .map((one) => one.replace(/^\w+ /, ""))
            .sort();
        expect(names(there, "new")).toEqual(names(back, "old"));
        expect(names(there, "old")).toEqual(names(back, "new"));
      }),
      { numRuns: 30 },
    );
  });
});

describe("results and findings", () => {
  const two = (burn: string, more = "") =>
    `${start}\n\n| phase climb "First"\n| burn ${burn}; bank 20\n\n| phase cruise "Second"\n| burn 100 kg; bank 30${more}\n`;

  it("that changed by what carries down are results of the point, not edits of it", () => {
    const { items } = compared(two("200 kg"), two("900 kg"));
    expect(items.map((one) => [one.new?.point?.title, one.inputs.length, one.because])).toEqual([
      ["First", 1, []],
      ["Second", 0, ["what carries down from before"]],
    ]);
    expect(shownResults(items[1])).toMatchObject({ weight: "7.70 t > 7.00 t", stall: "95 kt > 90 kt" });
  });

  it("count as changed where the figure that is shown is another, and only there", () => {
    const { items } = compared(two("200 kg"), two("200.4 kg"));
    // Less than a kilogram is below what a weight in tonnes shows here, and moves no stall speed by a knot.
    expect(items.map((one) => [one.new?.point?.title, Object.keys(shownResults(one))])).toEqual([
      ["First", []],
    ]);
  });

  it("are given in full in JSON beside what is shown", () => {
    const json = comparisonJson(compared(two("200 kg"), two("900 kg"))) as {
      points: {
        results: { name: string; old: { shown: string; value: { high: number; unit: string } } }[];
      }[];
    };
    const stall = json.points[1]?.results.find((one) => one.name === "stall");
    expect(stall?.old.shown).toBe("95 kt");
    expect(stall?.old.value.unit).toBe("kt");
    expect(stall?.old.value.high).toBe(fileJson(revision(two("200 kg")).note, "").points[1]?.stall_high_kt);
    expect(json).toMatchObject({ schema: 1, caution });
  });

  it("tell what is found anew and what is gone, and count both revisions", () => {
    const comparison = compared(two("200 kg"), two("200 kg").replace("bank 30", "bank 50"));
    expect(comparison.items[0]?.findings.map(({ old, new: now }) => [old?.code, now?.code])).toEqual([
      [undefined, "bank-over-limit"],
    ]);
    expect([comparison.old.findings.error, comparison.new.findings.error]).toEqual([0, 1]);
    const back = compared(two("200 kg").replace("bank 30", "bank 50"), two("200 kg"));
    expect(comparisonText(back, "table")).toMatch(
      /gone, error: Bank 50° exceeds the 40°.*\[bank-over-limit\]/,
    );
  });

  it("are the same where only the lines moved that messages name", () => {
    const broken = two("200 kg").replace("weight 8 t; ", "");
    const { same } = compared(broken, `Prose.\n\n${broken}`);
    expect(revision(broken).note.findings().length).toBeGreaterThan(0);
    expect(same).toBe(true);
  });

  it("say why a point has figures no more", () => {
    const { items } = compared(two("200 kg"), two("200 kg").replace("bank 20", "bnak 20"));
    expect(items.map((one) => shownResults(one).figures)).toContain(
      "computed > none (unknown-keyword, line 4)",
    );
  });

  it("name the tightest margin and ratio with their points", () => {
    const { old, new: now } = compared(two("200 kg"), two("200 kg", "; speed 150 kt"));
    expect([old.margin?.point.title, now.margin?.point.title, now.ratio?.point.title]).toEqual([
      "Second",
      "Second",
      "Second",
    ]);
    expect(Number(now.margin?.shown)).toBeLessThan(Number(old.margin?.shown));
    expect(compared("Prose.", "Prose.").old.margin).toBeNull();
  });

  it("read as they do everywhere: further ones, what is found, and each value of a sweep", () => {
    const note = (weight: string, bank: string) =>
      `${start.replace("8 t", weight)}\n\n| phase climb; bank ${bank}; shear 10 kt; decel 1 kt/s\n\n| phase cruise; bank 0 to 40 by 20\n`;
    const { items } = compared(note("8 t", "20"), note("8.9 t", "?"));
    const points = revision(note("8.9 t", "?"))
      .note.results()
      .flatMap((one) => (one.kind === "point" ? one.point : []));
    const now = (index: number) => new Map(items[index]?.results.map((one) => [one.name, one.new?.shown]));
    const [solved, swept] = points;
    const rows = solved ? furtherRows(solved) : [];
    expect(rows.map((one) => one.name)).toContain("time to warning");
    for (const { name, text } of rows) expect([name, now(1).get(name) ?? text]).toEqual([name, text]);
    expect(now(1).get("time to warning")).toMatch(/^\d+ s$/);
    expect(now(1).get("found")).toBe(solved?.solved && `bank ${solvedText(solved.solved)}`);
    const last = swept?.sweep?.rows[2]?.point.results?.margin;
    expect(now(2).get("bank 40")).toContain(`margin ${last && formatResult("margin", last)}, `);
  });

  it("of a setting are its edits", () => {
    const comparison = compared(two("200 kg"), two("200 kg").replace("altitude FL100", "altitude FL200"));
    expect(edits(comparison)).toEqual(["edited / setting / altitude FL100 > altitude FL200"]);
    expect(comparison.items[1]?.because).toEqual(["what carries down from before"]);
  });
});

describe("cards and limits that changed", () => {
  const note = `${start}\n\n| phase climb; bank 37\n`;

  it("are told clause by clause, and named at the points that use them", () => {
    const { definitions, items } = compared(note, note, card, card.replace("stall 95 kt", "stall 97 kt"));
    expect(
      definitions.map(({ new: now, parts }) => [now?.kind, now?.name, parts.map((one) => one.new?.text)]),
    ).toEqual([["card", "wheatear-9", ["config clean stall 97 kt, load -1 to 2.5"]]]);
    expect(items.map((one) => one.because)).toEqual([["the card wheatear-9"]]);
  });

  it("are told of the limits that others take their rows from", () => {
    const { definitions, items } = compared(note, note, card, card.replace("ratio 1.1", "ratio 2.5"));
    expect(definitions.map(({ new: now }) => now?.name)).toEqual(["base-rules"]);
    expect(items.map((one) => [one.because, one.findings.map(({ new: now }) => now?.code)])).toEqual([
      [["the limits base-rules"], ["ratio-short"]],
    ]);
  });

  it("are told when they come or go, and not where nobody uses them", () => {
    const gone = compared(note, note, card, card.replace(/\| limits base-rules[\s\S]*/, ""));
    expect(comparisonText(gone, "table")).toContain("The limits base-rules are gone");
    const other = "\n| aircraft dunlin-2; basis vsr; reference 9 t\n";
    expect(compared(note, note, card, card + other).same).toBe(true);
  });
});

describe("the text", () => {
  it("lets no mark of an author mean anything in Markdown", () => {
    const titled = (title: string) => `${start}\n\n| phase climb "${title}"; bank 20\n`;
    const text = comparisonText(compared(titled("a"), titled("<img src=x> | `b` [c](d)")), "markdown");
    expect(text).toContain("\\<img src=x\\> \\| \\`b\\` \\[c\\](d)");
    expect(text).not.toMatch(/[^\\]<img/);
  });
});
