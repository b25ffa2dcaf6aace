import type { ResultName } from "../notation/vocabulary.ts";
import type { Evaluated } from "./evaluated.ts";

/** Why a result is not known at this point, as a sentence; null where it is. */
export function whyAbsent(evaluated: Evaluated, name: ResultName | "ias"): string | null {
  const { ready, conditions, results } = evaluated;
  const { card, configuration, frame } = ready;
  if (name === "ias") {
    if (conditions.ias) return null;
    if (!configuration.ias) return `The card has no ias table for ${configuration.name}.`;
    return `The speed lies outside the card's ias table for ${configuration.name}.`;
  }
  if (results[name]) return null;
  switch (name) {
    case "v2min":
    case "vfto":
    case "vref":
    case "va": {
      const reference = evaluated.references()[name];
      return "why" in reference ? reference.why : null;
    }
    case "warning":
    case "warning-bank":
    case "overshoot":
      if (frame.warning === null) return `The card ${card.name} states no warning.`;
      if (name !== "warning" && results.warning) return "The warning has already come.";
      return liftUnknown(evaluated);
    case "buffet-load":
    case "buffet-bank":
      return buffetUnknown(evaluated, name);
    case "radius":
    case "rate":
      return "Wings level there is no turn.";
    case "rate-one-bank":
    case "load":
      return "It is not known here.";
    case "margin":
      if (results.stall?.low === 0) return "Without load there is no stall.";
      return liftUnknown(evaluated);
    case "stall-bank":
      if (results["stall-load"]) return "Wings level the aeroplane is already stalled.";
      return liftUnknown(evaluated);
    default:
      return liftUnknown(evaluated);
  }
}

function liftUnknown({ corners, ready }: Evaluated): string {
  const kinds = new Set(corners.all.flatMap((one) => [one.stallKind, one.vs1gKind]));
  if (kinds.has("no-level-flight"))
    return "At this weight and altitude the wing carries the load at no speed.";
  if (kinds.has("none")) return "Under a negative load no stall speed is computed.";
  return `It lies outside the card's lift-mach table for ${ready.configuration.name}, which is never extrapolated.`;
}

function buffetUnknown(
  { ready, conditions, results }: Evaluated,
  name: "buffet-load" | "buffet-bank",
): string {
  const { configuration, card, frame } = ready;
  if (!configuration.buffet) return `The card has no buffet table for ${configuration.name}.`;
  if (!card.wing) return "The card states no wing area, which the buffet table needs.";
  if (!frame.buffet) return "The card's buffet table or wing is in error.";
  if (0 < conditions.liftLoss.high) return "With contamination no buffet figure is known.";
  if (name === "buffet-bank" && results["buffet-load"]) return "Buffet begins wings level.";
  return `The Mach number lies outside the card's buffet table for ${configuration.name}, which is never extrapolated.`;
}
