import type { Fix } from "../notation/finding.ts";
import type { FindingCode } from "../plan/findings.ts";

/** Each way out of these gives the author's number another meaning: a sole one is still the author's to take. */
const choosesMeaning: ReadonlySet<FindingCode> = new Set([
  "missing-unit",
  "wrong-unit",
  "ambiguous-number",
  "bad-quantity",
]);

/**
 * The one way out that an editor may take without asking: the only one that is marked so, or the only
 * one there is. Null where several are as good, or where it would choose what a number means.
 */
export function preferredFix<F extends Fix>(code: FindingCode, fixes: readonly F[]): F | null {
  const marked = fixes.filter(({ preferred }) => preferred === true);
  if (marked.length > 0) return marked.length === 1 ? (marked[0] ?? null) : null;
  return fixes.length === 1 && !choosesMeaning.has(code) ? (fixes[0] ?? null) : null;
}
