/** What a card's stall speed is: the reference stall speed, the 1-g stall speed, or the older minimum speed. */
export type StallBasis = "vsr" | "vs1g" | "vs";

/**
 * Least factors on the stall speed: on VSR or VS1g, and on the older VS. Sources: 14 CFR 25.107(b)
 * and (g), 25.125(b)(2), CS-25 the same; for VS the same sections before Amendment 25-108.
 */
const factors = {
  v2min: { vs1g: 1.13, vs: 1.2 },
  vfto: { vs1g: 1.18, vs: 1.25 },
  vref: { vs1g: 1.23, vs: 1.3 },
} as const;

/** v2min is also at least this times the minimum control speed in the air (14 CFR 25.107(b)(3)). */
export const MINIMUM_CONTROL_FACTOR = 1.1;

function factor(name: keyof typeof factors, basis: StallBasis): number {
  return factors[name][basis === "vs" ? "vs" : "vs1g"];
}

/**
 * Least v2min, m/s CAS.
 *
 * @param stall the stall speed on the card's own basis, m/s CAS
 * @param vmca minimum control speed in the air, m/s CAS, where known
 * @param stated the factor a card states instead of 1.13 (1.08 where 25.107(b)(2) allows it), else null
 *
 * Example: VSR 100 kt, vmca 110 kt: 121 kt.
 */
export function leastV2min(
  stall: number,
  basis: StallBasis,
  vmca: number | null,
  stated: number | null,
): number {
  const byStall = (stated ?? factor("v2min", basis)) * stall;
  return vmca === null ? byStall : Math.max(byStall, MINIMUM_CONTROL_FACTOR * vmca);
}

/** Least vfto, m/s CAS. Example: VSR 100 kt: 118 kt. */
export function leastVfto(stall: number, basis: StallBasis): number {
  return factor("vfto", basis) * stall;
}

/** Least vref, m/s CAS; vmcl, 25.143(h) and icing may raise it. Example: VSR 100 kt: 123 kt. */
export function leastVref(stall: number, basis: StallBasis): number {
  return factor("vref", basis) * stall;
}
