import { describe, expect, it } from "vitest";
import { openDocument } from "../../server/src/notation/openDocument.ts";
import { collectDefinitions } from "../../server/src/plan/collectDefinitions.ts";
import { commonPractice, commonPracticeDraft } from "../../server/src/plan/commonPractice.ts";
import { createFolder } from "../../server/src/plan/createFolder.ts";
import { lowerCard } from "../../server/src/plan/lowerCard.ts";
import { lowerLimits, resolveLimits } from "../../server/src/plan/lowerLimits.ts";
import { lineOf } from "../../server/src/plan/origin.ts";

function collect(text: string) {
  const { blocks } = openDocument(text, "plumb");
  const uri = "file:///definitions.plumb";
  const cards = blocks.filter((block) => block.kind === "card").map((block) => lowerCard(block, uri));
  const drafts = blocks.filter((block) => block.kind === "limits").map((block) => lowerLimits(block, uri));
  const limits = drafts.map((draft) => resolveLimits(draft, [commonPracticeDraft(), ...drafts]));
  const { definitions, findings } = collectDefinitions(cards, limits);
  const told = blocks.flatMap((block) =>
    [...(findings.get(block) ?? [])].map((one) => `${block.start + one.line} ${one.code}`),
  );
  return { definitions, told, findings: blocks.flatMap((block) => findings.get(block) ?? []) };
}

describe("definitions", () => {
  it("are found by name without regard to case", () => {
    const { definitions, told } = collect(
      "| aircraft Gorsechat-2\n\n| limits School-Rules\n| must any bank 30",
    );
    expect(definitions.card("gorseCHAT-2")).toMatchObject({
      kind: "found",
      definition: { name: "Gorsechat-2" },
    });
    expect(definitions.limitsNamed("school-rules")).toMatchObject({
      kind: "found",
      definition: { name: "School-Rules" },
    });
    expect(definitions.card("school-rules").kind).toBe("missing");
    expect(told).toEqual([]);
  });

  it("that are missing name the nearest by spelling, from three letters on", () => {
    const { definitions } = collect("| aircraft gorsechat-2\n\n| aircraft brambling-37");
    expect(definitions.card("gorsecat-2")).toMatchObject({ nearest: { name: "gorsechat-2" } });
    expect(definitions.card("brambling-3")).toMatchObject({ nearest: { name: "brambling-37" } });
    expect(definitions.card("xy")).toEqual({ kind: "missing", nearest: null });
    expect(definitions.limitsNamed("comon-practice")).toMatchObject({ nearest: { name: "common-practice" } });
  });

  it("given twice are no definition, and are told at each place with the others", () => {
    const { definitions, told, findings } = collect(
      "| aircraft twin-1\n\n| aircraft other-1\n\n| aircraft TWIN-1\n\n| aircraft twin-1",
    );
    const found = definitions.card("twin-1");
    expect(found.kind === "twice" && found.places.map(lineOf)).toEqual([0, 4, 6]);
    expect(told).toEqual(["0 duplicate-name", "4 duplicate-name", "6 duplicate-name"]);
    expect(findings[1]?.related.map(({ origin }) => lineOf(origin))).toEqual([0, 6]);
    expect(definitions.card("other-1").kind).toBe("found");
  });

  it("a card and limits may have one name", () => {
    const { definitions, told } = collect("| aircraft same-1\n\n| limits same-1");
    expect([definitions.card("same-1").kind, definitions.limitsNamed("same-1").kind]).toEqual([
      "found",
      "found",
    ]);
    expect(told).toEqual([]);
  });

  it("without a name are found by none", () => {
    const { definitions, told } = collect("| aircraft\n\n| aircraft\n\n| limits\n\n| limits");
    expect(definitions.card("").kind).toBe("missing");
    expect(definitions.limitsNamed("").kind).toBe("missing");
    expect(told).toEqual([]);
  });

  it("hold the built-in limits", () => {
    expect(collect("").definitions.limitsNamed("COMMON-practice")).toEqual({
      kind: "found",
      definition: commonPractice(),
    });
  });
});

describe("limits that take the reserved name", () => {
  function told(use: string): string[] {
    const text = `| limits common-practice\n| must any bank 50\n\n${use}\n`;
    const note = createFolder({ today: "2026-12-01" }).open("file:///note.plumb", text, "plumb");
    return note
      .findings()
      .flatMap(({ line, finding }) => (finding.severity === "error" ? [`${line} ${finding.code}`] : []));
  }

  it.each([
    ["under them", "| under common-practice"],
    ["with their rows", "| limits own, from common-practice"],
  ])("are an error at their place, once, and where a note is %s", (_, use) => {
    expect(told(use)).toEqual(["0 duplicate-name", "3 duplicate-name"]);
  });
});
