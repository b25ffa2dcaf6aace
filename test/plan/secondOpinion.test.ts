import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { createFolder } from "../../server/src/plan/createFolder.ts";
import { fileJson, type PointJson } from "../../server/src/report/pointsJson.ts";
import { secondOpinion } from "../support/secondOpinion.ts";

const KT = 1852 / 3600;
const FT = 0.3048;

const table: readonly (readonly [number, number])[] = [
  [0.3, 1],
  [0.5, 0.92],
  [0.6, 0.95],
  [0.79, 0.68],
];

const card = `| aircraft testbed-1 "invented"
| basis vsr; reference 55 t; warning 1.03
| config clean stall 138 kt, load -1 to 2.5
| config flaps-15 stall 117 kt, load 0 to 2, takeoff
| config flaps-30 stall 106 kt, load 0 to 2, landing
| wing 104 m2; buffet clean 0.30 1.25, 0.79 0.80
| lift-mach clean ${table.map(([mach, factor]) => `${mach} ${factor}`).join(", ")}
| cg-effect 14 % 1.000, 34 % 0.98
`;

const inputs = fc.record({
  config: fc.constantFrom(
    ["clean", 138, table] as const,
    ["flaps-15", 117, []] as const,
    ["flaps-30", 106, []] as const,
  ),
  mass: fc.integer({ min: 33_000, max: 59_000 }),
  feet: fc.integer({ min: -1000, max: 41_000 }),
  qnh: fc.integer({ min: 960, max: 1040 }),
  deviation: fc.integer({ min: -30, max: 30 }),
  bank: fc.integer({ min: 0, max: 70 }),
  path: fc.integer({ min: -6, max: 6 }),
  loss: fc.integer({ min: 0, max: 30 }),
  cg: fc.integer({ min: 14, max: 34 }),
  speed: fc.oneof(
    fc.record({
      kind: fc.constantFrom("cas" as const, "eas" as const, "tas" as const),
      value: fc.integer({ min: 110, max: 260 }),
    }),
    fc.record({
      kind: fc.constant("mach" as const),
      value: fc.integer({ min: 30, max: 78 }).map((hundredths) => hundredths / 100),
    }),
  ),
});

function close(actual: unknown, wanted: number | null, what: string, relative = 1e-9): void {
  if (wanted === null || !Number.isFinite(wanted)) {
    expect(actual, what).toBeNull();
    return;
  }
  expect(typeof actual, `${what}: ${String(actual)} for ${wanted}`).toBe("number");
  expect(
    Math.abs((actual as number) - wanted),
    `${what}: ${String(actual)}, second opinion ${wanted}`,
  ).toBeLessThanOrEqual(relative * Math.max(Math.abs(wanted), 1e-3));
}

/** H(q) by bisection of the standard's own pressure-height relation. */
function offset(qnh: number): number {
  const pressure = (h: number) => 101325 * (1 - (0.0065 * h) / 288.15) ** (9.80665 / (287.05287 * 0.0065));
  let low = -2000;
  let high = 2000;
  for (let i = 0; i < 200; i++) {
    const middle = (low + high) / 2;
    if (qnh < pressure(middle)) low = middle;
    else high = middle;
  }
  return low;
}

describe("every field of a point", () => {
  it("is what an independent calculation gives, to 1e-9 relative", () => {
    fc.assert(
      fc.property(
        inputs,
        ({ config: [name, stall, liftMach], mass, feet, qnh, deviation, bank, path, loss, cg, speed }) => {
          const pressureAltitude = feet * FT + offset(qnh * 100);
          const written = speed.kind === "mach" ? `M ${speed.value}` : `${speed.value} kt ${speed.kind}`;
          const folder = createFolder({ today: "2026-12-01" });
          const note = folder.open(
            "file:///note.plumb",
            `${card}\n| fly testbed-1; weight ${mass} kg; qnh ${qnh} hPa; isa ${deviation < 0 ? "" : "+"}${deviation}; cg ${cg} %
| config ${name}; altitude ${feet} ft; contamination ${loss} %

| phase cruise; speed ${written}; bank ${bank} left; path ${path} deg\n`,
            "plumb",
          );
          const point = fileJson(note, "note").points[0] as PointJson;
          const gamma = (path * Math.PI) / 180;
          const phi = (bank * Math.PI) / 180;
          const load = Math.cos(gamma) / Math.cos(phi);
          const value = speed.kind === "mach" ? speed.value : speed.value * KT;
          const cgFactor = 1 - (0.02 * (cg - 14)) / 20;
          const state = {
            stallSpeed: stall * KT,
            referenceMass: 55_000,
            mass,
            cgFactor,
            liftMach,
            pressureAltitude,
            deviation,
          };
          const own = secondOpinion({
            ...state,
            load,
            liftLoss: loss / 100,
            speed: { kind: speed.kind, value },
          });
          if (!(own.mach < 0.95)) return;
          const clean =
            loss === 0
              ? own
              : secondOpinion({ ...state, load, liftLoss: 0, speed: { kind: speed.kind, value } });
          const at = point.speed as PointJson;
          close(point.pressure_altitude_ft, pressureAltitude / FT, "pressure altitude", 1e-8);
          close(point.load, load, "load");
          close(at.cas_kt, own.cas / KT, "cas");
          close(at.eas_kt, own.eas / KT, "eas");
          close(at.tas_kt, own.tas / KT, "tas");
          close(at.mach, own.mach, "mach");
          close(point.vs1g_kt, own.vs1g === null ? null : own.vs1g / KT, "vs1g");
          close(point.stall_kt, own.stall === null ? null : own.stall / KT, "stall");
          close(point.warning_kt, clean.stall === null ? null : (1.03 * clean.stall) / KT, "warning");
          close(point.ratio, own.vs1g === null ? null : own.cas / own.vs1g, "ratio");
          close(point.margin, own.stall === null ? null : own.cas / own.stall, "margin");
          close(point.stall_load, own.stallLoad, "stall-load");
          const cosine = own.stallLoad === null ? Number.NaN : Math.cos(gamma) / own.stallLoad;
          const stallBank = cosine <= 1 ? (Math.acos(cosine) * 180) / Math.PI : null;
          close(point.stall_bank_deg, stallBank, "stall-bank", 1e-8);
          const radius =
            bank === 0 ? null : (own.tas ** 2 * Math.cos(gamma)) / (9.80665 * Math.tan(phi)) / 1852;
          close(point.radius_nm, radius, "radius");
          close(
            point.rate_deg_s,
            bank === 0 ? null : ((9.80665 * Math.tan(phi)) / own.tas) * (180 / Math.PI),
            "rate",
          );
          close(
            point.rate_one_bank_deg,
            (Math.atan((((3 * Math.PI) / 180) * own.tas) / 9.80665) * 180) / Math.PI,
            "rate-one-bank",
          );
          const warned = secondOpinion({
            ...state,
            load: 1,
            liftLoss: 0,
            speed: { kind: "cas", value: own.cas / 1.03 },
          }).stallLoad;
          const warnedCosine = warned === null ? Number.NaN : Math.cos(gamma) / warned;
          const warningBank =
            stallBank === null || !(warnedCosine <= 1)
              ? null
              : Math.min((Math.acos(warnedCosine) * 180) / Math.PI, stallBank);
          close(point.warning_bank_deg, warningBank, "warning-bank", 1e-8);
          close(point.overshoot_deg, warningBank === null ? null : warningBank - bank, "overshoot", 1e-7);
        },
      ),
      { numRuns: 120 },
    );
  });
});
