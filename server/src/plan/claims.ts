import type { Quantity } from "../notation/tree.ts";
import type { ResultName } from "../notation/vocabulary.ts";
import type { Evaluated } from "./describe.ts";
import type { Point } from "./evaluatePoint.ts";
import type { Finding } from "./finding.ts";
import { formatClaim, formatDistinct, shownClaim } from "./format.ts";
import type { ClaimResult } from "./point.ts";
import { fromShownUnit, resultEntry, results } from "./results.ts";
import { ALLOWANCE } from "./rules.ts";
import { findingAt } from "./site.ts";

export type ClaimOutcome = ClaimResult;

/** Holds every figure that the author wrote down against the one that is computed. */
export function checkClaims(
  point: Point,
  evaluated: Evaluated | null,
  findings: Finding[],
): readonly ClaimOutcome[] {
  return point.clauses.claims.map(({ placed, body }): ClaimOutcome => {
    const claimed = inSI(body.result, body.value);
    const spread = evaluated?.results[body.result] ?? null;
    if (!evaluated || !spread) {
      findings.push(
        findingAt(
          "claim-unchecked",
          placed,
          `The ${body.result} that is claimed cannot be checked, for it is not known here. ${whyUnknown(evaluated, body.result)}`,
        ),
      );
      return { clause: placed, name: body.result, claimed, computed: null, holds: null };
    }
    const computed = worstOf(body.result, spread);
    const shown = shownClaim(body.result, spread, body.value);
    const holds = body.within
      ? Math.abs(computed - claimed) <= inSI(body.result, body.within) * (1 + ALLOWANCE)
      : shown === body.value.value;
    if (!holds) {
      const unsafe = resultEntry(body.result).unsafeWhenClaimed === (claimed < computed ? "lower" : "higher");
      // A narrow `within` can fail where both read alike at the claim's decimals.
      const [was, now] = formatDistinct(
        claimed,
        computed,
        () => formatClaim(body.result, null, body.value),
        (_, more) => formatClaim(body.result, spread, body.value, more),
      );
      findings.push(
        findingAt(
          "claim-stale",
          placed,
          `The note claims ${body.result} ${was} and it is ${now} now: check the point and write the new figure.`,
          { severity: unsafe ? "error" : "warning" },
        ),
      );
    }
    return { clause: placed, name: body.result, claimed, computed, holds };
  });
}

function inSI(name: ResultName, { value, unit }: Quantity): number {
  return fromShownUnit(name, value, unit ?? results[name].unit);
}

/** The worst corner, which is what is shown. */
function worstOf(
  name: ResultName,
  spread: { readonly nominal: number; readonly low: number; readonly high: number },
): number {
  return spread[resultEntry(name).worst];
}

function whyUnknown(evaluated: Evaluated | null, name: ResultName): string {
  return evaluated ? (evaluated.absent(name) ?? "") : "This point has no figures.";
}
