import { expect, it } from "vitest";
import { createFolder } from "../../server/src/plan/createFolder.ts";

const note = `| aircraft wheatear-9; basis vsr; reference 9 t; mass 5 t to 9 t; warning 1.05
| config clean stall 95 kt, load -1 to 3, vfe 180 kt

| fly wheatear-9; weight 8 t; config clean; altitude FL100; speed 170 kt
`;

/** Where the speed of a point that is too fast is said to come from. */
function speedsOrigin(points: string): readonly string[] {
  const opened = createFolder({ today: "2026-12-01" }).open("file:///n.plumb", note + points, "plumb");
  const found = opened.findings().filter(({ finding }) => finding.code === "over-vfe");
  expect(found).toHaveLength(1);
  return found[0]?.finding.related.map(({ message }) => message) ?? [];
}

it("a speed that the point states itself is not said to come from the line it replaces", () => {
  const stated = speedsOrigin("\n| phase cruise; speed 190 kt\n");
  expect(stated).toContain("The card states vfe here.");
  expect(stated).not.toContain("The speed was stated here.");
});

it("a speed that is carried is said to come from its line", () => {
  const carried = speedsOrigin("\n| speed 190 kt\n\n| phase cruise; bank 10\n");
  expect(carried).toContain("The speed was stated here.");
});
