import { celsiusToKelvin, FOOT, fromSI, KNOT, toSI, type UnitName } from "../flight/units.ts";
import type { Quantity, Tolerance } from "../notation/tree.ts";
import type { Unit } from "../notation/vocabulary.ts";

/** What a number measures, once its clause is known. */
export type Measured =
  | "mass"
  | "fuel"
  | "fuelFlow"
  | "time"
  | "speed"
  | "speedOffset"
  | "mach"
  | "speedFactor"
  | "altitude"
  | "qnh"
  | "deviation"
  | "oat"
  | "bank"
  | "load"
  | "pathAngle"
  | "gradient"
  | "verticalSpeed"
  | "cg"
  | "liftLoss"
  | "power"
  | "area"
  | "length"
  | "slope"
  | "radius"
  | "factor"
  | "liftCoefficient"
  | "gust"
  | "shear"
  | "decel"
  | "ratio"
  | "overshoot"
  | "loadLeft";

interface Measure {
  /** Of a number without a unit: SI as it stands, or this unit. */
  readonly bare: Unit | null;
  /** SI; both ends are allowed unless `open`. */
  readonly least: number;
  readonly most: number;
  readonly open: "least" | "most" | "both" | null;
  readonly noun: string;
}

function span(
  noun: string,
  least: number,
  most: number,
  open: Measure["open"] = null,
  bare: Unit | null = null,
): Measure {
  return { noun, least, most, open, bare };
}

/**
 * What each quantity may be. The ranges are wide on purpose: they catch a slip of the unit or of a
 * digit, and what the physics cannot take; what an aeroplane may do is the card's to say.
 */
const measures: Readonly<Record<Measured, Measure>> = {
  mass: span("weight", 50, 1_000_000),
  fuel: span("burn", 0, 500_000),
  fuelFlow: span("fuel flow", 0, 20),
  time: span("time", 0, 48 * 3600),
  // a0 is 661.5 kt: nothing supersonic is computed.
  speed: span("speed", 0, 661 * KNOT, "least"),
  speedOffset: span("speed", 0, 300 * KNOT),
  mach: span("Mach number", 0, 1, "both"),
  speedFactor: span("factor", 0.5, 10),
  // The atmosphere that is modelled, in feet, and its top at 20 000 m.
  altitude: span("altitude", -5000 * FOOT, 20_000),
  // The lowest and highest sea-level pressures on record lie within.
  qnh: span("qnh", 85_000, 108_500),
  deviation: span("deviation from ISA", -80, 80),
  oat: span("temperature", celsiusToKelvin(-120), celsiusToKelvin(70)),
  bank: span("bank", 0, Math.PI, null, "deg"),
  load: span("load factor", -6, 12),
  pathAngle: span("path", -Math.PI / 2, Math.PI / 2, "both"),
  gradient: span("path", -1, 1),
  verticalSpeed: span("vertical speed", -30_000 * (FOOT / 60), 30_000 * (FOOT / 60)),
  cg: span("cg", -1, 2),
  liftLoss: span("loss of maximum lift", 0, 1, "most"),
  power: span("power", 0, 1.2),
  area: span("area", 1, 2000),
  length: span("length", 0.1, 50),
  slope: span("lift-curve slope", 0, 12, "least"),
  radius: span("radius", 0, 500_000, "least"),
  factor: span("factor", 0, 5, "least"),
  liftCoefficient: span("lift coefficient", 0, 6, "least"),
  // The strongest derived gust of 14 CFR 23.333(c) is 66 ft/s.
  gust: span("gust", 0, 100 * FOOT, "least"),
  shear: span("loss of airspeed", 0, 150 * KNOT, "least"),
  decel: span("deceleration", 0, 20 * KNOT, "least"),
  ratio: span("ratio", 0, 10, "least"),
  overshoot: span("bank", -Math.PI, Math.PI, null, "deg"),
  loadLeft: span("load factor", -6, 12),
};

export interface Measurement {
  /** SI. */
  readonly value: number;
  /** Why the value is out of its range, as a sentence; null where it is not. */
  readonly problem: string | null;
}

/** The SI value of a quantity, and what is wrong with it. The text has already checked the unit's kind. */
export function measure(quantity: Quantity, what: Measured): Measurement {
  const rule = measures[what];
  const unit = quantity.unit ?? rule.bare;
  const value = convert(quantity.value, unit, what);
  return { value, problem: isInside(value, rule) ? null : outOfRange(quantity, rule, unit, what) };
}

/** True where an SI value is one that the quantity can have: the ends of a tolerance are held to it too. */
export function canBe(value: number, what: Measured): boolean {
  return isInside(value, measures[what]);
}

function convert(value: number, unit: Unit | null, what: Measured): number {
  if (unit === null) return value;
  if (what === "oat") return unit === "C" ? celsiusToKelvin(value) : value;
  return toSI(value, unit);
}

function isInside(value: number, { least, most, open }: Measure): boolean {
  // A figure at its printed limit is inside, whatever its unit's last bit says.
  const allowance = 1e-9 * Math.max(Math.abs(least), Math.abs(most));
  const aboveLeast = open === "least" || open === "both" ? least < value : least - allowance <= value;
  const belowMost = open === "most" || open === "both" ? value < most : value <= most + allowance;
  return aboveLeast && belowMost;
}

function outOfRange(quantity: Quantity, rule: Measure, unit: Unit | null, what: Measured): string {
  const written = withUnit(quantity.value, unit);
  const ends = [rule.least, rule.most].map((end) => shown(end, unit, what));
  const shownUnit = unit === null || unit === "FL" ? "" : unit === "deg" ? "°" : ` ${unit}`;
  const [least, most] = ends;
  const article = /^[aeiou]/.test(rule.noun) ? "An" : "A";
  const exclusive = leftOut[rule.open ?? "none"];
  return `${article} ${rule.noun} of ${written} is outside ${least} to ${most}${shownUnit}${exclusive}: check the number and its unit.`;
}

function withUnit(value: number, unit: Unit | null): string {
  if (unit === null) return String(value);
  if (unit === "FL") return `FL${String(value).padStart(3, "0")}`;
  return unit === "deg" ? `${value}°` : `${value} ${unit}`;
}

const leftOut = {
  none: "",
  least: " (the first left out)",
  most: " (the last left out)",
  both: " (both left out)",
} as const;

/** An end of a range in the author's own unit, to as many digits as say it. */
function shown(si: number, unit: Unit | null, what: Measured): string {
  if (unit === "FL") return `FL${String(Math.max(0, Math.round(fromSI(si, "FL")))).padStart(3, "0")}`;
  const value =
    unit === null ? si : what === "oat" ? (unit === "C" ? si - 273.15 : si) : fromSI(si, unit as UnitName);
  return String(Number(value.toPrecision(5)));
}

/** The half-width of a tolerance, SI. Without a unit of its own it has the quantity's. */
export function measureTolerance(tolerance: Tolerance, unit: Unit | null, what: Measured): number {
  const own = tolerance.unit ?? unit ?? measures[what].bare;
  if (own === null) return tolerance.value;
  // A tolerance on a temperature is a difference, which toSI gives.
  return toSI(tolerance.value, own);
}
