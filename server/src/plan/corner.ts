import {
  casFromEas,
  casFromMach,
  easFromMach,
  machFromCas,
  machFromEas,
  machFromTas,
  tasFromMach,
} from "../flight/airspeed.ts";
import { type Atmosphere, atmosphere } from "../flight/atmosphere.ts";
import { buffetBank, buffetLoad } from "../flight/buffet.ts";
import { calibratedFromIndicated, indicatedFromCalibrated } from "../flight/ias.ts";
import { type Lift, loadAtStall, type StallSpeed, stallBank, stallSpeed, warningBank } from "../flight/stall.ts";
import type { Table } from "../flight/table.ts";
import {
  loadFactor,
  pathFromGradient,
  pathFromVerticalSpeed,
  rateOneBank,
  turnRadius,
  turnRate,
} from "../flight/turn.ts";

/** What a speed says, before it is one CAS: m/s, or Mach. */
export interface SpeedInput {
  readonly kind: "cas" | "eas" | "tas" | "ias" | "mach";
  readonly value: number;
}

/** A path as stated: an angle in rad, a gradient, or a vertical speed in m/s. */
export interface PathInput {
  readonly kind: "angle" | "gradient" | "vertical-speed";
  readonly value: number;
}

/** One combination of inputs, SI. */
export interface CornerInput {
  readonly mass: number;
  readonly pressureAltitude: number;
  readonly deviation: number;
  readonly speed: SpeedInput;
  readonly bank: number | "rate-one";
  readonly path: PathInput;
  readonly load: number | null;
  readonly liftLoss: number;
  readonly cgFactor: number;
}

/** What stays the same over all corners of a point. */
export interface Airframe {
  readonly lift: Lift;
  /** Speed of the warning over the stall; null where the card states none. */
  readonly warning: number | null;
  readonly ias: Table | null;
  readonly buffet: { readonly table: Table; readonly wingArea: number } | null;
}

/**
 * The figures of one corner, SI. A figure that cannot be known is NaN, here and nowhere else:
 * it becomes null when the corners are gathered.
 */
export interface Corner {
  readonly input: CornerInput;
  readonly air: Atmosphere;
  readonly cas: number;
  readonly eas: number;
  readonly tas: number;
  readonly mach: number;
  readonly ias: number;
  readonly bank: number;
  readonly path: number;
  readonly load: number;
  readonly vs1gKind: StallSpeed["kind"];
  readonly stallKind: StallSpeed["kind"];
  readonly vs1g: number;
  readonly stall: number;
  readonly warning: number;
  readonly ratio: number;
  readonly margin: number;
  readonly stallLoad: number;
  readonly stallBank: number;
  readonly warningBank: number;
  readonly overshoot: number;
  readonly buffetLoad: number;
  readonly buffetBank: number;
  readonly radius: number;
  readonly rate: number;
  readonly rateOneBank: number;
}

/** Why a corner gives no figures at all. */
export type CornerProblem = "atmosphere" | "speed" | "ias" | "path" | "bank";

export function corner(frame: Airframe, input: CornerInput, near?: Atmosphere): Corner | CornerProblem {
  const same = near && near.pressureAltitude === input.pressureAltitude && near.deviation === input.deviation;
  const air = same ? near : atmosphere(input.pressureAltitude, input.deviation);
  if (!air) return "atmosphere";
  const flown = flownSpeed(frame, input, air);
  if (typeof flown === "string") return flown;
  const { cas, mach, bank, path, load } = flown;
  const eas = easFromMach(mach, air) ?? Number.NaN;
  const tas = tasFromMach(mach, air) ?? Number.NaN;

  const { lift } = frame;
  const { mass, liftLoss, cgFactor } = input;
  const oneG = stallSpeed(lift, { mass, load: 1, liftLoss, cgFactor }, air);
  const turning = load === 1 ? oneG : stallSpeed(lift, { mass, load, liftLoss, cgFactor }, air);
  const clean = liftLoss === 0 ? turning : stallSpeed(lift, { mass, load, liftLoss: 0, cgFactor }, air);
  const vs1g = casOf(oneG);
  const stall = casOf(turning);
  const warning = frame.warning === null ? Number.NaN : casOf(clean) * frame.warning;
  const stallLoad = loadAtStall(lift, { mass, liftLoss, cgFactor }, eas, air) ?? Number.NaN;
  const bankAtStall = stallBank(stallLoad, path) ?? Number.NaN;
  const bankAtWarning =
    frame.warning === null
      ? Number.NaN
      : (warningBank(lift, { mass, cgFactor }, cas, frame.warning, path, air) ?? Number.NaN);
  // The warning cannot come after the stall: what the wing does counts, not what the sensor would say.
  const warned = bankAtWarning > bankAtStall ? bankAtStall : bankAtWarning;
  const onset =
    frame.buffet && liftLoss === 0
      ? (buffetLoad(frame.buffet.table, mass, frame.buffet.wingArea, mach, air) ?? Number.NaN)
      : Number.NaN;
  const ias = frame.ias
    ? (indicatedFromCalibrated(frame.ias, cas, load, mass, lift.referenceMass) ?? Number.NaN)
    : Number.NaN;

  return {
    input,
    air,
    cas,
    eas,
    tas,
    mach,
    ias,
    bank,
    path,
    load,
    vs1gKind: oneG.kind,
    stallKind: turning.kind,
    vs1g,
    stall,
    warning,
    ratio: cas / vs1g,
    margin: stall === 0 ? Number.NaN : cas / stall,
    stallLoad,
    stallBank: bankAtStall,
    warningBank: warned,
    overshoot: warned - bank,
    buffetLoad: onset,
    buffetBank: buffetBank(onset, path) ?? Number.NaN,
    radius: turnRadius(tas, bank, path, input.load) ?? Number.NaN,
    rate: turnRate(tas, bank, path, input.load) ?? Number.NaN,
    rateOneBank: rateOneBank(tas),
  };
}

function casOf(stall: StallSpeed): number {
  if (stall.kind === "speed") return stall.cas;
  return stall.kind === "zero" ? 0 : Number.NaN;
}

interface Flown {
  readonly cas: number;
  readonly mach: number;
  readonly bank: number;
  readonly path: number;
  readonly load: number;
}

/**
 * Speed, bank, path and load lean on one another: rate one and a vertical speed need the true
 * airspeed, an indicated speed needs the load. Where each needs the next there is no answer.
 */
function flownSpeed(frame: Airframe, input: CornerInput, air: Atmosphere): Flown | CornerProblem {
  if (input.speed.kind === "ias") return indicatedSpeed(frame, input, air);
  const mach = machOf(input.speed, air);
  if (mach === null) return "speed";
  return withMach(input, air, mach);
}

function withMach(input: CornerInput, air: Atmosphere, mach: number): Flown | CornerProblem {
  const cas = input.speed.kind === "cas" ? input.speed.value : casFromMach(mach, air);
  const tas = tasFromMach(mach, air);
  if (cas === null || tas === null) return "speed";
  const path = pathAngleOf(input.path, tas);
  if (path === null) return "path";
  const bank = input.bank === "rate-one" ? rateOneBank(tas) : input.bank;
  const load = input.load ?? loadFactor(bank, path);
  if (load === null) return "bank";
  return { cas, mach, bank, path, load };
}

function machOf(speed: SpeedInput, air: Atmosphere): number | null {
  switch (speed.kind) {
    case "cas":
      return machFromCas(speed.value, air);
    case "eas":
      return machFromEas(speed.value, air);
    case "tas":
      return machFromTas(speed.value, air);
    case "mach":
      return 0 < speed.value && speed.value < 1 ? speed.value : null;
    case "ias":
      return null;
  }
}

function pathAngleOf(path: PathInput, tas: number): number | null {
  switch (path.kind) {
    case "angle":
      return path.value;
    case "gradient":
      return pathFromGradient(path.value);
    case "vertical-speed":
      return pathFromVerticalSpeed(path.value, tas);
  }
}

/** An indicated speed becomes calibrated through the card's table, which is entered at the load that is flown. */
function indicatedSpeed(frame: Airframe, input: CornerInput, air: Atmosphere): Flown | CornerProblem {
  if (!frame.ias) return "ias";
  if (input.bank === "rate-one" || (input.path.kind === "vertical-speed" && input.load === null)) return "ias";
  const path = pathAngleOf(input.path, Number.NaN);
  const load = input.load ?? (path === null ? null : loadFactor(input.bank, path));
  if (load === null || !(0 < load)) return "ias";
  const cas = calibratedFromIndicated(frame.ias, input.speed.value, load, input.mass, frame.lift.referenceMass);
  if (cas === null) return "ias";
  const mach = machFromCas(cas, air);
  if (mach === null) return "speed";
  return withMach({ ...input, speed: { kind: "cas", value: cas } }, air, mach);
}

/** CAS of a stated speed at one atmosphere, for what carries on; null where it is none. */
export function calibrated(speed: SpeedInput, air: Atmosphere): number | null {
  if (speed.kind === "cas") return speed.value;
  if (speed.kind === "eas") return casFromEas(speed.value, air);
  const mach = machOf(speed, air);
  return mach === null ? null : casFromMach(mach, air);
}
