import type { Keyword } from "../notation/vocabulary.ts";

/** What hints are about, as the setting names them, with what stands behind each. */
export const hintKinds = {
  points: "margin, ratio, stall and warning speed behind phase",
  weights: "the weight and its 1-g stall speed behind weight and burn",
  altitudes: "the pressure altitude behind altitude, where it differs",
  speeds: "calibrated and true airspeed behind a speed that is an expression",
  banks: "the bank at which the warning comes, load factor and radius behind bank",
  cards: "the 1-g stall speed behind each configuration of a card",
  others: "what is computed for any other clause",
} as const;

export type HintKind = keyof typeof hintKinds;

export const allHintKinds = Object.keys(hintKinds) as readonly HintKind[];

/** The kind of the hint that stands behind a clause. */
export function hintKindOf(keyword: Keyword | null): HintKind {
  return (keyword && kindOf[keyword]) ?? "others";
}

const kindOf: Readonly<Partial<Record<Keyword, HintKind>>> = {
  phase: "points",
  weight: "weights",
  burn: "weights",
  altitude: "altitudes",
  speed: "speeds",
  bank: "banks",
  config: "cards",
};
