import type { Unit } from "./vocabulary.ts";

/** What a number measures, which decides the units that may stand after it. */
export type QuantityKind =
  | "mass"
  | "flow"
  | "time"
  | "speed"
  | "altitude"
  | "pressure"
  | "deviation"
  | "temperature"
  | "angle"
  | "slope"
  | "per cent"
  | "gust"
  | "decel"
  | "area"
  | "length"
  | "distance"
  | "rate"
  | "number";

export interface UnitRule {
  readonly units: readonly Unit[];
  /** True where a number alone says enough. */
  readonly optional: boolean;
  /** What the number is called in a message. */
  readonly noun: string;
}

const rules: Readonly<Record<QuantityKind, UnitRule>> = {
  mass: { units: ["t", "kg", "lb", "N", "kN"], optional: false, noun: "a weight" },
  flow: { units: ["t/h", "kg/h", "lb/h", "kg/min"], optional: false, noun: "a fuel flow" },
  time: { units: ["h", "min", "s"], optional: false, noun: "a time" },
  speed: { units: ["kt", "km/h", "m/s", "mph"], optional: false, noun: "a speed" },
  altitude: { units: ["ft", "m", "FL"], optional: false, noun: "an altitude" },
  pressure: { units: ["hPa", "inHg"], optional: false, noun: "a pressure" },
  deviation: { units: ["C", "K"], optional: true, noun: "a deviation" },
  temperature: { units: ["C", "K"], optional: false, noun: "a temperature" },
  angle: { units: ["deg"], optional: true, noun: "an angle" },
  slope: { units: ["deg", "%", "ft/nm", "ft/min"], optional: false, noun: "a path" },
  "per cent": { units: ["%"], optional: false, noun: "a percentage" },
  gust: { units: ["ft/s", "m/s"], optional: false, noun: "a derived gust" },
  decel: { units: ["kt/s"], optional: false, noun: "a deceleration" },
  area: { units: ["m2", "ft2"], optional: false, noun: "an area" },
  length: { units: ["m", "ft"], optional: false, noun: "a length" },
  distance: { units: ["nm", "km"], optional: false, noun: "a distance" },
  rate: { units: ["deg/s"], optional: true, noun: "a rate" },
  number: { units: [], optional: true, noun: "a number" },
};

export function unitRule(kind: QuantityKind): UnitRule {
  return rules[kind];
}

const spellings: Readonly<Record<string, Unit>> = {
  t: "t",
  kg: "kg",
  lb: "lb",
  lbs: "lb",
  n: "N",
  kn: "kN",
  kt: "kt",
  kts: "kt",
  "km/h": "km/h",
  "m/s": "m/s",
  mph: "mph",
  ft: "ft",
  m: "m",
  fl: "FL",
  hpa: "hPa",
  inhg: "inHg",
  "ft/s": "ft/s",
  c: "C",
  "°c": "C",
  k: "K",
  deg: "deg",
  "°": "deg",
  "%": "%",
  "ft/nm": "ft/nm",
  "ft/min": "ft/min",
  m2: "m2",
  "m²": "m2",
  ft2: "ft2",
  "ft²": "ft2",
  "t/h": "t/h",
  "kg/h": "kg/h",
  "lb/h": "lb/h",
  "kg/min": "kg/min",
  h: "h",
  min: "min",
  s: "s",
  "kt/s": "kt/s",
  "deg/s": "deg/s",
  "°/s": "deg/s",
  nm: "nm",
  km: "km",
};

const known = new Map(Object.entries(spellings));

/** The unit that a word spells, without regard to case; null where it is none. */
export function unitOf(word: string): Unit | null {
  return known.get(word) ?? known.get(word.toLowerCase()) ?? null;
}

/** Words that can mean one unit only, whole or shortened otherwise. Tons are none: there are three. */
const words: Readonly<Record<string, Unit>> = {
  kgs: "kg",
  kilo: "kg",
  kilos: "kg",
  kilogram: "kg",
  kilograms: "kg",
  kilogramme: "kg",
  kilogrammes: "kg",
  pound: "lb",
  pounds: "lb",
  newton: "N",
  newtons: "N",
  knot: "kt",
  knots: "kt",
  foot: "ft",
  feet: "ft",
  metre: "m",
  metres: "m",
  meter: "m",
  meters: "m",
  hectopascal: "hPa",
  hectopascals: "hPa",
  celsius: "C",
  kelvin: "K",
  degs: "deg",
  degree: "deg",
  degrees: "deg",
  percent: "%",
  hr: "h",
  hrs: "h",
  hour: "h",
  hours: "h",
  mins: "min",
  minute: "min",
  minutes: "min",
  sec: "s",
  secs: "s",
  second: "s",
  seconds: "s",
};

const spelledOut = new Map(Object.entries(words));

/** The unit that a whole word means, where it is one of the units that are due; null otherwise. */
export function unitInWords(word: string, kind: QuantityKind): Unit | null {
  const unit = spelledOut.get(word.toLowerCase());
  return unit !== undefined && rules[kind].units.includes(unit) ? unit : null;
}
