import { describe, expect, it } from "vitest";
import { type HintLevel, inlayHints } from "../../server/src/features/inlayHints.ts";
import type { Flavour } from "../../server/src/notation/document.ts";
import { besideDemo } from "../support/besideDemo.ts";

function hints(text: string, level: HintLevel = "full", flavour: Flavour = "plumb"): string[] {
  const note = besideDemo(text, flavour);
  return inlayHints(note, 0, note.document.lineCount - 1, level).map(
    ({ line, character, parts }) => `${line}:${character} ${parts.map((part) => part.text).join("")}`,
  );
}

const places = (text: string, level: HintLevel = "full") =>
  hints(text, level).map((one) => one.slice(0, one.indexOf(" ")));

const state = (qnh: string) => `| fly brambling-37; under shuttle-rules; weight 56.4 t${qnh}\n\n`;
const point =
  "| phase departure\n| burn 380 kg; config flaps-5; altitude 3200 ft; speed M 0.31\n| bank 25 left\n";

describe("while a line has an error", () => {
  it.each([
    ["with a qnh", "; qnh 985 hPa"],
    ["without", ""],
  ])("hints wait where hints were, and nowhere else: %s", (_, qnh) => {
    for (const level of ["full", "brief"] as const) {
      const whole = state(qnh) + point;
      const broken = whole.replace("56.4 t", "56.4");
      expect(places(broken, level)).toEqual(places(whole, level));
      expect(hints(broken, level).every((one) => one.endsWith("≈ …"))).toBe(true);
    }
  });

  it("the clause that is typed keeps the place of its hint", () => {
    const lines = (text: string) => hints(text).map((one) => one.replace(/:\d+ .*/, ""));
    const whole = state("; qnh 985 hPa") + point;
    expect(lines(whole.replace("bank 25 left", "bank"))).toEqual(lines(whole));
    expect(lines(whole.replace("burn 380 kg", "burn 380"))).toEqual(lines(whole));
  });
});

describe("in Markdown", () => {
  it("a card has one hint a line, and none is longer than the editor draws", () => {
    const card =
      "```plumb\n| aircraft plover-4; basis vs 0.94; reference 14000 kg\n| config clean stall 194 kt; config full stall 160 kt\n```\n";
    const shown = hints(card, "full", "markdown");
    expect(shown).toHaveLength(1);
    expect((shown[0] ?? "").replace(/^\S+ /, "").length).toBeLessThanOrEqual(43);
  });
});
