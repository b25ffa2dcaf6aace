import { describe, expect, it } from "vitest";
import type { Quantity } from "../../server/src/notation/tree.ts";
import type { Unit } from "../../server/src/notation/vocabulary.ts";
import { type Measured, measure, measureTolerance } from "../../server/src/plan/quantity.ts";

function quantity(value: number, unit: Unit | null): Quantity {
  const span = { start: 0, end: 1 };
  return { kind: "quantity", value, unit, decimals: 0, signed: false, span, numberSpan: span };
}

describe("a quantity in SI", () => {
  it.each<[number, Unit | null, Measured, number]>([
    [56.4, "t", "mass", 56_400],
    [1000, "lb", "mass", 453.59237],
    // A force stands for the mass that weighs so under standard gravity.
    [553, "kN", "mass", 553_000 / 9.80665],
    [200, "kt", "speed", 102.888888888889],
    [350, "FL", "altitude", 10_668],
    [3000, "ft", "altitude", 914.4],
    [985, "hPa", "qnh", 98_500],
    [-42, "C", "oat", 231.15],
    [231, "K", "oat", 231],
    [-6, null, "deviation", -6],
    [8, "C", "deviation", 8],
    [25, null, "bank", 0.436332312998582],
    [25, "deg", "bank", 0.436332312998582],
    [22, "%", "cg", 0.22],
    [2.4, "t/h", "fuelFlow", 0.666666666666667],
    [300, "ft/nm", "gradient", 0.0493736501079914],
    [0.74, null, "mach", 0.74],
  ])("%f %s as %s", (value, unit, what, si) => {
    const measured = measure(quantity(value, unit), what);
    expect(measured.problem).toBeNull();
    expect(measured.value).toBeCloseTo(si, 9);
  });

  it.each<[number, Unit | null, Measured]>([
    [20_000, "m", "altitude"],
    [-5000, "ft", "altitude"],
    [850, "hPa", "qnh"],
    [1085, "hPa", "qnh"],
    [180, null, "bank"],
    [661, "kt", "speed"],
    [-80, null, "deviation"],
    [12, null, "load"],
    [0, "%", "liftLoss"],
    [-100, "%", "cg"],
  ])("%f %s as %s is at the end of its range and inside", (value, unit, what) => {
    expect(measure(quantity(value, unit), what).problem).toBeNull();
  });

  it.each<[number, Unit | null, Measured, string]>([
    [61_400, "t", "mass", "A weight of 61400 t is outside 0.05 to 1000 t: check the number and its unit."],
    [
      0,
      "kt",
      "speed",
      "A speed of 0 kt is outside 0 to 661 kt (the first left out): check the number and its unit.",
    ],
    [
      300_000,
      "ft",
      "altitude",
      "An altitude of 300000 ft is outside -5000 to 65617 ft: check the number and its unit.",
    ],
    [29.92, "hPa", "qnh", "A qnh of 29.92 hPa is outside 850 to 1085 hPa: check the number and its unit."],
    [1, null, "mach", "A Mach number of 1 is outside 0 to 1 (both left out): check the number and its unit."],
    [181, null, "bank", "A bank of 181° is outside 0 to 180°: check the number and its unit."],
    [
      100,
      "%",
      "liftLoss",
      "A loss of maximum lift of 100 % is outside 0 to 100 % (the last left out): check the number and its unit.",
    ],
    [-200, "C", "oat", "A temperature of -200 C is outside -120 to 70 C: check the number and its unit."],
    [999, "FL", "altitude", "An altitude of FL999 is outside FL000 to FL656: check the number and its unit."],
    [
      Number.POSITIVE_INFINITY,
      "t",
      "mass",
      "A weight of Infinity t is outside 0.05 to 1000 t: check the number and its unit.",
    ],
  ])("%f %s as %s is told in the author's unit", (value, unit, what, problem) => {
    expect(measure(quantity(value, unit), what).problem).toBe(problem);
  });
});

describe("a tolerance in SI", () => {
  const tolerance = (value: number, unit: Unit | null) => ({ value, unit, span: { start: 0, end: 1 } });

  it("has its own unit, else the quantity's, else what the quantity is bare", () => {
    expect(measureTolerance(tolerance(400, "kg"), "t", "mass")).toBe(400);
    expect(measureTolerance(tolerance(0.4, null), "t", "mass")).toBeCloseTo(400, 9);
    expect(measureTolerance(tolerance(5, null), null, "bank")).toBeCloseTo(0.0872664625997165, 12);
    expect(measureTolerance(tolerance(0.01, null), null, "mach")).toBe(0.01);
  });

  it("on a temperature is a difference", () => {
    expect(measureTolerance(tolerance(2, "C"), "C", "oat")).toBe(2);
  });

  it("on a flight level may be in feet", () => {
    expect(measureTolerance(tolerance(300, "ft"), "FL", "altitude")).toBeCloseTo(91.44, 9);
  });
});
