import type { Fix } from "../notation/finding.ts";
import type { BodyOf, Quantity } from "../notation/tree.ts";
import type { ResultName } from "../notation/vocabulary.ts";
import type { Read } from "./clauses.ts";
import type { Finding } from "./finding.ts";
import { formatClaim, formatClaimNumber, formatDistinct, shownClaim } from "./format.ts";
import type { Origin } from "./origin.ts";
import type { ClaimResult } from "./point.ts";
import { fromShownUnit, resultEntry, results } from "./results.ts";
import { MOST_DECIMALS } from "./roundShown.ts";
import { ALLOWANCE } from "./rules.ts";
import { findingAt } from "./site.ts";
import type { Spread } from "./spread.ts";

type Claim = BodyOf<"claim">;

/** What a claim is held against. */
export interface ClaimedFigures {
  /** The figure with its extremes, over all rows of a sweep; null where it is not known. */
  spread(name: ResultName): Spread | null;
  /** Why it is not known, as a sentence; null where that was told in this point already. */
  why(name: ResultName): string | null;
  /** Where the line stands that the reason names. */
  readonly mentions: readonly Origin[];
}

/** Holds every figure that the author wrote down against the one that is computed. */
export function checkClaims(
  claims: readonly Read<"claim">[],
  figures: ClaimedFigures,
  findings: Finding[],
): readonly ClaimResult[] {
  return claims.map(({ placed, body }): ClaimResult => {
    const claimed = inSI(body.result, body.value);
    const spread = figures.spread(body.result);
    if (!spread) {
      const why = figures.why(body.result);
      if (why !== null)
        findings.push(
          findingAt(
            "claim-unchecked",
            placed,
            `The ${body.result} that is claimed cannot be checked, for it is not known here. ${why}`,
            { mentions: figures.mentions },
          ),
        );
      return { clause: placed, name: body.result, claimed, computed: null, holds: null };
    }
    const computed = spread[resultEntry(body.result).worst];
    const holds = claimHolds(body, spread);
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
          `The note claims ${body.result} ${was} and it is ${now} now${unsafe ? ", so that it promises too much" : ""}: check the point and write the new figure.`,
          { severity: unsafe ? "error" : "warning", fixes: claimFix(body, spread, placed.line) },
        ),
      );
    }
    return { clause: placed, name: body.result, claimed, computed, holds };
  });
}

function claimHolds(body: Claim, spread: Spread): boolean {
  if (!body.within) return shownClaim(body.result, spread, body.value) === body.value.value;
  const off = Math.abs(spread[resultEntry(body.result).worst] - inSI(body.result, body.value));
  return off <= inSI(body.result, body.within) * (1 + ALLOWANCE);
}

/** Writes the figure that is shown, with the claim's own decimals, or as many as its `within` needs. */
function claimFix(body: Claim, spread: Spread, line: number): readonly Fix[] {
  for (let more = 0; body.value.decimals + more <= MOST_DECIMALS; more++) {
    const newText = formatClaimNumber(body.result, spread, body.value, more);
    const value = { ...body.value, value: Number(newText), decimals: body.value.decimals + more };
    if (!claimHolds({ ...body, value }, spread)) continue;
    const title = `Write ${formatClaim(body.result, spread, body.value, more)}`;
    return [{ title, preferred: true, edits: [{ line, ...body.value.numberSpan, newText }] }];
  }
  return [];
}

function inSI(name: ResultName, { value, unit }: Quantity): number {
  return fromShownUnit(name, value, unit ?? results[name].unit);
}
