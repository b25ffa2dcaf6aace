export type Phase =
  | "takeoff"
  | "departure"
  | "climb"
  | "cruise"
  | "descent"
  | "hold"
  | "approach"
  | "circling"
  | "landing"
  | "missed"
  | "manoeuvre";

export type SpeedName = "vs1g" | "vs" | "stall" | "warning" | "v2min" | "vfto" | "vref" | "va";

export type Subject = "bank" | "load" | "radius" | "ratio" | "margin" | "overshoot" | "buffet";

export type ResultName =
  | "vs1g"
  | "overshoot"
  | "stall"
  | "warning"
  | "ratio"
  | "margin"
  | "load"
  | "stall-load"
  | "stall-bank"
  | "warning-bank"
  | "buffet-bank"
  | "buffet-load"
  | "radius"
  | "rate"
  | "rate-one-bank"
  | "v2min"
  | "vfto"
  | "vref"
  | "va";

export type Unit =
  | "t" | "kg" | "lb" | "N" | "kN"
  | "kt" | "km/h" | "m/s" | "mph"
  | "ft" | "m" | "FL"
  | "hPa" | "inHg"
  | "ft/s"
  | "C" | "K"
  | "deg" | "%" | "ft/nm" | "ft/min"
  | "m2" | "ft2"
  | "t/h" | "kg/h" | "lb/h" | "kg/min"
  | "h" | "min" | "s"
  | "kt/s" | "deg/s"
  | "nm" | "km";

/** Every keyword that can begin a clause, as it is spelt in full (synonyms resolve to these). */
export type Keyword =
  // points and settings
  | "fly" | "under" | "rules" | "aside" | "phase" | "weight" | "burn" | "config" | "qnh" | "altitude"
  | "isa" | "oat" | "speed" | "bank" | "path" | "load" | "gust" | "shear" | "cg" | "contamination"
  | "power" | "decel" | "engine-out" | "emergency" | "claim" | "expect" | "accept"
  // cards
  | "aircraft" | "source" | "basis" | "reference" | "mass" | "wing" | "vmo" | "vmca" | "vne" | "vno"
  | "mmo" | "ceiling" | "warning" | "v2min" | "lift-mach" | "buffet" | "ias" | "cg-effect"
  | "power-effect" | "published"
  // limits
  | "limits" | "must" | "should";
