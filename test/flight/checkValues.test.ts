import { describe, expect, it } from "vitest";
import { type CheckValue, checkValues, uncovered } from "./checkValues.ts";
import { computations } from "./compute.ts";

function within(
  actual: number,
  wanted: number,
  tolerance: CheckValue["tolerance"][string] | undefined,
  what: string,
): void {
  const { abs = 0, rel = 0 } = typeof tolerance === "object" ? tolerance : {};
  // A printed figure cannot be held tighter than half its last digit.
  const decimals = /\.(\d+)$/.exec(String(wanted))?.[1]?.length ?? 0;
  const printed = typeof tolerance === "object" && decimals > 0 ? 0.5 * 10 ** -decimals : 0;
  const allowed = Math.max(abs + rel * Math.abs(wanted), printed) + 1e-12;
  expect(Math.abs(actual - wanted), `${what}: ${actual}, published ${wanted}`).toBeLessThanOrEqual(allowed);
}

describe("published and computed values", () => {
  it.each(
    checkValues.map(
      (value) =>
        [
          `${value.id}: ${value.statement} [${value.source.title}, ${value.source.section}, ${value.source.edition}; ${value.verified}]`,
          value,
        ] as const,
    ),
  )("%s", (_, value) => {
    const computed = computations[value.id]?.(value) ?? {};
    let compared = 0;
    for (const [key, wanted] of Object.entries(value.expected)) {
      const tolerance = value.tolerance[key] ?? value.tolerance.all;
      const actual = computed[key];
      if (tolerance === "quote only") {
        // A published figure that is wrong is not to be reproduced.
        for (const one of Object.values(computed)) expect(one).not.toBe(wanted);
        continue;
      }
      if (actual === undefined) continue;
      compared++;
      if (Array.isArray(wanted))
        for (const [i, one] of wanted.entries())
          within((actual as number[])[i] as number, one, tolerance, key);
      else if (typeof wanted === "boolean" || typeof wanted === "string") expect(actual).toBe(wanted);
      else within(actual as number, wanted as number, tolerance, key);
    }
    expect(compared).toBeGreaterThan(0);
  });

  it("are 120 or more, and each of the others has its reason", () => {
    expect(checkValues.length).toBeGreaterThanOrEqual(120);
    const ids = new Set(checkValues.map((value) => value.id));
    for (const id of Object.keys(uncovered)) expect(ids.has(id), id).toBe(false);
    expect(new Set(Object.keys(computations))).toEqual(ids);
    expect(ids.size + Object.keys(uncovered).length).toBe(232);
    for (const reason of Object.values(uncovered)) expect(reason.length).toBeGreaterThan(10);
  });
});
