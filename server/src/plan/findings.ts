import type { TextCode } from "../notation/finding.ts";

/** Every code that a user can see. */
export type FindingCode =
  | TextCode
  | "not-in-this-version"
  | "unknown-config"
  | "unknown-aircraft"
  | "unknown-limits"
  | "unknown-contaminant"
  | "duplicate-name"
  | "out-of-range"
  | "broken-definition"
  | "missing-value"
  | "outside-table"
  | "overweight"
  | "underweight"
  | "over-vfe"
  | "over-vmo"
  | "over-mmo"
  | "over-vne"
  | "over-vno"
  | "over-ceiling"
  | "over-load-limit"
  | "below-vmca"
  | "reference-config"
  | "bank-over-limit"
  | "bank-over-advice"
  | "ratio-short"
  | "margin-short"
  | "overshoot-short"
  | "load-over-rule"
  | "radius-over-rule"
  | "buffet-short"
  | "warning-in-turn"
  | "buffet-in-turn"
  | "stalled"
  | "stall-before-warning"
  | "no-level-flight"
  | "carried-over"
  | "contaminated-takeoff"
  | "not-evaluated"
  | "claim-stale"
  | "claim-unchecked"
  | "published-below-least"
  | "built-in-limits"
  | "turn-into-dead-engine"
  | "load-below-bank"
  | "unused-definition";

const warnings = new Set([
  "missing-bar",
  "no-bar-lines",
  "unclosed-fence",
  "broken-definition",
  "bank-over-advice",
  "buffet-in-turn",
  "outside-table",
  "underweight",
  "over-vno",
  "load-below-bank",
  "carried-over",
  "claim-unchecked",
  "published-below-least",
  "claim-stale",
  "not-in-this-version",
]);
const infos = new Set(["built-in-limits", "turn-into-dead-engine"]);
export const catalogue = new Proxy(
  {},
  {
    get: (_t, code: string) => ({
      title: code,
      explanation: code,
      severity: warnings.has(code)
        ? "warning"
        : infos.has(code)
          ? "information"
          : code === "unused-definition"
            ? "hint"
            : "error",
    }),
  },
) as Readonly<
  Record<
    FindingCode,
    {
      readonly severity: "error" | "warning" | "information" | "hint";
      readonly title: string;
      readonly explanation: string;
    }
  >
>;
