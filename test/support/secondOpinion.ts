/*
 * The core formulas written a second time and in another way: the atmosphere by integrating the
 * hydrostatic equation, speeds by bisection of the impact pressure, the stall by scanning upwards for
 * the first speed that carries the load. It shares no code with the product.
 */

const G = 9.80665;
const R_AIR = 287.05287;
const GAMMA = 1.4;
const SEA_PRESSURE = 101325;
const SEA_TEMPERATURE = 288.15;
// The printed 1.225 differs from it in the ninth digit, which a comparison to 1e-9 would see.
const SEA_DENSITY = SEA_PRESSURE / (R_AIR * SEA_TEMPERATURE);
const SOUND = Math.sqrt(GAMMA * R_AIR * SEA_TEMPERATURE);

export interface Question {
  /** m/s EAS at sea level. */
  readonly stallSpeed: number;
  readonly referenceMass: number;
  readonly mass: number;
  readonly load: number;
  readonly liftLoss: number;
  readonly cgFactor: number;
  /** Mach number and factor, rising; empty for none. */
  readonly liftMach: readonly (readonly [number, number])[];
  /** m. */
  readonly pressureAltitude: number;
  /** K. */
  readonly deviation: number;
  readonly speed: { readonly kind: "cas" | "eas" | "tas" | "mach"; readonly value: number };
}

export interface Answer {
  readonly cas: number;
  readonly eas: number;
  readonly tas: number;
  readonly mach: number;
  /** CAS; null where the lift table does not reach. */
  readonly stall: number | null;
  readonly vs1g: number | null;
  readonly stallLoad: number | null;
}

function standardTemperature(h: number): number {
  return SEA_TEMPERATURE - 0.0065 * Math.min(h, 11000);
}

/** dp/dh = -g p / (R T), by Runge-Kutta of the fourth order, in two stretches where the lapse changes. */
function pressureAt(h: number): number {
  const slope = (at: number, p: number) => (-G * p) / (R_AIR * standardTemperature(at));
  const integrate = (from: number, to: number, start: number) => {
    const steps = 4000;
    const step = (to - from) / steps;
    let p = start;
    for (let i = 0; i < steps; i++) {
      const at = from + i * step;
      const k1 = slope(at, p);
      const k2 = slope(at + step / 2, p + (step / 2) * k1);
      const k3 = slope(at + step / 2, p + (step / 2) * k2);
      const k4 = slope(at + step, p + step * k3);
      p += (step / 6) * (k1 + 2 * k2 + 2 * k3 + k4);
    }
    return p;
  };
  const low = integrate(0, Math.min(h, 11000), SEA_PRESSURE);
  return h <= 11000 ? low : integrate(11000, h, low);
}

function bisect(f: (x: number) => number, low: number, high: number): number {
  let a = low;
  let b = high;
  for (let i = 0; i < 200; i++) {
    const middle = (a + b) / 2;
    if (f(middle) < 0) a = middle;
    else b = middle;
  }
  return (a + b) / 2;
}

function impact(mach: number, pressure: number): number {
  return pressure * ((1 + 0.2 * mach * mach) ** 3.5 - 1);
}

export function secondOpinion(question: Question): Answer {
  const pressure = pressureAt(question.pressureAltitude);
  const temperature = standardTemperature(question.pressureAltitude) + question.deviation;
  const density = pressure / (R_AIR * temperature);
  const sound = Math.sqrt(GAMMA * R_AIR * temperature);
  const { kind, value } = question.speed;
  const machOfCas = (cas: number) =>
    bisect((mach) => impact(mach, pressure) - impact(cas / SOUND, SEA_PRESSURE), 0, 1);
  const mach =
    kind === "mach"
      ? value
      : kind === "tas"
        ? value / sound
        : kind === "eas"
          ? value / Math.sqrt(density / SEA_DENSITY) / sound
          : machOfCas(value);
  const tas = mach * sound;
  const eas = tas * Math.sqrt(density / SEA_DENSITY);
  const casOf = (m: number) => SOUND * bisect((c) => impact(c, SEA_PRESSURE) - impact(m, pressure), 0, 1);
  const machOfEas = (v: number) => v / Math.sqrt(density / SEA_DENSITY) / sound;
  const carries = (v: number): number | null => {
    const factor = factorAt(question.liftMach, machOfEas(v));
    if (factor === null) return null;
    const lift = (v / (question.stallSpeed * question.cgFactor)) ** 2 * factor * (1 - question.liftLoss);
    return (lift * question.referenceMass) / question.mass;
  };
  const stallAt = (load: number): number | null => {
    const step = 0.02;
    for (let v = step; machOfEas(v) < 1; v += step) {
      const load1 = carries(v);
      if (load1 === null) return null;
      if (load1 < load) continue;
      const root = bisect((x) => (carries(x) ?? Number.POSITIVE_INFINITY) - load, v - step, v);
      return casOf(machOfEas(root));
    }
    return null;
  };
  return {
    cas: kind === "cas" ? value : casOf(mach),
    eas,
    tas,
    mach,
    stall: stallAt(question.load),
    vs1g: stallAt(1),
    stallLoad: carries(eas),
  };
}

function factorAt(table: readonly (readonly [number, number])[], mach: number): number | null {
  const first = table[0];
  if (!first || mach <= first[0]) return 1;
  for (let i = 1; i < table.length; i++) {
    const [x0, y0] = table[i - 1] as readonly [number, number];
    const [x1, y1] = table[i] as readonly [number, number];
    if (mach <= x1) return y0 * ((x1 - mach) / (x1 - x0)) + y1 * ((mach - x0) / (x1 - x0));
  }
  return null;
}
