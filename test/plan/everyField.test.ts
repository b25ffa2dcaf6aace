import { describe, expect, it } from "vitest";
import { createFolder } from "../../server/src/plan/createFolder.ts";
import { fileJson, type JsonValue } from "../../server/src/report/pointsJson.ts";

/** A note that has something of everything that a point can say. */
const text = `| aircraft testbed-1; basis vsr; reference 55 t; mass 33 t to 59 t, landing 53 t; warning 1.03; vmca 101 kt
| config clean stall 138 kt, load -1 to 2.5
| config flaps-15 stall 117 kt, load 0 to 2, takeoff
| config flaps-30 stall 106 kt, load 0 to 2, landing
| wing 104 m2, chord 3.7 m, slope 0.00 5.1, 0.60 5.9, 0.80 6.2 per rad; ceiling FL385; buffet clean 0.30 1.25, 0.70 0.80, 0.80 0.30
| power-effect 0 % 1.00, 100 % 0.96; cg-effect 14 % 1.000, 34 % 0.982; contamination heavy-rain 5 %, rain
| ias clean 100 kt 104 kt, 200 kt 201 kt, 300 kt 298 kt

| limits own
| must any bank 30
| should any bank 25
| should any buffet 1.3 above FL400

| fly testbed-1; under own; rules ifr; weight 50 t; qnh 1013 hPa; isa +2; cg 20 %; power 50 %; config clean; altitude FL300; speed M 0.7

| phase cruise "All of it"; aside; emergency "a test"; bank ? left; path 0.5 deg; gust 4 ft/s; shear 15 kt; decel 1 kt/s
| claim stall 140 kt; expect not stalled

| phase cruise "Swept and accepted"; altitude FL100; speed 220 kt; bank 10 to 30 by 10; accept bank-over-advice to 30 because "a test" by "M. Roe" until 2027-03-31

| phase takeoff "One engine"; weight 50 t; config flaps-15; altitude 500 ft; speed v2min + 10 kt; engine-out right; contamination heavy-rain; bank 10 left

| phase cruise "No figures"; config flaps-99
`;

/** Every field of a point in the interface that scripts rely on. */
const fields = `line endLine phase title aside aircraft limits rules config
mass_kg altitude_ft pressure_altitude_ft isa_deviation_c cg_percent lift_loss_percent bank_deg bank_side path_deg load engine_out
speed speed.cas_kt speed.eas_kt speed.tas_kt speed.mach speed.ias_kt
vs1g_kt stall_kt stall_high_kt warning_kt warning_high_kt ratio margin margin_low margin_high ratio_low ratio_high
stall_load stall_bank_deg warning_bank_deg overshoot_deg
buffet_load buffet_bank_deg low_buffet_mach high_buffet_mach buffet_altitude_ft
gust_load gust_load_down margin_after_shear ratio_after_shear
va_kt v2min_kt vfto_kt vref_kt power_on_stall_kt
radius_nm rate_deg_s rate_one_bank_deg bank_limit_deg bank_advice_deg seconds_to_warning seconds_to_stall
approach_category approach_category.icao approach_category.faa
solved solved.what solved.value solved.exact solved.unit solved.boundBy solved.blockedBy sweep sweep.0.what sweep.0.value sweep.0.stall_kt
claims.0.name claims.0.claimed claims.0.computed claims.0.holds
expected.0.code expected.0.not expected.0.came accepted.0.code accepted.0.to accepted.0.because accepted.0.by accepted.0.until
not_evaluated.0.rule not_evaluated.0.why assumed.0 inherited.aircraft withheld withheld.line withheld.code`
  .split(/\s+/)
  .filter(Boolean);

function at(value: JsonValue | undefined, path: string): JsonValue | undefined {
  let found: JsonValue | undefined = value;
  for (const key of path.split(".")) {
    if (typeof found !== "object" || found === null) return undefined;
    found = (found as { readonly [key: string]: JsonValue })[key];
  }
  return found;
}

describe("what scripts read", () => {
  const folder = createFolder({ today: "2026-12-01" });
  const file = fileJson(folder.open("file:///note.plumb", text, "plumb"), "note");
  const blocked = fileJson(
    folder.open(
      "file:///other.plumb",
      "| fly testbed-1; under own; weight 50 t; config clean; altitude FL100; speed 90 kt\n\n| phase cruise; bank ?\n",
      "plumb",
    ),
    "other",
  );

  it("has no point that its note did not mean to be in error", () => {
    expect(
      file.findings
        .filter(({ severity }) => severity === "error")
        .map(({ code, message }) => `${code}: ${message}`),
    ).toEqual([expect.stringContaining("unknown-config")]);
  });

  it.each(fields)("%s is there, and not always null", (path) => {
    const points = [...file.points, ...blocked.points];
    const values = points.map((point) => at(point, path));
    const top = path.split(".")[0] ?? "";
    for (const point of points) expect(point).toHaveProperty(top);
    expect(values.some((value) => value !== undefined && value !== null)).toBe(true);
  });
});
