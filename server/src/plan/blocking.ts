import type { Finding } from "./finding.ts";
import type { FindingCode } from "./findings.ts";

/** Findings that say nothing of the value that is sought, or only inform. */
const besides = new Set<FindingCode>([
  "claim-stale",
  "claim-unchecked",
  "not-as-expected",
  "accept-unused",
  "accept-expired",
  "accept-refused",
  "carried-over",
  "built-in-limits",
  "unbounded",
  "published-below-least",
  "broken-definition",
  "turn-into-dead-engine",
  "over-holding-speed",
  "decel-too-fast",
]);

/** Findings that are a broken rule or check only where they are more than information. */
const gravely = new Set<FindingCode>(["load-below-bank", "reference-config"]);

/**
 * True for a finding that breaks a rule or a check: a solved value has none, and a sweep is shown at the
 * first value that has one. What is one step lower in an exercise or an emergency counts all the same;
 * what the note accepts does not.
 */
export function blocks(finding: Finding): boolean {
  if (finding.accepted || besides.has(finding.code)) return false;
  return !(gravely.has(finding.code) && finding.severity === "information");
}
