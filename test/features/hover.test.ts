import { describe, expect, it } from "vitest";
import { hover } from "../../server/src/features/hover.ts";
import { besideDemo } from "../support/besideDemo.ts";
import { atCursor } from "../support/fixture.ts";

function shown(marked: string): string {
  const { text, line, character } = atCursor(marked);
  return hover(besideDemo(text), line, character)?.text ?? "";
}

const state =
  "| fly brambling-37; under shuttle-rules; weight 56.4 t +- 0.4 t; qnh 985 hPa; contamination heavy-rain\n\n";
const point = (last: string) =>
  `${state}| phase departure\n| burn 380 kg; config flaps-5; altitude 3200 ft; speed M 0.31\n| ${last}\n`;

describe("the hover of a point", () => {
  it("names the line of every input, also of those that came from above", () => {
    const text = shown(point("ba$0nk 25 left; engine-out left"));
    expect(text).toContain(
      "From: 56.02 t (line 4); flaps-5 (line 4); 3200 ft (line 4) on 985 hPa (line 1); ISA 0 (assumed); ",
    );
    expect(text).toContain(
      "contamination heavy-rain 15 % (line 1); left engine out (line 5); brambling-37 (line 1).",
    );
    expect(text).toContain("With their tolerances: weight 55.62 t to 56.42 t; the worst corner is shown.");
  });

  it("shows how the banks and the radius come about at the bank, and the ratios elsewhere", () => {
    const turn = shown(point("ba$0nk 25"));
    expect(turn).toMatch(/stall-bank = arccos\(cos 0\.0° \/ 1\.\d\d\) = \d\d°/);
    expect(turn).toMatch(/radius = TAS² cos 0\.0° \/ \(g tan 25°\), TAS = 202 kt tas: 1\.28 nm/);
    expect(turn).not.toContain("margin = V / stall");
    const phase = shown(point("bank 25").replace("departure", "depar$0ture"));
    expect(phase).toMatch(/margin = V \/ stall = 191 kt \/ \d+ kt = 1\.\d\d/);
    expect(phase).toMatch(/warning = 1\.03\d* times the stall speed with loss = 0: \d+ kt/);
  });

  it("begins with what the clause is about", () => {
    expect(shown(point("bank 25").replace("speed M", "sp$0eed M"))).toMatch(
      /^\*\*191 kt = 202 kt tas = M 0\.310/,
    );
    expect(shown(point("bank 25").replace("altitude", "alti$0tude"))).toMatch(
      /^\*\*pressure altitude \d+ ft, FL039\*\*/,
    );
    expect(shown(point("bank 25; cl$0aim stall 120 kt"))).toMatch(
      /^\*\*stall 147 kt now: the claim is stale\*\*/,
    );
  });

  it("says of a claim the figure that it was held against, that of a sweep's worst row", () => {
    // The row that is shown is the first that breaks a rule, with less load.
    expect(shown(point("bank 0 to 60 by 15; cl$0aim load 2.00"))).toMatch(
      /^\*\*load 2\.00 now: the claim holds\*\*/,
    );
  });

  it("says of a row that is kept its bound as it is written, and a figure that reads as kept", () => {
    const text = shown(
      "| limits fine\n| must any ratio 1.2345\n\n| fly brambling-37; under fine\n\n| pha$0se cruise; weight 55 t; config clean; altitude 0 ft; speed 1.237 vs1g",
    );
    expect(text).toContain("- must any ratio 1.2345: 1.237, at least 1.2345, kept");
  });

  it("lists rows that are switched off where no other row is left", () => {
    const text = shown(
      "| limits no-bank\n| must any bank none\n\n| fly brambling-37; under no-bank\n\n| pha$0se cruise; weight 55 t; config clean; altitude FL200; speed 250 kt",
    );
    expect(text).toContain("- must any bank none: switched off");
  });
});

describe("an author's text in a hover", () => {
  it("is never Markdown: no link, no picture, no broken table", () => {
    const title = 'see [here](command:x) ![p](https://example.invalid/p.png) <img src="a"> a|b *c*';
    const quoted = title.replaceAll('"', "'");
    const text = shown(
      `| aircraft ker$0n-2 "${quoted}"; basis vsr; reference 4 t\n| source "${quoted}"\n| config clean stall 94 kt`,
    );
    expect(text).toContain("**kern-2**");
    expect(text).not.toMatch(/(?<!\\)\[here|(?<!\\)!\[|(?<!\\)<img|(?<!\\)\|b|(?<!\\)\*c/);
    expect(text.replace(/\\(?=[^\w\s])/g, "")).toContain(quoted);
  });
});
