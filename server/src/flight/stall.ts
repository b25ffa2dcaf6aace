import { casFromEas, easFromCas } from "./airspeed.ts";
import type { Atmosphere } from "./atmosphere.ts";
import { A0 } from "./constants.ts";
import { bracketedRoot } from "./root.ts";
import { interpolate, type Table } from "./table.ts";

/** What the stall of one configuration follows from. */
export interface Lift {
  /** V_c: the 1-g stall speed at the reference mass, m/s EAS at sea level, where it equals CAS. */
  readonly stallSpeed: number;
  /** m_ref, kg. */
  readonly referenceMass: number;
  /**
   * f_c: maximum lift coefficient against Mach number, over its value at low Mach number. The first
   * factor is 1; below the first argument it stays 1. Null: 1 everywhere.
   */
  readonly liftMach: Table | null;
}

export interface LiftState {
  /** m, kg. */
  readonly mass: number;
  /** lambda: loss of maximum lift coefficient, 0 to below 1. */
  readonly liftLoss: number;
  /** k: factor of the cg on the stall speed. */
  readonly cgFactor: number;
}

export type StallSpeed =
  | { readonly kind: "speed"; readonly eas: number; readonly cas: number; readonly mach: number }
  /** Without load the wing stalls at no speed. */
  | { readonly kind: "zero" }
  /** The lift table ends before the stall, with the lift still growing. */
  | { readonly kind: "outside-table" }
  /** The wing's lift has its maximum inside the table, below what is needed. */
  | { readonly kind: "no-level-flight" }
  /** A negative load, or an input that is none. */
  | { readonly kind: "none" };

const zero: StallSpeed = { kind: "zero" };
const none: StallSpeed = { kind: "none" };
const outsideTable: StallSpeed = { kind: "outside-table" };
const noLevelFlight: StallSpeed = { kind: "no-level-flight" };

/**
 * Stall speed at a load factor n: the smallest positive root of
 *
 *     V^2 f_c(M) = V_c^2 k^2 (n m / m_ref) / (1 - lambda),  M = V / (a0 sqrt(delta)),  V in EAS
 *
 * f is piecewise linear and need not be monotonic, so each piece is a cubic in M and is bracketed on
 * its own; a fixed-point iteration may find another root, or none. Without a table the root is
 * V_c k sqrt(n m / m_ref / (1 - lambda)), exactly.
 *
 * @param lift the configuration
 * @param state mass, contamination, cg; `load` is n
 * @param air the air at the point; the root is converted to CAS there
 *
 * Source: lift equation at maximum lift coefficient (FAA-H-8083-25B, Aerodynamics of Flight);
 * stall speed proportional to the square root of the load factor (the same, "Load Factors and
 * Stalling Speeds").
 * Example: V_c 50 kt, m = m_ref, n = 4: 100 kt.
 */
export function stallSpeed(
  lift: Lift,
  state: LiftState & { readonly load: number },
  air: Atmosphere,
): StallSpeed {
  const { mass, load, liftLoss, cgFactor } = state;
  if (load === 0) return zero;
  const square = (lift.stallSpeed * cgFactor) ** 2 * ((load * mass) / lift.referenceMass / (1 - liftLoss));
  if (!(0 < square && square < Number.POSITIVE_INFINITY && liftLoss < 1)) return none;
  const sound = A0 * Math.sqrt(air.delta);
  const plain = Math.sqrt(square);
  const table = lift.liftMach;
  if (!table || plain <= sound * (table.arguments[0] as number)) return speedOf(plain, sound, air);
  const mach = machAtStall(table, square / (sound * sound));
  return typeof mach === "number" ? speedOf(mach * sound, sound, air) : mach;
}

function speedOf(eas: number, sound: number, air: Atmosphere): StallSpeed {
  const cas = casFromEas(eas, air);
  return cas === null ? none : { kind: "speed", eas, cas, mach: eas / sound };
}

/** The smallest M beyond the table's first argument with M^2 f(M) = `needed`. */
function machAtStall(table: Table, needed: number): number | StallSpeed {
  const { arguments: machs, values } = table;
  let rising = true;
  for (let i = 1; i < machs.length; i++) {
    const from = machs[i - 1] as number;
    const to = machs[i] as number;
    const slope = ((values[i] as number) - (values[i - 1] as number)) / (to - from);
    const intercept = (values[i - 1] as number) - slope * from;
    const excess = (mach: number) => mach * mach * (intercept + slope * mach) - needed;
    // M^2 (c + s M) with s < 0 rises to its only maximum and falls from there; with s > 0 it rises.
    const top = slope < 0 ? (-2 * intercept) / (3 * slope) : Number.POSITIVE_INFINITY;
    const end = Math.min(Math.max(top, from), to);
    if (0 <= excess(end)) {
      return bracketedRoot(excess, from, end) ?? end;
    }
    rising = to <= top;
  }
  return rising ? outsideTable : noLevelFlight;
}

/**
 * Load factor at which the wing stalls at a speed: n_stall = (m_ref / m)(V / V_c)^2 f_c(M)(1 - lambda) / k^2.
 *
 * @param eas V, m/s EAS
 * @returns null beyond the end of the lift table
 *
 * Example: at 1.3 V_c and the reference mass, 1.69.
 */
export function loadAtStall(lift: Lift, state: LiftState, eas: number, air: Atmosphere): number | null {
  const factor = liftFactor(lift.liftMach, eas / (A0 * Math.sqrt(air.delta)));
  if (factor === null) return null;
  const { mass, liftLoss, cgFactor } = state;
  const load =
    ((lift.referenceMass / mass) * (eas / lift.stallSpeed) ** 2 * factor * (1 - liftLoss)) /
    (cgFactor * cgFactor);
  return Number.isFinite(load) ? load : null;
}

/** f_c(M): 1 below the table's first argument, which is the one place where a table is held constant. */
function liftFactor(table: Table | null, mach: number): number | null {
  if (!table || mach <= (table.arguments[0] as number)) return 1;
  return interpolate(table, mach);
}

/**
 * Bank at which a steady turn stalls, arccos(cos gamma / n_stall), rad.
 *
 * @param load n_stall
 * @param path gamma, rad
 * @returns null where the wing does not carry the aeroplane even wings level
 *
 * Example: n_stall 1.69 in level flight: 53.7 degrees.
 */
export function stallBank(load: number, path: number): number | null {
  const cosine = Math.cos(path) / load;
  // A speed flown exactly at the 1-g stall stalls wings level, not "at no bank".
  if (1 < cosine && cosine <= 1 + 1e-12) return 0;
  return 0 < load && cosine <= 1 ? Math.acos(cosine) : null;
}

/**
 * Bank at which the stall warning comes in a steady turn, rad: {@link stallBank} with a clean wing at
 * the EAS of CAS / warning, since the sensor does not know that the wing is dirty.
 *
 * @param cas m/s
 * @param warning speed of the warning over the stall speed, above 1
 * @returns null where the warning comes wings level, or the lift table does not reach
 */
export function warningBank(
  lift: Lift,
  state: Pick<LiftState, "mass" | "cgFactor">,
  cas: number,
  warning: number,
  path: number,
  air: Atmosphere,
): number | null {
  const eas = easFromCas(cas / warning, air);
  if (eas === null) return null;
  const load = loadAtStall(lift, { ...state, liftLoss: 0 }, eas, air);
  return load === null ? null : stallBank(load, path);
}

/**
 * What is wrong with a lift table: its first factor must be 1.00, and the configuration's own stall
 * Mach number at sea level at or below its first argument, so that the card's stall speed holds with
 * f = 1. Null where nothing is.
 */
export function checkLiftMach(
  table: Table,
  lift: Pick<Lift, "stallSpeed">,
): "first-factor" | "stall-mach" | null {
  if (Math.abs((table.values[0] ?? 0) - 1) > 1e-9) return "first-factor";
  return lift.stallSpeed / A0 <= (table.arguments[0] ?? 0) * (1 + 1e-9) ? null : "stall-mach";
}
