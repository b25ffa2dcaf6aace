import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  casFromEas,
  casFromMach,
  easFromCas,
  easFromMach,
  machFromCas,
  machFromEas,
  machFromTas,
  tasFromMach,
} from "../../server/src/flight/airspeed.ts";
import {
  type Atmosphere,
  altitudeOfPressure,
  atmosphere,
  pressureAltitudeOffset,
} from "../../server/src/flight/atmosphere.ts";
import { calibratedFromIndicated, indicatedFromCalibrated } from "../../server/src/flight/ias.ts";
import { bracketedRoot } from "../../server/src/flight/root.ts";
import {
  checkLiftMach,
  type Lift,
  loadAtStall,
  stallBank,
  stallSpeed,
  warningBank,
} from "../../server/src/flight/stall.ts";
import { interpolate, type Table } from "../../server/src/flight/table.ts";
import { loadFactor, turnRadius, turnRate } from "../../server/src/flight/turn.ts";

const height = fc.double({ min: -1500, max: 19_990, noNaN: true });
const deviation = fc.double({ min: -40, max: 40, noNaN: true });
const mach = fc.double({ min: 0.02, max: 0.98, noNaN: true });
const air = fc.tuple(height, deviation).map(([h, d]) => atmosphere(h, d) as Atmosphere);

const close = (a: number | null, b: number, relative = 1e-12) => {
  expect(a).not.toBeNull();
  expect(Math.abs((a as number) - b)).toBeLessThanOrEqual(relative * Math.abs(b));
};

describe("airspeeds", () => {
  it("come back from every conversion", () => {
    fc.assert(
      fc.property(air, mach, (at, m) => {
        const cas = casFromMach(m, at);
        if (cas !== null) {
          close(machFromCas(cas, at), m, 1e-11);
          close(casFromEas(easFromCas(cas, at) as number, at), cas, 1e-11);
        }
        close(machFromEas(easFromMach(m, at) as number, at), m);
        close(machFromTas(tasFromMach(m, at) as number, at), m);
      }),
    );
  });

  it("are the same at sea level on a standard day", () => {
    const sea = atmosphere(0, 0) as Atmosphere;
    fc.assert(fc.property(mach, (m) => close(casFromMach(m, sea), tasFromMach(m, sea) as number, 1e-9)));
  });

  it("give nothing at and above the speed of sound", () => {
    const sea = atmosphere(0, 0) as Atmosphere;
    for (const m of [1, 1.2, -0.1, Number.NaN]) {
      expect(casFromMach(m, sea)).toBeNull();
      expect(tasFromMach(m, sea)).toBeNull();
    }
    expect(machFromCas(341, sea)).toBeNull();
  });
});

describe("the atmosphere", () => {
  it("comes back from its pressure, and falls with height", () => {
    fc.assert(
      fc.property(height, height, (a, b) => {
        const at = atmosphere(a, 0) as Atmosphere;
        expect(altitudeOfPressure(at.pressure)).toBeCloseTo(a, 6);
        if (a + 1e-3 < b) expect((atmosphere(b, 0) as Atmosphere).pressure).toBeLessThan(at.pressure);
      }),
    );
  });

  it("is not modelled outside -5000 ft to 20 000 m", () => {
    for (const h of [-1524.1, 20_000.1, Number.NaN, Number.POSITIVE_INFINITY])
      expect(atmosphere(h, 0)).toBeNull();
    expect(atmosphere(-1524, 0)).not.toBeNull();
    expect(atmosphere(20_000, 0)).not.toBeNull();
    expect(pressureAltitudeOffset(101325)).toBe(0);
  });
});

const table = fc
  .array(
    fc.tuple(fc.double({ min: 0.02, max: 0.2, noNaN: true }), fc.double({ min: 0.3, max: 1.3, noNaN: true })),
    { minLength: 1, maxLength: 5 },
  )
  .map((steps): Table => {
    const xs = [0.3];
    const values = [1];
    for (const [step, value] of steps) {
      xs.push((xs[xs.length - 1] as number) + step);
      values.push(value);
    }
    return { arguments: xs, values };
  })
  .filter((one) => (one.arguments[one.arguments.length - 1] as number) < 0.95);

const lift = table.map((liftMach): Lift => ({ stallSpeed: 60, referenceMass: 50_000, liftMach }));
const state = fc.record({
  mass: fc.double({ min: 20_000, max: 80_000, noNaN: true }),
  load: fc.double({ min: 0.2, max: 3, noNaN: true }),
  liftLoss: fc.double({ min: 0, max: 0.4, noNaN: true }),
  cgFactor: fc.double({ min: 0.97, max: 1.02, noNaN: true }),
});

describe("the stall", () => {
  it("without a table is V_c sqrt(n m / m_ref), to 1e-9", () => {
    fc.assert(
      fc.property(state, air, ({ mass, load }, at) => {
        const stall = stallSpeed(
          { stallSpeed: 60, referenceMass: 50_000, liftMach: null },
          { mass, load, liftLoss: 0, cgFactor: 1 },
          at,
        );
        if (stall.kind !== "speed") return;
        close(stall.eas, 60 * Math.sqrt((load * mass) / 50_000), 1e-9);
      }),
    );
  });

  it("is the first speed that carries the load, also where the table is not monotonic", () => {
    fc.assert(
      fc.property(lift, state, air, (one, at, where) => {
        const stall = stallSpeed(one, at, where);
        if (stall.kind !== "speed") return;
        close(loadAtStall(one, at, stall.eas, where), at.load, 1e-9);
        for (let share = 0.02; share < 0.999; share += 0.02) {
          const below = loadAtStall(one, at, stall.eas * share, where);
          if (below !== null) expect(below).toBeLessThanOrEqual(at.load * (1 + 1e-9));
        }
      }),
      { numRuns: 400 },
    );
  });

  it("is not known where the lift still grows at the table's end, and never comes where it does not", () => {
    fc.assert(
      fc.property(lift, state, air, (one, at, where) => {
        const { kind } = stallSpeed(one, at, where);
        if (kind !== "outside-table" && kind !== "no-level-flight") return;
        const machs = one.liftMach?.arguments ?? [];
        const end = machs[machs.length - 1] as number;
        const carried = (m: number) =>
          loadAtStall(one, at, easFromMach(m, where) as number, where) ?? Number.NaN;
        for (let m = 0.02; m < end; m += 0.005) expect(carried(m)).toBeLessThan(at.load * (1 + 1e-9));
        const rising = carried(end * (1 - 1e-7)) < carried(end);
        expect(kind).toBe(rising ? "outside-table" : "no-level-flight");
      }),
      { numRuns: 400 },
    );
  });

  it("grows with mass, load, contamination and cg factor", () => {
    fc.assert(
      fc.property(lift, state, air, (one, at, where) => {
        const base = stallSpeed(one, at, where);
        for (const more of [
          { mass: at.mass * 1.1 },
          { load: at.load * 1.1 },
          { liftLoss: at.liftLoss + 0.1 },
          { cgFactor: at.cgFactor * 1.01 },
        ]) {
          const other = stallSpeed(one, { ...at, ...more }, where);
          if (base.kind === "speed" && other.kind === "speed") expect(other.eas).toBeGreaterThan(base.eas);
        }
      }),
    );
  });

  it("has no speed without load, and none under a negative one", () => {
    const sea = atmosphere(0, 0) as Atmosphere;
    const plain: Lift = { stallSpeed: 60, referenceMass: 50_000, liftMach: null };
    const at = { mass: 50_000, liftLoss: 0, cgFactor: 1 };
    expect(stallSpeed(plain, { ...at, load: 0 }, sea).kind).toBe("zero");
    expect(stallSpeed(plain, { ...at, load: -0.5 }, sea).kind).toBe("none");
    expect(stallSpeed(plain, { ...at, load: 1, liftLoss: 1 }, sea).kind).toBe("none");
  });

  it("comes at a bank at which the wing just carries the turn", () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1.001, max: 5, noNaN: true }),
        fc.double({ min: -0.2, max: 0.2, noNaN: true }),
        (load, path) => {
          const bank = stallBank(load, path) as number;
          close(loadFactor(bank, path), load, 1e-9);
        },
      ),
    );
    expect(stallBank(0.9, 0)).toBeNull();
  });

  it("warns later the faster one flies", () => {
    const sea = atmosphere(0, 0) as Atmosphere;
    const plain: Lift = { stallSpeed: 60, referenceMass: 50_000, liftMach: null };
    fc.assert(
      fc.property(fc.double({ min: 65, max: 120, noNaN: true }), (cas) => {
        const bank = (speed: number) =>
          warningBank(plain, { mass: 50_000, cgFactor: 1 }, speed, 1.05, 0, sea) as number;
        expect(bank(cas * 1.01)).toBeGreaterThan(bank(cas));
      }),
    );
  });

  it("asks of a table that it begins at 1 and above the card's own stall Mach number", () => {
    expect(checkLiftMach({ arguments: [0.3, 0.5], values: [0.9, 0.8] }, { stallSpeed: 60 })).toBe(
      "first-factor",
    );
    expect(checkLiftMach({ arguments: [0.1, 0.5], values: [1, 0.8] }, { stallSpeed: 60 })).toBe("stall-mach");
    expect(checkLiftMach({ arguments: [0.3, 0.5], values: [1, 0.8] }, { stallSpeed: 60 })).toBeNull();
  });
});

describe("turns, tables and roots", () => {
  it("radius times rate is the speed, with and without a stated load", () => {
    fc.assert(
      fc.property(
        fc.double({ min: 30, max: 250, noNaN: true }),
        fc.double({ min: 0.05, max: 1.4, noNaN: true }),
        fc.constantFrom(null, 1.5, 2),
        (tas, bank, load) => {
          close(
            (turnRadius(tas, bank, 0, load) as number) * (turnRate(tas, bank, 0, load) as number),
            tas,
            1e-12,
          );
        },
      ),
    );
    expect(turnRadius(100, 0, 0, null)).toBeNull();
  });

  it("a table is never extrapolated, and exact at its pairs", () => {
    fc.assert(
      fc.property(table, fc.double({ min: 0, max: 1, noNaN: true }), (one, x) => {
        const first = one.arguments[0] as number;
        const last = one.arguments[one.arguments.length - 1] as number;
        one.arguments.forEach((at, i) => {
          expect(interpolate(one, at)).toBe(one.values[i]);
        });
        if (x < first * (1 - 1e-6) || last * (1 + 1e-6) < x) expect(interpolate(one, x)).toBeNull();
      }),
    );
  });

  it("an indicated speed comes back from its calibrated one", () => {
    const one: Table = { arguments: [20, 30, 50], values: [23, 31, 49] };
    fc.assert(
      fc.property(
        fc.double({ min: 20, max: 50, noNaN: true }),
        fc.double({ min: 0.8, max: 1.5, noNaN: true }),
        (ias, load) => {
          const cas = calibratedFromIndicated(one, ias * Math.sqrt(load), load, 700, 700);
          if (cas !== null)
            close(indicatedFromCalibrated(one, cas, load, 700, 700), ias * Math.sqrt(load), 1e-12);
        },
      ),
    );
  });

  it("a bracketed root is found, and none where there is no bracket", () => {
    fc.assert(
      fc.property(fc.double({ min: 0.1, max: 50, noNaN: true }), (wanted) => {
        close(
          bracketedRoot((x) => x ** 3 - wanted ** 3, 0, 100),
          wanted,
          1e-12,
        );
      }),
    );
    expect(bracketedRoot((x) => x * x + 1, -1, 1)).toBeNull();
  });
});
