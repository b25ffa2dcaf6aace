import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { Quantity } from "../../server/src/notation/tree.ts";
import {
  formatAltitude,
  formatBank,
  formatClaim,
  formatDeviation,
  formatDistinct,
  formatFlightLevel,
  formatMass,
  formatResult,
  formatResultValue,
  formatSpeed,
  shownClaim,
} from "../../server/src/plan/format.ts";
import { fromShownUnit, inShownUnit, resultNames, results } from "../../server/src/plan/results.ts";
import { exactly } from "../../server/src/plan/spread.ts";

const value = fc.double({ min: 0.001, max: 5000, noNaN: true });
const figure = (text: string) => Number.parseFloat(text);

describe("rounding never flatters", () => {
  it.each(resultNames)("%s", (name) => {
    const { rounding, decimals } = results[name];
    fc.assert(
      fc.property(value, (shown) => {
        const si = fromShownUnit(name, shown);
        const read = figure(formatResultValue(name, si));
        const step = 10 ** -decimals;
        const allowance = 1e-6 * Math.abs(shown);
        expect(Math.abs(read - shown)).toBeLessThanOrEqual(
          (rounding === "nearest" ? step / 2 : step) + allowance,
        );
        if (rounding === "up") expect(read).toBeGreaterThanOrEqual(shown - allowance);
        if (rounding === "down") expect(read).toBeLessThanOrEqual(shown + allowance);
      }),
    );
  });

  it("lets a figure exactly at its limit read as such, for all its binary dust", () => {
    for (const ratio of [1.13, 1.18, 1.2, 1.23, 1.25, 1.3]) {
      for (const stall of [47.123, 60.111, 88.7])
        expect(formatResultValue("ratio", (ratio * stall) / stall)).toBe(ratio.toFixed(2));
    }
    for (let degrees = 1; degrees < 90; degrees++)
      expect(formatBank((degrees * Math.PI) / 180)).toBe(`${degrees}°`);
  });

  it("never reads as met what fails", () => {
    expect(formatResultValue("ratio", 1.2299)).toBe("1.22");
    expect(formatResultValue("margin", 1.0999)).toBe("1.09");
    expect(formatResultValue("warning", inShownUnit("warning", 0) + 70)).toBe("137 kt");
  });
});

describe("the formatter", () => {
  it("shows the worst corner, and the spread where its ends read differently", () => {
    const spread = { nominal: 1.46, low: 1.41, high: 1.5 };
    expect(formatResult("margin", spread)).toBe("1.41");
    expect(formatResult("margin", spread, { spread: true })).toBe("1.41 (1.41 to 1.50)");
    expect(formatResult("margin", exactly(1.46), { spread: true })).toBe("1.46");
    expect(formatResult("stall", { nominal: 60, low: 59, high: 62 })).toBe("121 kt");
  });

  it("gives two figures of one message as many decimals as tell them apart", () => {
    expect(formatDistinct(1.2299, 1.23, (one, more) => formatResultValue("ratio", one, more))).toEqual([
      "1.22",
      "1.23",
    ]);
    expect(formatDistinct(30.04, 30, (one, more) => formatBank((one * Math.PI) / 180, more))).toEqual([
      "30.04°",
      "30.00°",
    ]);
  });

  it("writes units as the notation takes them back", () => {
    expect(formatMass(56_020, 55_000)).toBe("56.02 t");
    expect(formatMass(712.4, 740)).toBe("712 kg");
    expect(formatFlightLevel(975.36)).toBe("FL032");
    expect(formatFlightLevel(-100)).toMatch(/^pressure altitude -\d+ ft$/);
    expect(formatAltitude(975.36)).toBe("3200 ft");
    expect(formatSpeed(100, 0, { type: "tas" })).toBe("194 kt tas");
    expect([formatDeviation(0), formatDeviation(8), formatDeviation(-6.5)]).toEqual(["0", "+8", "-6.5"]);
  });

  it("never shows what is no number, nor a negative zero", () => {
    for (const format of [
      formatBank,
      formatAltitude,
      (one: number) => formatSpeed(one),
      (one: number) => formatMass(one, 9000),
    ]) {
      expect(format(Number.NaN)).toMatch(/unknown/);
      expect(format(-0)).not.toContain("-");
    }
  });

  it("finds a claim at its own figure never stale", () => {
    fc.assert(
      fc.property(fc.constantFrom(...resultNames), value, fc.nat({ max: 3 }), (name, shown, decimals) => {
        const spread = exactly(fromShownUnit(name, shown));
        const written: Quantity = {
          kind: "quantity",
          value: 0,
          unit: null,
          decimals,
          signed: false,
          span: { start: 0, end: 0 },
          numberSpan: { start: 0, end: 0 },
        };
        const claimed = figure(formatClaim(name, spread, written));
        expect(shownClaim(name, spread, written)).toBe(claimed);
      }),
    );
  });
});
