import type { Finding, Severity } from "./finding.ts";
import type { FindingCode } from "./findings.ts";

/** A level that a code may be given. */
export type Level = Exclude<Severity, "hint">;

export const levels: readonly Level[] = ["error", "warning", "information"];

/** What an organisation makes of codes. */
export type Severities = Readonly<Partial<Record<FindingCode, Level>>>;

const order: readonly Severity[] = ["hint", "information", "warning", "error"];

/**
 * A finding with the severity that is asked for its code. Every code may be raised; a warning may be lowered
 * to information, an error never. What the note accepts or expects stays information: only the note
 * says that, with its reason.
 */
export function withSeverity(finding: Finding, severities: Severities): Finding {
  const asked = severities[finding.code];
  if (!asked || asked === finding.severity || finding.accepted || finding.expected) return finding;
  const isRaised = order.indexOf(finding.severity) < order.indexOf(asked);
  return isRaised || finding.severity === "warning" ? { ...finding, severity: asked } : finding;
}
