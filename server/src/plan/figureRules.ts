import type { Unit } from "../notation/vocabulary.ts";
import type { FindingCode } from "./findings.ts";
import type { Measured } from "./quantity.ts";

/** What the figure of a finding is, for those that can be taken up to a figure. */
export interface FigureRule {
  readonly what: Measured;
  /** The direction in which the finding gets worse. */
  readonly worse: "more" | "less";
  /** Units that the figure may be written in; null is a plain number. The first is the usual one. */
  readonly units: readonly (Unit | null)[];
  readonly decimals: number;
}

const bank = { what: "bank", worse: "more", units: [null, "deg"], decimals: 0 } as const;
const speed = { what: "speed", worse: "more", units: ["kt", "km/h", "m/s", "mph"], decimals: 0 } as const;
const mass = { what: "mass", worse: "more", units: ["t", "kg", "lb", "N", "kN"], decimals: 2 } as const;
const ratio = { what: "ratio", worse: "less", units: [null], decimals: 2 } as const;

/** The findings that have a figure; every other one is accepted without. */
export const figureRules: Readonly<Partial<Record<FindingCode, FigureRule>>> = {
  "bank-over-limit": bank,
  "bank-over-advice": bank,
  "ratio-short": ratio,
  "margin-short": ratio,
  "overshoot-short": { what: "overshoot", worse: "less", units: [null, "deg"], decimals: 0 },
  "load-over-rule": { what: "load", worse: "more", units: [null], decimals: 2 },
  "radius-over-rule": { what: "radius", worse: "more", units: ["nm", "km"], decimals: 2 },
  "buffet-short": { what: "loadLeft", worse: "less", units: [null], decimals: 2 },
  overweight: mass,
  underweight: { ...mass, worse: "less" },
  "over-vfe": speed,
  "over-vmo": speed,
  "over-vno": speed,
  "below-vmca": { ...speed, worse: "less" },
  "over-mmo": { what: "mach", worse: "more", units: [null], decimals: 3 },
  "over-ceiling": { what: "altitude", worse: "more", units: ["ft", "m", "FL"], decimals: 0 },
  "decel-too-fast": { what: "decel", worse: "more", units: ["kt/s"], decimals: 1 },
};
