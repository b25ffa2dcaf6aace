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
import { gustLoad } from "../flight/gust.ts";
import { calibratedFromIndicated, indicatedFromCalibrated } from "../flight/ias.ts";
import {
  type Lift,
  type LiftState,
  loadAtStall,
  type StallSpeed,
  stallBank,
  stallSpeed,
  warningBank,
} from "../flight/stall.ts";
import { interpolate, type Table } from "../flight/table.ts";
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
  /** What a gust acts on; the lift-curve slope is one figure, or against Mach number. */
  readonly wing: { readonly area: number; readonly chord: number; readonly slope: number | Table } | null;
}

/** A lift-curve slope that is one figure holds up to this Mach number. */
const GREATEST_MACH_OF_ONE_SLOPE = 0.4;

/** Why a corner gives no figures at all. */
export type CornerProblem = "atmosphere" | "speed" | "ias" | "path" | "bank";

export function corner(frame: Airframe, input: CornerInput, near?: Atmosphere): Corner | CornerProblem {
  const same = near && near.pressureAltitude === input.pressureAltitude && near.deviation === input.deviation;
  const air = same ? near : atmosphere(input.pressureAltitude, input.deviation);
  if (!air) return "atmosphere";
  const flown = flownSpeed(frame, input, air);
  return typeof flown === "string" ? flown : new Corner(frame, input, air, flown);
}

/**
 * The figures of one corner, SI. A figure that cannot be known is NaN, here and nowhere else: it
 * becomes null when the corners are gathered. Each is worked out when it is first asked for, since a
 * check asks for half of them.
 */
export class Corner {
  readonly input: CornerInput;
  readonly air: Atmosphere;
  readonly cas: number;
  readonly mach: number;
  readonly bank: number;
  readonly path: number;
  readonly load: number;
  readonly #frame: Airframe;
  #oneG: StallSpeed | null = null;
  #turning: StallSpeed | null = null;
  #stallLoad: number | null = null;
  #warningBank: number | null = null;
  #warning: number | null = null;

  constructor(frame: Airframe, input: CornerInput, air: Atmosphere, flown: Flown) {
    this.#frame = frame;
    this.input = input;
    this.air = air;
    this.cas = flown.cas;
    this.mach = flown.mach;
    this.bank = flown.bank;
    this.path = flown.path;
    this.load = flown.load;
  }

  get eas(): number {
    return easFromMach(this.mach, this.air) ?? Number.NaN;
  }

  get tas(): number {
    return tasFromMach(this.mach, this.air) ?? Number.NaN;
  }

  get ias(): number {
    const { ias, lift } = this.#frame;
    if (!ias) return Number.NaN;
    return (
      indicatedFromCalibrated(ias, this.cas, this.load, this.input.mass, lift.referenceMass) ?? Number.NaN
    );
  }

  get #oneGStall(): StallSpeed {
    this.#oneG ??=
      this.load === 1
        ? this.#turningStall
        : stallSpeed(this.#frame.lift, { ...this.#lift, load: 1 }, this.air);
    return this.#oneG;
  }

  get #turningStall(): StallSpeed {
    this.#turning ??= stallSpeed(this.#frame.lift, { ...this.#lift, load: this.load }, this.air);
    return this.#turning;
  }

  get #lift(): LiftState {
    const { mass, liftLoss, cgFactor } = this.input;
    return { mass, liftLoss, cgFactor };
  }

  get vs1gKind(): StallSpeed["kind"] {
    return this.#oneGStall.kind;
  }

  get stallKind(): StallSpeed["kind"] {
    return this.#turningStall.kind;
  }

  get vs1g(): number {
    return casOf(this.#oneGStall);
  }

  get stall(): number {
    return casOf(this.#turningStall);
  }

  /** The stall with a clean wing, since the sensor does not know that it is dirty, times the card's factor. */
  get warning(): number {
    this.#warning ??= this.#cleanStall() * (this.#frame.warning ?? Number.NaN);
    return this.#warning;
  }

  #cleanStall(): number {
    if (this.input.liftLoss === 0) return this.stall;
    return casOf(stallSpeed(this.#frame.lift, { ...this.#lift, liftLoss: 0, load: this.load }, this.air));
  }

  get ratio(): number {
    return this.cas / this.vs1g;
  }

  get margin(): number {
    return this.stall === 0 ? Number.NaN : this.cas / this.stall;
  }

  get stallLoad(): number {
    this.#stallLoad ??= loadAtStall(this.#frame.lift, this.#lift, this.eas, this.air) ?? Number.NaN;
    return this.#stallLoad;
  }

  /** True beyond the maximum of V² f(M), where the wing carries the more the slower it flies. */
  get carriesMoreSlower(): boolean {
    const slower = loadAtStall(this.#frame.lift, this.#lift, this.eas * 0.99, this.air);
    return slower !== null && this.stallLoad < slower;
  }

  get stallBank(): number {
    return stallBank(this.stallLoad, this.path) ?? Number.NaN;
  }

  /** The warning cannot come after the stall: what the wing does counts, not what the sensor would say. */
  get warningBank(): number {
    this.#warningBank ??= this.#sensedBank();
    return this.#warningBank;
  }

  #sensedBank(): number {
    const { lift, warning } = this.#frame;
    if (warning === null) return Number.NaN;
    const sensed = warningBank(lift, this.input, this.cas, warning, this.path, this.air) ?? Number.NaN;
    return Math.min(this.stallBank, sensed);
  }

  get overshoot(): number {
    return this.warningBank - this.bank;
  }

  get buffetLoad(): number {
    const { buffet } = this.#frame;
    if (!buffet || this.input.liftLoss !== 0) return Number.NaN;
    return buffetLoad(buffet.table, this.input.mass, buffet.wingArea, this.mach, this.air) ?? Number.NaN;
  }

  get buffetBank(): number {
    return buffetBank(this.buffetLoad, this.path) ?? Number.NaN;
  }

  /** What a derived gust, m/s EAS, adds to the load factor. */
  gustLoad(gust: number): number {
    const { wing } = this.#frame;
    const slope = wing && slopeAt(wing.slope, this.mach);
    if (!wing || !slope) return Number.NaN;
    return gustLoad(gust, this.eas, this.input.mass, { ...wing, slope }, this.air);
  }

  /** The stall in the turn with a factor on the stall speed, as power has one. */
  stallWith(factor: number): number {
    const cgFactor = this.input.cgFactor * factor;
    return casOf(stallSpeed(this.#frame.lift, { ...this.#lift, cgFactor, load: this.load }, this.air));
  }

  get radius(): number {
    return turnRadius(this.tas, this.bank, this.path, this.input.load) ?? Number.NaN;
  }

  get rate(): number {
    return turnRate(this.tas, this.bank, this.path, this.input.load) ?? Number.NaN;
  }

  get rateOneBank(): number {
    return rateOneBank(this.tas);
  }
}

function slopeAt(slope: number | Table, mach: number): number | null {
  if (typeof slope !== "number") return interpolate(slope, mach);
  return mach <= GREATEST_MACH_OF_ONE_SLOPE ? slope : null;
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
  if (input.bank === "rate-one" || (input.path.kind === "vertical-speed" && input.load === null))
    return "ias";
  const path = pathAngleOf(input.path, Number.NaN);
  const load = input.load ?? (path === null ? null : loadFactor(input.bank, path));
  if (load === null || !(0 < load)) return "ias";
  const cas = calibratedFromIndicated(
    frame.ias,
    input.speed.value,
    load,
    input.mass,
    frame.lift.referenceMass,
  );
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
