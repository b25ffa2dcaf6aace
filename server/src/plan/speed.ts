import { calibratedFromIndicated } from "../flight/ias.ts";
import { stallSpeed } from "../flight/stall.ts";
import type { PlacedClause } from "../notation/block.ts";
import type { Speed } from "../notation/tree.ts";
import type { SpeedName } from "../notation/vocabulary.ts";
import type { Card, Configuration } from "./card.ts";
import { measured, spreadIn } from "./carry.ts";
import type { Read } from "./clauses.ts";
import type { Airframe, SpeedInput } from "./corner.ts";
import type { Finding } from "./finding.ts";
import { canBe, measureTolerance } from "./quantity.ts";
import { manoeuvringCas, type ReferenceName, referenceConfiguration, referenceSpeed } from "./reference.ts";
import { findingAt } from "./site.ts";
import type { Air } from "./situation.ts";
import { exactly, type Spread } from "./spread.ts";

/** What a speed expression is reckoned with: the nominal state, and the load of the turn. */
export interface SpeedSetting {
  readonly card: Card;
  readonly configuration: Configuration;
  readonly frame: Airframe;
  readonly mass: number;
  readonly air: Air;
  readonly liftLoss: number;
  readonly cgFactor: number;
  /** Null where the load itself depends on the speed. */
  readonly load: number | null;
}

export interface ResolvedSpeed {
  readonly kind: SpeedInput["kind"];
  readonly value: Spread;
}

/**
 * The speed that a clause states. Null with a finding where it cannot be known; an expression needs
 * `setting`, which is null where the state lacks something (told elsewhere).
 */
export function resolveSpeed(
  read: Read<"speed">,
  setting: SpeedSetting | null,
  findings: Finding[],
): ResolvedSpeed | null {
  const { placed, body } = read;
  const speed = body.speed;
  switch (speed.kind) {
    case "unknown":
      return null;
    case "mach": {
      const value = spreadIn({ findings }, placed, speed.value, "mach");
      return value && { kind: "mach", value };
    }
    case "airspeed": {
      const value = spreadIn({ findings }, placed, speed.value, "speed");
      return value && { kind: speed.type, value };
    }
    case "multiple": {
      if (speed.factor.kind === "sweep" || !setting) return null;
      const factor = measured({ findings }, placed, speed.factor, "speedFactor");
      const base = namedSpeed(speed.of, placed, setting, findings);
      return factor === null || base === null ? null : { kind: "cas", value: exactly(factor * base) };
    }
    case "named":
      return setting && offsetSpeed(speed, placed, setting, findings);
  }
}

function offsetSpeed(
  speed: Extract<Speed, { kind: "named" }>,
  placed: PlacedClause,
  setting: SpeedSetting,
  findings: Finding[],
): ResolvedSpeed | null {
  const base = namedSpeed(speed.name, placed, setting, findings);
  if (base === null) return null;
  let cas = base;
  let unit = speed.tolerance?.unit ?? null;
  if (speed.offset) {
    const size = { ...speed.offset, value: Math.abs(speed.offset.value) };
    const added = measured({ findings }, placed, size, "speedOffset");
    if (added === null) return null;
    cas += speed.offset.value < 0 ? -added : added;
    unit = speed.offset.unit;
  }
  const half = speed.tolerance ? measureTolerance(speed.tolerance, unit, "speed") : 0;
  if (!canBe(cas - half, "speed") || !canBe(cas + half, "speed")) {
    findings.push(
      findingAt(
        "out-of-range",
        placed,
        "With what is added or taken away this is no speed that can be flown: check the figures.",
        { span: speed.span },
      ),
    );
    return null;
  }
  return { kind: "cas", value: { nominal: cas, low: cas - half, high: cas + half } };
}

/** The CAS of a named speed at the nominal state. */
function namedSpeed(
  name: SpeedName,
  placed: PlacedClause,
  setting: SpeedSetting,
  findings: Finding[],
): number | null {
  switch (name) {
    case "vs1g":
      return stallCas(name, 1, setting.liftLoss, placed, setting, findings);
    case "vs": {
      const basis = setting.card.basis?.value;
      if (basis?.kind !== "vs") {
        return lacking(
          findings,
          placed,
          `vs is the stall speed of a card on the vs basis, and ${setting.card.name} states ${basis?.kind ?? "none"}: write vs1g.`,
        );
      }
      const vs1g = stallCas(name, 1, setting.liftLoss, placed, setting, findings);
      return vs1g === null ? null : vs1g * basis.factor;
    }
    case "stall":
    case "warning": {
      if (setting.load === null) {
        return lacking(
          findings,
          placed,
          `The ${name} speed depends on the load, and the load here depends on the speed: state the speed, or the bank and the path in degrees.`,
        );
      }
      const loss = name === "stall" ? setting.liftLoss : 0;
      const stall = stallCas(name, setting.load, loss, placed, setting, findings);
      if (name === "stall" || stall === null) return stall;
      if (setting.frame.warning === null) {
        return lacking(
          findings,
          placed,
          `${setting.card.name} states no warning, so the warning speed is not known: state the speed in knots.`,
        );
      }
      return stall * setting.frame.warning;
    }
    case "v2min":
    case "vfto":
    case "vref":
      return referenceCas(name, placed, setting, findings);
    case "va": {
      const va = manoeuvringCas(setting.card, setting.configuration, setting.mass, setting.air.nominal);
      return "why" in va ? lacking(findings, placed, `va is not known here. ${va.why}`) : va.cas;
    }
  }
}

function stallCas(
  name: SpeedName,
  load: number,
  liftLoss: number,
  placed: PlacedClause,
  setting: SpeedSetting,
  findings: Finding[],
): number | null {
  const { frame, mass, cgFactor, air } = setting;
  const stall = stallSpeed(frame.lift, { mass, load, liftLoss, cgFactor }, air.nominal);
  if (stall.kind === "speed") return stall.cas;
  if (stall.kind === "zero")
    return lacking(findings, placed, `At no load there is no stall, so ${name} is no speed here.`);
  if (stall.kind === "no-level-flight") {
    findings.push(
      findingAt(
        "no-level-flight",
        placed,
        "At this weight and altitude the wing carries the load at no speed: fly lower or lighter.",
      ),
    );
    return null;
  }
  findings.push(
    findingAt(
      "outside-table",
      placed,
      `${name} lies outside the card's lift-mach table for ${setting.configuration.name}, so it is not known here.`,
    ),
  );
  return null;
}

/** How a card says which configuration a reference speed belongs to. */
const markWay: Readonly<Record<ReferenceName, string>> = {
  v2min: "Mark the configuration in the card (`config NAME …, takeoff`)",
  vfto: "Call the configuration without flaps `clean` in the card",
  vref: "Mark the configuration in the card (`config NAME …, landing`)",
};

function referenceCas(
  name: ReferenceName,
  placed: PlacedClause,
  setting: SpeedSetting,
  findings: Finding[],
): number | null {
  const { card, configuration, mass, air } = setting;
  const belongs = referenceConfiguration(name, card, configuration);
  if ("why" in belongs) {
    findings.push(
      findingAt(
        "reference-config",
        placed,
        `${name} is not known in the configuration ${configuration.name}. ${belongs.why} ${markWay[name]}, fly one that is, or state the speed in knots.`,
      ),
    );
    return null;
  }
  if (belongs !== configuration) {
    const why = name === "vref" ? ", the card's only landing configuration," : "";
    findings.push(
      findingAt(
        "reference-config",
        placed,
        `${name} is taken from ${belongs.name}${why} while ${configuration.name} is flown.`,
        { severity: "information" },
      ),
    );
  }
  const reference = referenceSpeed(name, card, configuration, mass, air.nominal);
  return "why" in reference
    ? lacking(findings, placed, `${name} is not known here. ${reference.why}`)
    : reference.speed.cas;
}

function lacking(findings: Finding[], placed: PlacedClause, message: string): null {
  findings.push(findingAt("missing-value", placed, message));
  return null;
}

/** What carries on of a speed that a setting states: a setting flies straight and level. */
export function settingCas(speed: ResolvedSpeed, setting: SpeedSetting | null): Spread | null {
  if (speed.kind !== "ias") return null;
  const table = setting?.frame.ias;
  if (!setting || !table) return null;
  const at = (indicated: number) =>
    calibratedFromIndicated(table, indicated, 1, setting.mass, setting.frame.lift.referenceMass);
  const nominal = at(speed.value.nominal);
  const low = at(speed.value.low);
  const high = at(speed.value.high);
  return nominal === null || low === null || high === null ? null : { nominal, low, high };
}
