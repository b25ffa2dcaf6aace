import { describe, expect, it } from "vitest";
import { openDocument } from "../../server/src/notation/openDocument.ts";
import { commonPractice, commonPracticeText } from "../../server/src/plan/commonPractice.ts";

describe("the built-in limits", () => {
  it("are read without a finding", () => {
    const { blocks } = openDocument(commonPracticeText, "plumb");
    expect(blocks.map((block) => block.kind)).toEqual(["limits"]);
    expect(blocks.flatMap((block) => block.findings)).toEqual([]);
    expect(commonPractice()).toMatchObject({
      name: "common-practice",
      builtIn: true,
      withheld: null,
      findings: [],
      origin: { uri: "plumbline:common-practice" },
    });
  });

  it("are these rows, each with its source or as common practice", () => {
    expect(commonPractice().rows.map(({ text, remark }) => [text, remark])).toEqual([
      ["must any bank 30", expect.stringContaining("common practice, no source")],
      ["should any bank 25 or rate-one when ifr", expect.stringContaining("ICAO Doc 8168")],
      ["should any bank 15 above FL300", expect.stringContaining("common practice")],
      ["must takeoff bank 15 when engine-out", "14 CFR 121.189(f)"],
      ["must takeoff, departure, missed ratio 1.13, vs 1.2", "14 CFR 25.107(b)"],
      ["should climb ratio 1.18, vs 1.25", "14 CFR 25.107(g)"],
      [
        "must approach, circling, landing ratio 1.23, vs 1.3",
        expect.stringMatching(/^14 CFR 25\.125\(b\)\(2\) for landing;.*common practice$/),
      ],
      ["should any overshoot 15", expect.stringContaining("14 CFR 25.143(h)")],
      ["should any buffet 1.3 above FL250", expect.stringContaining("14 CFR 25.251(e)")],
      ["must manoeuvre bank 60", expect.stringContaining("14 CFR 91.307(c)")],
      ["should manoeuvre overshoot none", expect.stringContaining("common practice")],
      ["should manoeuvre bank none when ifr", expect.stringContaining("common practice")],
      ["should manoeuvre bank none above FL300", expect.stringContaining("common practice")],
    ]);
  });

  it("are the same object each time", () => {
    expect(commonPractice()).toBe(commonPractice());
  });
});
