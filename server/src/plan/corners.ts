import type { Atmosphere } from "../flight/atmosphere.ts";
import { bends, type Edge, type Varied } from "./bends.ts";
import type { PathInput, SpeedInput } from "./corner.ts";
import { type Airframe, type Corner, type CornerInput, type CornerProblem, corner } from "./corner.ts";
import type { Spread } from "./spread.ts";

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
  /** A sudden loss of airspeed, m/s CAS, after which the corners are looked at too. */
  readonly shear: number | null;
}

/** The nominal corner and all corners, the nominal one among them. */
export interface Corners {
  readonly nominal: Corner;
  readonly all: readonly Corner[];
}

/**
 * Evaluates the point at its nominal inputs and at every corner of its tolerances. Where a table bends
 * between two corners, the bend counts as a corner too.
 */
export function evaluateCorners(frame: Airframe, inputs: PointInputs): Corners | CornerProblem {
  const nominal = corner(frame, nominalInput(inputs), inputs.air);
  if (typeof nominal === "string") return nominal;
  const dimensions = dimensionsOf(inputs);
  if (dimensions.length === 0) return { nominal, all: [nominal] };
  const ends: Corner[] = [];
  for (const input of cornerInputs(nominal.input, dimensions)) {
    const one = corner(frame, input, inputs.air);
    if (typeof one === "string") return one;
    ends.push(one);
  }
  const between = edges(ends, dimensions).flatMap((edge) => bends(frame, edge, inputs.shear));
  return { nominal, all: [nominal, ...ends, ...between] };
}

/**
 * The same corners after a sudden loss of airspeed, m/s CAS: bank, path and load stay as they were flown.
 * Null where nothing is left of a speed.
 */
export function slowed(frame: Airframe, corners: Corners, loss: number): Corners | CornerProblem {
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
  for (const flown of corners.all) {
    const one = slow(flown);
    if (typeof one === "string") return one;
    all.push(one);
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

/** An input with a tolerance: its ends, and what lies between them and is a corner by itself. */
interface Dimension {
  readonly varied: Varied;
  readonly values: readonly number[];
  readonly vary: Vary;
}

function dimensionsOf(inputs: PointInputs): readonly Dimension[] {
  const dimensions: Dimension[] = [];
  const add = (varied: Varied, { low, high }: Spread, vary: Vary, within: readonly number[] = []) => {
    if (low === high) return;
    const values = [low, ...within.filter((one) => low < one && one < high), high];
    dimensions.push({ varied, values, vary });
  };
  add("mass", inputs.mass, (input, mass) => ({ ...input, mass }));
  add("altitude", inputs.pressureAltitude, (input, pressureAltitude) => ({ ...input, pressureAltitude }));
  add("deviation", inputs.deviation, (input, deviation) => ({ ...input, deviation }));
  add("speed", inputs.speed.value, (input, value) => ({ ...input, speed: { ...input.speed, value } }));
  if (inputs.bank !== "rate-one") add("turn", inputs.bank, (input, bank) => ({ ...input, bank }));
  // Level flight needs the most lift: a path that may climb or sink passes it.
  add("turn", inputs.path.value, (input, value) => ({ ...input, path: { ...input.path, value } }), [0]);
  if (inputs.load) add("turn", inputs.load, (input, load) => ({ ...input, load }));
  add("wing", inputs.liftLoss, (input, liftLoss) => ({ ...input, liftLoss }));
  add("wing", inputs.cgFactor, (input, cgFactor) => ({ ...input, cgFactor }));
  return dimensions;
}

function cornerInputs(start: CornerInput, dimensions: readonly Dimension[]): readonly CornerInput[] {
  return dimensions.reduce<readonly CornerInput[]>(
    (corners, { values, vary }) => corners.flatMap((input) => values.map((value) => vary(input, value))),
    [start],
  );
}

/** Every stretch between two neighbouring corners, which stand in the order of {@link cornerInputs}. */
function edges(corners: readonly Corner[], dimensions: readonly Dimension[]): readonly Edge[] {
  let stride = corners.length;
  return dimensions.flatMap(({ varied, values, vary }) => {
    stride /= values.length;
    return corners.flatMap((first, i): Edge[] => {
      const at = Math.floor(i / stride) % values.length;
      const [from, to] = [values[at], values[at + 1]];
      const last = corners[i + stride];
      if (from === undefined || to === undefined || !last) return [];
      return [{ varied, from, to, first, last, at: (value) => vary(first.input, value) }];
    });
  });
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
