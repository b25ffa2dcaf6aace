import type { BlockKind } from "./block.ts";

export const phases = [
  "takeoff",
  "departure",
  "climb",
  "cruise",
  "descent",
  "hold",
  "approach",
  "circling",
  "landing",
  "missed",
  "manoeuvre",
] as const;
export type Phase = (typeof phases)[number];

export const speedNames = ["vs1g", "vs", "stall", "warning", "v2min", "vfto", "vref", "va"] as const;
export type SpeedName = (typeof speedNames)[number];

export const subjects = ["bank", "load", "radius", "ratio", "margin", "overshoot", "buffet"] as const;
export type Subject = (typeof subjects)[number];

/** The results that claims, hints, hovers, tables and scripts name alike. */
export const results = [
  "vs1g",
  "overshoot",
  "stall",
  "warning",
  "ratio",
  "margin",
  "load",
  "stall-load",
  "stall-bank",
  "warning-bank",
  "buffet-bank",
  "buffet-load",
  "radius",
  "rate",
  "rate-one-bank",
  "v2min",
  "vfto",
  "vref",
  "va",
] as const;
export type ResultName = (typeof results)[number];

export type Unit =
  | "t"
  | "kg"
  | "lb"
  | "N"
  | "kN"
  | "kt"
  | "km/h"
  | "m/s"
  | "mph"
  | "ft"
  | "m"
  | "FL"
  | "hPa"
  | "inHg"
  | "ft/s"
  | "C"
  | "K"
  | "deg"
  | "%"
  | "ft/nm"
  | "ft/min"
  | "m2"
  | "ft2"
  | "t/h"
  | "kg/h"
  | "lb/h"
  | "kg/min"
  | "h"
  | "min"
  | "s"
  | "kt/s"
  | "deg/s"
  | "nm"
  | "km";

/** Every keyword that can begin a clause, as it is spelt in full (synonyms resolve to these). */
export type Keyword =
  // points and settings
  | "fly"
  | "under"
  | "rules"
  | "aside"
  | "phase"
  | "weight"
  | "burn"
  | "config"
  | "qnh"
  | "altitude"
  | "isa"
  | "oat"
  | "speed"
  | "bank"
  | "path"
  | "load"
  | "gust"
  | "shear"
  | "cg"
  | "contamination"
  | "power"
  | "decel"
  | "engine-out"
  | "emergency"
  | "claim"
  | "expect"
  | "accept"
  // cards
  | "aircraft"
  | "source"
  | "basis"
  | "reference"
  | "mass"
  | "wing"
  | "vmo"
  | "vmca"
  | "vne"
  | "vno"
  | "mmo"
  | "ceiling"
  | "warning"
  | "v2min"
  | "lift-mach"
  | "buffet"
  | "ias"
  | "cg-effect"
  | "power-effect"
  | "published"
  // limits
  | "limits"
  | "must"
  | "should";

/** One keyword of the notation: the one table that parser, completion, hover, grammar and README read. */
export interface KeywordEntry {
  readonly keyword: Keyword;
  /** Where it may stand. */
  readonly blocks: readonly BlockKind[];
  /** Its arguments, as a reader sees them. */
  readonly pattern: string;
  /** The text that completion inserts; `$0` is where the cursor stops. */
  readonly snippet: string;
  readonly example: string;
  /** One or two plain sentences. */
  readonly documentation: string;
  /** True where a point that does not state it goes on with the last one stated. */
  readonly carries: boolean;
  readonly since: string;
}

const inPlan: readonly BlockKind[] = ["point", "setting"];
const inPoint: readonly BlockKind[] = ["point"];
const inCard: readonly BlockKind[] = ["card"];
const inLimits: readonly BlockKind[] = ["limits"];

function entry(
  keyword: Keyword,
  blocks: readonly BlockKind[],
  pattern: string,
  example: string,
  documentation: string,
  carries = false,
): KeywordEntry {
  const snippet = pattern === "" ? keyword : `${keyword} $0`;
  return { keyword, blocks, pattern, snippet, example, documentation, carries, since: "0.1.0" };
}

export const vocabulary: readonly KeywordEntry[] = [
  entry(
    "fly",
    inPlan,
    "NAME",
    "fly brambling-37",
    "The card in use. Another aeroplane starts afresh; only limits and rules go on.",
    true,
  ),
  entry(
    "under",
    inPlan,
    "NAME",
    "under shuttle-rules",
    "The limits in use; the built-in common-practice when none are named.",
    true,
  ),
  entry(
    "rules",
    inPlan,
    "ifr|vfr",
    "rules ifr",
    "Which rows marked `when` apply. Without it rows for both hold.",
    true,
  ),
  entry(
    "phase",
    inPoint,
    'PHASE ["TITLE"]',
    'phase departure "Noise turn"',
    "Makes the block a point: one moment of the plan.",
  ),
  entry(
    "aside",
    inPoint,
    "",
    "aside",
    "A variation: the point takes over what came before, and passes nothing on.",
  ),
  entry(
    "weight",
    inPlan,
    "MASS [+- MASS]",
    "weight 56.4 t +- 0.4 t",
    "Gross weight, as a mass or as a force.",
    true,
  ),
  entry(
    "burn",
    inPlan,
    "MASS | FLOW for TIME",
    "burn 2.4 t/h for 35 min",
    "Mass burnt since the point before; tolerances add.",
    true,
  ),
  entry(
    "config",
    ["point", "setting", "card"],
    "NAME",
    "config flaps-5",
    "In a plan: the configuration that is flown. In a card: a configuration with its stall speed, limit load factors and flap speed.",
    true,
  ),
  entry(
    "qnh",
    inPlan,
    "PRESSURE",
    "qnh 985 hPa",
    "The altimeter setting that altitudes in feet are on.",
    true,
  ),
  entry(
    "altitude",
    inPlan,
    "ALTITUDE",
    "altitude FL350",
    "Feet or metres on the qnh where one is stated, else pressure altitude; a flight level has three digits.",
    true,
  ),
  entry(
    "isa",
    inPlan,
    "DEVIATION",
    "isa +8",
    "Deviation from the standard temperature, with its sign.",
    true,
  ),
  entry(
    "oat",
    inPlan,
    "TEMPERATURE",
    "oat -42 C",
    "Outside air temperature; it goes on as the deviation that it is at its own altitude.",
    true,
  ),
  entry(
    "speed",
    inPlan,
    "SPEED",
    "speed vref + 5 kt",
    "Calibrated unless it says eas, tas, ias or M; also 1.3 vs1g, vref + 5 kt, warning.",
    true,
  ),
  entry(
    "bank",
    inPoint,
    "ANGLE | rate-one [left|right]",
    "bank 25 left",
    "Bank in degrees, never signed. Not stated, wings level is taken. 90 and more needs a load.",
  ),
  entry(
    "path",
    inPoint,
    "deg | % | ft/nm | ft/min",
    "path -3 deg",
    "Flight-path angle. Not stated, level flight is taken.",
  ),
  entry("load", inPoint, "NUMBER", "load 1.5", "Load factor, where the bank does not give it."),
  entry(
    "gust",
    inPoint,
    "ft/s | m/s",
    "gust 30 ft/s",
    "Derived gust velocity; a reported wind gust is something else.",
  ),
  entry(
    "shear",
    inPoint,
    "SPEED",
    "shear 15 kt",
    "A sudden loss of airspeed that margins are also shown after.",
  ),
  entry(
    "engine-out",
    inPlan,
    "left|right|none",
    "engine-out left",
    "Which engine is out; rows marked `when engine-out` apply.",
    true,
  ),
  entry(
    "cg",
    inPlan,
    "PER CENT",
    "cg 18 %",
    "Centre of gravity in per cent of the mean chord. Not stated, the most adverse of the card is taken.",
    true,
  ),
  entry(
    "contamination",
    ["point", "setting", "card"],
    "PER CENT | NAME | none",
    "contamination 8 %",
    "Loss of maximum lift of the wing, not of the runway. In a card: a named loss.",
    true,
  ),
  entry(
    "power",
    inPlan,
    "PER CENT",
    "power 70 %",
    "Power set; shown for information, no rule uses it.",
    true,
  ),
  entry(
    "decel",
    inPoint,
    "kt/s",
    "decel 1 kt/s",
    "Deceleration, for the seconds to the warning and to the stall.",
  ),
  entry(
    "emergency",
    inPoint,
    '["TITLE"]',
    'emergency "engine fire return"',
    "The limits' emergency rows apply; an emergency does not move the stall.",
  ),
  entry(
    "claim",
    inPoint,
    "RESULT VALUE [within VALUE]",
    "claim margin 1.34 within 0.02",
    "A figure that the note states in words; it is told when it is no longer so.",
  ),
  entry(
    "expect",
    inPoint,
    "[not] CODE",
    "expect warning-in-turn",
    "For exercises: the finding must come, or must not.",
  ),
  entry(
    "accept",
    inPoint,
    'CODE to VALUE because "…" by "…" until DATE',
    'accept bank-over-limit to 35 because "terrain"',
    "A finding that is known and taken, with the reason.",
  ),
  entry(
    "aircraft",
    inCard,
    'NAME ["TITLE"]',
    'aircraft brambling-37 "an invented twin jet"',
    "Begins a card: what is known of an aeroplane.",
  ),
  entry(
    "source",
    ["card", "limits"],
    '"TITLE" [issue NAME] [, from DATE]',
    'source "invented" issue 3, from 2026-03-01',
    "Where the figures come from, and which issue of it.",
  ),
  entry(
    "basis",
    inCard,
    "vsr | vs1g | vs FACTOR",
    "basis vs 0.94",
    "What the card's stall speeds are. On `vs` the factor is vs over the 1-g stall speed.",
  ),
  entry("reference", inCard, "MASS", "reference 55 t", "The mass at which the stall speeds hold."),
  entry(
    "mass",
    inCard,
    "MASS to MASS [, landing MASS]",
    "mass 33 t to 59 t, landing 53 t",
    "Least and greatest mass, and the greatest landing mass.",
  ),
  entry(
    "wing",
    inCard,
    "AREA [, chord LENGTH] [, slope … per rad]",
    "wing 104 m2, chord 3.7 m",
    "Wing area, mean chord and lift-curve slope.",
  ),
  entry("vmo", inCard, "SPEED [ias]", "vmo 318 kt", "Maximum operating speed."),
  entry("mmo", inCard, "MACH", "mmo 0.79", "Maximum operating Mach number."),
  entry("vne", inCard, "SPEED [ias]", "vne 138 kt", "Never-exceed speed."),
  entry("vno", inCard, "SPEED [ias]", "vno 108 kt", "Maximum structural cruising speed."),
  entry("vmca", inCard, "SPEED [ias]", "vmca 101 kt", "Minimum control speed in the air."),
  entry("ceiling", inCard, "ALTITUDE", "ceiling FL385", "Greatest pressure altitude."),
  entry("warning", inCard, "FACTOR", "warning 1.03", "Speed of the stall warning over the stall speed."),
  entry(
    "v2min",
    inCard,
    "FACTOR",
    "v2min 1.08",
    "The factor of v2min where 14 CFR 25.107(b)(2) allows another than 1.13.",
  ),
  entry(
    "lift-mach",
    inCard,
    "CONFIG MACH FACTOR, …",
    "lift-mach clean 0.30 1.00, 0.79 0.68",
    "Maximum lift coefficient against Mach number, over its low-speed value.",
  ),
  entry(
    "buffet",
    inCard,
    "CONFIG [cg PER CENT,] MACH CL, …",
    "buffet clean 0.40 1.25, 0.79 0.62",
    "Lift coefficient at buffet onset against Mach number.",
  ),
  entry(
    "ias",
    inCard,
    "CONFIG IAS CAS, …",
    "ias clean 43 kt 49 kt, 80 kt 80 kt",
    "Indicated, then calibrated airspeed, at 1 g and the reference mass.",
  ),
  entry(
    "cg-effect",
    inCard,
    "CG FACTOR, …",
    "cg-effect 14 % 1.000, 34 % 0.982",
    "Factor on the stall speed against cg.",
  ),
  entry(
    "power-effect",
    inCard,
    "POWER FACTOR, …",
    "power-effect 0 % 1.00, 100 % 0.96",
    "Factor on the stall speed against power; information only.",
  ),
  entry(
    "published",
    inCard,
    "vref|v2min|vfto CONFIG MASS SPEED, …",
    "published vref flaps-30 45 t 119 kt, 53 t 131 kt",
    "Published reference speeds over mass; they count before the least values.",
  ),
  entry(
    "limits",
    inLimits,
    'NAME ["TITLE"] [, from NAME]',
    "limits shuttle-rules, from common-practice",
    "Begins limits: the rules that a plan is held against.",
  ),
  entry(
    "must",
    inLimits,
    "PHASES SUBJECT VALUE [conditions]",
    "must any bank 30",
    "A rule: breaking it is an error.",
  ),
  entry(
    "should",
    inLimits,
    "PHASES SUBJECT VALUE [conditions]",
    "should any bank 25 or rate-one when ifr",
    "Advice: not keeping it is a warning.",
  ),
];

const byKeyword = new Map<string, KeywordEntry>(vocabulary.map((one) => [one.keyword, one]));

export function keywordEntry(keyword: Keyword): KeywordEntry {
  return byKeyword.get(keyword) as KeywordEntry;
}

/** Other spellings that are understood as they stand. */
export const synonyms: Readonly<Record<string, string>> = { maneuver: "manoeuvre", mach: "m" };

/** Words that newcomers write for a keyword; none is understood, each gets a fix that names the clause. */
export const strangers: Readonly<Record<string, Keyword>> = {
  flaps: "config",
  flap: "config",
  configuration: "config",
  gear: "config",
  alt: "altitude",
  level: "altitude",
  height: "altitude",
  fl: "altitude",
  temp: "oat",
  temperature: "oat",
  roll: "bank",
  angle: "bank",
  turn: "bank",
  gw: "weight",
  tow: "weight",
  lw: "weight",
  gross: "weight",
  wt: "weight",
  fuel: "burn",
  spd: "speed",
  kias: "speed",
  kcas: "speed",
  airspeed: "speed",
  ice: "contamination",
  icing: "contamination",
  slope: "path",
  gradient: "path",
  climb: "path",
  g: "load",
  engine: "engine-out",
  altimeter: "qnh",
  type: "fly",
  aeroplane: "fly",
  airplane: "fly",
};

const keywordSet = new Set<string>([...byKeyword.keys()]);
export const keywords: readonly Keyword[] = vocabulary.map((one) => one.keyword);

/** The keyword a word spells, without regard to case. */
export function keywordOf(word: string): Keyword | null {
  if (keywordSet.has(word)) return word as Keyword;
  const lower = word.toLowerCase();
  return keywordSet.has(lower) ? (lower as Keyword) : null;
}
