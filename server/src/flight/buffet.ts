import { type Atmosphere, altitudeOfPressure } from "./atmosphere.ts";
import { G0, KAPPA, RHO0 } from "./constants.ts";
import { bracketedRoot } from "./root.ts";
import { stallBank } from "./stall.ts";
import { interpolate, type Table } from "./table.ts";

/**
 * Load factor at buffet onset, n = CL_b(M) (kappa / 2) p M^2 S / (m g0).
 *
 * @param table CL_b against Mach number
 * @param mass m, kg
 * @param wingArea S, m2
 * @param mach M
 * @returns null outside the table
 *
 * Source: lift equation; 14 CFR 25.251(e) asks for the buffet boundary and gives no figure for it.
 */
export function buffetLoad(
  table: Table,
  mass: number,
  wingArea: number,
  mach: number,
  air: Atmosphere,
): number | null {
  const lift = interpolate(table, mach);
  return lift === null ? null : (lift * (KAPPA / 2) * air.pressure * mach * mach * wingArea) / (mass * G0);
}

/** Bank at buffet onset in a steady turn, arccos(cos gamma / n), rad. Null where buffet begins wings level. */
export function buffetBank(load: number, path: number): number | null {
  return stallBank(load, path);
}

/**
 * Lift coefficient at the stall, m_ref g0 / (rho0 / 2 V_c^2 S): what a buffet table may not exceed.
 *
 * @param stallSpeed V_c, m/s EAS
 * @param referenceMass m_ref, kg
 * @param wingArea S, m2
 */
export function liftCoefficientAtStall(stallSpeed: number, referenceMass: number, wingArea: number): number {
  return (referenceMass * G0) / (0.5 * RHO0 * stallSpeed * stallSpeed * wingArea);
}

/**
 * The least and the greatest Mach number at which buffet begins at a load factor: within them the wing
 * carries it without buffet. Null for an end that the table does not reach.
 *
 * Each piece of the table is CL_b M^2 = (a + b M) M^2, a cubic with at most two bends at M = 0 and
 * M = -2a/3b, so that between those each crossing is bracketed.
 *
 * @param load n, above 0
 */
export function buffetMachs(
  table: Table,
  mass: number,
  wingArea: number,
  load: number,
  air: Atmosphere,
): { readonly low: number | null; readonly high: number | null } {
  const excess = (mach: number) => (buffetLoad(table, mass, wingArea, mach, air) ?? Number.NaN) - load;
  const crossings: { readonly mach: number; readonly rises: boolean }[] = [];
  const stops = monotonicStops(table);
  for (const [i, high] of stops.entries()) {
    const low = stops[i - 1];
    if (low === undefined) continue;
    const [before, after] = [excess(low), excess(high)];
    if (0 <= before === 0 <= after) continue;
    const mach = bracketedRoot(excess, low, high);
    if (mach !== null) crossings.push({ mach, rises: before < 0 });
  }
  const low = crossings[0];
  const high = crossings[crossings.length - 1];
  return { low: low?.rises ? low.mach : null, high: high && !high.rises ? high.mach : null };
}

/** The table's arguments, and where CL_b M^2 bends between them. */
function monotonicStops({ arguments: machs, values }: Table): readonly number[] {
  const stops: number[] = [];
  for (const [i, mach] of machs.entries()) {
    const before = machs[i - 1];
    if (before !== undefined) {
      const slope = ((values[i] as number) - (values[i - 1] as number)) / (mach - before);
      const bend = (-2 / 3) * ((values[i] as number) / slope - mach);
      if (before < bend && bend < mach) stops.push(bend);
    }
    stops.push(mach);
  }
  return stops;
}

/**
 * The pressure altitude up to which the wing carries a load factor without buffet at one Mach number, m.
 * Null outside the table, and where that is outside the atmosphere that is modelled.
 *
 * Example: CL_b 0.5 at M 0.7, 500 kg/m2, load 1.3: p = 1.3 m g0 / (S CL_b kappa/2 M^2).
 */
export function buffetAltitude(
  table: Table,
  mass: number,
  wingArea: number,
  mach: number,
  load: number,
): number | null {
  const lift = interpolate(table, mach);
  if (lift === null) return null;
  return altitudeOfPressure((load * mass * G0) / (lift * (KAPPA / 2) * mach * mach * wingArea));
}
