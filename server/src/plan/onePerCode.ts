import { figureRules } from "./figureRules.ts";
import type { Finding } from "./finding.ts";

/** Codes whose cases stand at clauses of their own and are mended one by one. */
export const toldApart: ReadonlySet<string> = new Set([
  "claim-stale",
  "claim-unchecked",
  "missing-value",
  "out-of-range",
]);

const gravest = ["error", "warning", "information", "hint"] as const;

/** A point has at most one finding of a code, whose message names every case: what is accepted is accepted once. */
export function onePerCode(findings: readonly Finding[]): readonly Finding[] {
  const first = new Map<string, Finding>();
  const told: Finding[] = [];
  for (const finding of findings) {
    const before = toldApart.has(finding.code) ? undefined : first.get(finding.code);
    if (!before) {
      first.set(finding.code, finding);
      told.push(finding);
      continue;
    }
    const both = together(before, finding, `${before.message} ${finding.message}`);
    first.set(finding.code, both);
    told[told.indexOf(before)] = both;
  }
  return told;
}

/** Two findings of one code as one: as grave as the graver, with the worse figure. */
export function together(one: Finding, other: Finding, message: string): Finding {
  const figure = worse(one, other);
  const { figure: _, ...first } = one;
  const mentions = [...(one.mentions ?? []), ...(other.mentions ?? [])];
  return {
    ...first,
    severity: gravest.find((level) => level === one.severity || level === other.severity) ?? one.severity,
    message,
    related: [...one.related, ...other.related],
    fixes: [...one.fixes, ...other.fixes],
    ...(figure === undefined ? {} : { figure }),
    ...(mentions.length === 0 ? {} : { mentions }),
  };
}

function worse(one: Finding, other: Finding): number | undefined {
  // A case without a figure is worse than any that has one: no `to` may cover it.
  if (one.figure === undefined || other.figure === undefined) return undefined;
  const rule = figureRules[one.code];
  return rule?.worse === "less" ? Math.min(one.figure, other.figure) : Math.max(one.figure, other.figure);
}
