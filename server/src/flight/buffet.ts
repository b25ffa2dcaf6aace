import type { Atmosphere } from "./atmosphere.ts";
import { G0, KAPPA, RHO0 } from "./constants.ts";
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
