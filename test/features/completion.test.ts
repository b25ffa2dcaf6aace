import { describe, expect, it } from "vitest";
import { completion } from "../../server/src/features/completion.ts";
import { completionOf } from "../../server/src/lsp/convert.ts";
import { besideDemo } from "../support/besideDemo.ts";
import { atCursor } from "../support/fixture.ts";

function at(marked: string) {
  const { text, line, character } = atCursor(marked);
  return completion(besideDemo(text), line, character).toSorted((a, b) => a.rank - b.rank);
}

const labels = (marked: string) => at(marked).map((one) => one.label);

describe("after a number", () => {
  it.each([
    ["| weight 61.4 t $0", ["+-"]],
    ["| altitude FL350 $0", ["+-"]],
    ["| weight 61.4 t +- 0.5 $0", ["t", "kg", "lb", "N", "kN"]],
    ["| weight 61.4 t +- 0.5 t $0", []],
    ["| qnh 1013 hPa $0", []],
    ["| phase hold; bank 25 $0", ["deg", "left", "right", "+-"]],
    ["| burn 2.4 t/h $0", ["for"]],
    ["| burn 2.4 t/h for 35 $0", ["h", "min", "s"]],
    ["| cg 22 % $0", ["+-"]],
  ])("%s", (marked, wanted) => expect(labels(marked)).toEqual(wanted));

  it("a speed may have a tolerance", () => {
    expect(labels("| phase hold; speed 200 kt $0")).toEqual(expect.arrayContaining(["cas", "tas", "+-"]));
  });
});

describe("a keyword", () => {
  it("comes with the unit that was used last", () => {
    const inserted = (marked: string, keyword: string) =>
      at(marked).find((one) => one.label === keyword)?.insertText;
    expect(inserted("| weight 5400 lb\n\n| phase hold; wei$0", "weight")).toBe("weight $1 lb$0");
    expect(inserted("| altitude FL350\n\n| phase hold; $0", "altitude")).toBe("altitude FL$0");
    expect(inserted("| weight 5 t\n\n| weight 5400 lb\n\n| phase hold; $0", "weight")).toBe("weight $1 lb$0");
    expect(inserted("| phase hold; $0\n\n| weight 5400 lb", "weight")).toBe("weight $0");
    expect(inserted("| phase hold; $0", "qnh")).toBe("qnh $0");
  });

  it("leaves nothing behind the cursor for a client without snippets", () => {
    const items = at("| weight 5400 lb\n\n| phase hold; $0").map((one) => completionOf(one, 2, false));
    const written = items.map((one) => (one.textEdit as { newText: string }).newText);
    expect(written).toContain("weight ");
    expect(written.join("\n")).not.toContain("$");
    const speeds = at("| phase hold; speed $0").map((one) => completionOf(one, 0, false));
    expect(speeds.map((one) => (one.textEdit as { newText: string }).newText)).toContain("1.3 vs1g");
  });

  it("that begins a card or limits comes after a point and an aeroplane", () => {
    expect(labels("| $0").slice(0, 4).sort()).toEqual(["aircraft", "fly", "limits", "phase"]);
  });
});
