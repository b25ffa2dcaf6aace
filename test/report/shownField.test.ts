import { describe, expect, it } from "vitest";
import { shownField } from "../../server/src/report/comparison/shownField.ts";
import type { JsonValue } from "../../server/src/report/pointsJson.ts";

describe("a field of the points' JSON", () => {
  it.each<[string, JsonValue, string]>([
    ["margin_low", 1.459, "1.45"],
    ["margin_after_shear_low", 1.459, "1.45"],
    // The warning is rounded up and a bank that is left is cut, as wherever they are shown.
    ["warning_high_kt", 150.2, "151 kt"],
    ["stall_bank_low_deg", 52.9, "52°"],
    ["rate_deg_s", 3.29, "3.2°/s"],
    ["gust_load", 1.511, "1.52"],
    ["high_buffet_mach", 0.7834, "M 0.783"],
    ["bank_limit_deg", 30, "30°"],
    ["some_altitude_ft", 36682.9, "36682 ft"],
    ["engine_out", "left", "left"],
    ["aside", true, "yes"],
    ["rules", null, "-"],
    ["assumed", [], "-"],
    ["assumed", ["ISA", "power off"], "ISA; power off"],
    ["approach_category", { icao: "C", faa: "C" }, "icao C, faa C"],
    [
      "solved",
      { what: "bank", value: 41, exact: 41.377, unit: "deg", boundBy: null },
      "what bank, value 41, unit deg",
    ],
    ["sweep", { margin_low: 1.459, stall_high_kt: 134.2 }, "margin 1.45, stall 134 kt"],
  ])("%s of %j reads %s", (name, value, shown) => {
    expect(shownField(name, value)).toBe(shown);
  });
});
