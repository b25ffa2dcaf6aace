import { describe, expect, it } from "vitest";
import { openDocument } from "../../server/src/notation/openDocument.ts";
import { commonPracticeDraft } from "../../server/src/plan/commonPractice.ts";
import type { Limits, Row } from "../../server/src/plan/limits.ts";
import { type LimitsDraft, lowerLimits, resolveLimits } from "../../server/src/plan/lowerLimits.ts";

function drafts(text: string): LimitsDraft[] {
  return openDocument(text, "plumb").blocks.map((block) => lowerLimits(block, "file:///limits.plumb"));
}

/** The first limits of a text, with what they take from the others. */
function resolved(text: string): Limits {
  const all = drafts(text);
  const [first] = all;
  if (!first) throw new Error("The text holds no limits.");
  return resolveLimits(first, [commonPracticeDraft(), ...all]);
}

function row(text: string): Row {
  const [first] = resolved(`| limits a\n| ${text}`).rows;
  if (!first) throw new Error(`No row was read: ${text}`);
  return first;
}

describe("a row", () => {
  it("is read in SI", () => {
    expect(row("must takeoff, missed bank 15 when engine-out above FL100 after shear")).toMatchObject({
      verb: "must",
      phases: ["takeoff", "missed"],
      subject: "bank",
      value: expect.closeTo(Math.PI / 12, 12),
      vs: null,
      rateOne: false,
      when: ["engine-out"],
      afterShear: true,
      levels: [{ kind: "above", altitude: expect.closeTo(3048, 9), flightLevel: true }],
      limitsName: "a",
    });
    expect(row("should any radius 1.5 nm below 3000 ft")).toMatchObject({
      value: 2778,
      levels: [{ kind: "below", altitude: expect.closeTo(914.4, 9), flightLevel: false }],
    });
    expect(row("must landing ratio 1.23, vs 1.3")).toMatchObject({ value: 1.23, vs: 1.3 });
    expect(row("should any bank 25 or rate-one when ifr")).toMatchObject({ rateOne: true, when: ["ifr"] });
    expect(row("should any overshoot none")).toMatchObject({ value: null });
  });

  it.each([
    ["must any bank 30", "must any bank 30", null],
    ["must  any\tbank   30", "must any bank 30", null],
    ["must any bank 30 (common practice, no source)", "must any bank 30", "common practice, no source"],
    ["must any bank 30 (14 CFR 25.107(b))", "must any bank 30", "14 CFR 25.107(b)"],
    ["must any bank 30 (see (a); (b)); should any bank 20", "must any bank 30", "see (a); (b)"],
    ["must any (all of (them)) bank 30", "must any bank 30", null],
    ["must any bank 30 (one) (two)", "must any bank 30", "one; two"],
    ["must any bank 30; (not its own)", "must any bank 30", null],
  ])("%s is quoted without its remark, which is its source", (text, quoted, remark) => {
    expect(row(text)).toMatchObject({ text: quoted, remark });
  });

  it("in error is not held, and the others are", () => {
    const limits = resolved("| limits a\n| must any bank 300\n| must any load 2\n| must any bank 2O");
    expect(limits.rows.map((one) => one.text)).toEqual(["must any load 2"]);
    expect(limits.withheld).toBeNull();
    expect(limits.findings.map((one) => `${one.line} ${one.code}`)).toEqual(["1 out-of-range"]);
    expect(limits.block.findings.map((one) => `${one.line} ${one.code}`)).toEqual(["3 unexpected-text"]);
  });

  it("with a level that cannot be is not held at every level", () => {
    expect(resolved("| limits a\n| must any bank 20 above 300000 ft").rows).toEqual([]);
  });
});

describe("rows taken with `from`", () => {
  const base = "\n\n| limits base\n| must any bank 20\n| must any bank 15 above FL300\n| should any load 2";

  function texts(own: string): string[] {
    return resolved(`| limits a, from base\n${own}${base}`).rows.map(
      (one) => `${one.limitsName}: ${one.text}`,
    );
  }

  it("come first", () => {
    expect(texts("| must any margin 1.2")).toEqual([
      "base: must any bank 20",
      "base: must any bank 15 above FL300",
      "base: should any load 2",
      "a: must any margin 1.2",
    ]);
  });

  it("are replaced by one of the same verb, phases, subject and conditions, and by no other", () => {
    expect(texts("| must any bank 40")).toEqual([
      "base: must any bank 15 above FL300",
      "base: should any load 2",
      "a: must any bank 40",
    ]);
    expect(texts("| must any bank 40 above FL300")).not.toContain("base: must any bank 15 above FL300");
    expect(texts("| must any bank 40 above FL290")).toContain("base: must any bank 15 above FL300");
    expect(texts("| should any bank 10")).toContain("base: must any bank 20");
    expect(texts("| must cruise bank 10")).toContain("base: must any bank 20");
  });

  it("are replaced whatever the order of phases and conditions is", () => {
    const limits = resolved(
      "| limits a, from b\n| must missed, takeoff bank 10 below FL200 when ifr\n\n| limits b\n| must takeoff, missed bank 15 when ifr below FL200",
    );
    expect(limits.rows.map((one) => one.text)).toEqual(["must missed, takeoff bank 10 below FL200 when ifr"]);
  });

  it("come through limits that take them themselves", () => {
    const limits = resolved(
      `| limits a, from b\n| must any margin 1.2\n\n| limits b, from base\n| must any bank 25${base}`,
    );
    expect(limits.rows.map((one) => `${one.limitsName}: ${one.text}`)).toEqual([
      "base: must any bank 15 above FL300",
      "base: should any load 2",
      "b: must any bank 25",
      "a: must any margin 1.2",
    ]);
  });

  it("may be the built-in ones", () => {
    const limits = resolved("| limits a, from Common-Practice\n| must any bank 20");
    expect(limits.rows).toHaveLength(13);
    expect(limits.builtIn).toBe(false);
  });
});

describe("limits that hold nothing", () => {
  function withheld(text: string) {
    const limits = resolved(text);
    const [finding] = [...limits.findings, ...limits.block.findings];
    expect(limits.withheld, text).not.toBeNull();
    return { code: limits.withheld?.code, finding, rows: limits.rows };
  }

  it("take rows from a name that is nowhere; the nearest is offered", () => {
    const { code, finding, rows } = withheld("| limits a, from bse\n| must any bank 20\n\n| limits base");
    expect([code, rows.length]).toEqual(["unknown-limits", 0]);
    expect(finding).toMatchObject({ code: "unknown-limits", severity: "error", line: 0 });
    expect(finding?.fixes[0]?.edits).toEqual([{ line: 0, start: 17, end: 20, newText: "base" }]);
  });

  it("take rows from a name that is given twice", () => {
    const { code, finding } = withheld("| limits a, from b\n\n| limits b\n\n| limits b");
    expect(code).toBe("duplicate-name");
    expect(finding).toMatchObject({ code: "duplicate-name", severity: "error", line: 0 });
  });

  it("take them from limits that hold nothing", () => {
    expect(withheld("| limits a, from b\n\n| limits b, from nowhere").code).toBe("broken-definition");
    expect(withheld("| limits a, from b\n\n| limits b\n| mst any bank 20").code).toBe("broken-definition");
  });

  it.each([
    ["| limits a, from a", "a takes its rows from itself"],
    ["| limits a, from b\n\n| limits b, from a", "a takes its rows from b, which leads back to a"],
    [
      "| limits a, from b\n\n| limits b, from c\n\n| limits c, from a",
      "a takes its rows from b, which leads back to a",
    ],
  ])("take them in a circle, which is an error at each: %s", (text, message) => {
    const all = drafts(text);
    for (const draft of all) {
      const { findings, rows, withheld: why } = resolveLimits(draft, all);
      expect(findings).toMatchObject([{ code: "broken-definition", severity: "error" }]);
      expect(rows).toEqual([]);
      expect(why?.code).toBe("broken-definition");
    }
    expect(withheld(text).finding?.message).toContain(message);
  });

  it("lead into a circle that they are no part of", () => {
    const { finding } = withheld("| limits a, from b\n\n| limits b, from c\n\n| limits c, from b");
    expect(finding?.message).toMatch(/^b has an error/);
  });

  it("have an error in their first clause, where `from` may have been meant", () => {
    expect(withheld("| limits a form base\n| must any load 2\n\n| limits base").code).toBe("unexpected-text");
    expect(withheld("| limits a, from\n| must any load 2").code).toBe("missing-argument");
    expect(withheld("| limits\n| must any load 2").code).toBe("missing-argument");
  });

  it("have a keyword that is none", () => {
    expect(withheld("| limits a\n| mst any bank 20\n| must any load 2").code).toBe("unknown-keyword");
  });
});
