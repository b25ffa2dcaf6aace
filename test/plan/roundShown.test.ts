import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { MOST_DECIMALS, roundShown } from "../../server/src/plan/roundShown.ts";
import { ALLOWANCE } from "../../server/src/plan/rules.ts";

const decimals = fc.integer({ min: 0, max: 3 });
const rounding = fc.constantFrom("nearest", "up", "down");
const value = fc.double({ min: -4000, max: 4000, noNaN: true });

/** A bound as an author writes it, and a value about it: far off, near the allowance's edge, or within the last bits. */
const aboutBound = fc
  .tuple(
    fc.integer({ min: 1, max: 400_000 }),
    decimals,
    fc.oneof(
      fc.double({ min: -0.1, max: 0.1, noNaN: true }),
      fc.integer({ min: -30, max: 30 }).map((tenths) => (tenths * ALLOWANCE) / 10),
      fc.integer({ min: -8, max: 8 }).map((bits) => bits * Number.EPSILON),
    ),
  )
  .map(([units, places, off]) => {
    const bound = units / 10 ** places;
    return { bound, places, value: bound * (1 + off) };
  });

describe("a figure as it is shown", () => {
  it("reads as met against a least value exactly where the comparison of the rules says so", () => {
    fc.assert(
      fc.property(aboutBound, ({ bound, places, value }) => {
        expect(bound <= roundShown(value, places, "down")).toBe(bound * (1 - ALLOWANCE) <= value);
      }),
      { numRuns: 2000 },
    );
  });

  it("reads as met against a greatest value exactly where the comparison of the rules says so", () => {
    fc.assert(
      fc.property(aboutBound, ({ bound, places, value }) => {
        expect(roundShown(value, places, "up") <= bound).toBe(value <= bound * (1 + ALLOWANCE));
      }),
      { numRuns: 2000 },
    );
  });

  it("is less than one unit of its last decimal off, to the nearest half of one", () => {
    fc.assert(
      fc.property(value, decimals, rounding, (one, places, how) => {
        const unit = 10 ** -places;
        const off = Math.abs(roundShown(one, places, how) - one);
        expect(off).toBeLessThanOrEqual((how === "nearest" ? unit / 2 : unit) * (1 + 1e-6));
      }),
    );
  });

  it("never falls where the value rises", () => {
    fc.assert(
      fc.property(value, value, decimals, rounding, (one, other, places, how) => {
        const [low, high] = one < other ? [one, other] : [other, one];
        expect(roundShown(low, places, how)).toBeLessThanOrEqual(roundShown(high, places, how));
      }),
    );
  });

  it("stays what it is when it is shown again, in the same text", () => {
    fc.assert(
      fc.property(value, decimals, rounding, (one, places, how) => {
        const shown = roundShown(one, places, how);
        expect(roundShown(shown, places, how)).toBe(shown);
        expect(Number(shown.toFixed(places))).toBe(shown);
      }),
    );
  });

  it("goes down where the mirrored value goes up", () => {
    fc.assert(
      fc.property(value, decimals, (one, places) => {
        expect(roundShown(-one, places, "down") + 0).toBe(-roundShown(one, places, "up") + 0);
        expect(roundShown(-one, places, "nearest") + 0).toBe(-roundShown(one, places, "nearest") + 0);
      }),
    );
  });

  it("is never -0, and what is not finite stays so", () => {
    for (const how of ["nearest", "up", "down"] as const) {
      for (const one of [-0, 0, -1e-12]) expect(Object.is(roundShown(one, 0, how), -0)).toBe(false);
      expect(roundShown(Number.NaN, 2, how)).toBeNaN();
      expect(roundShown(Number.POSITIVE_INFINITY, 2, how)).toBe(Number.POSITIVE_INFINITY);
    }
  });

  it("keeps a large figure at the most decimals", () => {
    expect(roundShown(41_000.25, MOST_DECIMALS, "nearest")).toBe(41_000.25);
    expect(roundShown(Number.MAX_SAFE_INTEGER, MOST_DECIMALS, "up")).toBe(Number.MAX_SAFE_INTEGER);
  });

  it("takes a half that unit conversion has brought below the half by its last bit for a half", () => {
    const knot = 1852 / 3600;
    for (let knots = 40.5; knots < 400; knots++) {
      expect(roundShown((knots * knot) / knot, 0, "nearest")).toBe(knots + 0.5);
    }
  });
});
