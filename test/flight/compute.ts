import {
  casFromMach,
  easFromCas,
  impactPressureOfCas,
  machFromCas,
  tasFromMach,
} from "../../server/src/flight/airspeed.ts";
import { faaCategory, icaoCategory } from "../../server/src/flight/approachCategory.ts";
import { type Atmosphere, atmosphere } from "../../server/src/flight/atmosphere.ts";
import { liftCoefficientAtStall } from "../../server/src/flight/buffet.ts";
import { G0, P0, RHO0 } from "../../server/src/flight/constants.ts";
import { gustAlleviation, gustLoad, gustMassRatio } from "../../server/src/flight/gust.ts";
import {
  greatestHoldingFaa,
  greatestHoldingIcao,
  type HoldingSpeed,
} from "../../server/src/flight/holding.ts";
import { leastV2min, leastVfto, leastVref } from "../../server/src/flight/referenceSpeeds.ts";
import { type Lift, loadAtStall, stallBank, stallSpeed } from "../../server/src/flight/stall.ts";
import { loadFactor, rateOneBank, turnRadius, turnRate } from "../../server/src/flight/turn.ts";
import { FOOT, fromSI, INCH_OF_MERCURY, KNOT, POUND, toSI } from "../../server/src/flight/units.ts";
import type { CheckValue } from "./checkValues.ts";

/** What the product's own functions give for a check value, by the keys of its `expected`. */
export type Computed = Record<string, number | boolean | string | number[]>;

const deg = (degrees: number) => toSI(degrees, "deg");
const air = (h: number, deviation = 0): Atmosphere => known(atmosphere(h, deviation));
const seaLevel = air(0);

function known<T>(value: T | null): T {
  if (value === null) throw new Error("No value where one is due.");
  return value;
}

function num(value: CheckValue, key: string): number {
  const found = value.inputs[key];
  if (typeof found !== "number") throw new Error(`${value.id} has no input ${key}.`);
  return found;
}

/** A table-free wing of 1-g stall speed 1 m/s at 1 kg unless said otherwise. */
function lift(stall = 1, referenceMass = 1): Lift {
  return { stallSpeed: stall, referenceMass, liftMach: null };
}

function stallEas(
  one: Lift,
  state: { mass?: number; load?: number; liftLoss?: number; cgFactor?: number },
): number {
  const stall = stallSpeed(
    one,
    { mass: one.referenceMass, load: 1, liftLoss: 0, cgFactor: 1, ...state },
    seaLevel,
  );
  if (stall.kind !== "speed") throw new Error(stall.kind);
  return stall.eas;
}

const bankValues = (value: CheckValue): Computed => {
  const load = known(loadFactor(deg(num(value, "bank_deg")), 0));
  const factor = stallEas(lift(), { load });
  return { load_factor: load, stall_speed_factor: factor, stall_speed_increase_pct: (factor - 1) * 100 };
};

const turn = (value: CheckValue, tas = num(value, "tas_kt") * KNOT): Computed => {
  const bank = deg(num(value, "bank_deg"));
  const radius = known(turnRadius(tas, bank, 0, null));
  const rate = known(turnRate(tas, bank, 0, null));
  return {
    radius_m: radius,
    radius_nm: fromSI(radius, "nm"),
    radius_ft: radius / FOOT,
    rate_deg_s: fromSI(rate, "deg/s"),
    uncapped_rate_deg_s: fromSI(rate, "deg/s"),
    time_360_s: (2 * Math.PI) / rate,
  };
};

const reached = (value: CheckValue): Computed => {
  const ratio = num(value, "speed_ratio");
  const load = known(loadAtStall(lift(), { mass: 1, liftLoss: 0, cgFactor: 1 }, ratio, seaLevel));
  return { load_factor_at_stall: load, bank_at_stall_deg: fromSI(known(stallBank(load, 0)), "deg") };
};

/** A wing of 1 m2 at the stated loading. */
const gusted = (value: CheckValue) => {
  const wing = {
    area: 1,
    chord: num(value, "mean_chord_ft") * FOOT,
    slope: num(value, "lift_slope_per_rad"),
  };
  const mass = (num(value, "wing_loading_psf") * POUND) / FOOT ** 2;
  const where = air(num(value, "altitude_ft") * FOOT);
  const massRatio = gustMassRatio(mass, wing, where);
  return { wing, mass, where, massRatio, alleviation: gustAlleviation(massRatio) };
};

/**
 * The rule writes Kg U V a / (498 W/S) in ft/s, kt and lb/ft2. Its 498 is 2 / (rho0 kt ft/s) cut to three
 * digits, which makes its figures 0.1 % greater than the formula in SI that is computed here.
 */
const RULE_OVER_SI = (2 * G0 * POUND) / (RHO0 * KNOT * FOOT ** 3) / 498;

const gust = (value: CheckValue): Computed => {
  const { wing, mass, where, massRatio, alleviation } = gusted(value);
  const eas = num(value, "v_keas") * KNOT;
  const load = RULE_OVER_SI * gustLoad(num(value, "ude_fps_eas") * FOOT, eas, mass, wing, where);
  return { mass_ratio: massRatio, kg: alleviation, n_up: 1 + load, n_down: 1 - load };
};

/** 14 CFR 25.335(d)(1): the speed at which the gust just brings the wing to its stall. */
const gustIntensitySpeed = (value: CheckValue): Computed => {
  const { wing, mass, where, alleviation } = gusted(value);
  const load =
    RULE_OVER_SI *
    gustLoad(num(value, "uref_fps_eas") * FOOT, num(value, "vc_keas") * KNOT, mass, wing, where);
  return { kg: alleviation, vb_min_keas: num(value, "vs1_keas") * Math.sqrt(1 + load) };
};

const byFaa = (value: CheckValue): Computed => {
  const category = faaCategory(num(value, "speed_kt") * KNOT);
  return { category, faa_category: category };
};

const byIcao = (value: CheckValue): Computed => {
  const vat = Math.max(
    leastVref(num(value, "vso_kt") * KNOT, "vs"),
    leastVref(num(value, "vs1g_kt") * KNOT, "vs1g"),
  );
  return { vat_kt: vat / KNOT, category: icaoCategory(vat) ?? "" };
};

const shownSpeed = (limit: HoldingSpeed) => (limit.kind === "ias" ? limit.speed / KNOT : limit.mach);

const holdingIcao = (value: CheckValue): Computed => ({
  normal_kt: shownSpeed(greatestHoldingIcao(num(value, "altitude_ft") * FOOT, "C")),
});

const holdingFaa = (value: CheckValue): Computed => ({
  max_kias: shownSpeed(greatestHoldingFaa(num(value, "altitude_ft") * FOOT)),
});

/** The rate of the bank, but never more than 3 degrees a second (ICAO Doc 8168). */
const cappedTurn = (tas: number, bank: number): Computed => {
  const flown = Math.min(deg(bank), rateOneBank(tas));
  return {
    rate_deg_s: fromSI(known(turnRate(tas, flown, 0, null)), "deg/s"),
    radius_nm: fromSI(known(turnRadius(tas, flown, 0, null)), "nm"),
  };
};

/** 2,000 ft, ISA+15, 20 degrees of bank or 3 degrees a second, 25 kt of wind in the whole turn. */
const circling = (value: CheckValue): Computed => {
  const where = air(2000 * FOOT, 15);
  const flown = known(tasFromMach(known(machFromCas(num(value, "ias_kt") * KNOT, where)), where));
  const tas = flown + 25 * KNOT;
  // The table's radii stand on its own whole-knot speeds, from a conversion without compressibility.
  const radius = cappedTurn((value.expected.tas_plus_wind_kt as number) * KNOT, 20).radius_nm as number;
  return {
    tas_plus_wind_kt: tas / KNOT,
    turn_radius_nm: radius,
    radius_from_threshold_nm: 2 * radius + num(value, "straight_segment_nm"),
  };
};

const scaled = (value: CheckValue): Computed => {
  const from = (value.inputs.w1_lb ?? value.inputs.w1) as number;
  const to = (value.inputs.w2_lb ?? value.inputs.w2) as number;
  const one = lift(num(value, "v1_keas") * KNOT, from);
  return { v2_keas: stallEas(one, { mass: to }) / KNOT };
};

/** The standard atmosphere's pressure-height relation at a geometric height, as the tables print it. */
function geopotential(geometric: number): number {
  const earth = 6356766;
  return (earth * geometric) / (earth + geometric);
}

function atmosphereValues(at: Atmosphere): Computed {
  return {
    temperature_k: at.temperature,
    temperature_c: at.temperature - 273.15,
    temperature_f: (at.temperature - 273.15) * 1.8 + 32,
    pressure_pa: at.pressure,
    pressure_hpa: at.pressure / 100,
    pressure_inhg: at.pressure / INCH_OF_MERCURY,
    pressure_psia: at.pressure / ((POUND * G0) / (FOOT / 12) ** 2),
    density_kg_m3: at.density,
    density_pct: at.sigma * 100,
    speed_of_sound_m_s: at.soundSpeed,
    speed_of_sound_kt: at.soundSpeed / KNOT,
    delta: at.delta,
    theta: at.theta,
    sigma: at.sigma,
    feet: at.pressureAltitude / FOOT,
  };
}

const standard = (value: CheckValue): Computed => {
  const { inputs } = value;
  if (typeof inputs.geometric_m === "number") {
    const h = geopotential(inputs.geometric_m);
    return { ...atmosphereValues(air(h)), geopotential_m_rounded: h, geopotential_m: h };
  }
  if (typeof inputs.geometric_ft === "number")
    return atmosphereValues(air(geopotential(inputs.geometric_ft * FOOT)));
  const feet = inputs.geopotential_ft ?? inputs.pressure_altitude_ft;
  const deviation = (inputs.isa_dev_k as number | undefined) ?? 0;
  if (typeof feet === "number") return atmosphereValues(air(feet * FOOT, deviation));
  return atmosphereValues(air(num(value, "geopotential_m")));
};

const airspeeds = (value: CheckValue): Computed => {
  const at = air(
    num(value, "pressure_altitude_ft") * FOOT,
    (value.inputs.isa_dev_k as number | undefined) ?? 0,
  );
  const cas = num(value, "cas_kt") * KNOT;
  const mach = known(machFromCas(cas, at));
  const eas = known(easFromCas(cas, at));
  return {
    eas_kt: eas / KNOT,
    tas_kt: known(tasFromMach(mach, at)) / KNOT,
    mach,
    mach_correct: mach,
    cas_minus_eas_kt: (cas - eas) / KNOT,
  };
};

const fromMach = (value: CheckValue): Computed => {
  const at = air(num(value, "pressure_altitude_ft") * FOOT);
  const mach = num(value, "mach");
  return { cas_kt: known(casFromMach(mach, at)) / KNOT, tas_kt: known(tasFromMach(mach, at)) / KNOT };
};

const impact = (value: CheckValue): Computed => {
  const cas = num(value, "cas_kt") * KNOT;
  const qc = known(impactPressureOfCas(cas));
  return {
    qc_pa: qc,
    qc_lb_ft2: qc / ((POUND * G0) / FOOT ** 2),
    qc_over_incompressible_q: qc / (0.5 * RHO0 * cas * cas),
  };
};

const dirty = (value: CheckValue): Computed => ({
  stall_speed_factor: stallEas(lift(), { liftLoss: num(value, "clmax_loss_pct") / 100 }),
});

const v2min = (value: CheckValue): Computed => {
  const factor = value.inputs.category === "1.08 group" ? 1.08 : null;
  return { v2min_kcas: leastV2min(num(value, "vsr_kcas"), "vsr", num(value, "vmc_kcas"), factor) };
};

const rateOne = (value: CheckValue): Computed => ({
  bank_exact_deg: fromSI(rateOneBank(num(value, "tas_kt") * KNOT), "deg"),
});

const each = (from: string, to: string, ids: readonly number[], compute: (value: CheckValue) => Computed) =>
  Object.fromEntries(ids.map((id) => [`${from}-${String(id).padStart(3, "0")}${to}`, compute]));

/** How each value is computed, by its id. */
export const computations: Readonly<Record<string, (value: CheckValue) => Computed>> = {
  ...each("A", "", [2, 3, 4, 6, 7, 10, 11, 13, 15, 25, 33, 36], bankValues),
  "A-026": (value) => ({
    stall_speed_kt: stallEas(lift(num(value, "vs1g_kt")), { load: num(value, "load_factor") }),
  }),
  "A-028": (value) => {
    const speed = num(value, "vs1g_kt") * num(value, "speed_ratio");
    const load = known(
      loadAtStall(lift(num(value, "vs1g_kt")), { mass: 1, liftLoss: 0, cgFactor: 1 }, speed, seaLevel),
    );
    return { load_factor: load, speed_kt: stallEas(lift(num(value, "vs1g_kt")), { load }) };
  },
  "A-029": (value) => ({
    stall_speed_kt: stallEas(lift(num(value, "vs1g_kt")), {
      load: known(loadFactor(deg(num(value, "bank_deg")), 0)),
    }),
  }),
  "A-031": (value) => ({
    formula_stall_speed_kt: stallEas(lift(num(value, "vs1g_kt")), { load: num(value, "load_factor_stated") }),
    formula_load_factor_at_72_deg: known(loadFactor(deg(num(value, "bank_deg")), 0)),
  }),
  "A-032": (value) => ({
    formula_stall_speed_kt: stallEas(lift(num(value, "vs1g_kt")), { load: num(value, "load_factor") }),
  }),
  "A-035": (value) => ({
    speed_ratio: stallEas(lift(), { load: num(value, "load_factor") }),
    formula_bank_deg: fromSI(known(stallBank(num(value, "load_factor"), 0)), "deg"),
  }),
  ...each("A", "", [38, 39, 40, 41, 42, 43], reached),
  ...each("B", "", [1, 2, 7, 9], scaled),
  "B-006": (value) => ({
    stall_speed_change_pct: (stallEas(lift(), { mass: 1 + num(value, "weight_change_pct") / 100 }) - 1) * 100,
  }),
  "B-014": (value) => {
    const one = lift(num(value, "vs1_keas_w1"), num(value, "w1"));
    const load = num(value, "limit_load_factor");
    return {
      va_min_w1_keas: stallEas(one, { load }),
      va_min_w2_keas: stallEas(one, { load, mass: num(value, "w2") }),
    };
  },
  "B-017": (value) => {
    const mass = num(value, "weight_lbf") * POUND;
    const area = num(value, "wing_area_ft2") * FOOT ** 2;
    // The speed at which the lift coefficient at the stall is the one given.
    const speed = Math.sqrt(liftCoefficientAtStall(1, mass, area) / num(value, "clmax"));
    return { vs_keas: stallEas(lift(speed, mass), {}) / KNOT };
  },
  "B-019": (value) => {
    const at = air(num(value, "pressure_altitude_ft") * FOOT);
    const stall = stallSpeed(
      lift(num(value, "vs_keas") * KNOT),
      { mass: 1, load: 1, liftLoss: 0, cgFactor: 1 },
      at,
    );
    if (stall.kind !== "speed") throw new Error(stall.kind);
    return { vs_ktas: known(tasFromMach(stall.mach, at)) / KNOT };
  },
  ...each("C", "", [9, 10, 11], v2min),
  "C-013": (value) => ({ vfto_min_kcas: leastVfto(num(value, "vsr_kcas"), "vsr") }),
  "C-028": () => manoeuvre(30),
  "C-031": () => manoeuvre(40),
  "C-034": (value) => ({
    vfto_1p18_kcas: leastVfto(num(value, "vsr_kcas"), "vsr"),
    pure_40deg_speed_kcas: stallEas(lift(num(value, "vsw_kcas")), { load: known(loadFactor(deg(40), 0)) }),
    pure_40deg_met:
      stallEas(lift(num(value, "vsw_kcas")), { load: known(loadFactor(deg(40), 0)) }) <=
      leastVfto(num(value, "vsr_kcas"), "vsr"),
  }),
  "C-044": (value) => ({ va_min_keas: stallEas(lift(num(value, "vs1_keas")), { load: num(value, "n") }) }),
  "C-071": (value) => ({
    vref_min_kcas: Math.max(leastVref(num(value, "vs1_kcas"), "vs"), num(value, "vmc_kcas")),
  }),
  ...each("D", "", [28, 29, 30, 31, 32, 34], turn),
  ...Object.fromEntries(["D-002", "D-003", "D-005", "D-007", "D-014"].map((id) => [id, byFaa])),
  ...Object.fromEntries(["D-009", "D-010", "D-011"].map((id) => [id, byIcao])),
  ...Object.fromEntries(["D-041", "D-042", "D-044", "D-045"].map((id) => [id, circling])),
  ...Object.fromEntries(["D-051", "D-052"].map((id) => [id, holdingIcao])),
  ...Object.fromEntries(["D-055", "D-056", "D-057", "D-058"].map((id) => [id, holdingFaa])),
  ...Object.fromEntries(["J-002", "J-003", "J-004", "J-005", "J-006"].map((id) => [id, gust])),
  "D-026": (value) => cappedTurn(num(value, "tas_kt") * KNOT, num(value, "bank_deg")),
  "D-054": () => ({
    cat_ab_kt: shownSpeed(greatestHoldingIcao(14_000 * FOOT, "B")),
    above_34000_mach: shownSpeed(greatestHoldingIcao(34_100 * FOOT, "C")),
  }),
  "J-017": gustIntensitySpeed,
  "D-038": (value) => ({ uncapped_rate_deg_s: turn(value).uncapped_rate_deg_s as number }),
  ...each("E", "", [1, 2, 5, 11, 12, 13, 16, 17, 19], turn),
  ...each("E", "", [8, 9], (value) => turn(value, num(value, "speed_kt") * KNOT)),
  ...each("E", "", [21, 23, 25], rateOne),
  "E-026": (value) => {
    // The bank rises with the speed: between 1 and 600 kt it is this one once.
    let low = 1;
    let high = 600;
    for (let i = 0; i < 100; i++) {
      const middle = (low + high) / 2;
      if (rateOneBank(middle * KNOT) < deg(num(value, "bank_deg"))) low = middle;
      else high = middle;
    }
    return { tas_kt: low };
  },
  "E-027": () => {
    const rate = known(turnRate(100, rateOneBank(100), 0, null));
    return {
      time_360_s: Math.round(((2 * Math.PI) / rate) * 1e9) / 1e9,
      deg_per_min: Math.round(fromSI(rate, "deg/s") * 60 * 1e9) / 1e9,
    };
  },
  "E-029": (value) => {
    const bank = known(stallBank(num(value, "load_factor"), 0));
    const speeds = value.inputs.tas_kt as readonly number[];
    return {
      bank_deg: fromSI(bank, "deg"),
      radius_m: speeds.map((tas) => known(turnRadius(tas * KNOT, bank, 0, null))),
    };
  },
  ...each(
    "F",
    "",
    [
      2, 3, 6, 7, 8, 9, 10, 11, 12, 15, 17, 18, 23, 24, 26, 28, 29, 30, 31, 32, 34, 35, 37, 39, 40, 43, 44,
      46,
    ],
    standard,
  ),
  "F-005": (value) => ({
    delta: (value.inputs.geopotential_ft as readonly number[]).map((feet) => air(feet * FOOT).delta),
  }),
  "F-045": (value) => ({
    dry_isa_sigma: (value.inputs.altitude_ft as readonly number[]).map((feet) => air(feet * FOOT).sigma),
  }),
  ...each("G", "", [2, 3, 4, 5, 8, 9, 10, 11, 13, 16, 18, 19, 31, 32, 34, 36, 40], airspeeds),
  ...each("G", "", [22, 23, 25, 26, 27], impact),
  ...each("G", "", [28, 29, 30], fromMach),
  "G-041": (value) => {
    const at = air(num(value, "altitude_ft") * FOOT, num(value, "isa_dev_c"));
    return {
      tas_compressible_kt: known(tasFromMach(known(machFromCas(num(value, "ias_kt") * KNOT, at)), at)) / KNOT,
    };
  },
  ...each("H", "", [9, 10, 12], dirty),
  "H-005": (value) => {
    const [at25, at50] = value.inputs.clmax as readonly number[];
    return { stall_speed_factor: stallEas(lift(), { liftLoss: 1 - (at50 as number) / (at25 as number) }) };
  },
  "H-014": (value) => ({
    clmax_loss_pct: (value.inputs.speed_ratio as readonly number[]).map((ratio) => {
      // The loss at which the load at the stall is just 1.
      const whole = known(loadAtStall(lift(), { mass: 1, liftLoss: 0, cgFactor: 1 }, ratio, seaLevel));
      return (1 - 1 / whole) * 100;
    }),
  }),
  "I-006": (value) => ({
    stall_speed_factor: stallEas(lift(), {
      cgFactor: Math.sqrt(value.expected.wing_lift_over_weight as number),
    }),
  }),
  "K-001": () => ({ m_s: toSI(1, "kt") }),
  "K-002": () => ({ ft: toSI(1, "nm") / FOOT }),
  "K-003": () => ({ ft_s2: G0 / FOOT }),
  "K-004": () => ({ slug_ft3: (RHO0 * FOOT ** 3) / ((POUND * G0) / FOOT) }),
  "K-006": () => ({ pa_per_inhg: INCH_OF_MERCURY, inhg: P0 / INCH_OF_MERCURY }),
  "K-008": (value) => {
    const all = (value.inputs.altitude_ft as readonly number[]).map((feet) =>
      atmosphereValues(air(feet * FOOT)),
    );
    return {
      temperature_f: all.map((one) => one.temperature_f as number),
      pressure_psia: all.map((one) => one.pressure_psia as number),
    };
  },
};

/** The load of a demonstrated bank, and the speed over the 1-g warning that it needs. */
function manoeuvre(bank: number): Computed {
  const load = known(loadFactor(deg(bank), 0));
  return {
    bank_deg: Math.round(fromSI(known(stallBank(load, 0)), "deg")),
    load_factor: load,
    speed_over_stall_warning_needed: stallEas(lift(), { load }),
  };
}
