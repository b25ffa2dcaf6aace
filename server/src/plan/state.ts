import type { Keyword, Phase } from "../notation/vocabulary.ts";
import type { Card } from "./card.ts";
import type { Limits } from "./limits.ts";
import { type Origin, sameOrigin } from "./origin.ts";
import type { Spread } from "./spread.ts";

/** A value that goes on to later points. */
export interface Carried<T> {
  /** Null where the clause that should give it is in error: it is unknown until stated again. */
  readonly value: T | null;
  readonly origin: Origin;
  /** The code of the finding that made it unknown; null where the value is known. */
  readonly unknown: string | null;
  /** The phase of the point that stated it; null where a setting did. */
  readonly phase: Phase | null;
  /** True where a sweep gave it many values, none of which goes on. */
  readonly swept?: boolean;
}

export interface FlownAircraft {
  readonly name: string;
  readonly card: Card | null;
}

export interface AppliedLimits {
  readonly name: string;
  readonly limits: Limits | null;
}

export interface StatedAltitude {
  readonly altitude: Spread;
  readonly flightLevel: boolean;
}

export interface Contamination {
  readonly loss: Spread;
  /** The card's name for it; null for a figure, and for `contamination none`. */
  readonly contaminant: string | null;
  readonly rain: boolean;
}

/** The speed that was flown, m/s or Mach; never the expression that gave it. */
export interface FlownSpeed {
  readonly kind: "cas" | "mach";
  readonly speed: Spread;
}

/** What each carried clause leaves behind. `mass` is left by `weight` and `burn`, `deviation` by `isa` and `oat`. */
export interface CarriedValues {
  readonly aircraft: FlownAircraft;
  readonly limits: AppliedLimits;
  readonly rules: "ifr" | "vfr";
  readonly qnh: number;
  readonly mass: Spread;
  readonly config: string;
  readonly altitude: StatedAltitude;
  readonly deviation: Spread;
  readonly cg: Spread;
  readonly power: Spread;
  readonly contamination: Contamination;
  readonly engineOut: "left" | "right" | "none";
  readonly speed: FlownSpeed;
}

export type CarriedKey = keyof CarriedValues;

/** Every key is there, undefined where nothing was stated: objects of one shape are copied and compared fast. */
export type CarriedState = { readonly [K in CarriedKey]: Carried<CarriedValues[K]> | undefined };

/** What later points start from. It holds no line number, so that lines may come and go above it. */
export interface State {
  readonly carried: CarriedState;
  /** True after a landing, so that a takeoff begins a new sector. */
  readonly landed: boolean;
  /** What was stated after that landing, and so is already of the next sector. */
  readonly sinceLanding: readonly CarriedKey[];
  /** What was already told as missing, and where, so that it is told once. */
  readonly told: { readonly [K in CarriedKey]?: Origin };
}

const nothingStated: CarriedState = {
  aircraft: undefined,
  limits: undefined,
  rules: undefined,
  qnh: undefined,
  mass: undefined,
  config: undefined,
  altitude: undefined,
  deviation: undefined,
  cg: undefined,
  power: undefined,
  contamination: undefined,
  engineOut: undefined,
  speed: undefined,
};

export const startState: State = { carried: nothingStated, landed: false, sinceLanding: [], told: {} };

/** The keyword that a reader knows each carried value by. */
export const keywordOf: Readonly<Record<CarriedKey, Keyword>> = {
  aircraft: "fly",
  limits: "under",
  rules: "rules",
  qnh: "qnh",
  mass: "weight",
  config: "config",
  altitude: "altitude",
  deviation: "isa",
  cg: "cg",
  power: "power",
  contamination: "contamination",
  engineOut: "engine-out",
  speed: "speed",
};

const keys = Object.keys(keywordOf) as CarriedKey[];

/** True where nothing that is evaluated from `a` could differ when evaluated from `b`. */
export function sameState(a: State, b: State): boolean {
  if (a === b) return true;
  if (a.landed !== b.landed || a.sinceLanding.join() !== b.sinceLanding.join()) return false;
  for (const key of keys) {
    if (!sameCarried(a.carried[key], b.carried[key])) return false;
    const toldA = a.told[key];
    const toldB = b.told[key];
    if (toldA !== toldB && (!toldA || !toldB || !sameOrigin(toldA, toldB))) return false;
  }
  return true;
}

function sameCarried(a: Carried<unknown> | undefined, b: Carried<unknown> | undefined): boolean {
  if (a === b) return true;
  if (!a || !b) return false;
  return (
    a.unknown === b.unknown &&
    a.phase === b.phase &&
    a.swept === b.swept &&
    sameOrigin(a.origin, b.origin) &&
    sameValue(a.value, b.value)
  );
}

/** Cards and limits are compared by identity, the small records of figures field by field. */
function sameValue(a: unknown, b: unknown): boolean {
  if (Object.is(a, b)) return true;
  if (typeof a !== "object" || typeof b !== "object" || a === null || b === null) return false;
  const left = a as Record<string, unknown>;
  const right = b as Record<string, unknown>;
  for (const key in left) {
    const one = left[key];
    const other = right[key];
    if (Object.is(one, other)) continue;
    if (key === "card" || key === "limits" || typeof one !== "object") return false;
    if (!sameValue(one, other)) return false;
  }
  return true;
}
