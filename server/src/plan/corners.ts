import { casFromMach, easFromMach, impactPressureOfCas, tasFromMach } from "../flight/airspeed.ts";
import { type Atmosphere, altitudeOfPressure, atmosphere } from "../flight/atmosphere.ts";
import { A0, P0 } from "../flight/constants.ts";
import type { PathInput, SpeedInput } from "./corner.ts";
import { type Airframe, type Corner, type CornerInput, type CornerProblem, corner } from "./corner.ts";
import { exactly, type Spread } from "./spread.ts";

/** The inputs of a point with their tolerances, SI. */
export interface PointInputs {
  readonly mass: Spread;
  readonly pressureAltitude: Spread;
  readonly deviation: Spread;
  /** At the nominal altitude and deviation, which most corners share. */
  readonly air: Atmosphere;
  readonly speed: { readonly kind: SpeedInput["kind"]; readonly value: Spread };
  readonly bank: Spread | "rate-one";
  readonly path: { readonly kind: PathInput["kind"]; readonly value: Spread };
  readonly load: Spread | null;
  readonly liftLoss: Spread;
  readonly cgFactor: Spread;
}

/** The nominal corner and all corners, the nominal one among them. */
export interface Corners {
  readonly nominal: Corner;
  readonly all: readonly Corner[];
}

/**
 * Evaluates the point at its nominal inputs and at every corner of its tolerances. Where a table
 * against Mach number bends between the corners, the bends count as corners too, since the load
 * factor at the stall and at buffet onset need not be monotonic there.
 */
export function evaluateCorners(frame: Airframe, inputs: PointInputs): Corners | CornerProblem {
  const nominal = corner(frame, nominalInput(inputs), inputs.air);
  if (typeof nominal === "string") return nominal;
  const varied = cornerInputs(inputs);
  if (varied.length === 0) return { nominal, all: [nominal] };
  const all: Corner[] = [nominal];
  for (const input of varied) {
    const one = corner(frame, input, inputs.air);
    if (typeof one === "string") return one;
    all.push(one);
  }
  for (const input of bends(frame, inputs, varied)) {
    const one = corner(frame, input);
    // A bend lies between corners that were evaluated; one that cannot be is no corner.
    if (typeof one !== "string") all.push(one);
  }
  return { nominal, all };
}

/**
 * The same corners after a sudden loss of airspeed, m/s CAS: bank, path and load stay as they were flown.
 * Null where nothing is left of a speed.
 */
export function slowed(
  frame: Airframe,
  inputs: PointInputs,
  corners: Corners,
  loss: number,
): Corners | CornerProblem {
  const slow = (one: Corner): Corner | CornerProblem => {
    if (one.cas <= loss) return "speed";
    const input: CornerInput = {
      ...one.input,
      speed: { kind: "cas", value: one.cas - loss },
      bank: one.bank,
      path: { kind: "angle", value: one.path },
    };
    return corner(frame, input, one.air);
  };
  const nominal = slow(corners.nominal);
  if (typeof nominal === "string") return nominal;
  const all: Corner[] = [];
  const flown = corners.all.map(slow);
  for (const one of flown) {
    if (typeof one === "string") return one;
    all.push(one);
  }
  // The tables may bend elsewhere between the slower corners.
  const slowest = all.map((one) => one.input);
  const { value } = inputs.speed;
  const spread = {
    low: Math.min(...all.map((one) => one.cas)),
    high: Math.max(...all.map((one) => one.cas)),
  };
  const speed = {
    kind: "cas",
    value: value.low < value.high ? { ...value, ...spread } : exactly(nominal.cas),
  } as const;
  for (const input of bends(frame, { ...inputs, speed }, slowest)) {
    const one = corner(frame, input);
    if (typeof one !== "string") all.push(one);
  }
  return { nominal, all };
}

function nominalInput(inputs: PointInputs): CornerInput {
  return {
    mass: inputs.mass.nominal,
    pressureAltitude: inputs.pressureAltitude.nominal,
    deviation: inputs.deviation.nominal,
    speed: { kind: inputs.speed.kind, value: inputs.speed.value.nominal },
    bank: inputs.bank === "rate-one" ? "rate-one" : inputs.bank.nominal,
    path: { kind: inputs.path.kind, value: inputs.path.value.nominal },
    load: inputs.load ? inputs.load.nominal : null,
    liftLoss: inputs.liftLoss.nominal,
    cgFactor: inputs.cgFactor.nominal,
  };
}

type Vary = (input: CornerInput, value: number) => CornerInput;

function cornerInputs(inputs: PointInputs): CornerInput[] {
  const dimensions: [readonly number[], Vary][] = [];
  const add = ({ low, high }: Spread, vary: Vary, within: readonly number[] = []) => {
    if (low !== high)
      dimensions.push([[low, ...within.filter((one) => low < one && one < high), high], vary]);
  };
  add(inputs.mass, (input, mass) => ({ ...input, mass }));
  add(inputs.pressureAltitude, (input, pressureAltitude) => ({ ...input, pressureAltitude }));
  add(inputs.deviation, (input, deviation) => ({ ...input, deviation }));
  add(inputs.speed.value, (input, value) => ({ ...input, speed: { kind: input.speed.kind, value } }));
  if (inputs.bank !== "rate-one") add(inputs.bank, (input, bank) => ({ ...input, bank }));
  // Level flight needs the most lift: a path that may climb or sink passes it.
  add(inputs.path.value, (input, value) => ({ ...input, path: { kind: input.path.kind, value } }), [0]);
  if (inputs.load) add(inputs.load, (input, load) => ({ ...input, load }));
  add(inputs.liftLoss, (input, liftLoss) => ({ ...input, liftLoss }));
  add(inputs.cgFactor, (input, cgFactor) => ({ ...input, cgFactor }));
  if (dimensions.length === 0) return [];
  let corners = [nominalInput(inputs)];
  for (const [values, vary] of dimensions) {
    corners = corners.flatMap((input) => values.map((value) => vary(input, value)));
  }
  return corners;
}

/** The corners at which a Mach table bends: reached by the speed at each altitude, and by the altitude at each speed. */
function bends(frame: Airframe, inputs: PointInputs, corners: readonly CornerInput[]): CornerInput[] {
  const machs = [...(frame.lift.liftMach?.arguments ?? []), ...(frame.buffet?.table.arguments ?? [])];
  if (machs.length === 0) return [];
  const { speed, pressureAltitude } = inputs;
  const found: CornerInput[] = [];
  for (const input of corners) {
    for (const mach of machs) {
      if (speed.value.low < speed.value.high && input.speed.value === speed.value.low) {
        const value = speedAtMach(input, mach);
        if (value !== null && speed.value.low < value && value < speed.value.high) {
          found.push({ ...input, speed: { kind: speed.kind, value } });
        }
      }
      if (pressureAltitude.low < pressureAltitude.high && input.pressureAltitude === pressureAltitude.low) {
        for (const altitude of [flownAltitudeAt(frame, input, mach), stallAltitudeAt(frame, input, mach)]) {
          if (altitude !== null && pressureAltitude.low < altitude && altitude < pressureAltitude.high) {
            found.push({ ...input, pressureAltitude: altitude });
          }
        }
      }
    }
  }
  return found;
}

function speedAtMach(input: CornerInput, mach: number): number | null {
  const air = atmosphere(input.pressureAltitude, input.deviation);
  if (!air) return null;
  switch (input.speed.kind) {
    case "cas":
      return casFromMach(mach, air);
    case "eas":
      return easFromMach(mach, air);
    case "tas":
      return tasFromMach(mach, air);
    case "mach":
      return mach;
    case "ias":
      return null;
  }
}

/** The pressure altitude at which a constant calibrated speed is this Mach number. */
function flownAltitudeAt(frame: Airframe, input: CornerInput, mach: number): number | null {
  const one = corner(frame, input);
  if (typeof one === "string") return null;
  const impact = impactPressureOfCas(one.cas);
  if (impact === null) return null;
  return altitudeOfPressure(impact / ((1 + 0.2 * mach * mach) ** 3.5 - 1));
}

/** The pressure altitude at which the stall comes at this Mach number. */
function stallAltitudeAt(frame: Airframe, input: CornerInput, mach: number): number | null {
  const table = frame.lift.liftMach;
  const index = table ? table.arguments.indexOf(mach) : -1;
  const factor = table?.values[index];
  const one = corner(frame, input);
  if (factor === undefined || typeof one === "string" || one.load <= 0) return null;
  const { mass, liftLoss, cgFactor } = input;
  const eas =
    frame.lift.stallSpeed *
    cgFactor *
    Math.sqrt((one.load * mass) / frame.lift.referenceMass / (1 - liftLoss) / factor);
  return altitudeOfPressure(P0 * (eas / (A0 * mach)) ** 2);
}

/** The extremes of one figure over the corners; null where any corner cannot give it. */
export function spreadOf(corners: Corners, figure: (corner: Corner) => number): Spread | null {
  const nominal = figure(corners.nominal);
  if (!Number.isFinite(nominal)) return null;
  let low = nominal;
  let high = nominal;
  for (const one of corners.all) {
    const value = figure(one);
    if (!Number.isFinite(value)) return null;
    if (value < low) low = value;
    if (high < value) high = value;
  }
  return { nominal, low, high };
}
